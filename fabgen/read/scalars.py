"""What one value of a design file may be: metadata for the fields of `grammar`.

Each kind reads a scalar of the tree strictly and says, when it cannot, what is allowed and what an example looks like.
A value that is readable but only likely in the other unit leaves a warning in the context.
"""

import re
from abc import ABC, abstractmethod
from datetime import date
from typing import Any, NamedTuple, NoReturn, cast

from pydantic import GetCoreSchemaHandler, GetJsonSchemaHandler, ValidationError, ValidationInfo
from pydantic_core import CoreSchema, PydanticCustomError, core_schema

from fabgen.errors import Place
from fabgen.read.nearest import suggestion
from fabgen.read.yaml_tree import Node, Scalar, Seq
from fabgen.units import UnitError, in_to_mm, mm_to_in, parse_frequency_mhz, parse_length_mm


class OtherUnit(NamedTuple):
    """A length that is only likely in the other unit."""

    key: str
    place: Place
    written: str
    read_mm: float
    other_mm: float
    other_unit: str


class Broken(NamedTuple):
    """A section, row or value of the top level that did not validate, with pydantic's reasons."""

    node: Node
    field: str
    error: ValidationError


class Context:
    """What fields need to know about their file, and where they leave what they notice.

    Attributes:
        unit: of bare lengths: `mm`, `in`, or None when the file does not say.
        other_unit: lengths that are only likely in the other unit.
        broken: sections and rows that did not validate, with the reasons.
    """

    def __init__(self, unit: str | None) -> None:
        self.unit = unit
        self.other_unit: list[OtherUnit] = []
        self.broken: list[Broken] = []


def refuse(code: str, message: str, fix: str) -> NoReturn:
    """Refuse a value.

    Args:
        code: the D code.
        message: what is wrong; the key is put in front of it.
        fix: the cheapest way out, with an example.

    Raises:
        PydanticCustomError: always.
    """
    raise PydanticCustomError("fabgen", "{message}", {"code": code, "message": message, "fix": fix})


def scalar_of(value: Any, example: str) -> Scalar:
    """The scalar that a field takes.

    Raises:
        PydanticCustomError: it is a list, a mapping, or nothing.
    """
    if isinstance(value, Scalar):
        if value.empty:
            refuse("D07", "has no value", f"for example {example}")
        return value
    refuse("D08", f"takes one value, not a {'list' if isinstance(value, Seq) else 'mapping'}", f"for example {example}")


class Kind(ABC):
    """Base of the kinds: plugs `read` into pydantic and `schema` into its JSON Schema.

    Plain classes, because these are made at every start of the program and a dataclass costs a millisecond each.

    Attributes:
        example: as a user would write it.
    """

    example: str

    @abstractmethod
    def read(self, value: Any, info: ValidationInfo) -> Any:
        """The value in force, from a node of the tree."""

    @abstractmethod
    def schema(self) -> dict[str, Any]:
        """The JSON Schema of what may be written."""

    def __get_pydantic_core_schema__(self, _source: Any, _handler: GetCoreSchemaHandler) -> CoreSchema:
        return core_schema.with_info_plain_validator_function(self.read)

    def __get_pydantic_json_schema__(self, _schema: CoreSchema, _handler: GetJsonSchemaHandler) -> dict[str, Any]:
        return self.schema()


class Length(Kind):
    """A length.

    Args:
        low_mm: smallest allowed.
        high_mm: largest allowed.
        example: as a user would write it.
        likely_mm: what a shop would call normal; decides whether the other unit was meant.
    """

    def __init__(
        self, low_mm: float, high_mm: float, example: str, likely_mm: tuple[float, float] | None = None
    ) -> None:
        self.low_mm, self.high_mm, self.example, self.likely_mm = low_mm, high_mm, example, likely_mm

    def read(self, value: Any, info: ValidationInfo) -> float:
        """The length in mm."""
        scalar = scalar_of(value, self.example)
        context = cast(Context, info.context)
        try:
            length_mm = parse_length_mm(scalar, context.unit)
        except UnitError as error:
            self._refuse(scalar, error)
        if not self.low_mm <= length_mm <= self.high_mm:
            fix = f"{self.low_mm:g} mm to {self.high_mm:g} mm; for example {self.example}"
            other = self._other(scalar, length_mm)
            if other is not None:
                fix += f"; {scalar.strip()} in the other unit would be {other[0]:.4g} mm: write the unit"
            refuse("D12", f"'{scalar}' is out of range", fix)
        if self.likely_mm and not self.likely_mm[0] <= length_mm <= self.likely_mm[1]:
            other = self._other(scalar, length_mm)
            if other is not None:
                key = (info.field_name or "").removesuffix("_mm")
                context.other_unit.append(OtherUnit(key, scalar.place, str(scalar), length_mm, *other))
        return length_mm

    def _other(self, scalar: Scalar, length_mm: float) -> tuple[float, str] | None:
        """The same number in the other unit, in mm, when that is likely."""
        if self.likely_mm is None:
            return None
        inch = any(mark in scalar for mark in ("in", '"', "″", "ft", "'"))
        other = (mm_to_in(length_mm), "mm") if inch else (in_to_mm(length_mm), "in")
        return other if self.likely_mm[0] <= other[0] <= self.likely_mm[1] else None

    def _refuse(self, scalar: Scalar, error: UnitError) -> NoReturn:
        """Refuse with the code that fits: a comma, a missing unit, or no length at all."""
        code = "D13" if "," in scalar else "D10"
        fix = error.fix
        if code == "D10" and (bare := _bare_mm(scalar)) is not None:
            code = "D11"
            in_inches = in_to_mm(bare)
            low, high = self.likely_mm or (self.low_mm, self.high_mm)
            if low <= bare <= high and low <= in_inches <= high:
                fix = f"{scalar} mm and {scalar} in ({in_inches:.4g} mm) are both likely: write the unit or set `units`"
            else:
                fix += ", or set `units: mm` or `units: in` for the whole file"
        refuse(code, error.message, f"{fix}; for example {self.example}" if self.example not in fix else fix)

    def schema(self) -> dict[str, Any]:
        """A text with a unit or a bare number."""
        said = f"a length, {self.low_mm:g} mm to {self.high_mm:g} mm"
        return {"type": ["string", "number"], "description": said, "examples": [self.example]}


def _bare_mm(scalar: Scalar) -> float | None:
    """The number of a length without a unit, or None."""
    for unit in ("mm", "in"):
        try:
            return parse_length_mm(scalar, unit)
        except UnitError:
            continue
    return None


class Frequency(Kind):
    """A frequency with its unit."""

    def __init__(self, low_mhz: float, high_mhz: float, example: str) -> None:
        self.low_mhz, self.high_mhz, self.example = low_mhz, high_mhz, example

    def read(self, value: Any, _info: ValidationInfo) -> float:
        """The frequency in MHz."""
        scalar = scalar_of(value, self.example)
        try:
            frequency_mhz = parse_frequency_mhz(scalar)
        except UnitError as error:
            code = "D13" if "," in scalar else "D11" if re.fullmatch(r"[0-9.]+", scalar) else "D10"
            refuse(code, error.message, error.fix)
        if not self.low_mhz <= frequency_mhz <= self.high_mhz:
            limits = f"{self.low_mhz:g} MHz to {self.high_mhz:g} MHz"
            refuse("D12", f"'{scalar}' is out of range", f"{limits}; for example {self.example}")
        return frequency_mhz

    def schema(self) -> dict[str, Any]:
        """A text with a unit."""
        said = f"a frequency with its unit, {self.low_mhz:g} MHz to {self.high_mhz:g} MHz"
        return {"type": "string", "description": said, "examples": [self.example]}


class Number(Kind):
    """A plain number; `said` is its meaning and unit."""

    def __init__(self, low: float, high: float, example: str, said: str) -> None:
        self.low, self.high, self.example, self.said = low, high, example, said

    def read(self, value: Any, _info: ValidationInfo) -> float:
        """The number, by the rules of YAML 1.2's core schema for floats, without infinities."""
        scalar = scalar_of(value, self.example)
        text = scalar.strip()
        if not re.fullmatch(r"[+-]?(\.[0-9]+|[0-9]+(\.[0-9]*)?)([eE][+-]?[0-9]+)?", text):
            code = "D13" if "," in text else "D10"
            fix = f"write {text.replace(',', '.')}" if code == "D13" else f"{self.said}, for example {self.example}"
            refuse(code, f"'{scalar}' is not a plain number", fix)
        number = float(text)
        if not self.low <= number <= self.high:
            limits = f"{self.said}, {self.low:g} to {self.high:g}"
            refuse("D12", f"'{scalar}' is out of range", f"{limits}; for example {self.example}")
        return number

    def schema(self) -> dict[str, Any]:
        """A number within its limits."""
        return {"type": "number", "minimum": self.low, "maximum": self.high, "description": self.said}


class Word(Kind):
    """One of a few words."""

    def __init__(self, *words: str) -> None:
        self.words, self.example = words, words[0]

    def read(self, value: Any, _info: ValidationInfo) -> str:
        """The word."""
        scalar = scalar_of(value, self.words[0])
        if str(scalar) not in self.words:
            refuse("D09", f"'{scalar}' is not known", suggestion(scalar, self.words))
        return str(scalar)

    def schema(self) -> dict[str, Any]:
        """The words, and what YAML makes of those that look like a number or a truth value."""
        typed = {"1": 1, "true": True, "false": False}
        return {"enum": [*self.words, *(typed[word] for word in self.words if word in typed)]}


class Text(Kind):
    """Free text on one line; white space of any kind becomes single spaces.

    Args:
        longest: number of characters.
        example: as a user would write it.
        blank: whether nothing may be written.
    """

    def __init__(self, longest: int, example: str, *, blank: bool = False) -> None:
        self.longest, self.example, self.blank = longest, example, blank

    def read(self, value: Any, _info: ValidationInfo) -> str:
        """The text."""
        if self.blank and isinstance(value, Scalar) and value.empty:
            return ""
        scalar = scalar_of(value, self.example)
        text = " ".join(scalar.split())
        if not text and not self.blank:
            refuse("D07", "has no value", f"for example {self.example}")
        if len(text) > self.longest:
            refuse("D12", f"has {len(text)} characters", f"at most {self.longest}")
        if not text.isprintable():
            bad = next(character for character in text if not character.isprintable())
            refuse("D14", f"holds U+{ord(bad):04X}, which cannot be printed", "delete that character")
        return text

    def schema(self) -> dict[str, Any]:
        """A text of limited length."""
        kinds = ["string", "null"] if self.blank else ["string", "number"]
        return {"type": kinds, "maxLength": self.longest, "examples": [self.example]}


class Name(Kind):
    """A name that becomes part of file and part names.

    Args:
        pattern: the whole name matches it.
        said: the pattern in words.
        example: as a user would write it.
        reserved: words that are taken, in lower case.
    """

    def __init__(self, pattern: str, said: str, example: str, reserved: tuple[str, ...] = ()) -> None:
        self.pattern, self.said, self.example, self.reserved = pattern, said, example, reserved

    def read(self, value: Any, _info: ValidationInfo) -> str:
        """The name as written."""
        scalar = scalar_of(value, self.example)
        if not re.fullmatch(self.pattern, scalar):
            refuse(
                "D14",
                f"'{scalar}' cannot be a name in files and on drawings",
                f"{self.said}; for example {self.example}",
            )
        if scalar.lower() in self.reserved:
            refuse("D14", f"'{scalar}' is reserved for the part of that name", f"for example {self.example}")
        return str(scalar)

    def schema(self) -> dict[str, Any]:
        """A text of that pattern."""
        return {"type": ["string", "number"], "pattern": f"^{self.pattern}$", "description": self.said}


class Date(Kind):
    """A calendar date, or nothing."""

    example = "2026-03-01"

    def read(self, value: Any, _info: ValidationInfo) -> str:
        """The date as written."""
        if isinstance(value, Scalar) and value.empty:
            return ""
        scalar = scalar_of(value, self.example)
        try:
            if len(scalar) != len(self.example):
                raise ValueError
            date.fromisoformat(scalar)
        except ValueError:
            refuse("D10", f"'{scalar}' is not a date", f"year, month and day, for example {self.example}")
        return str(scalar)

    def schema(self) -> dict[str, Any]:
        """A text of that form."""
        return {"type": ["string", "null"], "format": "date", "examples": [self.example]}


class WordOrLength(Kind):
    """One of a few words, or a length."""

    def __init__(self, words: tuple[str, ...], length: Length) -> None:
        self.words, self.length, self.example = words, length, words[0]

    def read(self, value: Any, info: ValidationInfo) -> str | float:
        """The word, or the length in mm."""
        if isinstance(value, Scalar) and str(value) in self.words:
            return str(value)
        if isinstance(value, Scalar) and value[:1].isalpha() and not value.empty:
            said = suggestion(value, self.words)
            refuse("D09", f"'{value}' is not known", f"{said}; or a length like {self.length.example}")
        return self.length.read(value, info)

    def schema(self) -> dict[str, Any]:
        """The words or a length."""
        return {"anyOf": [{"enum": list(self.words)}, self.length.schema()]}
