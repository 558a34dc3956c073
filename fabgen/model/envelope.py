"""Whether a part's simple shapes hold its solid, so that a distance between shapes is never more than the true one."""

import functools
import math
from typing import Any

from fabgen.design.arranged import Axis, Box, Cylinder, Frame, Parameters, Placed, Shape, Vector
from fabgen.design.distances import bounding_box
from fabgen.model.kernel import bounds_of, cq, cut, location_of
from fabgen.model.solids import solid_of, without_growth

_DECIMALS = 7
_OUTSIDE_MM3 = 1e-6
_BOX_MM = 1e-6
_VOLUME_REL = 1e-9
_UNDRILLED: dict[str, dict[str, Any]] = {"boom": {"holes": ()}, "rod": {"cross_hole_mm": 0.0, "cross_hole_z_mm": 0.0}}
"""What a drill takes away lies within what it was taken from."""
_AXES: dict[Axis, Vector] = {"x": (1.0, 0.0, 0.0), "y": (0.0, 1.0, 0.0), "z": (0.0, 0.0, 1.0)}


def outside_envelope(placed: Placed) -> str:
    """What the shapes of a placed part leave out of its solid, in words; empty when they hold it."""
    frame = Frame(z=placed.frame.z, x=placed.frame.x)
    shapes = tuple(_from_origin(shape, placed.frame.origin) for shape in placed.shapes)
    parameters = dict(without_growth(placed.parameters))
    if not placed.exact:
        parameters |= _UNDRILLED.get(placed.part, {})
    return _outside(placed.part, tuple(sorted(parameters.items())), frame, shapes, placed.exact)


@functools.cache
def _outside(part: str, parameters: Parameters, frame: Frame, shapes: tuple[Shape, ...], exact: bool) -> str:
    solid = solid_of(part, parameters).moved(location_of(frame))
    if exact:
        simple_mm3 = sum(_volume_mm3(shape) for shape in shapes)
        if not math.isclose(solid.Volume(), simple_mm3, rel_tol=_VOLUME_REL):
            return f"{part} has {solid.Volume():.6f} mm³, the shapes that should be it {simple_mm3:.6f} mm³"
    if exact or (len(shapes) == 1 and isinstance(shapes[0], Box)):
        (low, high), box = bounds_of(solid), bounding_box(shapes)
        below = [b - s for s, b in zip(low, box.low, strict=True)]
        above = [s - b for s, b in zip(high, box.high, strict=True)]
        over_mm = max(*below, *above)
        return f"{part} stands out of its shapes by {over_mm:.6f} mm" if over_mm > _BOX_MM else ""
    left_mm3 = cut(solid, *(_solid(shape) for shape in shapes)).Volume()
    return f"{part} stands out of its shapes with {left_mm3:.6f} mm³" if left_mm3 > _OUTSIDE_MM3 else ""


def _from_origin(shape: Shape, origin: Vector) -> Shape:
    """The shape seen from the part's origin, rounded so that equal parts are judged once."""

    def local(point: Vector) -> Vector:
        x, y, z = (round(p - o, _DECIMALS) + 0.0 for p, o in zip(point, origin, strict=True))
        return (x, y, z)

    if isinstance(shape, Box):
        return Box(local(shape.low), local(shape.high))
    return Cylinder(shape.axis, local(shape.centre), shape.diameter_mm, shape.length_mm, shape.bore_mm)


def _volume_mm3(shape: Shape) -> float:
    if isinstance(shape, Box):
        return math.prod(high - low for low, high in zip(shape.low, shape.high, strict=True))
    return math.pi / 4 * (shape.diameter_mm**2 - shape.bore_mm**2) * shape.length_mm


def _solid(shape: Shape) -> cq.Shape:
    if isinstance(shape, Box):
        x, y, z = (high - low for low, high in zip(shape.low, shape.high, strict=True))
        return cq.Solid.makeBox(x, y, z, cq.Vector(*shape.low))
    axis = cq.Vector(*_AXES[shape.axis])
    foot = cq.Vector(*shape.centre) - axis * (shape.length_mm / 2)
    full: cq.Shape = cq.Solid.makeCylinder(shape.diameter_mm / 2, shape.length_mm, foot, axis)
    if shape.bore_mm:
        full = cut(full, cq.Solid.makeCylinder(shape.bore_mm / 2, shape.length_mm, foot, axis))
    return full
