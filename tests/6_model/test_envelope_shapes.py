"""Simple shapes hold the solids they stand for; a shape that does not is named with what stands out."""

import dataclasses
import re

import pytest

from fabgen import registry
from fabgen.design import part_sizes
from fabgen.design.arranged import Box, Cylinder, Frame, Placed
from fabgen.model.envelope import outside_envelope

LEFT = (0.0, 1.0, 0.0)


def placed(part, shapes, frame=None, exact=False, **parameters):
    frozen = tuple(sorted(parameters.items()))
    return Placed("P", "E", part, frozen, frame or Frame(), tuple(shapes), exact, "made", "x", True, 1.0, part)


def rod(diameter=4.0, length=300.0):
    shape = Cylinder("y", (50.0, 0.0, 7.0), diameter, length)
    return placed("rod", [shape], Frame((50.0, 0, 7.0), z=LEFT), True, diameter_mm=4.0, length_mm=300.0)


def bush(flange=12.0, spigot=7.8, bore=0.0):
    shapes = [
        Cylinder("z", (0, 0, 1.5), flange, 3.0, bore),
        Cylinder("z", (0, 0, -1.25), spigot, 2.5, bore),
    ]
    return placed("bush", shapes)


def boom(width=20.0):
    box = Box((0, -width / 2, -10), (260, width / 2, 10))
    return placed("boom", [box])


@pytest.mark.parametrize("part", [rod(), bush(), bush(bore=4.2), boom()])
def test_shapes_that_hold_their_solid(part):
    assert outside_envelope(part) == ""


@pytest.mark.parametrize(
    ("part", "message"),
    [
        pytest.param(rod(diameter=3.9), "the shapes that should be it", id="exact, too thin"),
        pytest.param(rod(diameter=4.1), "the shapes that should be it", id="exact, too thick"),
        pytest.param(
            dataclasses.replace(rod(), shapes=(Cylinder("y", (50.0, 2.0, 7.0), 4.0, 300.0),)),
            "by 2.000000 mm",
            id="exact, off its place",
        ),
        pytest.param(bush(flange=11.0), r"bush stands out of its shapes with \d+", id="flange"),
        pytest.param(bush(bore=4.4), r"bush stands out of its shapes with \d+", id="bore"),
        pytest.param(boom(width=19.0), r"boom stands out of its shapes by 0\.500000 mm", id="box"),
    ],
)
def test_shapes_that_leave_something_out_are_named(part, message):
    assert re.search(message, outside_envelope(part))


def test_an_envelope_larger_than_its_part_is_right_unless_it_should_be_the_part():
    assert outside_envelope(boom(width=24.0)) == ""
    assert outside_envelope(dataclasses.replace(boom(width=24.0), exact=True)) != ""


SIZED = [entry.name for entry in registry.entries("model/parts") if hasattr(part_sizes, f"{entry.name}_size")]
ROUND = ["bush", "feed_block", "folded_saddle", "saddle"]


@pytest.mark.parametrize("part", SIZED)
def test_every_part_lies_in_the_shapes_that_it_is_arranged_by(part):
    assert outside_envelope(placed(part, getattr(part_sizes, f"{part}_size")().shapes)) == ""


@pytest.mark.parametrize("part", ROUND)
def test_parts_for_a_round_boom_lie_in_their_shapes(part):
    size = getattr(part_sizes, f"{part}_size")(boom_diameter_mm=25.0)
    assert outside_envelope(placed(part, size.shapes, boom_diameter_mm=25.0)) == ""


@pytest.mark.parametrize(("height_mm", "boxes"), [(7.6, 3), (7.5, 2), (6.0, 2), (2.4, 1)])
def test_a_low_saddle_has_no_empty_shape(height_mm, boxes):
    """Ears of 7.5 mm: at that height the fillets end, and under a bore with little plastic over it the column too."""
    numbers = {"rod_diameter_mm": 2.0, "height_mm": height_mm, "wall_mm": 3.0}
    shapes = part_sizes.saddle_size(**numbers).shapes
    assert len(shapes) == boxes
    assert outside_envelope(placed("saddle", shapes, **numbers)) == ""
