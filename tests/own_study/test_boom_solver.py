"""The full-wave solver against the own study's values, limits from theory, and its own refinement.

Source of every table: own study 2026, computed, unpublished; theory, no measurement. Wavelength 1000 mm throughout.
"""

import csv
import math
from dataclasses import replace
from functools import cache
from pathlib import Path

import pytest

from fabgen.physics.boom_closed_form import closed_form_allowance
from fabgen.physics.boom_coupon import end_fall_factor, reactance_factor_from_allowance
from fabgen.physics.boom_mount import BoomMount, Section, Style, wavelength_mm
from fabgen.physics.boom_mount_mesh import DEFAULT, FINE, Fineness, rod_segments
from fabgen.physics.boom_range import Reason
from fabgen.physics.boom_solver import (
    SolvedAllowance,
    free_rod_length_wl,
    free_rod_mode,
    solve_allowance,
    solve_at,
    solver_misses,
)
from fabgen.physics.boom_uncertainty import carrying_u_relative

DATA = Path(__file__).parent / "data"
MHZ = 299.792458


def rows(name: str) -> list[dict[str, str]]:
    with (DATA / name).open(encoding="utf-8") as file:
        return list(csv.DictReader(file))


def bonded(outside_mm: float, rod_mm: float, section: Section = Section.ROUND, height_mm: float = 0) -> BoomMount:
    return BoomMount(Style.BONDED_THROUGH, section, outside_mm, rod_mm, height_mm=height_mm)


def other_mount(row: dict[str, str]) -> BoomMount:
    boom_mm, rod_mm = 1000 * float(row["boom_wl"]), 1000 * float(row["rod_wl"])
    return BoomMount(
        style=Style(row["style"]),
        section=Section(row["section"]),
        outside_mm=boom_mm,
        rod_diameter_mm=rod_mm,
        wall_mm=boom_mm * float(row["wall_over_boom"]),
        hole_mm=rod_mm * float(row["hole_over_rod"]),
        axis_height_mm=1000 * float(row["height_wl"]),
    )


def ratio(mount: BoomMount, length_wl: float, mhz: float = MHZ, fineness: Fineness = DEFAULT) -> float:
    return solve_at(mount, length_wl * wavelength_mm(mhz), mhz, fineness)[0] / mount.outside_mm


@pytest.mark.slow
@pytest.mark.parametrize("fineness", [DEFAULT, FINE], ids=["default", "fine"])
@pytest.mark.parametrize(("radius_wl", "length_wl"), [(0.001, 0.47155), (0.00425, 0.45693)])
def test_free_rods_resonate(radius_wl: float, length_wl: float, fineness: Fineness) -> None:
    """Tolerance 2e-4 wavelengths, as the study states. Misses: 0.0e-4 and 0.6e-4 default."""
    segments = rod_segments(Style.BONDED_THROUGH, fineness)
    found = free_rod_length_wl(0.0, 2 * radius_wl, length_wl, segments, fineness)
    assert found == pytest.approx(length_wl, abs=2e-4)


@pytest.mark.slow
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
def test_slope_of_free_rods(rod_wl: float, length_wl: float, slope_ohm: float) -> None:
    """Resistance times slope of the eigenvalue. Second code's values, tolerance 1 %; largest miss 0.4 %."""
    segments, step_wl = rod_segments(Style.BONDED_THROUGH, DEFAULT), 0.002
    low, middle, high = (free_rod_mode(rod_wl, length_wl + part * step_wl, segments, DEFAULT) for part in (-1, 0, 1))
    found = middle.resistance_ohm * (high.reactance_ratio - low.reactance_ratio) / (2 * step_wl)
    assert found == pytest.approx(slope_ohm, rel=0.01)


TABLE = rows("boom_round_bonded.csv")
CELLS = [row for i, row in enumerate(TABLE) if (i + i // 3) % 3 == 0]


def test_chosen_cells_cover_the_table() -> None:
    assert len(CELLS) >= 14
    for column in ("boom_wl", "rod_wl", "length_wl"):
        assert {row[column] for row in CELLS} == {row[column] for row in TABLE}


@pytest.mark.slow
@pytest.mark.parametrize("row", CELLS, ids=lambda r: "-".join(r.values()))
def test_round_bonded_table(row: dict[str, str]) -> None:
    """Tolerance 1.5 %. Largest miss of all 54 cells 1.3 % (B .055, d .0015, L0 .42), elsewhere within 0.9 %."""
    mount = bonded(1000 * float(row["boom_wl"]), 1000 * float(row["rod_wl"]))
    expected = float(row["allowance_over_boom"])
    assert ratio(mount, float(row["length_wl"])) == pytest.approx(expected, rel=0.015)


KNOWN_DIFFERENCES = {
    ("insulated-through", "0.055", "0"): 0.052,
    ("insulated-through", "0.0288", "0"): 0.02,
    ("on-top", "0.0288", "0.0058"): 0.035,
}
"""Where this solver and the study's part: see `test_other_mounts`."""


@pytest.mark.slow
@pytest.mark.parametrize("row", rows("boom_other_mounts.csv"), ids=lambda r: "-".join(r.values()))
def test_other_mounts(row: dict[str, str]) -> None:
    """Tolerance 1.5 %, but for three cases where refinement moves this solver by less than 0.7 %.

    Solid bar of B .055 (.519 against .495) and of B .0288 (.380 against .373), square on top at half a diameter
    (.321 against .313): there this solver agrees with the study's own closed forms (.514, .379, .323), and for
    the solid bars with the inductance of the buried coaxial line, better than the tabulated value does.
    """
    mount = other_mount(row)
    key = (row["style"], row["boom_wl"], row["wall_over_boom"] if float(row["hole_over_rod"]) else row["height_wl"])
    tolerance = 0.015
    if row["section"] == "square" or row["style"] != "on-top":
        tolerance = KNOWN_DIFFERENCES.get(key, tolerance)
    assert ratio(mount, float(row["length_wl"])) == pytest.approx(float(row["allowance_over_boom"]), rel=tolerance)


@pytest.mark.slow
@pytest.mark.parametrize(
    ("mhz", "rod_mm", "section", "length_wl", "expected"),
    [
        (144.3, 6.0, Section.ROUND, 0.43, 0.180),
        (144.3, 6.0, Section.SQUARE, 0.43, 0.270),
        (432.2, 4.0, Section.ROUND, 0.43, 0.252),
        (432.2, 4.0, Section.SQUARE, 0.43, 0.390),
    ],
)
def test_rods_nearly_touching_the_top(
    mhz: float, rod_mm: float, section: Section, length_wl: float, expected: float
) -> None:
    """Gap 0.1 rod diameter on a 20 mm boom; tolerance 1.5 %."""
    mount = BoomMount(Style.ON_TOP, section, 20, rod_mm, axis_height_mm=0.6 * rod_mm)
    assert ratio(mount, length_wl, mhz) == pytest.approx(expected, rel=0.015)


@pytest.mark.slow
@pytest.mark.parametrize(
    ("mhz", "mount", "length_wl", "expected_mm"),
    [
        (144.3, bonded(20, 6), 0.43, 6.7),
        (144.3, bonded(20, 6), 0.49, 9.2),
        (432.2, bonded(20, 4), 0.43, 9.7),
        (432.2, bonded(20, 4), 0.49, 13.0),
        (144.3, BoomMount(Style.INSULATED_THROUGH, Section.ROUND, 20, 6, wall_mm=1.5, hole_mm=12), 0.43, 3.3),
        (432.2, BoomMount(Style.INSULATED_THROUGH, Section.ROUND, 20, 4, wall_mm=1.5, hole_mm=8), 0.43, 4.3),
    ],
)
def test_examples_in_mm(mhz: float, mount: BoomMount, length_wl: float, expected_mm: float) -> None:
    """Tolerance 1.5 % and half the last printed digit."""
    value_mm = solve_at(mount, length_wl * wavelength_mm(mhz), mhz)[0]
    assert abs(value_mm - expected_mm) <= 0.015 * expected_mm + 0.05


@pytest.mark.slow
@pytest.mark.parametrize("rod_wl", [0.0015, 0.003])
def test_far_thin_boom(rod_wl: float) -> None:
    """A boom of radius b at h = 10 B takes (3/8) b²/h, a static dipole limit; tolerance 10 %."""
    boom_wl = 0.005
    mount = BoomMount(Style.ON_TOP, Section.ROUND, 1000 * boom_wl, 1000 * rod_wl, axis_height_mm=9500 * boom_wl)
    expected_wl = 0.375 * (boom_wl / 2) ** 2 / (10 * boom_wl)
    assert ratio(mount, 0.45) * boom_wl == pytest.approx(expected_wl, rel=0.10)


RECTANGULAR = Section.RECTANGULAR
REFINED = {
    "bonded round": bonded(30, 6),
    "bonded square": bonded(30, 6, Section.SQUARE),
    "bonded rectangular, wide": bonded(40, 6, RECTANGULAR, 20),
    "bonded rectangular, high": bonded(20, 6, RECTANGULAR, 40),
    "insulated round tube": BoomMount(Style.INSULATED_THROUGH, Section.ROUND, 28.8, 5.8, wall_mm=2.16, hole_mm=11.6),
    "insulated rectangular tube": BoomMount(
        Style.INSULATED_THROUGH, RECTANGULAR, 30, 5, wall_mm=2, hole_mm=9, height_mm=20
    ),
    "insulated solid bar": BoomMount(Style.INSULATED_THROUGH, Section.ROUND, 28.8, 5.8, hole_mm=11.6),
    "round, on top": BoomMount(Style.ON_TOP, Section.ROUND, 28.8, 5.8, axis_height_mm=5.8),
    "rectangular, on top": BoomMount(Style.ON_TOP, RECTANGULAR, 40, 6, height_mm=20, axis_height_mm=6),
}


@cache
def refined(name: str) -> SolvedAllowance:
    return solve_allowance(REFINED[name], 450, MHZ)


@pytest.mark.slow
@pytest.mark.parametrize("name", REFINED)
def test_refinement_moves_the_allowance_by_less_than_one_per_cent(name: str) -> None:
    solved = refined(name)
    assert solved.unknowns[1] > 1.4 * solved.unknowns[0]
    assert solved.mesh_difference_relative == pytest.approx(solved.allowance_mm / solved.coarse_allowance_mm - 1)
    assert abs(solved.mesh_difference_relative) < 0.01


@pytest.mark.slow
@pytest.mark.parametrize(("name", "low_mm", "high_mm"), [("wide", 20, 40), ("high", 20, 40)])
def test_rectangular_boom_lies_between_the_squares_of_its_sides(name: str, low_mm: float, high_mm: float) -> None:
    """No closed form covers it. Metal inside other metal takes less: the square of the short side fits into it, it
    fits into the square of the long side."""
    low, high = (closed_form_allowance(bonded(s, 6, Section.SQUARE), 450, MHZ) for s in (low_mm, high_mm))
    assert low.allowance_mm is not None
    assert high.allowance_mm is not None
    solved = refined(f"bonded rectangular, {name}")
    assert low.allowance_mm < solved.allowance_mm < high.allowance_mm


@pytest.mark.slow
def test_factor_belongs_to_the_allowance() -> None:
    solved = refined("bonded round")
    closed = closed_form_allowance(REFINED["bonded round"], 450, MHZ)
    assert solved.reactance_factor == pytest.approx(closed.reactance_factor, rel=0.036)


def test_progress_is_told() -> None:
    tiny = Fineness(up=2, along=1, over=2, on_top_segments=2, growth=2.5, rod_step_wl=0.06, boom_step_wl=0.1)
    told: list[tuple[str, float]] = []
    solve_allowance(bonded(30, 6), 450, MHZ, meshes=(tiny, tiny), progress=lambda what, part: told.append((what, part)))
    assert [part for _, part in told] == [0.0, 0.2, 1.0]


@pytest.mark.parametrize(
    ("mount", "length_mm", "reason"),
    [
        (bonded(1.9, 1), 450, Reason.BOOM_TOO_SMALL),
        (bonded(81, 6), 450, Reason.BOOM_TOO_LARGE),
        (bonded(30, 0.4), 450, Reason.ROD_TOO_THIN),
        (bonded(30, 21), 450, Reason.ROD_TOO_THICK),
        (bonded(30, 6), 359, Reason.ROD_TOO_SHORT),
        (bonded(30, 6), 501, Reason.ROD_TOO_LONG),
        (bonded(11, 10), 450, Reason.BOOM_TO_ROD),
        (bonded(30, 6, RECTANGULAR, 6.5), 450, Reason.BOOM_TO_ROD),
        (
            BoomMount(Style.INSULATED_THROUGH, Section.ROUND, 30, 6, wall_mm=2, hole_mm=25),
            450,
            Reason.HOLE_TOO_LARGE,
        ),
        (
            BoomMount(Style.INSULATED_THROUGH, Section.ROUND, 30, 6, hole_mm=6.05, film_insulation=True),
            450,
            Reason.FILM_INSULATION,
        ),
        (replace(bonded(30, 6), film_insulation=True), 450, Reason.FILM_INSULATION),
        (BoomMount(Style.ON_TOP, Section.ROUND, 30, 6, axis_height_mm=3.1), 450, Reason.GAP_TOO_SMALL),
    ],
)
def test_what_cannot_be_solved_is_refused(mount: BoomMount, length_mm: float, reason: Reason) -> None:
    assert [miss.reason for miss in solver_misses(mount, length_mm, MHZ)] == [reason]
    with pytest.raises(ValueError, match=reason.value[:20]):
        solve_at(mount, length_mm, MHZ)


SHORT_BOOMS = {
    "bonded": bonded(28.8, 5.8),
    "insulated": REFINED["insulated round tube"],
    "on top": REFINED["round, on top"],
}


@pytest.mark.slow
@pytest.mark.parametrize("name", SHORT_BOOMS)
def test_boom_ends_lower_the_factor(name: str) -> None:
    """Two ends at 2 B against two at 0.3 wavelengths; tolerance 25 % of the fall, as the rule says "about".

    Solved: 10, 23 and 23 % less allowance; the rule gives 8, 19 and 20 %.
    """
    mount = SHORT_BOOMS[name]
    case = {"boom_mm": 28.8, "rod_diameter_mm": 5.8, "rod_length_mm": 450.0, "frequency_mhz": MHZ}
    long, short = (
        reactance_factor_from_allowance(solve_at(mount, 450, MHZ, boom_half_mm=half_mm)[0], **case)
        for half_mm in (300.0, 57.6)
    )
    expected = 2 * (end_fall_factor(28.8, 57.6) - end_fall_factor(28.8, 300))
    assert long - short == pytest.approx(expected, rel=0.25)


LENGTHS = {
    "insulated": REFINED["insulated round tube"],
    "near the top": REFINED["round, on top"],
    "high above": BoomMount(Style.ON_TOP, Section.ROUND, 28.8, 5.8, axis_height_mm=31.7),
}


@pytest.mark.slow
@pytest.mark.parametrize("name", LENGTHS)
def test_factor_depends_on_the_rods_length_as_u_says(name: str) -> None:
    """From .45 to .48 wavelengths g falls by 0.5 to 1.3 times what `carrying_u_relative` counts for it."""
    mount = LENGTHS[name]
    case = {"boom_mm": 28.8, "rod_diameter_mm": 5.8, "frequency_mhz": MHZ}
    at, away = (
        reactance_factor_from_allowance(solve_at(mount, length, MHZ)[0], rod_length_mm=length, **case)
        for length in (450.0, 480.0)
    )
    counted = carrying_u_relative(mount, MHZ, 450, 480)
    assert 0.5 * counted < 1 - away / at < 1.3 * counted


CAGES = rows("boom_cage_single.csv")


@pytest.mark.slow
@pytest.mark.parametrize("row", CAGES[1::2], ids=lambda r: f"{r['boom_wl']}-{r['rod_wl']}-{r['length_wl']}")
def test_single_rods_on_wire_cages_of_a_reference_library(row: dict[str, str]) -> None:
    """Twelve-wire cages solved by a general moment-method library; tolerance 5 %, what such cages read.

    The cage's value comes from the phase of the scattered field, in which the boom's own scattering takes part;
    they read 0 to 3 % low.
    """
    mount = bonded(1000 * float(row["boom_wl"]), 1000 * float(row["rod_wl"]))
    cage = float(row["allowance_over_boom"])
    assert ratio(mount, float(row["length_wl"])) == pytest.approx(cage, rel=0.05)


@pytest.mark.slow
def test_bonded_factor_grows_with_the_logarithm_of_the_boom() -> None:
    """Doubling B at one rod adds ln 2 to g but for the retardation term, in a coarse solve; tolerance 5 % of g."""
    tiny = Fineness(up=3, along=2, growth=2.0, rod_step_wl=0.04, boom_step_wl=0.06)
    small, large = (solve_allowance(bonded(b, 2), 450, MHZ, meshes=(tiny, tiny)) for b in (10, 20))
    grown = large.reactance_factor - small.reactance_factor
    assert grown == pytest.approx(math.log(2) - 3.01 * 0.01, abs=0.05 * large.reactance_factor)
