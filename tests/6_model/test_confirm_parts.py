"""Every part of a near pair is held to the shapes it was arranged by, whatever its pairs say."""

import dataclasses

import pytest

from fabgen.design import part_sizes
from fabgen.design.arranged import Cylinder, Frame, Interface, Placed
from fabgen.errors import ProgramError
from fabgen.model.confirm import confirm

LEFT = (0.0, 1.0, 0.0)


@dataclasses.dataclass(frozen=True)
class Pair:
    first: Placed
    second: Placed
    interface: Interface | None
    limit_mm: float
    distance_mm: float


def rod(name, x, **mistake):
    numbers = {"diameter_mm": 4.0, "length_mm": 300.0} | mistake
    shape = Cylinder("y", (x, 0.0, 0.0), 4.0, 300.0)
    return Placed(
        name, "E", "rod", tuple(sorted(numbers.items())), Frame((x, 0, 0), z=LEFT), (shape,), True, "made", "x", True,
        1.0, "rod",
    )  # fmt: skip


def bush(name, x, **mistake):
    size = part_sizes.bush_size()
    shapes = (
        Cylinder("y", (x, 11.5, 0.0), size.flange_mm, 3.0, size.bore_mm),
        Cylinder("y", (x, 8.75, 0.0), size.spigot_mm, 2.5, size.bore_mm),
    )
    return Placed(
        name, "E", "bush", tuple(sorted(mistake.items())), Frame((x, 10.0, 0.0), z=LEFT), shapes, False, "printed", "x",
        False, 1.0, "bush",
    )  # fmt: skip


def parallel(first):
    return Pair(first, rod("D", 110.0), None, 1.0, 6.0)


def fitted(first):
    bar = rod("R", 100.0)
    return Pair(first, bar, Interface(first.name, bar.name, "bore on rod", 0.1, 0.2), 0.0, 0.0)


def test_parts_that_are_their_shapes_pass():
    assert confirm([parallel(rod("R", 100.0)), fitted(bush("B", 100.0))]) == 2


@pytest.mark.parametrize(
    ("pair", "message"),
    [
        pytest.param(parallel(rod("R", 100.0, length_mm=300.01)), "R: rod has", id="a rod that is too long"),
        pytest.param(parallel(rod("R", 100.0, length_mm=299.99)), "R: rod has", id="a rod that is too short"),
        pytest.param(
            fitted(bush("B", 100.0, flange_diameter_mm=12.01)), "B: bush stands out", id="a flange that is too wide"
        ),
        pytest.param(
            fitted(bush("B", 100.0, spigot_length_mm=2.51)), "B: bush stands out", id="a spigot that is too long"
        ),
    ],
)
def test_a_part_whose_pairs_are_right_is_still_held_to_its_shapes(pair, message):
    """The distance of parallel rods and a bore's fit are the same; the sizes are off by 0.01 mm."""
    with pytest.raises(ProgramError, match=f"^{message}"):
        confirm([pair])


@pytest.mark.parametrize("along", [0, 1, 2])
@pytest.mark.parametrize("part", [rod("R", 100.0), bush("R", 100.0)], ids=["rod", "bush"])
def test_a_part_a_micrometre_off_its_shapes_is_noticed(part, along):
    """Along the rod's own axis too, where no gap and no fit changes; shapes and interfaces stay where they were."""
    origin = list(part.frame.origin)
    origin[along] += 0.001
    off = dataclasses.replace(part, frame=dataclasses.replace(part.frame, origin=tuple(origin)))
    passed_by = dataclasses.replace(parallel(off), limit_mm=7.0)  # has its finding: only the part itself is confirmed
    with pytest.raises(ProgramError, match=f"^R: {part.part} stands out of its shapes"):
        confirm([passed_by])
