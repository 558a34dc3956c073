"""Text to millimetres and megahertz and back: the only place that knows what an inch is.

A length is read as an exact fraction and rounded to a float once, so `5/8 in` and `15.875 mm` are the same
number. Whatever could be read in two ways (`4,5 mm`, `1 000 mm`, `1:30`) is refused with the reason and the
cheapest fix.
"""

import difflib
import math
import re
from fractions import Fraction

SPEED_OF_LIGHT_M_S = 299_792_458
"""Speed of light in vacuum. Source: SI Brochure, BIPM, 9th edition 2019, defining constants (exact)."""

MM_PER_IN = Fraction("25.4")
"""Source: international inch of 1959 (exact), as in ISO 80000-3."""

_MM_PER_UNIT = {
    "mm": Fraction(1),
    "cm": Fraction(10),
    "m": Fraction(1000),
    "in": MM_PER_IN,
    "ft": 12 * MM_PER_IN,
}
_LENGTH_NAMES = {name: name for name in _MM_PER_UNIT} | {
    '"': "in",
    "''": "in",
    "inch": "in",
    "inches": "in",
    "'": "ft",
    "foot": "ft",
    "feet": "ft",
}
_MHZ_PER_UNIT = {
    "Hz": Fraction(1, 1_000_000),
    "kHz": Fraction(1, 1000),
    "MHz": Fraction(1),
    "GHz": Fraction(1000),
}
_OTHER_UNITS = {"km", "dm", "um", "µm", "μm", "nm", "yd", "mil", "mils", "thou", "thz"}
_LONGEST_TEXT = 40
_LARGEST_EXPONENT = 15
_LARGEST_MM = 1_000_000
_LARGEST_MHZ = 1_000_000

_VULGAR = {
    "½": "1/2", "⅓": "1/3", "⅔": "2/3", "¼": "1/4", "¾": "3/4", "⅕": "1/5", "⅖": "2/5", "⅗": "3/5",
    "⅘": "4/5", "⅙": "1/6", "⅚": "5/6", "⅛": "1/8", "⅜": "3/8", "⅝": "5/8", "⅞": "7/8",
}  # fmt: skip
_SAME_CHARACTERS = str.maketrans(
    {"″": '"', "”": '"', "“": '"', "′": "'", "’": "'", "‘": "'", "−": "-", "–": "-", "‐": "-", "‑": "-", "⁄": "/"}
    | dict.fromkeys("\u00a0\u2007\u2009\u202f", " ")
)

_DECIMAL = r"(?:[0-9]+\.?[0-9]*|\.[0-9]+)"
_QUANTITY = re.compile(rf"(?P<number>{_DECIMAL}(?:[eE][+-]?[0-9]+)?) ?(?P<unit>[^0-9\s.,/+-][^0-9]*)?")
_FRACTION = re.compile(r"(?:(?P<whole>[0-9]+)[ -])?(?P<over>[0-9]+)/(?P<under>[0-9]+) ?(?P<unit>[^0-9\s.,/+-][^0-9]*)?")
_WITH_COMMA = re.compile(r"(?P<sign>[+-]? ?)(?P<number>[0-9](?:[0-9.,]|(?<=[0-9]) (?=[0-9]))*)(?P<rest>[^0-9]*)")
_FEET_INCHES = re.compile(r"(?P<feet>[0-9]+) ?(?:ft|foot|feet|'(?!'))[ -]?(?P<inches>[0-9.].*)")


class UnitError(ValueError):
    """A text that is not one length or one frequency.

    Attributes:
        message: what is wrong, one sentence.
        fix: the cheapest way out, with an example.
    """

    def __init__(self, message: str, fix: str) -> None:
        super().__init__(f"{message}; {fix}")
        self.message = message
        self.fix = fix


def parse_length_mm(text: str, default_unit: str | None = None) -> float:
    """Read one length.

    Accepts `12.7 mm`, `1.2 m`, `3 cm`, `0.625 in`, `5/8 in`, `1-1/2 in`, `1 1/2"`, `1½ in`, `6 ft 2 in`, with
    or without a sign and with or without the space before the unit.

    Args:
        text: the length as written.
        default_unit: unit of a bare number, `mm`, `cm`, `m`, `in` or `ft`; None refuses a bare number. A bare
            fraction takes it only when it is `in` or `ft`: `5/8` beside millimetres is most likely inches.

    Returns:
        The length in mm, correctly rounded; negative when the text is.

    Raises:
        UnitError: the text is not exactly one length.
    """
    shown, plain = _prepare(text, "12.7 mm")
    sign, plain = _split_sign(plain)
    value = _feet_and_inches(shown, plain)
    if value is None:
        value = _one_length(shown, plain, default_unit)
    if value > _LARGEST_MM:
        raise UnitError(f"{shown} is longer than 1 km", "check the number and its unit, for example 12.7 mm")
    return float(sign * value)


def parse_frequency_mhz(text: str, example: str = "434.2 MHz") -> float:
    """Read one frequency: `434.2 MHz`, `1.2962 GHz`, `50100 kHz`, `144300000 Hz`; the unit is compulsory.

    Args:
        text: the frequency as written.
        example: one as a user would write it, for messages; a number without a unit is proposed with its unit.

    Returns:
        The frequency in MHz, correctly rounded, above zero.

    Raises:
        UnitError: the text is not exactly one frequency above zero.
    """
    shown, plain = _prepare(text, example)
    sign, plain = _split_sign(plain)
    match = _QUANTITY.fullmatch(plain)
    if not match:
        raise UnitError(f"{shown} is not a frequency", f"write a number and its unit, for example {example}")
    number, unit = match["number"], match["unit"]
    if unit is None:
        raise UnitError(f"{shown} has no unit", f"write {number} {example.partition(' ')[2]}")
    if unit not in _MHZ_PER_UNIT:
        raise _unknown_unit(unit, number, list(_MHZ_PER_UNIT), "MHz or GHz")
    value = _decimal(shown, number) * _MHZ_PER_UNIT[unit]
    if sign < 0 or value <= 0 or value > _LARGEST_MHZ:
        raise UnitError(f"{shown} is not a frequency above zero and up to 1000 GHz", f"for example {example}")
    return float(value)


def wavelength_mm(frequency_mhz: float) -> float:
    """Wavelength in vacuum.

    Args:
        frequency_mhz: frequency in MHz, above zero.

    Returns:
        Wavelength in mm.
    """
    return SPEED_OF_LIGHT_M_S / frequency_mhz / 1000


def mm_to_in(length_mm: float) -> float:
    """Inches of a length in mm."""
    return length_mm / float(MM_PER_IN)


def in_to_mm(length_in: float) -> float:
    """Millimetres of a length in inches."""
    return length_in * float(MM_PER_IN)


def format_mm(length_mm: float, decimals: int = 3) -> str:
    """Print a length for a table or a drawing: `.` as decimal mark, fixed decimals, never a negative zero.

    Args:
        length_mm: any finite number.
        decimals: digits after the mark, at least 1.

    Raises:
        ValueError: the number is not finite.
    """
    if not math.isfinite(length_mm):
        raise ValueError(f"{length_mm} is not a length")
    printed = f"{length_mm:.{decimals}f}"
    return printed.removeprefix("-") if float(printed) == 0 else printed


def _prepare(text: str, example: str) -> tuple[str, str]:
    """The text as messages show it, and the text with one spelling for signs, quotes, spaces and fractions.

    Raises:
        UnitError: a form that is refused by name.
    """
    if not text.strip():
        raise UnitError("the value is empty", f"write a number and its unit, for example {example}")
    if len(text) > _LONGEST_TEXT:
        raise UnitError(f"'{text[:20]}…' is too long for one value", f"write a number like {example}")
    plain = text.translate(_SAME_CHARACTERS)
    plain = re.sub(f"(?<=[0-9])[{''.join(_VULGAR)}]", lambda match: f" {_VULGAR[match[0]]}", plain)
    plain = re.sub(f"[{''.join(_VULGAR)}]", lambda match: _VULGAR[match[0]], plain)
    plain = " ".join(plain.split())
    shown = repr(text.strip())
    lower = plain.lower()
    if "," in plain:
        raise comma_error(text)
    if re.match(r"[+-]?\.?(nan|inf)", lower):
        raise UnitError(f"{shown} is not a finite number", f"write a number like {example}")
    if re.match(r"[+-]?0[xob]", lower):
        raise UnitError(f"{shown} is not a decimal number", f"write it in decimal, for example {example}")
    if "_" in plain:
        raise UnitError(f"{shown} has an underscore in it", f"write {plain.replace('_', '')}")
    if ":" in plain:
        raise UnitError(f"{shown} looks like a time or a base-60 number", f"write a number like {example}")
    if grouped := re.match(r"[+-]?[0-9]{1,3}(?: [0-9]{3})+(?![0-9/])", plain):
        joined = grouped[0].replace(" ", "") + plain[grouped.end() :]
        raise UnitError(f"{shown} has a space inside a number", f"write {joined}")
    return shown, plain


def comma_error(text: str) -> UnitError:
    """The refusal of a comma, which is a decimal mark for one reader and a thousands mark for the next.

    Args:
        text: a value that holds one.
    """
    shown = repr(text.strip())
    parts = _WITH_COMMA.fullmatch(" ".join(text.split()))
    if parts:
        number = parts["number"].replace(" ", "")
        joined, point = (f"{parts['sign']}{number.replace(',', mark)}{parts['rest']}" for mark in ("", "."))
        if re.fullmatch(r"[1-9][0-9]{0,2},[0-9]{3}", number):
            return UnitError(f"the comma in {shown} can be read in two ways", f"write {joined} or {point}")
        if re.fullmatch(r"[1-9][0-9]{0,2}(,[0-9]{3})+(\.[0-9]+)?", number):
            return UnitError(f"{shown} has commas inside a number", f"write {joined}")
        if re.fullmatch(r"[0-9]+,[0-9]+", number):
            return UnitError(f"{shown} has a decimal comma", f"write {point}")
        if re.fullmatch(r"[1-9][0-9]{0,2}(\.[0-9]{3})+,[0-9]+", number):
            point = f"{parts['sign']}{number.replace('.', '').replace(',', '.')}{parts['rest']}"
            return UnitError(f"{shown} has points inside a number and a decimal comma", f"write {point}")
    return UnitError(f"{shown} is not one value", "write one number with a decimal point, for example 4.5 mm")


def _split_sign(plain: str) -> tuple[int, str]:
    """The sign as a factor and the rest of the text."""
    return (-1 if plain.startswith("-") else 1), re.sub(r"^[+-] ?", "", plain)


def _feet_and_inches(shown: str, plain: str) -> Fraction | None:
    """A length in feet and inches in mm, or None when the text is not of that form."""
    match = _FEET_INCHES.fullmatch(plain)
    if not match:
        return None
    unit = re.search(r"[^0-9\s./-]+$", match["inches"])
    if unit is None or _LENGTH_NAMES.get(unit[0]) != "in":
        whole = re.match(r"[0-9]{1,2}(?![0-9])", match["inches"])
        fix = f"write {match['feet']} ft {whole[0] if whole else 2} in, or one unit"
        raise UnitError(f"{shown} has feet and then something else than inches", fix)
    feet, inches_mm = int(match["feet"]), _one_length(shown, match["inches"], None)
    if inches_mm >= _MM_PER_UNIT["ft"]:
        more, rest_mm = divmod(inches_mm, _MM_PER_UNIT["ft"])
        fix = f"write {feet + more} ft {float(rest_mm / MM_PER_IN):g} in"
        raise UnitError(f"{shown} has 12 inches or more after the feet", fix)
    return feet * _MM_PER_UNIT["ft"] + inches_mm


def _one_length(shown: str, plain: str, default_unit: str | None) -> Fraction:
    """A length in one unit, unsigned, in mm."""
    fraction = _FRACTION.fullmatch(plain)
    match = fraction or _QUANTITY.fullmatch(plain)
    if not match:
        raise UnitError(f"{shown} is not a length", "write one number and its unit, like 12.7 mm or 1-1/2 in")
    number = plain[: match.start("unit")].strip() if match["unit"] else plain
    unit = _length_unit(shown, number, match["unit"], default_unit, bool(fraction))
    value = _mixed_number(shown, fraction) if fraction else _decimal(shown, number)
    return value * _MM_PER_UNIT[unit]


def _length_unit(shown: str, number: str, unit: str | None, default_unit: str | None, is_fraction: bool) -> str:
    """The unit in force, by its short name."""
    if unit is not None:
        if unit not in _LENGTH_NAMES:
            raise _unknown_unit(unit, number, [name for name in _LENGTH_NAMES if name.isalpha()], "mm or in")
        return _LENGTH_NAMES[unit]
    if default_unit is None:
        raise UnitError(f"{shown} has no unit", f"write {number} {'in' if is_fraction else 'mm'}")
    if is_fraction and default_unit not in ("in", "ft"):
        raise UnitError(f"{shown} is a fraction without a unit, unlikely in {default_unit}", f"write {number} in")
    return default_unit


def _mixed_number(shown: str, match: re.Match[str]) -> Fraction:
    """The value of `5/8` or `1-1/2`."""
    over, under = int(match["over"]), int(match["under"])
    if under == 0:
        raise UnitError(f"{shown} divides by zero", "write a fraction like 5/8 in")
    if match["whole"] is None:
        return Fraction(over, under)
    if over >= under:
        raise UnitError(f"{shown} has a whole number and a fraction of one or more", "write it like 1-1/2 in")
    return int(match["whole"]) + Fraction(over, under)


def _decimal(shown: str, number: str) -> Fraction:
    """An exact decimal; a power of ten that no antenna needs is refused before it is multiplied out."""
    mantissa, _, exponent = number.lower().partition("e")
    if exponent and abs(int(exponent)) > _LARGEST_EXPONENT:
        raise UnitError(f"{shown} is out of range", "write the number without a power of ten")
    return Fraction(mantissa) * Fraction(10) ** int(exponent or 0)


def _unknown_unit(unit: str, number: str, names: list[str], usual: str) -> UnitError:
    """The refusal of a unit, with the nearest that exists; a real unit of another size is no misspelling."""
    written = unit.lower().rstrip(".")
    lower = {name.lower(): name for name in names}
    near = [] if written in _OTHER_UNITS else difflib.get_close_matches(written, lower, n=9, cutoff=0.5)
    near = [name for name in near if len(name) > 1 or name == written]
    fix = f"write {number} {lower[near[0]]}" if near else f"write it in {usual}"
    return UnitError(f"'{unit}' is not a unit known here ({', '.join(names)})", fix)
