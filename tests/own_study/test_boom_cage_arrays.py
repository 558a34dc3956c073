"""Whole arrays on wire-cage booms in a general moment-method library, lengthened rod by rod.

`data/boom_cage_array.csv` holds the lengths and what the library returned for them, with its name, version and
segments; `boom_reference_library.py` writes it. 0.8 wavelengths long, five rods, four bonded, the fed one above.
"""

import csv
from pathlib import Path

import pytest

from fabgen.physics.boom_closed_form import closed_form_allowance
from fabgen.physics.boom_mount import BoomMount, Section, Style

MHZ = 299.792458  # one wavelength is 1000 mm
FED = 1
with (Path(__file__).parent / "data" / "boom_cage_array.csv").open(encoding="utf-8") as table:
    ROWS = {(row["case"], row["lengthened_by"]): row for row in csv.DictReader(table)}
CASES = sorted({case for case, _ in ROWS})


def lengths(row: dict[str, str]) -> list[float]:
    return [float(row[f"length_{i}_wl"]) for i in range(5)]


def misses(case: str, by: str) -> tuple[float, float]:
    """Gain and front/back against the array in free space, in dB."""
    free, other = ROWS[case, "free space"], ROWS[case, by]
    gain, ratio = (float(other[name]) - float(free[name]) for name in ("gain_dbi", "front_back_db"))
    return abs(gain), abs(ratio)


@pytest.mark.parametrize("case", CASES)
def test_rows_were_made_with_todays_closed_form(case: str) -> None:
    free, own = ROWS[case, "free space"], ROWS[case, "closed form"]
    mount = BoomMount(Style.BONDED_THROUGH, Section.ROUND, 1000 * float(free["boom_wl"]), 1000 * float(free["rod_wl"]))
    for i, (modelled, lengthened) in enumerate(zip(lengths(free), lengths(own), strict=True)):
        allowance = 0.0 if i == FED else closed_form_allowance(mount, 1000 * modelled, MHZ).allowance_wl
        assert allowance is not None
        assert lengthened == pytest.approx(modelled + allowance, abs=1e-6)


@pytest.mark.parametrize("case", ["B .03 d .006 a", "B .012 d .002 a", "B .012 d .002 b"])
def test_lengthened_array_returns_to_free_space(case: str) -> None:
    """Within 0.05 dB of gain and 0.3 dB of front/back."""
    gain_db, ratio_db = misses(case, "closed form")
    assert gain_db < 0.05
    assert ratio_db < 0.3


def test_large_boom_near_a_null_returns_less_exactly() -> None:
    """At B .03 with 21.5 dB front/back the array comes back within 0.06 dB and 0.7 dB, not 0.05 and 0.3.

    A cage reads some per cent off and neighbours raise the allowance by 3 %: the stated uncertainty.
    """
    gain_db, ratio_db = misses("B .03 d .006 b", "closed form")
    assert gain_db < 0.06
    assert ratio_db < 0.7


@pytest.mark.parametrize("case", CASES)
def test_nothing_added_is_far_worse(case: str) -> None:
    """Without any allowance the same boom shifts the array by over 0.15 dB and 4 dB: the test can fail."""
    gain_db, ratio_db = misses(case, "nothing")
    assert gain_db > 0.15
    assert ratio_db > 4


@pytest.mark.parametrize("case", ["B .012 d .002 a", "B .012 d .002 b"])
def test_published_curve_is_worse_on_a_small_boom(case: str) -> None:
    """At B .012 the closed form brings front/back at least ten times nearer than the curve of DL6WU does."""
    assert misses(case, "closed form")[1] * 10 < misses(case, "DL6WU")[1]
