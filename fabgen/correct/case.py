"""A rod in its mount as plain numbers for the physics."""

from fabgen.design.design import Design, Element, Mount
from fabgen.design.mount_geometry import mount_geometry
from fabgen.design.records import MountGeometry
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.physics.boom_uncertainty import Surroundings


def boom_mount(design: Design, element: Element, mount: Mount) -> BoomMount:
    """The mount of one rod on a metal boom.

    Args:
        design: for the boom.
        element: for the rod.
        mount: one of the three styles that meet metal.
    """
    return as_boom_mount(mount_geometry(design, element, mount))


def as_boom_mount(geometry: MountGeometry) -> BoomMount:
    """A mount's geometry as the physics takes it."""
    return BoomMount(
        style=Style(geometry.style),
        section=Section(geometry.section),
        outside_mm=geometry.outside_mm,
        rod_diameter_mm=geometry.rod_diameter_mm,
        wall_mm=geometry.wall_mm,
        height_mm=geometry.height_mm,
        hole_mm=geometry.hole_mm,
        axis_height_mm=geometry.axis_height_mm,
        bush_permittivity=geometry.bush_permittivity,
        bush_length_mm=geometry.bush_length_mm,
        film_insulation=geometry.film_insulation,
    )


def surroundings(design: Design, element: Element) -> Surroundings:
    """How far the boom's ends, the nearest other rod and the clamp are from a rod."""
    stations = [other.station_mm for other in design.elements if other.id != element.id]
    through = [other.station_mm for other in design.elements if other.mount is not None]
    return Surroundings(
        end_distance_mm=min(element.station_mm, design.boom.length_mm - element.station_mm),
        neighbour_distance_mm=min((abs(station - element.station_mm) for station in stations), default=None),
        widening_distance_mm=_to_clamp_mm(design, element.station_mm),
        interior=min(through) < element.station_mm < max(through),
    )


def _to_clamp_mm(design: Design, station_mm: float) -> float | None:
    """From a rod to the clamp's plate; None while the clamp has no place."""
    if design.clamp is None or design.clamp.span_mm is None:
        return None
    low_mm, high_mm = design.clamp.span_mm
    return max(0.0, low_mm - station_mm, station_mm - high_mm)
