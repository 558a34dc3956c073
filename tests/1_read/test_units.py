"""Lengths and frequencies as written: what is read, what is refused and with which fix."""

import math
from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen.units import (
    UnitError,
    format_mm,
    in_to_mm,
    mm_to_in,
    parse_frequency_mhz,
    parse_length_mm,
    wavelength_mm,
)

READ = {
    "5/8 in": 15.875,
    "1-1/2 in": 38.1,
    "1–1/2 in": 38.1,
    '1 1/2"': 38.1,
    "1½ in": 38.1,
    "1 ½ in": 38.1,
    "½ in": 12.7,
    '3/16"': 4.7625,
    "3⁄16 in": 4.7625,
    "9/8 in": 28.575,
    "3/16in": 4.7625,
    "6 ft 2 in": 1879.6,
    "6' 2\"": 1879.6,
    "6'-2 1/2\"": 1892.3,
    "6 feet 2 inches": 1879.6,
    "0 ft 0 in": 0.0,
    "6 ft": 1828.8,
    "12.7 mm": 12.7,
    "12.7mm": 12.7,
    "  12.7   mm ": 12.7,
    "12.7\u00a0mm": 12.7,
    ".5 in": 12.7,
    "0.1 in": 2.54,
    "1 inch": 25.4,
    "1”": 25.4,
    "1''": 25.4,
    "1.2 m": 1200.0,
    "3 cm": 30.0,
    "1e2 mm": 100.0,
    "-3 mm": -3.0,
    "−3 mm": -3.0,
    "-1-1/2 in": -38.1,
    "+0.5 mm": 0.5,
    "1/2 mm": 0.5,
}


@pytest.mark.parametrize(("text", "expected_mm"), READ.items())
def test_a_length_with_its_unit_is_read_exactly(text, expected_mm):
    assert parse_length_mm(text, None) == expected_mm
    assert parse_length_mm(text, "in") == expected_mm


@pytest.mark.parametrize(
    ("text", "unit", "expected_mm"),
    [
        ("12.7", "mm", 12.7),
        ("0.5", "in", 12.7),
        ("5/8", "in", 15.875),
        ("1-1/2", "ft", 457.2),
        ("0", "mm", 0.0),
    ],
)
def test_a_bare_number_takes_the_files_unit(text, unit, expected_mm):
    assert parse_length_mm(text, unit) == expected_mm
    with pytest.raises(UnitError, match="has no unit"):
        parse_length_mm(text, None)


REFUSED = {
    "4,5 mm": ("decimal comma", "write 4.5 mm"),
    "-4,5 mm": ("decimal comma", "write -4.5 mm"),
    "4,5": ("decimal comma", "write 4.5"),
    "1,000 mm": ("two ways", "write 1000 mm or 1.000 mm"),
    "1,000,000 mm": ("commas inside", "write 1000000 mm"),
    "1,234.5 mm": ("commas inside", "write 1234.5 mm"),
    "1.234,5 mm": ("points inside a number and a decimal comma", "write 1234.5 mm"),
    "1 234,5 mm": ("decimal comma", "write 1234.5 mm"),
    "0,500 mm": ("decimal comma", "write 0.500 mm"),
    "4, 5 mm": ("not one value", "for example 4.5 mm"),
    "1/2,5 in": ("not one value", "for example 4.5 mm"),
    "1 000 mm": ("space inside", "write 1000 mm"),
    "1_000 mm": ("underscore", "write 1000 mm"),
    "nan": ("not a finite number", "12.7 mm"),
    ".nan": ("not a finite number", "12.7 mm"),
    "NaN mm": ("not a finite number", "12.7 mm"),
    "inf": ("not a finite number", "12.7 mm"),
    "-.inf": ("not a finite number", "12.7 mm"),
    "-Infinity mm": ("not a finite number", "12.7 mm"),
    "1e400": ("out of range", "without a power of ten"),
    "1e999999999 mm": ("out of range", "without a power of ten"),
    "1e-400 mm": ("out of range", "without a power of ten"),
    "0x10 mm": ("not a decimal number", "in decimal"),
    "0b1": ("not a decimal number", "in decimal"),
    "1:30": ("base-60", "12.7 mm"),
    "5 mn": ("'mn' is not a unit", "write 5 mm"),
    "5 MM": ("'MM' is not a unit", "write 5 mm"),
    "5 M": ("'M' is not a unit", "write 5 m"),
    "5 in.": ("'in.' is not a unit", "write 5 in"),
    "1/2 inchs": ("'inchs' is not a unit", "write 1/2 inches"),
    "5 km": ("'km' is not a unit", "write it in mm or in"),
    "5 thou": ("'thou' is not a unit", "write it in mm or in"),
    "5 centimeter": ("'centimeter' is not a unit", "write it in mm or in"),
    "5/8": ("a fraction without a unit", "write 5/8 in"),
    "5/0 in": ("divides by zero", "5/8 in"),
    "1 9/8 in": ("a fraction of one or more", "1-1/2 in"),
    "1.5/2 in": ("not a length", "1-1/2 in"),
    "1 - 1/2 in": ("not a length", "1-1/2 in"),
    "2-3 in": ("not a length", "1-1/2 in"),
    "1 1 1/2 in": ("not a length", "1-1/2 in"),
    "5/8/2 in": ("not a length", "1-1/2 in"),
    "6 ft 14 in": ("12 inches or more", "7 ft 2 in"),
    "6 ft 2": ("something else than inches", "write 6 ft 2 in"),
    "6 ft 2 mm": ("something else than inches", "write 6 ft 2 in"),
    "6 ft -2 in": ("not a length", "1-1/2 in"),
    "6.5 ft 2 in": ("not a length", "1-1/2 in"),
    "": ("empty", "12.7 mm"),
    "   ": ("empty", "12.7 mm"),
    "mm": ("not a length", "12.7 mm"),
    "--5 mm": ("not a length", "12.7 mm"),
    "5 mm 3": ("not a length", "12.7 mm"),
    "1..2 mm": ("not a length", "12.7 mm"),
    "٣ mm": ("not a length", "12.7 mm"),
    "9" * 30: ("longer than 1 km", "12.7 mm"),
    "9" * 5000: ("too long", "12.7 mm"),
}


@pytest.mark.parametrize(("text", "expected"), REFUSED.items())
def test_what_can_be_read_two_ways_is_refused_with_its_fix(text, expected):
    reason, fix = expected
    with pytest.raises(UnitError) as caught:
        parse_length_mm(text, "mm")
    assert reason in caught.value.message
    assert fix in caught.value.fix
    assert len(str(caught.value)) < 200


@pytest.mark.parametrize("fix", [fix for _, fix in REFUSED.values() if fix.startswith("write ")])
def test_the_fix_of_a_refused_length_is_itself_read(fix):
    suggested = fix.removeprefix("write ").partition(" or ")[0]
    if suggested.startswith("it in"):
        suggested = "5 mm"
    assert math.isfinite(parse_length_mm(suggested, "mm"))


@pytest.mark.parametrize(
    ("text", "expected_mhz"),
    [
        ("434.2 MHz", 434.2),
        ("434.2MHz", 434.2),
        ("1.2962 GHz", 1296.2),
        ("50100 kHz", 50.1),
        ("144300000 Hz", 144.3),
    ],
)
def test_a_frequency_is_read_exactly(text, expected_mhz):
    assert parse_frequency_mhz(text) == expected_mhz


@pytest.mark.parametrize(
    ("text", "reason", "fix"),
    [
        ("434.2", "has no unit", "write 434.2 MHz"),
        ("434,2 MHz", "decimal comma", "write 434.2 MHz"),
        ("434.2 mhz", "not a unit", "write 434.2 MHz"),
        ("434.2 MHzz", "not a unit", "write 434.2 MHz"),
        ("0.4 THz", "not a unit", "write it in MHz or GHz"),
        ("-434 MHz", "above zero", "434.2 MHz"),
        ("0 MHz", "above zero", "434.2 MHz"),
        ("1e9 GHz", "up to 1000 GHz", "434.2 MHz"),
        ("nan MHz", "not a finite number", "434.2 MHz"),
        ("1/2 GHz", "not a frequency", "434.2 MHz"),
        ("430-440 MHz", "not a frequency", "434.2 MHz"),
        ("2 m", "not a unit", "MHz"),
    ],
)
def test_what_is_no_frequency_is_refused_with_its_fix(text, reason, fix):
    with pytest.raises(UnitError) as caught:
        parse_frequency_mhz(text)
    assert reason in caught.value.message
    assert fix in caught.value.fix


@given(st.text(max_size=60))
def test_any_text_is_a_finite_length_or_a_unit_error(text):
    for unit in (None, "mm", "in"):
        try:
            length_mm = parse_length_mm(text, unit)
        except UnitError as error:
            length_mm = 0.0 if error.message and error.fix else math.nan
        assert math.isfinite(length_mm)


@given(st.from_regex(r"[+-]?[0-9]{1,3}([., ][0-9]{1,3})?,[0-9]{1,3}(\.[0-9]{1,3})?( mm)?", fullmatch=True))
def test_what_is_proposed_for_a_comma_can_be_read(text):
    with pytest.raises(UnitError) as caught:
        parse_length_mm(text, "mm")
    for proposed in caught.value.fix.removeprefix("write ").split(" or "):
        parse_length_mm(proposed.partition("for example ")[2] or proposed, "mm")


@given(st.integers(0, 200), st.integers(0, 63))
def test_an_inch_fraction_is_read_exactly(whole, sixty_fourths):
    length_mm = float((whole + Fraction(sixty_fourths, 64)) * Fraction("25.4"))
    assert parse_length_mm(f"{whole}-{sixty_fourths}/64 in", None) == length_mm


@given(st.decimals(-9999, 9999, places=3))
def test_a_printed_length_is_read_back_exactly(value):
    printed = format_mm(float(value))
    assert parse_length_mm(printed, "mm") == float(value)
    assert len(printed.partition(".")[2]) == 3


def test_printed_lengths_have_no_negative_zero_and_no_nan():
    assert format_mm(-0.0001) == "0.000"
    assert format_mm(-0.0) == "0.000"
    assert format_mm(-0.0006) == "-0.001"
    assert format_mm(12) == "12.000"
    assert format_mm(40.25, 1) == "40.2"
    for bad in (math.nan, math.inf, -math.inf):
        with pytest.raises(ValueError, match="is not a length"):
            format_mm(bad)


def test_inches_and_millimetres_convert_both_ways():
    assert in_to_mm(1.5) == pytest.approx(38.1, rel=1e-15)
    assert mm_to_in(38.1) == pytest.approx(1.5, rel=1e-15)


def test_wavelength_uses_the_exact_speed_of_light():
    """BIPM, SI Brochure, 9th edition 2019: c = 299 792 458 m/s; wavelength = c/f, computed."""
    assert wavelength_mm(299.792458) == pytest.approx(1000, rel=1e-15)
    assert wavelength_mm(144.3) == pytest.approx(2077.564, abs=5e-4)
