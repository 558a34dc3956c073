"""What errors and other rods do to a twelve-rod array for 434 MHz with 4 mm rods.

Source: own study 2026, computed, unpublished; found with an implementation of which nothing is reused here.
"""

import csv
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest
from scipy.optimize import brentq

from fabgen.physics.array import LIGHT_MM_MHZ, RodArray, solve_array, solve_band
from fabgen.physics.array_gradient import gradient_band
from fabgen.physics.array_sampling import BuildChanges, expand_array, respond, sample_band
from fabgen.physics.array_shift import Shift, ShiftGauge, build_shift, shift_gauge
from fabgen.physics.scattering_reactance import equal_scattering_length, scattering_impedance_ohm

DESIGN_MHZ = 434.0
SENSITIVITY_TOLERANCE = 0.10
"""Of the value: phase origin and edges of the band are free to 4 %, the mesh to 1 %."""
DATA = Path(__file__).parents[1] / "9_validation" / "data"


@pytest.fixture(scope="module")
def design() -> RodArray:
    with (DATA / "twelve_rod_array.csv").open(encoding="utf-8") as file:
        rows = list(csv.DictReader(file))
    stations_mm = tuple(float(row["station_mm"]) for row in rows)
    lengths_mm = tuple(float(row["length_mm"]) for row in rows)
    return RodArray(stations_mm, lengths_mm, (4.0,) * len(rows), fed_index=1)


@pytest.fixture(scope="module")
def gauge(design: RodArray) -> ShiftGauge:
    return shift_gauge(design, DESIGN_MHZ)


def longer(array: RodArray, change_mm: float, *, fed: bool) -> RodArray:
    """All rods changed alike, the fed rod only where asked."""
    return replace(
        array,
        length_mm=tuple(
            value + (change_mm if fed or index != array.fed_index else 0.0)
            for index, value in enumerate(array.length_mm)
        ),
    )


def per_mm(gauge: ShiftGauge, array: RodArray, quantity: str) -> Shift:
    """Shift per millimetre of every length or station."""
    rows = [getattr(gradient, quantity) for gradient in gradient_band(array, gauge.frequency_mhz)]
    return gauge.per_mm(
        np.array([row.gain_db_per_mm for row in rows]).T, np.array([row.back_front_per_mm for row in rows]).T
    )


def scaled(array: RodArray, scale: float) -> RodArray:
    return RodArray(
        tuple(scale * value for value in array.station_mm),
        tuple(scale * value for value in array.length_mm),
        tuple(scale * value for value in array.diameter_mm),
        array.fed_index,
    )


def test_a_scaled_design_is_shifted_and_nothing_else(design: RodArray, gauge: ShiftGauge) -> None:
    """1.001 times everything is -433.6 kHz (434 MHz / 1.001) to 1 kHz; found -433.57 with no residual."""
    shift = build_shift(gauge, scaled(design, 1.001))
    assert shift.shift_khz[0] == pytest.approx(-433.6, abs=1.0)
    assert shift.residual[0] < 1e-6
    assert not shift.at_limit[0]


def test_the_gauge_reaches_far_shifts_and_says_where_it_ends(design: RodArray, gauge: ShiftGauge) -> None:
    """2 % is measured to 1 kHz; 4 % lies beyond the reach and is marked."""
    far = build_shift(gauge, scaled(design, 1.02))
    assert far.shift_khz[0] == pytest.approx(1e3 * DESIGN_MHZ * (1 / 1.02 - 1), abs=1.0)
    assert build_shift(gauge, scaled(design, 1.04)).at_limit[0]


def test_more_frequencies_give_the_same_shift(design: RodArray) -> None:
    """13 against 61 frequencies over 430 to 438 MHz: within 1.5 %; ends counted whole would be 7 % apart."""
    rng = np.random.default_rng(3)
    lengths_mm = np.array(design.length_mm) + rng.uniform(-0.5, 0.5, (2, design.count)) + [[0.0], [0.3]]
    for row in lengths_mm:
        build = replace(design, length_mm=tuple(row))
        few, many = (
            build_shift(shift_gauge(design, DESIGN_MHZ, low_mhz=430.0, high_mhz=438.0, points=points), build)
            for points in (13, 61)
        )
        assert few.shift_khz[0] == pytest.approx(many.shift_khz[0], rel=0.015)
        assert few.residual[0] == pytest.approx(many.residual[0], rel=0.03)


def test_moving_the_whole_array_changes_nothing(design: RodArray, gauge: ShiftGauge) -> None:
    moved = replace(design, station_mm=tuple(value + 40.0 for value in design.station_mm))
    shift = build_shift(gauge, moved)
    assert abs(shift.shift_khz[0]) < 1e-3
    assert shift.residual[0] < 1e-6


def test_a_tenth_of_a_millimetre_on_all_lengths(design: RodArray, gauge: ShiftGauge) -> None:
    """-98 kHz; found -98.5."""
    shift = build_shift(gauge, longer(design, 0.1, fed=True))
    assert shift.shift_khz[0] == pytest.approx(-98, rel=SENSITIVITY_TOLERANCE)


def test_an_allowance_wrong_by_a_millimetre(design: RodArray, gauge: ShiftGauge) -> None:
    """All parasitic rods 1 mm longer: -982 kHz; found -989. It dwarfs the random errors below."""
    shift = build_shift(gauge, longer(design, 1.0, fed=False))
    assert shift.shift_khz[0] == pytest.approx(-982, rel=SENSITIVITY_TOLERANCE)
    assert shift.residual[0] < 0.6


def test_shift_per_millimetre_adds_up(design: RodArray, gauge: ShiftGauge) -> None:
    """First-order shifts of single rods sum to the common one; stations sum to none; the residual is not hidden."""
    lengths, stations = per_mm(gauge, design, "length"), per_mm(gauge, design, "station")
    together = build_shift(gauge, longer(design, 0.01, fed=True))
    assert lengths.shift_khz.sum() * 0.01 == pytest.approx(together.shift_khz[0], rel=1e-3)
    assert abs(stations.shift_khz.sum()) < 1e-6
    one = replace(design, length_mm=(*design.length_mm[:3], design.length_mm[3] + 0.1, *design.length_mm[4:]))
    single = build_shift(gauge, one)
    assert lengths.shift_khz[3] * 0.1 == pytest.approx(single.shift_khz[0], rel=0.02)
    assert lengths.residual[3] * 0.1 == pytest.approx(single.residual[0], rel=0.02)
    assert lengths.residual_back_front[3] * 0.1 == pytest.approx(single.residual_back_front[0], rel=0.05)


def test_an_element_can_cost_front_to_back_without_a_shift(design: RodArray, gauge: ShiftGauge) -> None:
    """Kilohertz alone mislead: one rod costs more than 0.3 dB of F/B per 0.1 mm for less than 10 kHz."""
    lengths = per_mm(gauge, design, "length")
    at_design = solve_array(design, DESIGN_MHZ).front_to_back_db
    costs = []
    for index, khz_per_mm in enumerate(lengths.shift_khz):
        lengths_mm = list(design.length_mm)
        lengths_mm[index] += 0.1
        worse = solve_array(replace(design, length_mm=tuple(lengths_mm)), DESIGN_MHZ).front_to_back_db
        costs.append((abs(khz_per_mm) * 0.1, abs(worse - at_design)))
    assert any(khz < 10 and db > 0.3 for khz, db in costs)


def test_random_cutting_and_drilling_errors(design: RodArray) -> None:
    """+-0.5 mm on lengths and stations: 95 % of builds within 373 kHz; found 384 for rectangular errors."""
    gauge = shift_gauge(design, DESIGN_MHZ, points=7)
    rng = np.random.default_rng(434)
    builds = (800, design.count)
    changes = BuildChanges(rng.uniform(-0.5, 0.5, builds), rng.uniform(-0.5, 0.5, builds), np.zeros(builds))
    sampled = sample_band(design, gauge.frequency_mhz, changes)
    shift = gauge.measure(sampled.gain_dbi, sampled.back_front)
    assert np.quantile(np.abs(shift.shift_khz), 0.95) == pytest.approx(373, rel=SENSITIVITY_TOLERANCE)


def with_rods_of(array: RodArray, new_diameter_mm: tuple[float, ...]) -> RodArray:
    """The array built from other rods, every rod cut for equal scattering reactance."""
    lengths_mm = tuple(
        equal_scattering_length(length_mm, diameter_mm, new_mm, DESIGN_MHZ).length_mm
        for length_mm, diameter_mm, new_mm in zip(array.length_mm, array.diameter_mm, new_diameter_mm, strict=True)
    )
    return replace(array, length_mm=lengths_mm, diameter_mm=new_diameter_mm)


def test_another_rod_diameter(design: RodArray, gauge: ShiftGauge) -> None:
    """4 to 5 mm rods: -2841 kHz uncorrected (found -2939), -17 kHz after equal scattering reactance (found -11)."""
    thicker = replace(design, diameter_mm=(5.0,) * design.count)
    uncorrected = build_shift(gauge, thicker)
    assert uncorrected.shift_khz[0] == pytest.approx(-2841, rel=SENSITIVITY_TOLERANCE)
    corrected = with_rods_of(design, (5.0,) * design.count)
    left = build_shift(gauge, corrected)
    assert left.shift_khz[0] == pytest.approx(-17, abs=10)
    assert left.residual[0] < 0.3
    cuts_mm = [old - new for old, new in zip(design.length_mm, corrected.length_mm, strict=True)]
    assert min(cuts_mm) == pytest.approx(0.7, abs=0.05)
    assert max(cuts_mm) == pytest.approx(3.7, abs=0.05)


@pytest.mark.parametrize(("radius_mm", "resonant_mm"), [(1.0, 471.55), (4.25, 456.93)])
def test_scattering_resonance_of_a_free_rod(radius_mm: float, resonant_mm: float) -> None:
    """Half-wave mode of a rod with flat ends, surface integral solution: 0.47155 and 0.45693 wavelengths.

    Found 471.86 and 456.66 mm at a wavelength of 1000 mm: 0.07 %, inside the 0.3 % that the model claims.
    """
    frequency_mhz = LIGHT_MM_MHZ / 1000

    def reactance_ohm(length_mm: float) -> float:
        return scattering_impedance_ohm(length_mm, 2 * radius_mm, frequency_mhz).imag

    assert brentq(reactance_ohm, 430, 495) == pytest.approx(resonant_mm, rel=1e-3)


@pytest.mark.parametrize("length_mm", [380.0, 430.0, 485.0])
def test_a_finer_mesh_gives_the_same_cut(length_mm: float) -> None:
    frequency_mhz = LIGHT_MM_MHZ / 1000
    usual = equal_scattering_length(length_mm, 4.0, 8.5, frequency_mhz)
    finer = equal_scattering_length(length_mm, 4.0, 8.5, frequency_mhz, segments=5)
    assert usual.length_mm == pytest.approx(finer.length_mm, abs=0.03)


def test_there_and_back_is_the_same_rod(design: RodArray) -> None:
    thicker = with_rods_of(design, (5.0,) * design.count)
    back = with_rods_of(thicker, design.diameter_mm)
    assert back.length_mm == pytest.approx(design.length_mm, abs=1e-6)


def test_expanded_builds_agree_with_builds_solved_anew(design: RodArray) -> None:
    """+-0.5 mm, +-0.05 mm of diameter, rods with loss; F/B (30-60 dB here) within 0.05 dB, found 0.02."""
    lossy = replace(design, conductivity_s_per_m=2e7)
    rng = np.random.default_rng(7)
    shape = (60, design.count)
    changes = BuildChanges(
        rng.uniform(-0.5, 0.5, shape), rng.uniform(-0.5, 0.5, shape), rng.uniform(-0.05, 0.05, shape)
    )
    expanded = respond(expand_array(lossy, DESIGN_MHZ), changes)
    for build in range(shape[0]):
        anew = solve_array(
            replace(
                lossy,
                length_mm=tuple(np.add(design.length_mm, changes.length_mm[build])),
                station_mm=tuple(np.add(design.station_mm, changes.station_mm[build])),
                diameter_mm=tuple(np.add(design.diameter_mm, changes.diameter_mm[build])),
            ),
            DESIGN_MHZ,
        )
        assert expanded.front_to_back_db[build, 0] == pytest.approx(anew.front_to_back_db, abs=0.05)
        assert expanded.gain_dbi[build, 0] == pytest.approx(anew.gain_dbi, abs=0.002)
        assert abs(expanded.feed_impedance_ohm[build, 0] - anew.feed_impedance_ohm) < 0.05


def test_no_change_is_the_design(design: RodArray) -> None:
    none = np.zeros((1, design.count))
    sampled = sample_band(design, (430.0, 438.0), BuildChanges(none, none, none))
    band = solve_band(design, (430.0, 438.0))
    assert sampled.gain_dbi[0] == pytest.approx(band.gain_dbi, abs=1e-9)
    assert sampled.back_front[0] == pytest.approx(band.back_front, abs=1e-9)
    assert sampled.mismatch(50.0)[0] == pytest.approx(band.mismatch(50.0), rel=1e-9)
