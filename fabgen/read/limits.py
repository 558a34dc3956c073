"""The `limits` section: its keys, what contradicts what in it, the record made of it, and how it is shown."""

import re
from collections.abc import Iterator
from typing import Annotated, Any

from fabgen.design.limits import Limits
from fabgen.read.keys import Field, Keys, ValidationInfo
from fabgen.read.kind import Kind, refuse, scalar_of
from fabgen.read.places import value_place
from fabgen.read.quantities import Frequency, Number
from fabgen.read.source import Problems
from fabgen.read.yaml_tree import Map, Scalar, Seq
from fabgen.units import comma_error

WIDEST_BAND = 0.15
"""Band over design frequency: wider ones are no band of an array of half-wave rods; common practice, wide."""

_NUMBER_AND_UNIT = re.compile(r"([+-]?[0-9.eE+-]*[0-9.])\s*([A-Za-z]*)")


class Decibels(Kind):
    """A ratio in dB, with its unit."""

    def __init__(self, low_db: float, high_db: float, example: str) -> None:
        self.low_db, self.high_db, self.example = low_db, high_db, example

    def read(self, value: Any, info: ValidationInfo) -> float:
        """The number of dB."""
        scalar = scalar_of(value, self.example)
        if "," in scalar:
            error = comma_error(scalar)
            refuse("D13", error.message, error.fix)
        match = _NUMBER_AND_UNIT.fullmatch(scalar.strip())
        if match is None:
            refuse("D10", f"'{scalar}' is not a number of decibels", f"write it as {self.example}")
        number, unit = match.groups()
        if not unit:
            refuse("D11", f"'{scalar}' has no unit", f"write {number} dB")
        if unit != "dB":
            refuse("D10", f"'{unit}' is not a unit of this value", f"write {number} dB")
        plain = Scalar.at(number, scalar.source, scalar.line, scalar.column, scalar.width)
        return Number(self.low_db, self.high_db, self.example, "decibels").read(plain, info)

    def schema(self) -> dict[str, Any]:
        """A text with its unit."""
        said = f"a ratio in dB, {self.low_db:g} dB to {self.high_db:g} dB"
        return {"type": "string", "description": said, "examples": [self.example]}


class Band(Kind):
    """Two frequencies, the lower one first."""

    example = "[430 MHz, 438 MHz]"
    _each = Frequency(20, 6000, "430 MHz")

    def read(self, value: Any, info: ValidationInfo) -> tuple[float, float]:
        """Lower and upper end in MHz."""
        if not isinstance(value, Seq):
            scalar_of(value, self.example)
            refuse("D08", "takes a list of two frequencies", f"for example {self.example}")
        if len(value) != 2:
            fix = f"the decimal mark is a point, a comma separates; for example {self.example}"
            refuse("D08", f"takes two frequencies, not {len(value)}", fix)
        low_mhz, high_mhz = (self._each.read(item, info) for item in value)
        if low_mhz >= high_mhz:
            refuse("D19", "the second frequency is not above the first", f"for example {self.example}")
        return low_mhz, high_mhz

    def schema(self) -> dict[str, Any]:
        """A list of two frequencies."""
        return {"type": "array", "items": self._each.schema(), "minItems": 2, "maxItems": 2}


class LimitsKeys(Keys):
    """What builds may lose; each key may be left out."""

    band_mhz: Annotated[tuple[float, float] | None, Band()] = Field(default=None, alias="band")
    shift_mhz: Annotated[float | None, Frequency(0.001, 100, "400 kHz")] = Field(default=None, alias="shift")
    gain_loss_db: Annotated[float | None, Decibels(0.001, 10, "0.1 dB")] = Field(default=None, alias="gain_loss")
    front_to_back_db: Annotated[float | None, Decibels(1, 60, "18 dB")] = Field(default=None, alias="front_to_back")
    mismatch: Annotated[float | None, Number(1.01, 20, "1.5", "standing wave ratio")] = None


def check_limits(keys: LimitsKeys | None, frequency_mhz: float | None, tree: Map, problems: Problems) -> None:
    """Report limits that cannot be held together with the rest of the file."""
    if keys is None or frequency_mhz is None:
        return
    if keys.band_mhz is not None:
        low_mhz, high_mhz = keys.band_mhz
        place = value_place(tree, "limits", "band")
        if not low_mhz <= frequency_mhz <= high_mhz:
            message = f"band: the design frequency {frequency_mhz:g} MHz lies outside it"
            problems.add("D19", message, place, "a band that holds it, or another `frequency`")
        elif high_mhz - low_mhz > WIDEST_BAND * frequency_mhz:
            message = f"band: {high_mhz - low_mhz:g} MHz is too wide for one array"
            problems.add("D12", message, place, f"at most {WIDEST_BAND * frequency_mhz:.4g} MHz from end to end")
    if keys.shift_mhz is not None and keys.shift_mhz > 0.02 * frequency_mhz:
        message = f"shift: {1000 * keys.shift_mhz:g} kHz is more than 2 % of the design frequency"
        place = value_place(tree, "limits", "shift")
        problems.add("D12", message, place, f"at most {20 * frequency_mhz:.4g} kHz; for example 400 kHz")


def resolve_limits(keys: LimitsKeys | None) -> Limits:
    """The limits of a validated file."""
    if keys is None:
        return Limits()
    return Limits(
        band_mhz=keys.band_mhz,
        shift_khz=None if keys.shift_mhz is None else round(1000 * keys.shift_mhz, 6),
        gain_loss_db=keys.gain_loss_db,
        front_to_back_db=keys.front_to_back_db,
        mismatch=keys.mismatch,
    )


def shown_limits(limits: Limits) -> Iterator[tuple[str, str]]:
    """Keys and values of the section as a design file has them."""
    if limits.band_mhz is not None:
        yield "band", f"[{', '.join(f'{end_mhz!r} MHz' for end_mhz in limits.band_mhz)}]"
    if limits.shift_khz is not None:
        yield "shift", f"{limits.shift_khz!r} kHz"
    if limits.gain_loss_db is not None:
        yield "gain_loss", f"{limits.gain_loss_db!r} dB"
    if limits.front_to_back_db is not None:
        yield "front_to_back", f"{limits.front_to_back_db!r} dB"
    if limits.mismatch is not None:
        yield "mismatch", repr(limits.mismatch)
