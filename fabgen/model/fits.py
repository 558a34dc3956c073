"""Fits read from two solids: pairs of cylinders on one axis, one hollow, one full."""

import functools
import math

from OCP.BRepAdaptor import BRepAdaptor_Surface
from OCP.GeomAbs import GeomAbs_SurfaceType
from OCP.TopAbs import TopAbs_Orientation

from fabgen.design.arranged import Frame, Vector
from fabgen.frozen import frozen
from fabgen.model.kernel import cq, faces_of, location_of
from fabgen.model.neighbourhood import Body

_SAME_AXIS = 1e-6


@frozen
class Fit:
    """A full cylinder in a hollow one.

    Attributes:
        fit_mm: diametral clearance, negative for a grip.
        ring_mm3: volume of the full ring that a grip's solids share over the length they have in common, a bore's
            45° lead-ins counted at both ends as far as they grip; 0 with clearance.
    """

    fit_mm: float
    ring_mm3: float


@frozen
class _Barrel:
    """A cylindrical face; its span is measured along the axis from the point nearest to the origin."""

    axis: Vector
    foot: Vector
    diameter_mm: float
    hollow: bool
    low_mm: float
    high_mm: float


@functools.cache
def fits(first: Body, second: Body, frame: Frame) -> tuple[Fit, ...]:
    """Every fit between two bodies, the tightest first.

    Args:
        first: one body.
        second: the other.
        frame: where the second one stands in the first one's frame.
    """
    own = _barrels(first.solid)
    others = _barrels(second.solid.moved(location_of(frame)))
    found: dict[float, float] = {}
    for a in own:
        for b in others:
            if a.hollow == b.hollow or math.dist(a.axis, b.axis) > _SAME_AXIS or math.dist(a.foot, b.foot) > _SAME_AXIS:
                continue
            common_mm = min(a.high_mm, b.high_mm) - max(a.low_mm, b.low_mm)
            if common_mm <= 0:
                continue
            bore, pin = (a, b) if a.hollow else (b, a)
            fit_mm = round(bore.diameter_mm - pin.diameter_mm, 9)
            ring_mm2 = max(0.0, math.pi / 4 * (pin.diameter_mm**2 - bore.diameter_mm**2))
            found[fit_mm] = found.get(fit_mm, 0.0) + ring_mm2 * (common_mm + abs(fit_mm))
    return tuple(Fit(fit_mm, ring_mm3) for fit_mm, ring_mm3 in sorted(found.items()))


def _barrels(shape: cq.Shape) -> list[_Barrel]:
    """The cylindrical faces; those that continue each other round one axis count once."""
    found: dict[tuple[object, ...], _Barrel] = {}
    for face in faces_of(shape):
        surface = BRepAdaptor_Surface(face.wrapped)
        if surface.GetType() != GeomAbs_SurfaceType.GeomAbs_Cylinder:
            continue
        cylinder = surface.Cylinder()
        direction, place = cylinder.Axis().Direction(), cylinder.Axis().Location()
        axis, along = (direction.X(), direction.Y(), direction.Z()), 1.0
        if next(value for value in axis if abs(value) > 0.5) < 0:
            axis, along = (-axis[0], -axis[1], -axis[2]), -1.0
        start = (place.X(), place.Y(), place.Z())
        offset = sum(s * a for s, a in zip(start, axis, strict=True))
        foot = (start[0] - offset * axis[0], start[1] - offset * axis[1], start[2] - offset * axis[2])
        ends = (offset + along * surface.FirstVParameter(), offset + along * surface.LastVParameter())
        hollow = (face.wrapped.Orientation() == TopAbs_Orientation.TopAbs_REVERSED) == cylinder.Direct()
        barrel = _Barrel(axis, foot, 2 * cylinder.Radius(), hollow, min(ends), max(ends))
        key = tuple(round(value, 6) for value in (*axis, *foot, barrel.diameter_mm, barrel.low_mm, barrel.high_mm))
        found[(*key, hollow)] = barrel
    return list(found.values())
