"""Laws of thin-rod arrays, on arrays nobody chose."""

import math
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fabgen.physics.array import LIGHT_MM_MHZ, RodArray, solve_array
from fabgen.physics.array_gradient import solve_gradient
from fabgen.physics.array_pattern import mean_gain

FREQUENCY_MHZ = LIGHT_MM_MHZ / 1000


@st.composite
def arrays(draw: st.DrawFn, most: int = 6) -> RodArray:
    """Two to `most` rods at a wavelength of 1000 mm; 0.05 to 0.4 wavelengths apart, 0.39 to 0.495 long."""
    count = draw(st.integers(2, most))
    gaps_mm = draw(st.lists(st.floats(50.0, 400.0), min_size=count - 1, max_size=count - 1))
    stations_mm = tuple(float(value) for value in np.cumsum([0.0, *gaps_mm]))
    lengths_mm = tuple(draw(st.lists(st.floats(390.0, 495.0), min_size=count, max_size=count)))
    diameters_mm = tuple(draw(st.lists(st.floats(1.0, 8.5), min_size=count, max_size=count)))
    return RodArray(stations_mm, lengths_mm, diameters_mm, draw(st.integers(0, count - 1)))


@given(arrays(), st.floats(0.2, 5.0))
@settings(max_examples=15)
def test_scale_law(array: RodArray, scale: float) -> None:
    """Everything times s at frequency over s is the same array: 1e-4 asked, rounding found."""
    larger = RodArray(
        tuple(scale * value for value in array.station_mm),
        tuple(scale * value for value in array.length_mm),
        tuple(scale * value for value in array.diameter_mm),
        array.fed_index,
    )
    one, other = solve_array(array, FREQUENCY_MHZ), solve_array(larger, FREQUENCY_MHZ / scale)
    assert other.feed_impedance_ohm == pytest.approx(one.feed_impedance_ohm, rel=1e-8)
    assert other.back_front == pytest.approx(one.back_front, rel=1e-8, abs=1e-10)


@given(arrays())
@settings(max_examples=15)
def test_turned_round_front_is_back(array: RodArray) -> None:
    """The array mirrored along the boom has the inverse back/front ratio and the same impedance."""
    mirrored = replace(array, station_mm=tuple(-value for value in array.station_mm))
    one, other = solve_array(array, FREQUENCY_MHZ), solve_array(mirrored, FREQUENCY_MHZ)
    assert other.feed_impedance_ohm == pytest.approx(one.feed_impedance_ohm, rel=1e-9)
    assert other.back_front * one.back_front == pytest.approx(1, rel=1e-8)


@given(arrays(), st.randoms(use_true_random=False))
@settings(max_examples=10)
def test_order_of_rows_and_origin_do_not_matter(array: RodArray, random) -> None:
    order = list(range(array.count))
    random.shuffle(order)
    shuffled = RodArray(
        tuple(array.station_mm[index] + 123.0 for index in order),
        tuple(array.length_mm[index] for index in order),
        tuple(array.diameter_mm[index] for index in order),
        order.index(array.fed_index),
    )
    one, other = solve_array(array, FREQUENCY_MHZ), solve_array(shuffled, FREQUENCY_MHZ)
    assert other.feed_impedance_ohm == pytest.approx(one.feed_impedance_ohm, rel=1e-8)
    assert other.back_front == pytest.approx(one.back_front, rel=1e-7, abs=1e-9)


@given(arrays(most=4))
@settings(max_examples=10)
def test_reciprocity(array: RodArray) -> None:
    """The short-circuit current in rod B with rod A fed equals that in A with B fed."""
    last = array.count - 1
    from_first = solve_array(replace(array, fed_index=0), FREQUENCY_MHZ).current_a[last, 0]
    from_last = solve_array(replace(array, fed_index=last), FREQUENCY_MHZ).current_a[0, 0]
    assert from_first == pytest.approx(from_last, rel=1e-9)


@given(arrays())
@settings(max_examples=15)
def test_power_in_is_power_out(array: RodArray) -> None:
    """Gain averaged over the sphere 0.995 to 1.005."""
    assert 0.995 <= mean_gain(solve_array(array, FREQUENCY_MHZ)) <= 1.005


@given(arrays(), st.floats(5.0, 8.0))
@settings(max_examples=10)
def test_loss_takes_what_it_says(array: RodArray, exponent: float) -> None:
    """Loss grows as conductivity falls, and the sphere's mean is the efficiency."""
    lossy = solve_array(replace(array, conductivity_s_per_m=10**exponent), FREQUENCY_MHZ)
    lossier = solve_array(replace(array, conductivity_s_per_m=0.25 * 10**exponent), FREQUENCY_MHZ)
    assert 0 < lossy.lost_fraction < lossier.lost_fraction < 1
    assert mean_gain(lossy) == pytest.approx(lossy.efficiency, abs=0.005)


@given(arrays(most=5), st.sampled_from(["length_mm", "station_mm", "diameter_mm"]), st.sampled_from([math.inf, 1e6]))
@settings(max_examples=25)
def test_adjoint_against_differences(array: RodArray, quantity: str, conductivity_s_per_m: float) -> None:
    """Every derivative against a five-point difference: 1e-5 of the largest of its kind."""
    array = replace(array, conductivity_s_per_m=conductivity_s_per_m)
    gradient = solve_gradient(array, FREQUENCY_MHZ)
    sensitivity = getattr(gradient, quantity.removesuffix("_mm"))
    analytic = np.stack(
        [sensitivity.gain_db_per_mm, sensitivity.back_front_per_mm, sensitivity.feed_impedance_ohm_per_mm], axis=1
    )
    step_mm = 2e-3

    def response(index: int, change_mm: float) -> np.ndarray:
        values = list(getattr(array, quantity))
        values[index] += change_mm
        solution = solve_array(replace(array, **{quantity: tuple(values)}), FREQUENCY_MHZ)
        return np.array([solution.gain_dbi, solution.back_front, solution.feed_impedance_ohm])

    for index in range(array.count):
        near = response(index, step_mm) - response(index, -step_mm)
        far = response(index, 2 * step_mm) - response(index, -2 * step_mm)
        difference = (8 * near - far) / (12 * step_mm)
        scale = np.maximum(np.abs(analytic).max(axis=0), 1e-6)
        assert np.all(np.abs(analytic[index] - difference) <= 1e-5 * scale)


@given(arrays())
@settings(max_examples=10)
def test_gradient_and_solver_are_one(array: RodArray) -> None:
    solution, plain = solve_gradient(array, FREQUENCY_MHZ).solution, solve_array(array, FREQUENCY_MHZ)
    assert solution.feed_impedance_ohm == pytest.approx(plain.feed_impedance_ohm, rel=1e-10)
    assert solution.gain_dbi == pytest.approx(plain.gain_dbi, abs=1e-9)


@pytest.mark.parametrize(
    ("stations_mm", "lengths_mm", "diameters_mm", "fed_index"),
    [
        ((0.0, 4.0), (480.0, 440.0), (5.0, 5.0), 0),
        ((0.0, 200.0), (480.0,), (5.0, 5.0), 0),
        ((0.0,), (480.0,), (0.0,), 0),
        ((0.0,), (4.0,), (5.0,), 0),
        ((0.0,), (480.0,), (5.0,), 1),
        ((0.0,), (math.nan,), (5.0,), 0),
    ],
)
def test_impossible_arrays_are_refused(
    stations_mm: tuple[float, ...], lengths_mm: tuple[float, ...], diameters_mm: tuple[float, ...], fed_index: int
) -> None:
    with pytest.raises(ValueError, match=r"touch|one entry|positive|fed_index|finite"):
        RodArray(stations_mm, lengths_mm, diameters_mm, fed_index)
