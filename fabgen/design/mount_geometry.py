"""A drawn mount in the numbers that records are keyed to."""

from fabgen.design.design import Design, Element, Mount
from fabgen.design.records import MountGeometry


def mount_geometry(design: Design, element: Element, mount: Mount) -> MountGeometry:
    """The mount of one rod on a metal boom.

    Args:
        design: for the boom and the frequency.
        element: for the rod.
        mount: one of the three styles that meet metal.
    """
    boom, bush, keeper = design.boom, mount.bush, mount.keeper
    held = f"{keeper.kind} {keeper.material.name}" if keeper and mount.hold == "keepers" else mount.bond or mount.hold
    return MountGeometry(
        style=mount.style,
        section=boom.section,
        outside_mm=boom.width_mm,
        height_mm=boom.height_mm if boom.section == "rectangular" else 0.0,
        wall_mm=boom.wall_mm,
        rod_diameter_mm=element.rod.diameter_mm,
        hole_mm=mount.hole_mm if mount.style == "insulated-through" else 0.0,
        axis_height_mm=mount.saddle.height_mm if mount.saddle else 0.0,
        bush_material=bush.material.name if bush else "",
        bush_permittivity=(bush.material.permittivity or 1.0) if bush else 1.0,
        bush_length_mm=bush.spigot_length_mm if bush else 0.0,
        keeper=held if mount.style != "on-top" else "saddle " + (mount.saddle.material.name if mount.saddle else ""),
        film_insulation=film_insulated(element, mount),
        frequency_mhz=design.frequency_mhz,
    )


def film_insulated(element: Element, mount: Mount) -> bool:
    """Whether an anodic film or paint stands between rod and boom: on a rod pressed into its holes.

    A weld burns it off and a screw's thread cuts it.
    """
    return mount.bond == "press" and element.rod.finish != "bare"


def conducting_boom(design: Design) -> bool:
    """Whether the boom takes length from rods near it."""
    material = design.boom.material
    return material.kind == "metal" or material.conductive


def beside_metal(design: Design, mount: Mount) -> bool:
    """Whether a mount's effect is that of a metal boom: never known for a rod through a non-metal that conducts."""
    return mount.style != "through-nonmetal" and conducting_boom(design)
