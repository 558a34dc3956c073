"""Builds by iteration are the builds solved one by one, whatever their errors."""

import numpy as np
import pytest

from fabgen.physics import array_sampling
from fabgen.physics.array import RodArray
from fabgen.physics.array_sampling import BuildChanges, SampledResponse, expand_array, respond

ARRAY = RodArray(
    station_mm=(0.0, 131.0, 190.0, 307.0, 439.0),
    length_mm=(338.4, 329.2, 311.3, 303.6, 289.8),
    diameter_mm=(4.0,) * 5,
    fed_index=1,
)


def both(tolerance_mm: float, monkeypatch: pytest.MonkeyPatch) -> tuple[SampledResponse, SampledResponse]:
    """The same builds by iteration and each by itself."""
    errors = np.random.default_rng(7).uniform(-tolerance_mm, tolerance_mm, (2, 60, ARRAY.count))
    changes = BuildChanges(errors[0], errors[1], np.zeros_like(errors[0]))
    expanded = expand_array(ARRAY, 434.0)
    iterated = respond(expanded, changes)
    monkeypatch.setattr(
        array_sampling,
        "iterate_currents",
        lambda about, scales, fed: (np.zeros(scales[0].shape, complex), np.zeros(scales[0].shape[0], bool)),
    )
    return iterated, respond(expanded, changes)


@pytest.mark.parametrize("tolerance_mm", [0.1, 1.0, 4.0, 10.0])
def test_iterated_builds_are_the_solved_ones(tolerance_mm: float, monkeypatch: pytest.MonkeyPatch) -> None:
    """Errors of 10 mm are past anything that is drawn, and still settle or are solved by themselves."""
    iterated, solved = both(tolerance_mm, monkeypatch)
    np.testing.assert_allclose(iterated.back_front, solved.back_front, rtol=0, atol=1e-7)
    np.testing.assert_allclose(iterated.gain_dbi, solved.gain_dbi, rtol=0, atol=1e-6)
    np.testing.assert_allclose(iterated.feed_impedance_ohm, solved.feed_impedance_ohm, rtol=1e-7)
