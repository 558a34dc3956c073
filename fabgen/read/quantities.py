"""Lengths, frequencies and plain numbers of a design file, each with its range and an example.

A length that is readable but only likely in the other unit leaves a warning in the context.
"""

import contextlib
import re
from typing import Any, NoReturn, cast

from pydantic_core.core_schema import ValidationInfo

from fabgen.read.kind import Context, Kind, OtherUnit, refuse, scalar_of
from fabgen.read.nearest import suggestion
from fabgen.read.yaml_tree import Scalar
from fabgen.units import UnitError, comma_error, in_to_mm, mm_to_in, parse_frequency_mhz, parse_length_mm


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
            self._refuse(scalar, error, context.unit)
        likely = self.likely_mm is None or self.likely_mm[0] <= length_mm <= self.likely_mm[1]
        other = None if likely else self._other(scalar, length_mm, context.unit, info)
        if not self.low_mm <= length_mm <= self.high_mm:
            fix = f"allowed are {self._range(context.unit)}; for example {self.example}"
            if other is not None:
                fix += f"; was {other.meant} meant?"
            refuse("D12", f"'{scalar}' is out of range", fix)
        if other is not None:
            context.other_unit.append(other)
        return length_mm

    def _range(self, unit: str | None) -> str:
        """The allowed range, in inches too for those who write inches."""
        inches = f" ({mm_to_in(self.low_mm):.3g} in to {mm_to_in(self.high_mm):.4g} in)" if unit == "in" else ""
        return f"{self.low_mm:g} mm to {self.high_mm:g} mm{inches}"

    def _other(self, scalar: Scalar, length_mm: float, unit: str | None, info: ValidationInfo) -> OtherUnit | None:
        """The same number in the other unit, when that is likely."""
        number = _without_unit(scalar)
        written = scalar.strip()[len(number) :].strip() or unit
        if self.likely_mm is None or written not in ("mm", "in", '"', "″"):
            return None
        other_mm, other = (in_to_mm(length_mm), "in") if written == "mm" else (mm_to_in(length_mm), "mm")
        if not self.likely_mm[0] <= other_mm <= self.likely_mm[1]:
            return None
        return OtherUnit((info.field_name or "").removesuffix("_mm"), scalar.place, number, length_mm, other_mm, other)

    def _refuse(self, scalar: Scalar, error: UnitError, unit: str | None) -> NoReturn:
        """Refuse with the code that fits: a comma, a missing unit, or no length at all."""
        code, fix = "D13" if "," in scalar else "D10", error.fix
        if code == "D10" and (bare := _bare(scalar)):
            code = "D11"
            low, high = self.likely_mm or (self.low_mm, self.high_mm)
            if len(bare) == 2 and bare["mm"] and all(low <= length_mm <= high for length_mm in bare.values()):
                both = f"{scalar} mm and {scalar} in ({bare['in']:.4g} mm) are both likely"
                fix = f"{both}: write the unit, or `units` for the whole file"
            elif unit is None:
                fix += f", or {' or '.join(f'`units: {name}`' for name in bare)} for the whole file"
        elif not any(given in fix for given in (self.example, "like", "example")):
            fix += f"; for example {self.example}"
        refuse(code, error.message, f"{fix}; allowed are {self._range(unit)}")

    def schema(self) -> dict[str, Any]:
        """A text with a unit or a bare number."""
        said = f"a length, {self.low_mm:g} mm to {self.high_mm:g} mm"
        return {"type": ["string", "number"], "description": said, "examples": [self.example]}


def _without_unit(written: str) -> str:
    """The number of a length as written, for a message that proposes another unit."""
    return written.strip().rstrip("\"″' abcdefghijklmnopqrstuvwxyz")


def _bare(scalar: Scalar) -> dict[str, float]:
    """A length without a unit in mm, by the units that it could be read in; empty when it has one or is none."""
    found = {}
    for unit in ("mm", "in"):
        with contextlib.suppress(UnitError):
            found[unit] = parse_length_mm(scalar, unit)
    return found


class Frequency(Kind):
    """A frequency with its unit."""

    def __init__(self, low_mhz: float, high_mhz: float, example: str) -> None:
        self.low_mhz, self.high_mhz, self.example = low_mhz, high_mhz, example

    def read(self, value: Any, _info: ValidationInfo) -> float:
        """The frequency in MHz."""
        scalar = scalar_of(value, self.example)
        try:
            frequency_mhz = parse_frequency_mhz(scalar, self.example)
        except UnitError as error:
            code = "D13" if "," in scalar else "D11" if re.fullmatch(r"[0-9.]+", scalar) else "D10"
            refuse(code, error.message, error.fix)
        if not self.low_mhz <= frequency_mhz <= self.high_mhz:
            limits = f"allowed are {self.low_mhz:g} MHz to {self.high_mhz:g} MHz"
            refuse("D12", f"'{scalar}' is out of range", f"{limits}; for example {self.example}")
        return frequency_mhz

    def schema(self) -> dict[str, Any]:
        """A text with a unit."""
        said = f"a frequency with its unit, {self.low_mhz:g} MHz to {self.high_mhz:g} MHz"
        return {"type": "string", "description": said, "examples": [self.example]}


class Number(Kind):
    """A number.

    Args:
        low: smallest allowed.
        high: largest allowed.
        example: as a user would write it.
        said: its meaning and unit.
        units: spellings of its unit that may follow it; without them only a plain number is read.
    """

    def __init__(self, low: float, high: float, example: str, said: str, units: tuple[str, ...] = ()) -> None:
        self.low, self.high, self.example, self.said, self.units = low, high, example, said, units

    def read(self, value: Any, _info: ValidationInfo) -> float:
        """The number, by the rules of YAML 1.2's core schema for floats, without infinities."""
        scalar = scalar_of(value, self.example)
        text = self._without_unit(scalar.strip())
        if not re.fullmatch(r"[+-]?(\.[0-9]+|[0-9]+(\.[0-9]*)?)([eE][+-]?[0-9]+)?", text):
            if "," in text:
                error = comma_error(text)
                refuse("D13", error.message, error.fix)
            kind = f"a number of {self.units[0]}" if self.units else "a plain number"
            refuse("D10", f"'{scalar}' is not {kind}", f"{self.said}, for example {self.example}")
        number = float(text)
        if not self.low <= number <= self.high:
            limits = f"{self.said}, {self.low:g} to {self.high:g}"
            refuse("D12", f"'{scalar}' is out of range", f"{limits}; for example {self.example}")
        return number

    def _without_unit(self, text: str) -> str:
        unit = next((unit for unit in self.units if text.endswith(unit)), "")
        return text.removesuffix(unit).rstrip()

    def schema(self) -> dict[str, Any]:
        """A number within its limits, or a text with its unit."""
        number = {"type": "number", "minimum": self.low, "maximum": self.high}
        if not self.units:
            return number | {"description": self.said}
        said = f"{self.said}, {self.low:g} to {self.high:g} {self.units[0]}"
        text = {"type": "string", "pattern": rf"^\s*[0-9.eE+-]+\s*({'|'.join(self.units)})?\s*$"}
        return {"anyOf": [number, text], "description": said, "examples": [self.example]}


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
