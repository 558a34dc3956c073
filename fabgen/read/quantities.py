"""Lengths, frequencies and plain numbers of a design file, each with its range and an example.

A length that is readable but only likely in the other unit leaves a warning in the context.
"""

import re
from typing import Any, NoReturn, cast

from pydantic import ValidationInfo

from fabgen.read.kind import Context, Kind, OtherUnit, refuse, scalar_of
from fabgen.read.nearest import suggestion
from fabgen.read.yaml_tree import Scalar
from fabgen.units import UnitError, in_to_mm, mm_to_in, parse_frequency_mhz, parse_length_mm


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
