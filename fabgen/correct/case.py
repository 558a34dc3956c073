"""A rod in its mount as plain numbers for the physics."""

from fabgen.design.design import Design, Element, Mount
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.physics.boom_uncertainty import Surroundings

_STYLES = {
    "bonded-through": Style.BONDED_THROUGH,
    "insulated-through": Style.INSULATED_THROUGH,
    "on-top": Style.ON_TOP,
}


def boom_mount(design: Design, element: Element, mount: Mount) -> BoomMount:
    """The mount of one rod on a metal boom.

    Args:
        design: for the boom.
        element: for the rod.
        mount: one of the three styles that meet metal.
    """
    boom = design.boom
    return BoomMount(
        style=_STYLES[mount.style],
        section=Section(boom.section),
        outside_mm=boom.width_mm,
        rod_diameter_mm=element.rod.diameter_mm,
        wall_mm=boom.wall_mm,
        height_mm=boom.height_mm if boom.section == "rectangular" else 0.0,
        hole_mm=mount.hole_mm if mount.style == "insulated-through" else 0.0,
        axis_height_mm=mount.saddle.height_mm if mount.saddle else 0.0,
        bush_permittivity=(mount.bush.material.permittivity or 1.0) if mount.bush else 1.0,
        bush_length_mm=mount.bush.spigot_length_mm if mount.bush else 0.0,
        film_insulation=film_insulated(element, mount),
    )


def film_insulated(element: Element, mount: Mount) -> bool:
    """Whether nothing but an anodic film or paint stands between rod and boom."""
    return mount.style == "insulated-through" and mount.bush is None and element.rod.finish != "bare"


def surroundings(design: Design, element: Element) -> Surroundings:
    """How far the boom's ends and the nearest other rod are from a rod."""
    stations = [other.station_mm for other in design.elements if other.id != element.id]
    through = [other.station_mm for other in design.elements if other.mount is not None]
    return Surroundings(
        end_distance_mm=min(element.station_mm, design.boom.length_mm - element.station_mm),
        neighbour_distance_mm=min((abs(station - element.station_mm) for station in stations), default=None),
        interior=min(through) < element.station_mm < max(through),
    )
