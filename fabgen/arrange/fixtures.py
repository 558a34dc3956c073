"""Which shop aids a design needs: drill guides for its holes, fit gauges and centring aids for its rods.

They are no part of the array, so they stand on no parts list, weigh nothing and meet no rule.
"""

from collections.abc import Iterable
from typing import Literal

from fabgen.arrange.layout import Value, sorted_parameters
from fabgen.design.arranged import Arranged, Cylinder, Hole, Placed
from fabgen.design.centring_aid_sizes import HEIGHT_MM, centring_aid_size
from fabgen.design.design import Boom
from fabgen.design.drill_guide_sizes import drill_guide_size
from fabgen.design.fixtures import Fixture
from fabgen.stock.bushings import drill_bushing
from fabgen.stock.practice import process_range
from fabgen.stock.read_csv import UnknownStockError

Face = Literal["sides", "top"]
_AROUND_ROD = ("bush", "sleeve", "push_ring", "snap_keeper")
_SAME_MM = 1e-6


def fixtures(arranged: Arranged) -> tuple[Fixture, ...]:
    """The shop aids of a design, in the order of their use: fit gauges, drill guides, centring aids."""
    return (*_gauges(arranged), *_guides(arranged), *_aids(arranged))


def _gauges(arranged: Arranged) -> Iterable[Fixture]:
    """One for every rod that goes through a printed bore, with a plug for every hole that takes a printed spigot."""
    pairs: dict[tuple[float, float], None] = {}
    for placed in arranged.placed:
        numbers = dict(placed.parameters)
        rod_mm, hole_mm = numbers.get("rod_diameter_mm"), numbers.get("hole_diameter_mm", 0.0)
        if placed.source == "printed" and isinstance(rod_mm, float) and isinstance(hole_mm, float):
            pairs[rod_mm, hole_mm] = None
    with_hole = {rod_mm for rod_mm, hole_mm in pairs if hole_mm}
    for rod_mm, hole_mm in sorted(pairs):
        if not hole_mm and rod_mm in with_hole:
            continue
        plug = (
            " Push the plug into a hole drilled in an offcut: the number of steps that stay out, in tenths of a "
            "millimetre, is what a spigot must be smaller than its hole."
        )
        yield Fixture(
            part="fit_gauge",
            parameters=sorted_parameters({"hole_diameter_mm": hole_mm, "rod_diameter_mm": rod_mm}),
            label=f"fit gauge rod {rod_mm:g}" + (f" hole {hole_mm:g}" if hole_mm else ""),
            quantity=1,
            purpose=f"shows this printer's hole_growth on a rod of {rod_mm:g} mm",
            needs=(),
            use=(
                "Print it first, in the material and with the settings of the parts. Push the rod through the bores "
                "from 0 upwards: the number at the first bore that lets it through by hand, in tenths of a millimetre, "
                f"is the printer's hole_growth.{plug if hole_mm else ''}"
            ),
        )


def _guides(arranged: Arranged) -> Iterable[Fixture]:
    """One for every drill and pair of walls, up to the size above which thin wall is opened with a step drill."""
    boom, growth_mm = arranged.design.boom, arranged.design.printer.hole_growth_mm
    wanted: dict[tuple[Face, float], set[float]] = {}
    for hole in arranged.holes:
        for drill_mm in _drills_mm(hole):
            wanted.setdefault((_face(hole), drill_mm), set()).add(hole.angle_deg)
    for (face, drill_mm), angles in sorted(wanted.items()):
        guide = _guide(boom, face, drill_mm, growth_mm, walls=len(angles))
        if guide:
            yield guide


def _drills_mm(hole: Hole) -> tuple[float, ...]:
    """The drills that go through a bushing for this hole; none for a hole beside the wall's centre line."""
    if abs(hole.across_mm) > _SAME_MM:
        return ()
    step_drill_above_mm, _ = process_range("step_drill_above_mm")
    final = (hole.diameter_mm,) if hole.diameter_mm <= step_drill_above_mm else ()
    return (hole.pilot_mm, *final)


def _face(hole: Hole) -> Face:
    return "sides" if hole.axis[1] else "top"


def _guide(boom: Boom, face: Face, drill_mm: float, growth_mm: float, *, walls: int) -> Fixture | None:
    """The guide for one drill; None where the boom is too small or the drill too large for one."""
    try:
        bushing = drill_bushing(drill_mm)
        numbers: dict[str, Value] = {
            "boom_width_mm": boom.width_mm if face == "sides" else boom.height_mm,
            "boom_height_mm": boom.height_mm if face == "sides" else boom.width_mm,
            "boom_diameter_mm": boom.diameter_mm,
            "bushing_bore_mm": drill_mm,
            "bushing_outside_mm": bushing.outside_mm,
            "bushing_length_mm": bushing.length_mm,
            "face": face,
            "hole_growth_mm": growth_mm,
        }
        size = drill_guide_size(**numbers)  # type: ignore[arg-type]
    except (UnknownStockError, ValueError):
        return None
    screws = len(size.screws)
    window = "in the top wall" if face == "sides" else "in the right-hand wall"
    crown = "the line along the boom's top in the notches, " if boom.diameter_mm else ""
    where = {"sides": "both side walls", "top": "top and bottom wall" if walls > 1 else "the top wall"}[face]
    return Fixture(
        part="drill_guide",
        parameters=sorted_parameters(numbers),
        label=f"drill guide {face} {drill_mm:g}",
        quantity=1,
        purpose=f"guides a drill of {drill_mm:g} mm through {where}",
        needs=(
            (walls, f"drill bushing DIN 179 {drill_mm:g} x {bushing.outside_mm:g} x {bushing.length_mm:g}"),
            (screws, f"set screw {size.screw} x {size.set_screw_mm:g}"),
            (screws, f"nut {size.screw}"),
        ),
        use=(
            "Press a bushing from outside into each wall that is drilled, against its lip; lay the nuts into their "
            f"pockets. Slide the guide on the boom, arrow forward. Set the edge of the window {window} on the scribed "
            f"station line, {crown}and tighten by hand. Drill each wall that the drilling table names from its own "
            "side, never through from one."
        ),
    )


def _aids(arranged: Arranged) -> Iterable[Fixture]:
    """A pair of blocks for every rod that is centred in the boom or on it."""
    growth_mm = arranged.design.printer.hole_growth_mm
    longest: dict[float, float] = {}
    for cut in arranged.cuts:
        if cut.stock == "rod" and cut.half_mm > 0 and cut.projection_mm > 0:
            longest[cut.rod_mm] = max(longest.get(cut.rod_mm, 0.0), cut.projection_mm)
    for rod_mm, projection_mm in sorted(longest.items()):
        numbers: dict[str, Value] = {
            "clear_mm": max([rod_mm, *_widths_mm(arranged.placed, rod_mm)]),
            "hole_growth_mm": growth_mm,
            "rod_diameter_mm": rod_mm,
        }
        try:
            size = centring_aid_size(**numbers)  # type: ignore[arg-type]
        except ValueError:
            continue
        yield Fixture(
            part="centring_aid",
            parameters=sorted_parameters(numbers),
            label=f"centring aid rod {rod_mm:g}",
            quantity=2,
            purpose=f"sets a rod of {rod_mm:g} mm so that it stands out evenly on both sides",
            needs=((1, f"screw {size.screw} x {size.screw_length_mm:g}"), (1, f"nut {size.screw}")),
            use=(
                f"Clamp two on an offcut of the rod, {projection_mm + 2 * HEIGHT_MM:.0f} mm or longer, their flat "
                "faces the same way and apart by the projection in the cut list. Hold the first against the boom "
                "beside the rod, its arm turned up; push the rod until its tip meets the arm of the second. The other "
                "side must then show the same."
            ),
        )


def _widths_mm(placed: Iterable[Placed], rod_mm: float) -> Iterable[float]:
    """Diameters of what sits round rods of one size."""
    for part in placed:
        if part.part in _AROUND_ROD and dict(part.parameters).get("rod_diameter_mm") == rod_mm:
            yield from (shape.diameter_mm for shape in part.shapes if isinstance(shape, Cylinder))
