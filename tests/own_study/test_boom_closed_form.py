"""Closed forms of the boom's effect against the full-wave solutions they were fitted to.

Source of every expected value: own study 2026, computed, unpublished. Theory, no measurement.
"""

import csv
import math
from dataclasses import replace
from pathlib import Path

import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from fabgen.physics.boom_closed_form import closed_form_allowance, relative_allowance, rod_slope_ohm_per_wl
from fabgen.physics.boom_mount import BoomMount, Section, Style, wavelength_mm
from fabgen.physics.boom_range import Advice, Reason, touching_allowance_ratios
from fabgen.physics.boom_uncertainty import Surroundings

DATA = Path(__file__).parent / "data"
MHZ = 299.792458  # one wavelength is 1000 mm


def rows(name: str) -> list[dict[str, str]]:
    with (DATA / name).open(encoding="utf-8") as file:
        return list(csv.DictReader(file))


def other_mount(row: dict[str, str]) -> BoomMount:
    boom_wl, rod_wl = float(row["boom_wl"]), float(row["rod_wl"])
    return BoomMount(
        style=Style(row["style"]),
        section=Section(row["section"]),
        outside_mm=1000 * boom_wl,
        rod_diameter_mm=1000 * rod_wl,
        wall_mm=1000 * boom_wl * float(row["wall_over_boom"]),
        hole_mm=1000 * rod_wl * float(row["hole_over_rod"]),
        axis_height_mm=1000 * float(row["height_wl"]),
    )


def tube(outside_mm: float, wall_mm: float, rod_mm: float, hole_mm: float, **more: float) -> BoomMount:
    return BoomMount(
        style=Style.INSULATED_THROUGH,
        section=Section.ROUND,
        outside_mm=outside_mm,
        wall_mm=wall_mm,
        rod_diameter_mm=rod_mm,
        hole_mm=hole_mm,
        **more,
    )


def bonded(outside_mm: float, rod_mm: float, section: Section = Section.ROUND) -> BoomMount:
    return BoomMount(Style.BONDED_THROUGH, section, outside_mm, rod_mm, wall_mm=outside_mm / 10)


def on_top(outside_mm: float, rod_mm: float, gap_mm: float, section: Section = Section.ROUND) -> BoomMount:
    return BoomMount(Style.ON_TOP, section, outside_mm, rod_mm, axis_height_mm=gap_mm + rod_mm / 2)


@pytest.mark.parametrize(
    ("rod_wl", "length_wl", "slope_ohm"),
    [
        (0.003, 0.42, 2319.8),
        (0.003, 0.45, 1950.1),
        (0.003, 0.48, 1645.9),
        (0.006, 0.42, 1895.0),
        (0.006, 0.45, 1597.0),
        (0.006, 0.48, 1350.9),
    ],
)
def test_slope_of_the_free_rod(rod_wl: float, length_wl: float, slope_ohm: float) -> None:
    """Second code's values; the fit is stated to 0.9 % against it."""
    assert rod_slope_ohm_per_wl(rod_wl, length_wl) == pytest.approx(slope_ohm, rel=0.01)


@pytest.mark.parametrize("row", rows("boom_round_bonded.csv"), ids=lambda r: "-".join(r.values()))
def test_round_bonded_table(row: dict[str, str]) -> None:
    """Tolerance 4 %: the fit's largest error is 3.6 %."""
    mount = bonded(1000 * float(row["boom_wl"]), 1000 * float(row["rod_wl"]))
    result = closed_form_allowance(mount, 1000 * float(row["length_wl"]), MHZ)
    assert result.misses == ()
    assert result.allowance_mm is not None
    assert result.allowance_mm / mount.outside_mm == pytest.approx(float(row["allowance_over_boom"]), rel=0.04)


@pytest.mark.parametrize("row", rows("boom_other_mounts.csv"), ids=lambda r: "-".join(r.values()))
def test_other_mounts(row: dict[str, str]) -> None:
    """Tolerances are the fits' largest errors: bonded 3.6, insulated 8.6, on top 7 %."""
    mount = other_mount(row)
    tolerance = {Style.BONDED_THROUGH: 0.036, Style.INSULATED_THROUGH: 0.086, Style.ON_TOP: 0.07}[mount.style]
    result = closed_form_allowance(mount, 1000 * float(row["length_wl"]), MHZ)
    assert result.misses == ()
    assert result.allowance_mm is not None
    assert result.allowance_mm / mount.outside_mm == pytest.approx(float(row["allowance_over_boom"]), rel=tolerance)


@pytest.mark.parametrize(
    ("mount", "mhz", "length_wl", "expected_mm"),
    [
        (bonded(20, 6), 144.3, 0.43, 6.7),
        (bonded(20, 6), 144.3, 0.49, 9.2),
        (bonded(20, 4), 432.2, 0.43, 9.7),
        (bonded(20, 4), 432.2, 0.49, 13.0),
        (tube(20, 1.5, 6, 12), 144.3, 0.43, 3.3),
        (tube(20, 1.5, 4, 8), 432.2, 0.43, 4.3),
        (on_top(20, 6, 0.6), 144.3, 0.43, 20 * 0.180),
        (on_top(20, 6, 0.6, Section.SQUARE), 144.3, 0.43, 20 * 0.270),
        (on_top(20, 4, 0.4), 432.2, 0.43, 20 * 0.252),
        (on_top(20, 4, 0.4, Section.SQUARE), 432.2, 0.43, 20 * 0.390),
    ],
)
def test_examples_in_mm(mount: BoomMount, mhz: float, length_wl: float, expected_mm: float) -> None:
    """The table is solved, so the tolerances are: bonded 4, insulated 8.6, on top 7 %.

    To that comes half the last printed digit, 0.05 mm. Largest misses: 4.0, 4.2 and 2.0 %.
    """
    tolerance = {Style.BONDED_THROUGH: 0.04, Style.INSULATED_THROUGH: 0.086, Style.ON_TOP: 0.07}[mount.style]
    result = closed_form_allowance(mount, length_wl * wavelength_mm(mhz), mhz)
    assert result.allowance_mm is not None
    assert abs(result.allowance_mm - expected_mm) <= tolerance * expected_mm + 0.05


def test_square_tube_insulated_is_1_14_of_round() -> None:
    square = BoomMount(Style.INSULATED_THROUGH, Section.SQUARE, 20, 4, wall_mm=1.5, hole_mm=8)
    value = relative_allowance(square, 300, 432.2)
    assert value == pytest.approx(1.14 * relative_allowance(tube(20, 1.5, 4, 8), 300, 432.2))


def test_longer_rod_takes_more() -> None:
    """A director at .42 needs about 15 % less and a reflector at .48 about 17 % more than a .45 rod."""
    mount = bonded(20, 4)
    short, middle, long = (relative_allowance(mount, x * wavelength_mm(432.2), 432.2) for x in (0.42, 0.45, 0.48))
    assert short / middle == pytest.approx(0.85, abs=0.015)
    assert long / middle == pytest.approx(1.17, abs=0.02)


@pytest.mark.parametrize(
    ("mhz", "mount", "low_mm", "high_mm"),
    [
        (144.3, tube(20, 1.5, 6, 10, bush_permittivity=3, bush_length_mm=2.5), -0.0035, -0.0025),
        (432.2, tube(20, 1.5, 4, 8, bush_permittivity=3, bush_length_mm=2.5), -0.045, -0.035),
        (432.2, tube(20, 1.5, 4, 5, bush_permittivity=3, bush_length_mm=2.5), -0.125, -0.115),
        (1296.2, tube(12.7, 1.2, 1.9, 3.8, bush_permittivity=3, bush_length_mm=2.2), -0.35, -0.13),
        (1296.2, tube(12.7, 1.2, 1.9, 2.9, bush_permittivity=3, bush_length_mm=2.2), -0.35, -0.13),
    ],
)
def test_bush_term(mhz: float, mount: BoomMount, low_mm: float, high_mm: float) -> None:
    """Permittivity 3: -0.003 mm at 144 MHz, -0.04 to -0.12 at 432, -0.13 to -0.35 at 1296 with tight holes.

    The holes of those examples were not kept; these give them with a spigot 1 mm longer than the wall.
    """
    length_mm = 0.43 * wavelength_mm(mhz)
    air = tube(mount.outside_mm, mount.wall_mm, mount.rod_diameter_mm, mount.hole_mm)
    filled, empty = (closed_form_allowance(m, length_mm, mhz) for m in (mount, air))
    assert filled.allowance_mm is not None
    assert empty.allowance_mm is not None
    assert low_mm <= filled.allowance_mm - empty.allowance_mm <= high_mm
    assert filled.bush_term_mm == pytest.approx(filled.allowance_mm - empty.allowance_mm)
    assert filled.u_bush_mm == pytest.approx(-filled.bush_term_mm / 2)
    assert empty.u_bush_mm == 0


LIMITS = [
    (bonded(4.9, 2), 450, Reason.BOOM_TOO_SMALL),
    (bonded(55.1, 4), 450, Reason.BOOM_TOO_LARGE),
    (bonded(55.1, 4, Section.SQUARE), 450, Reason.BOOM_TOO_LARGE),
    (bonded(20, 1.49), 450, Reason.ROD_TOO_THIN),
    (bonded(20, 8.6), 450, Reason.ROD_TOO_THICK),
    (bonded(9.9, 8), 450, Reason.BOOM_TO_ROD),
    (bonded(20, 4), 389.9, Reason.ROD_TOO_SHORT),
    (bonded(20, 4), 495.1, Reason.ROD_TOO_LONG),
    (tube(20, 1.5, 4, 14.5), 450, Reason.HOLE_TOO_LARGE),
    (tube(20, 0, 4, 17.1), 450, Reason.HOLE_TOO_LARGE),
    (on_top(20, 4, 0.079), 450, Reason.GAP_TOO_SMALL),
    (on_top(20, 4, 48.1), 450, Reason.TOO_HIGH),
    (on_top(50, 4, 108.1), 450, Reason.TOO_HIGH),
    (BoomMount(Style.BONDED_THROUGH, Section.RECTANGULAR, 20, 4, height_mm=15), 450, Reason.RECTANGULAR),
    (
        BoomMount(Style.INSULATED_THROUGH, Section.SQUARE, 20, 4, hole_mm=8),
        450,
        Reason.SOLID_SQUARE_INSULATED,
    ),
    (tube(20, 1.5, 4, 4.1, film_insulation=True), 450, Reason.FILM_INSULATION),
    (replace(bonded(20, 4), film_insulation=True), 450, Reason.FILM_INSULATION),
    (tube(20, 1.5, 4, 4.04, bush_permittivity=8, bush_length_mm=2.5), 450, Reason.BUSH_CAPACITANCE),
]


@pytest.mark.parametrize(("mount", "length_mm", "reason"), LIMITS, ids=lambda v: getattr(v, "name", None))
def test_outside_the_range_there_is_no_number(mount: BoomMount, length_mm: float, reason: Reason) -> None:
    result = closed_form_allowance(mount, length_mm, MHZ)
    assert [miss.reason for miss in result.misses] == [reason]
    assert result.allowance_mm is result.allowance_wl is result.u_mm is result.reactance_factor is None
    assert result.advice


@pytest.mark.parametrize(
    ("mount", "length_mm"),
    [
        (bonded(5, 2), 450),
        (bonded(55, 4), 450),
        (bonded(55, 4, Section.SQUARE), 450),
        (bonded(20, 1.5), 450),
        (bonded(20, 8.5), 450),
        (bonded(10, 8), 450),
        (bonded(20, 4), 390),
        (bonded(20, 4), 495),
        (tube(20, 1.5, 4, 14.45), 450),
        (on_top(20, 4, 0.08), 450),
        (on_top(20, 4, 48), 450),
        (on_top(50, 4, 108), 450),
    ],
)
def test_the_limits_themselves_are_inside(mount: BoomMount, length_mm: float) -> None:
    result = closed_form_allowance(mount, length_mm, MHZ)
    assert result.misses == ()
    assert result.allowance_mm is not None
    assert result.allowance_mm > 0


ROUND, SQUARE = bonded(20, 4), bonded(20, 4, Section.SQUARE)
TUBE, TOP = tube(20, 1.5, 4, 8), on_top(20, 4, 2)
SQUARE_TUBE = BoomMount(Style.INSULATED_THROUGH, Section.SQUARE, 20, 4, wall_mm=1.5, hole_mm=8)


@pytest.mark.parametrize(
    ("mount", "length_mm", "near", "u_relative"),
    [
        (ROUND, 450, Surroundings(), 0.06),
        (SQUARE, 450, Surroundings(), 0.06),
        (TUBE, 450, Surroundings(), 0.08),
        (tube(20, 0, 4, 8), 450, Surroundings(), 0.08),
        (SQUARE_TUBE, 450, Surroundings(), 0.10),
        (TOP, 450, Surroundings(), 0.10),
        (ROUND, 450, Surroundings(neighbour_distance_mm=149), 0.10),
        (ROUND, 450, Surroundings(neighbour_distance_mm=150), 0.06),
        (ROUND, 419, Surroundings(), 0.08),
        (ROUND, 420, Surroundings(), 0.06),
        (ROUND, 480, Surroundings(), 0.06),
        (TOP, 481, Surroundings(), 0.12),
        (TUBE, 450, Surroundings(end_distance_mm=66), 0.08),
        (TUBE, 450, Surroundings(end_distance_mm=65), 0.15),
        (TOP, 450, Surroundings(end_distance_mm=40), 0.15),
        (ROUND, 450, Surroundings(widening_distance_mm=39), math.hypot(0.06, 0.10)),
    ],
)
def test_uncertainty_of_the_method(mount: BoomMount, length_mm: float, near: Surroundings, u_relative: float) -> None:
    result = closed_form_allowance(mount, length_mm, MHZ, near)
    assert result.misses == ()
    assert result.u_relative == pytest.approx(u_relative)


@pytest.mark.parametrize("section", [Section.ROUND, Section.SQUARE])
@pytest.mark.parametrize(("mhz", "rod_mm"), [(144.3, 6.0), (432.2, 4.0)])
def test_touching_rods_take_about_what_nearly_touching_ones_do(section: Section, mhz: float, rod_mm: float) -> None:
    """At the least gap of the range a 20 mm boom takes what lies between the stated ratios, 10 % aside."""
    ratios = touching_allowance_ratios(section)
    assert ratios is not None
    value = closed_form_allowance(on_top(20, rod_mm, 0.02 * rod_mm, section), 0.45 * wavelength_mm(mhz), mhz)
    assert value.allowance_mm is not None
    assert 0.9 * ratios[0] < value.allowance_mm / 20 < 1.1 * ratios[1]
    assert touching_allowance_ratios(Section.RECTANGULAR) is None


def test_u_of_raised_rods_covers_what_their_length_changes() -> None:
    """Solved at 1.1 B on B .0288, d .0058: 2.03, 2.16, 2.13 mm at 420, 450, 480 mm; the closed form, which follows
    1/S, says 1.87, 2.22, 2.62. A wire cage in a reference library goes with the solved values (.59, .65, .62)."""
    mount = BoomMount(Style.ON_TOP, Section.ROUND, 28.8, 5.8, axis_height_mm=31.7)
    for length_mm, solved_mm in ((420, 2.03), (450, 2.16), (480, 2.13)):
        result = closed_form_allowance(mount, length_mm, MHZ)
        assert result.allowance_mm is not None
        assert abs(result.allowance_mm - solved_mm) < 1.5 * result.u_relative * result.allowance_mm
        assert (Advice.SOLVE_THIS_LENGTH in result.advice) == (length_mm != 450)


def test_common_part_belongs_to_interior_rods() -> None:
    assert closed_form_allowance(bonded(19.9, 4), 450, MHZ).u_correlated_relative == 0.02
    assert closed_form_allowance(bonded(20, 4), 450, MHZ).u_correlated_relative == 0.03
    end = Surroundings(interior=False)
    assert closed_form_allowance(bonded(20, 4), 450, MHZ, end).u_correlated_relative == 0


def test_bonded_rod_near_the_end_keeps_its_value_and_grows_its_u() -> None:
    far = closed_form_allowance(ROUND, 450, MHZ)
    near = closed_form_allowance(ROUND, 450, MHZ, Surroundings(end_distance_mm=30))
    assert near.allowance_mm == far.allowance_mm
    assert near.u_end_relative == pytest.approx(0.12 * 20 / 30)
    assert near.u_mm is not None
    assert near.allowance_mm is not None
    assert near.u_mm == pytest.approx(near.allowance_mm * math.hypot(0.06, 0.03, 0.08))
    assert Advice.LONGER_BOOM in near.advice
    assert Advice.LONGER_BOOM not in far.advice


@pytest.mark.parametrize("mount", [TUBE, TOP, SQUARE_TUBE])
def test_unbonded_rod_near_the_end_has_no_value(mount: BoomMount) -> None:
    result = closed_form_allowance(mount, 450, MHZ, Surroundings(end_distance_mm=39.9))
    assert [miss.reason for miss in result.misses] == [Reason.BOOM_END]
    assert result.allowance_mm is None
    assert Advice.LONGER_BOOM_UNBONDED in result.advice


def test_all_misses_come_at_once() -> None:
    mount = BoomMount(Style.BONDED_THROUGH, Section.RECTANGULAR, 60, 9, height_mm=40)
    result = closed_form_allowance(mount, 500, MHZ)
    assert {miss.reason for miss in result.misses} == {
        Reason.RECTANGULAR,
        Reason.BOOM_TOO_LARGE,
        Reason.ROD_TOO_THICK,
        Reason.ROD_TOO_LONG,
    }


def test_scale_does_not_matter() -> None:
    small = closed_form_allowance(tube(20, 1.5, 4, 8), 300, 432.2)
    large = closed_form_allowance(tube(60, 4.5, 12, 24), 900, 432.2 / 3)
    assert small.allowance_mm is not None
    assert large.allowance_mm == pytest.approx(3 * small.allowance_mm)


@pytest.mark.parametrize(
    "bad",
    [
        {"outside_mm": 0.0},
        {"wall_mm": 10.0},
        {"hole_mm": 4.0},
        {"height_mm": 5.0},
        {"bush_permittivity": 0.9},
        {"style": Style.ON_TOP, "axis_height_mm": 1.0},
    ],
)
def test_impossible_mounts_are_refused(bad: dict[str, object]) -> None:
    good = {"outside_mm": 20.0, "wall_mm": 1.5, "rod_diameter_mm": 4.0, "hole_mm": 8.0}
    start = {"style": Style.INSULATED_THROUGH, "section": Section.ROUND}
    with pytest.raises(ValueError, match=r"boom|rod|hole|wall|bush"):
        BoomMount(**{**start, **good, **bad})  # type: ignore[arg-type]


@given(
    boom_mm=st.floats(5, 55),
    rod_part=st.floats(0, 1),
    wall_part=st.floats(0.02, 0.2),
    hole_part=st.floats(0, 1),
    length_mm=st.floats(390, 495),
)
def test_insulating_takes_less_than_bonding_and_never_nothing(
    boom_mm: float, rod_part: float, wall_part: float, hole_part: float, length_mm: float
) -> None:
    """Over the whole range: 0 < thin tube < thick tube < bonded, and a solid bar between its tube and bonded."""
    thickest_mm = min(8.5, boom_mm / 1.25, 0.8 * 0.85 * boom_mm * (1 - 2 * wall_part))
    rod_mm = 1.5 + rod_part * max(0.0, thickest_mm - 1.5)
    widest_mm = 0.85 * boom_mm * (1 - 2 * wall_part)
    assume(rod_mm * 1.05 < widest_mm)
    hole_mm = rod_mm * 1.05 + hole_part * (widest_mm - rod_mm * 1.05)
    thin, thick, solid = (
        closed_form_allowance(tube(boom_mm, part * boom_mm, rod_mm, hole_mm), length_mm, MHZ).allowance_mm
        for part in (wall_part / 2, wall_part, 0.0)
    )
    whole = closed_form_allowance(bonded(boom_mm, rod_mm), length_mm, MHZ).allowance_mm
    assert thin is not None
    assert thick is not None
    assert solid is not None
    assert whole is not None
    assert 0 < thin < thick < solid < whole


@given(
    boom_mm=st.floats(8, 43),
    low_part=st.floats(0.02, 1),
    rise_part=st.floats(0.01, 1),
    length_mm=st.floats(390, 494),
)
def test_higher_rods_take_less_and_longer_rods_more(
    boom_mm: float, low_part: float, rise_part: float, length_mm: float
) -> None:
    """A square boom takes more than a round one of its side as diameter, at any height."""
    low_mm, high_mm = low_part * boom_mm, (low_part + rise_part) * boom_mm
    values = [
        closed_form_allowance(on_top(boom_mm, 5, gap_mm, section), long_mm, MHZ).allowance_mm
        for section, gap_mm, long_mm in (
            (Section.ROUND, high_mm, length_mm),
            (Section.ROUND, low_mm, length_mm),
            (Section.ROUND, low_mm, length_mm + 1),
            (Section.SQUARE, low_mm, length_mm + 1),
        )
    ]
    numbers = [value for value in values if value is not None]
    assert len(numbers) == 4
    assert 0 < numbers[0] < numbers[1] < numbers[2] < numbers[3]
