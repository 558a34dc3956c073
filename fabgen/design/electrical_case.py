"""What an array's response is computed from: plain numbers, and nothing else of the design."""

import hashlib
import json
from dataclasses import asdict

from fabgen.design.arranged import Arranged
from fabgen.design.design import Design, Feed
from fabgen.design.limits import Limits
from fabgen.design.mount_geometry import conducting_boom
from fabgen.frozen import frozen
from fabgen.stock.electrical import conductivity_s_per_m, tolerance_classes

METHOD = "thin-rod array, response 5"
"""Changes when the computation changes, so that a response stored before no longer fits."""

LOCATING = ("rod", "bush", "saddle screw", "bond screw", "middle screw", "feed screw")
"""Purposes of the holes that set the station of a rod."""


@frozen
class ElectricalCase:
    """An array for the solver, rods in order of station; one entry per rod in every tuple.

    Attributes:
        element: ids.
        fed: index of the driven rod.
        frequency_mhz: design frequency.
        station_mm: as drawn.
        modelled_mm: modelled lengths.
        modelled_diameter_mm: diameters that the model used.
        diameter_mm: diameters of the shop's rods.
        rod_change_mm: what another diameter adds to the length.
        rounding_mm: what rounding to the shop's step adds.
        allowance_u_mm: u of the mount's allowance, 0 for a rod without one.
        common_u_mm: the part of it that is common to all rods for certain.
        length_tolerance_mm: general tolerance of the length, ±.
        station_tolerance_mm: general tolerance of the station, ±.
        spacing_mm: of a folded driven rod's limbs, 0 for a straight one.
        reference_ohm: what mismatch is counted against.
        conductivity_s_per_m: of all rods, the lowest; 0 where the table has none: a perfect conductor.
        limits: what builds may lose.
        classes_mm: tolerances that a length can get, the finest first.
        station_classes_mm: those that a station can get.
        method: of the computation.
    """

    element: tuple[str, ...]
    fed: int
    frequency_mhz: float
    station_mm: tuple[float, ...]
    modelled_mm: tuple[float, ...]
    modelled_diameter_mm: tuple[float, ...]
    diameter_mm: tuple[float, ...]
    rod_change_mm: tuple[float, ...]
    rounding_mm: tuple[float, ...]
    allowance_u_mm: tuple[float, ...]
    common_u_mm: tuple[float, ...]
    length_tolerance_mm: tuple[float, ...]
    station_tolerance_mm: tuple[float, ...]
    spacing_mm: float
    reference_ohm: float
    conductivity_s_per_m: float
    limits: Limits
    classes_mm: tuple[float, ...]
    station_classes_mm: tuple[float, ...]
    method: str = METHOD

    @property
    def sha256(self) -> str:
        """Of everything the response depends on."""
        return hashlib.sha256(json.dumps(asdict(self), sort_keys=True).encode("utf-8")).hexdigest()

    @property
    def band_mhz(self) -> tuple[float, float]:
        """The stated band, else the design frequency twice."""
        return self.limits.band_mhz or (self.frequency_mhz, self.frequency_mhz)


def no_case(design: Design) -> str:
    """Why a design cannot be modelled; empty where it can.

    Args:
        design: as read.
    """
    if sum(element.role == "driven" for element in design.elements) != 1:
        return "the array solver needs one driven rod"
    on_metal = conducting_boom(design) and any(element.mount for element in design.elements)
    if design.lengths_are == "as-cut" and on_metal:
        return (
            "lengths are as cut, with what the boom takes in them: their free lengths, which the solver needs, are lost"
        )
    return ""


def electrical_case(arranged: Arranged) -> ElectricalCase | None:
    """The case of an arranged design; None where `no_case` says why.

    Args:
        arranged: with its general tolerances.
    """
    design, ledger = arranged.design, arranged.ledger
    if no_case(design):
        return None
    fed = [index for index, element in enumerate(design.elements) if element.role == "driven"]
    feed = design.feed_of(design.elements[fed[0]])
    stations = {hole.element: hole.tolerance_mm for hole in arranged.holes if hole.purpose in LOCATING}
    lines = [ledger.line(element.id) for element in design.elements]
    return ElectricalCase(
        element=tuple(element.id for element in design.elements),
        fed=fed[0],
        frequency_mhz=design.frequency_mhz,
        station_mm=tuple(line.station_mm for line in lines),
        modelled_mm=tuple(line.modelled_mm for line in lines),
        modelled_diameter_mm=tuple(element.rod.replaces_mm for element in design.elements),
        diameter_mm=tuple(element.rod.diameter_mm for element in design.elements),
        rod_change_mm=tuple(line.rod_change_mm for line in lines),
        rounding_mm=tuple(line.rounding_mm for line in lines),
        allowance_u_mm=tuple(line.allowance.u_mm if line.allowance.needed else 0.0 for line in lines),
        common_u_mm=tuple(min(line.allowance.correlated_u_mm, line.allowance.u_mm) for line in lines),
        length_tolerance_mm=tuple(line.tolerance_mm for line in lines),
        station_tolerance_mm=tuple(stations.get(element.id, 0.0) for element in design.elements),
        spacing_mm=_spacing_mm(feed),
        reference_ohm=feed.reference_ohm if feed else 50.0,
        conductivity_s_per_m=_conductivity_s_per_m(design),
        limits=design.limits,
        classes_mm=tuple(each.tolerance_mm for each in tolerance_classes()),
        station_classes_mm=tuple(each.tolerance_mm for each in tolerance_classes() if each.holes),
    )


def _spacing_mm(feed: Feed | None) -> float:
    return feed.spacing_mm if feed is not None and feed.kind == "folded-dipole" else 0.0


def _conductivity_s_per_m(design: Design) -> float:
    found = [conductivity_s_per_m(element.rod.material.name) for element in design.elements]
    return min((each for each in found if each is not None), default=0.0)
