"""Rods and the keepers that stop them sliding: the same for every style of mount."""

from fabgen.arrange.layout import Layout, Side, outward, side_name
from fabgen.design.arranged import Frame, Vector
from fabgen.design.design import Design, Element, Keeper
from fabgen.frozen import frozen

KEEPER_PLAY_MM = 0.3
"""Play of a rod along itself between its two keepers, both sides together. Source: common practice."""


def straight_rod(layout: Layout, element: Element, length_mm: float, z_mm: float) -> None:
    """A whole rod along y, its middle over the boom's axis."""
    layout.put(
        "rod",
        element.id,
        {
            "diameter_mm": element.rod.diameter_mm,
            "length_mm": length_mm,
        },
        owner=element.id,
        label=f"rod {element.rod.diameter_mm:g} x {length_mm:.3f}",
        material=element.rod.material,
        frame=Frame((element.station_mm, 0.0, z_mm), z=(0.0, 1.0, 0.0)),
        exact=True,
    )


def drilled_rod(
    layout: Layout,
    element: Element,
    name: str,
    *,
    length_mm: float,
    middle: Vector,
    z: Vector,
    hole_mm: float,
    hole_z_mm: float,
) -> None:
    """A rod with one upright hole across it, `hole_z_mm` from its middle along its own axis `z`."""
    layout.put(
        "rod",
        name,
        {
            "diameter_mm": element.rod.diameter_mm,
            "length_mm": length_mm,
            "cross_hole_mm": hole_mm,
            "cross_hole_z_mm": hole_z_mm,
        },
        owner=element.id,
        label=f"rod {element.rod.diameter_mm:g} x {length_mm:.3f} drilled",
        material=element.rod.material,
        frame=Frame(middle, z=z, x=(0.0, 0.0, 1.0)),
    )


@frozen
class Seat:
    """What a keeper stops on.

    Attributes:
        part: occurrence name.
        distance_mm: of its face from the boom's middle.
        opening_mm: diameter of the opening in that face; a keeper that is no larger slips into it.
    """

    part: str
    distance_mm: float
    opening_mm: float


def keeper_pair(
    layout: Layout, design: Design, element: Element, keeper: Keeper, seats: dict[Side, Seat], z_mm: float
) -> None:
    """Put one keeper on each side, half the play off its seat.

    Args:
        layout: takes the keepers and their interfaces.
        design: for the printer.
        element: the rod's element.
        keeper: its fits.
        seats: per side what the keeper stops on.
        z_mm: height of the rod's axis.
    """
    for side, seat in seats.items():
        part = layout.put(
            "push_ring" if keeper.kind == "push-ring" else "snap_keeper",
            f"{element.id} keeper {side_name(side)}",
            {
                "rod_diameter_mm": element.rod.diameter_mm,
                "bore_mm": keeper.bore_mm,
                "outside_diameter_mm": keeper.outside_mm,
                "length_mm": keeper.length_mm,
                "hole_growth_mm": design.printer.hole_growth_mm,
            },
            owner=element.id,
            label=f"{keeper.kind} keeper rod {element.rod.diameter_mm:g}",
            material=keeper.material,
            frame=Frame((element.station_mm, side * (seat.distance_mm + KEEPER_PLAY_MM / 2), z_mm), z=outward(side)),
        )
        layout.meet(part.name, element.id, "keeper on rod", 0.0, keeper.bore_mm - element.rod.diameter_mm)
        if keeper.outside_mm > seat.opening_mm:
            layout.meet(part.name, seat.part, "keeper on seat", KEEPER_PLAY_MM / 2)
