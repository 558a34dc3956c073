"""The kernel's word on near pairs: right ones pass, contradictions are named, equal places are measured once."""

import dataclasses
import math

import pytest

from fabgen.design import part_sizes
from fabgen.design.arranged import Box, Cylinder, Frame, Interface, Placed
from fabgen.design.distances import parts_distance_mm
from fabgen.errors import ProgramError
from fabgen.model import confirm as module
from fabgen.model.confirm import confirm
from fabgen.model.neighbourhood import Body
from fabgen.model.separation import separation_mm

LEFT, RIGHT = (0.0, 1.0, 0.0), (0.0, -1.0, 0.0)
ALONG = (1.0, 0.0, 0.0)


@dataclasses.dataclass(frozen=True)
class Pair:
    first: Placed
    second: Placed
    interface: Interface | None = None
    limit_mm: float = 0.0
    distance_mm: float = 0.0


def placed(name, part, frame, shapes, exact=False, **parameters):
    return Placed(
        name, "E", part, tuple(sorted(parameters.items())), frame, tuple(shapes), exact, "made", "x", True, 1.0, part
    )


def rod(name, x, z=0.0, length=300.0, diameter=4.0):
    shape = Cylinder("y", (x, 0.0, z), diameter, length)
    return placed(name, "rod", Frame((x, 0, z), z=LEFT), [shape], True, diameter_mm=diameter, length_mm=length)


def boom(holes, length=1000.0):
    box = Box((0, -10, -10), (length, 10, 10))
    return placed("boom", "boom", Frame(), [box], holes=tuple(holes), length_mm=length, width_mm=20.0, height_mm=20.0)


def bush(name, x, side=1):
    size = part_sizes.bush_size()
    shapes = [
        Cylinder("y", (x, side * (10 + 1.5), 0), size.flange_mm, 3.0),
        Cylinder("y", (x, side * (10 - 1.25), 0), size.spigot_mm, 2.5),
    ]
    return placed(name, "bush", Frame((x, side * 10.0, 0), z=LEFT if side > 0 else RIGHT), shapes)


def keeper(name, x, bore=3.7):
    shape = Cylinder("y", (x, 13.15 + 2.5, 0), 7.2, 5.0)
    return placed(name, "push_ring", Frame((x, 13.15, 0), z=LEFT), [shape], bore_mm=bore)


def through(*stations):
    return [row for x in stations for row in ((x, 90.0, 0.0, 8.0), (x, 270.0, 0.0, 8.0))]


def meet(first, second, kind, gap, fit=None):
    return Pair(first, second, Interface(first.name, second.name, kind, gap, fit))


def apart(first, second, limit=1.0):
    return Pair(first, second, None, limit, parts_distance_mm(first.shapes, second.shapes))


def test_a_mount_that_fits_is_confirmed():
    tube, bar, left, ring = boom(through(100, 160)), rod("R", 100), bush("R bush", 100), keeper("R keeper", 100)
    pairs = [
        meet(left, bar, "bore on rod", 0.1, 0.2),
        meet(left, tube, "spigot in hole", 0.0, 0.2),
        meet(bar, tube, "rod in clearance hole", 2.0, 4.0),
        meet(ring, bar, "keeper on rod", 0.0, -0.3),
        meet(ring, left, "keeper on seat", 0.15),
        apart(tube, ring),
        apart(bar, rod("D1", 110)),
    ]
    assert confirm(pairs) == len(pairs)


@pytest.mark.parametrize(
    ("pair", "message"),
    [
        pytest.param(meet(bush("B", 100), rod("R", 100), "bore on rod", 0.15, 0.3), "gap of 0.150000", id="gap"),
        pytest.param(meet(bush("B", 100), rod("R", 100), "bore on rod", 0.1, 0.3), "fit of 0.300000", id="fit"),
        pytest.param(
            meet(bush("B", 100), boom(through(100)), "spigot in hole", 0.0, 0.3),
            "fit of 0.300000 mm, the solids have",
            id="a seat that touches does not hide a wrong radial gap",
        ),
        pytest.param(
            meet(keeper("K", 100, 3.9), rod("R", 100), "keeper on rod", 0.0, -0.3), "fit of -0.300000", id="grip"
        ),
        pytest.param(
            meet(bush("B", 100), boom(through(103)), "spigot in hole", 0.0, 0.2), "have none", id="off the axis"
        ),
        pytest.param(meet(rod("R", 100), rod("D", 103), "rods touch", 0.0), "overlaps by", id="face that overlaps"),
        pytest.param(
            dataclasses.replace(apart(rod("R", 100), rod("D", 110)), distance_mm=6.5), "6.000000 mm apart", id="formula"
        ),
        pytest.param(Pair(rod("R", 100), rod("D", 103)), "overlap by", id="undeclared overlap"),
    ],
)
def test_every_contradiction_is_named(pair, message):
    with pytest.raises(ProgramError, match=f"^{pair.first.name} and {pair.second.name}: .*{message}"):
        confirm([pair])


def test_exact_parts_are_held_to_the_formula_both_ways():
    """A formula that says less than the true distance of two exact, parallel parts is wrong as well."""
    too_small = dataclasses.replace(apart(rod("R", 100), rod("D", 110)), distance_mm=5.5)
    with pytest.raises(ProgramError, match=r"6\.000000 mm apart, by formula 5\.500000"):
        confirm([too_small])


def test_a_pair_with_its_finding_is_let_pass():
    """Two rods nearer than their limit are the design's mistake, and judged by the checks."""
    assert confirm([apart(rod("R", 100), rod("D", 103), limit=1.0)]) == 0


def test_overlap_of_a_grip_is_the_ring_without_slit_and_lead_ins():
    """Ring π/4 (4² − 3.7²) × 5 = 9.071 mm³; slit 1 mm wide and two lead-ins take up to a third of it."""
    ring, bar = keeper("K", 100), rod("R", 100)
    first, own = module.neighbourhood(ring, bar, 0.0)
    second, others = module.neighbourhood(bar, ring, 0.0)
    overlap = module._overlap_mm3(first, second, module.relative(own, others))
    assert 0.6 * 9.071 < overlap < 9.071


def test_a_thick_rods_keeper_grips_by_more_than_its_slit_takes():
    """Rod 10, bore 9.7, 5 mm long: the 1 mm slit takes 3 % of the ring, the lead-ins grip 0.15 mm deep at both ends."""
    shape = Cylinder("y", (100, 15.65, 0), 17.0, 5.0)
    numbers = {"rod_diameter_mm": 10.0, "bore_mm": 9.7, "outside_diameter_mm": 17.0}
    ring = placed("K", "push_ring", Frame((100, 13.15, 0), z=LEFT), [shape], **numbers)
    assert confirm([meet(ring, rod("R", 100, diameter=10.0), "keeper on rod", 0.0, -0.3)]) == 1


def test_equal_placements_are_measured_once():
    """Forty elements with rods of forty lengths in one boom: no more to measure than one element."""
    stations = [100.0 + 37.3 * i for i in range(40)]
    tube = boom(through(*stations), length=1700.0)

    def element(i):
        x = stations[i]
        bar, left = rod(f"D{i}", x, length=300.0 - 1.7 * i), bush(f"D{i} bush", x)
        return [
            meet(left, bar, "bore on rod", 0.1, 0.2),
            meet(left, tube, "spigot in hole", 0.0, 0.2),
            meet(bar, tube, "rod in clearance hole", 2.0, 4.0),
        ]

    separation_mm.cache_clear()
    confirm(element(0))
    once = separation_mm.cache_info().misses
    assert confirm([pair for i in range(40) for pair in element(i)]) == 120
    assert separation_mm.cache_info().misses == once == 3


def test_a_hole_on_the_edge_of_the_neighbourhood_is_kept_whole():
    """The piece of boom beside a part ends beyond a hole, never in it."""
    tube = boom(through(100, 108.5, 117, 200))
    body, frame = module.neighbourhood(tube, bush("B", 100), 0.0)
    holes = dict(body.parameters)["holes"]
    assert len(holes) == 6
    length = dict(body.parameters)["length_mm"]
    assert all(hole[3] / 2 < hole[0] < length - hole[3] / 2 for hole in holes)
    assert frame.origin[0] + holes[0][0] == pytest.approx(100)


def test_a_rod_with_a_hole_across_is_measured_whole():
    """It is a part of its own, built once; a piece with its hole would be one more cut for every neighbour."""
    bar = placed(
        "DE-left", "rod", Frame((100, 85, 0), z=LEFT), [Cylinder("y", (100, 85, 0), 4, 160)],
        diameter_mm=4.0, length_mm=160.0, cross_hole_mm=2.2, cross_hole_z_mm=-75.0,
    )  # fmt: skip
    body, frame = module.neighbourhood(bar, bush("B", 100), 0.0)
    assert body.parameters == bar.parameters
    assert frame == bar.frame


@pytest.mark.parametrize("swapped", [False, True])
def test_a_part_inside_another_ones_material_touches_it(swapped):
    """Surfaces of a thin rod inside a thick one are 8 mm apart; the solids are not."""
    thick, thin = rod("R", 100, diameter=20.0, length=50.0), rod("D", 100, diameter=4.0, length=20.0)
    bodies = [Body(part.part, part.parameters) for part in (thick, thin)]
    own, other = reversed(bodies) if swapped else bodies
    assert separation_mm(own, other, Frame(), math.inf) == 0.0
    assert separation_mm(own, other, Frame(), 0.01) == 0.0
    beside = Frame(origin=(30.0, 0.0, 0.0))
    assert separation_mm(own, other, beside, math.inf) == pytest.approx(18.0, abs=1e-9)


def test_a_frame_sees_its_own_points_where_they_are():
    frame = Frame((1.0, 2.0, 3.0), z=(0.0, 1.0, 0.0), x=(0.0, 0.0, 1.0))
    assert frame.local(frame.point((4.0, 5.0, 6.0))) == pytest.approx((4.0, 5.0, 6.0))
