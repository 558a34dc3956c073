"""The mounts of a design that meet metal, as plain numbers for whoever draws their effect."""

from fabgen.correct.case import boom_mount
from fabgen.design.design import Design
from fabgen.design.mount_geometry import beside_metal
from fabgen.physics.boom_mount import BoomMount


def metal_mounts(design: Design) -> tuple[tuple[str, BoomMount], ...]:
    """The mount of every rod that a metal boom carries, with its element's id, in order of station."""
    return tuple(
        (element.id, boom_mount(design, element, element.mount))
        for element in design.elements
        if element.mount is not None and beside_metal(design, element.mount)
    )
