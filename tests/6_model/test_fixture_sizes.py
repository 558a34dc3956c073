"""Fixtures: volumes, envelopes, print pose and refusals, away from the defaults."""

import importlib
import math

import numpy as np
import pytest

from fabgen.design.centring_aid_sizes import centring_aid_size
from fabgen.design.drill_guide_sizes import drill_guide_size
from fabgen.design.fit_gauge_sizes import fit_gauge_size
from fabgen.model.kernel import bounds_mm, solid_of, volume_mm3
from fabgen.model.tessellate import mesh_of
from fabgen.stock.bushings import drill_bushing
from fabgen.stock.practice import print_practice
from fabgen.stock.read_csv import UnknownStockError

CLOSED_FORM = 1e-7
"""Relative: the kernel integrates trimmed faces to 1e-6 and does better."""
FIRST_LAYER_MM = 0.2
"""A triangle whose middle lies in it lies on the bed."""
SIZES = {"drill_guide": drill_guide_size, "fit_gauge": fit_gauge_size, "centring_aid": centring_aid_size}
ROUND = {"boom_diameter_mm": 20.0}
BIG_BUSHING = {"bushing_bore_mm": 9.0, "bushing_outside_mm": 15.0, "bushing_length_mm": 12.0}
CASES = [
    ("drill_guide", {}),
    ("drill_guide", {"face": "top", "boom_width_mm": 20.0, "boom_height_mm": 30.0, "hole_growth_mm": 0.2}),
    ("drill_guide", {"boom_width_mm": 12.7, "boom_height_mm": 12.7}),
    ("drill_guide", {"boom_width_mm": 25.4, "boom_height_mm": 25.4, "face": "top", **BIG_BUSHING}),
    ("drill_guide", ROUND),
    ("drill_guide", {**ROUND, "face": "top", "hole_growth_mm": 0.2}),
    ("fit_gauge", {}),
    ("fit_gauge", {"rod_diameter_mm": 6.35, "hole_diameter_mm": 0.0}),
    ("fit_gauge", {"rod_diameter_mm": 2.0, "hole_diameter_mm": 4.6, "steps": 9, "step_mm": 0.05}),
    ("centring_aid", {}),
    ("centring_aid", {"rod_diameter_mm": 8.0, "clear_mm": 11.2, "hole_growth_mm": 0.2}),
    ("centring_aid", {"rod_diameter_mm": 3.0}),
]


@pytest.fixture(scope="module", params=CASES, ids=lambda case: "-".join([case[0], *map(str, case[1].values())]))
def case(request):
    """(module, size, solid) of one fixture."""
    name, parameters = request.param
    module = importlib.import_module(f"fabgen.model.parts.{name}")
    return module, SIZES[name](**parameters), getattr(module, name)(**parameters)


def test_volume_is_the_closed_form(case):
    _, size, part = case
    assert volume_mm3(part) == pytest.approx(size.volume_mm3, rel=CLOSED_FORM)


def test_envelope_is_tight(case):
    _, size, part = case
    boxes = [getattr(shape, "box", shape) for shape in size.shapes]
    low = [min(box.low[i] for box in boxes) for i in range(3)]
    high = [max(box.high[i] for box in boxes) for i in range(3)]
    found_low, found_high = bounds_mm(part)
    assert found_low == pytest.approx(low, abs=1e-6)
    assert found_high == pytest.approx(high, abs=1e-6)


def test_prints_without_support_by_its_triangles(case):
    """No triangle hangs over more than 45° but level ones no wider than a bridge (common practice: 20 mm)."""
    module, _, part = case
    pose = module.print_pose(part)
    assert bounds_mm(pose)[0][2] == pytest.approx(0.0, abs=1e-6)
    mesh = mesh_of(solid_of(pose))
    corners = np.asarray(mesh.vertices_mm)[np.asarray(mesh.triangles)]
    across = np.cross(corners[:, 1] - corners[:, 0], corners[:, 2] - corners[:, 0])
    slope = across[:, 2] / np.linalg.norm(across, axis=1)
    above = corners[:, :, 2].mean(axis=1) > FIRST_LAYER_MM
    limit = math.sin(math.radians(print_practice("overhang_from_vertical_deg")))
    # A side of the 126 to a circle leans by up to 0.05 rad more than the arc at its middle.
    level = above & (slope < -1 + 1e-9)
    assert not (above & ~level & (slope < -limit - 0.03)).any()
    spans = np.ptp(corners[level], axis=1)[:, :2].min(axis=1) if level.any() else np.zeros(1)
    assert spans.max() <= print_practice("longest_bridge_mm")


@pytest.mark.parametrize(
    ("size", "parameters"),
    [
        (drill_guide_size, {"boom_width_mm": 6.0}),
        (drill_guide_size, {"bushing_outside_mm": 3.5}),
        (drill_guide_size, {"boom_diameter_mm": 10.0, **BIG_BUSHING}),
        (fit_gauge_size, {"hole_diameter_mm": 2.0}),
        (fit_gauge_size, {"steps": 10}),
        (centring_aid_size, {"rod_diameter_mm": 2.0}),
    ],
)
def test_impossible_fixtures_are_refused_with_the_reason(size, parameters):
    with pytest.raises(ValueError, match=r"\d mm"):
        size(**parameters)


def test_a_guide_is_for_the_sides_or_the_top():
    with pytest.raises(ValueError, match="front"):
        drill_guide_size(face="front")


@pytest.mark.parametrize(
    ("bore_mm", "outside_mm", "length_mm"), [(2.0, 5.0, 6.0), (2.6, 5.0, 6.0), (4.1, 8.0, 8.0), (10.1, 18.0, 12.0)]
)
def test_drill_bushings(bore_mm, outside_mm, length_mm):
    """DIN 179:1992, from memory: up to 2.6 mm outside 5; over 4 to 5 mm 8; over 10 to 12 mm 18; short series."""
    bushing = drill_bushing(bore_mm)
    assert (bushing.outside_mm, bushing.length_mm) == (outside_mm, length_mm)


def test_no_bushing_for_a_drill_beyond_the_table():
    with pytest.raises(UnknownStockError, match=r"15\.1 mm"):
        drill_bushing(15.1)
