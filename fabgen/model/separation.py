"""The smallest distance of two solids by the kernel, asked only of the faces that can matter."""

import functools
import itertools
import math
from collections.abc import Iterable
from typing import Any, NamedTuple

from OCP.Bnd import Bnd_Box
from OCP.BRep import BRep_Builder
from OCP.BRepBndLib import BRepBndLib
from OCP.BRepClass3d import BRepClass3d_SolidClassifier
from OCP.BRepExtrema import BRepExtrema_DistShapeShape
from OCP.gp import gp_Pnt
from OCP.TopAbs import TopAbs_State
from OCP.TopoDS import TopoDS_Compound

from fabgen.design.arranged import Box, Frame, Vector
from fabgen.design.distances import bounding_box, distance_mm
from fabgen.errors import ProgramError
from fabgen.model.kernel import cq, faces_of, location_of
from fabgen.model.neighbourhood import Body

_POINT_MM = 1e-6


class _Face(NamedTuple):
    face: Any
    box: Box


@functools.cache
def separation_mm(first: Body, second: Body, frame: Frame, within_mm: float) -> float:
    """Distance of two bodies, the second standing at `frame` in the first one's frame.

    Args:
        first: one body.
        second: the other.
        frame: where the second one stands in the first one's frame.
        within_mm: faces farther than this from the other body's box are left out; a distance up to here is exact, a
            larger one is only known to be larger.

    Returns:
        0 where they touch or overlap, infinite where they are certainly farther apart than `within_mm`.
    """
    own, others = _faces(first), [_Face(each.face, _turned(each.box, frame)) for each in _faces(second)]
    own_box, others_box = (bounding_box([face.box for face in faces]) for faces in (own, others))
    near = [face.face for face in own if distance_mm(face.box, others_box) <= within_mm]
    near_others = [face.face for face in others if distance_mm(face.box, own_box) <= within_mm]
    apart_mm = math.inf
    if near and near_others:
        measured = BRepExtrema_DistShapeShape(
            _compound(near), cq.Shape.cast(_compound(near_others)).moved(location_of(frame)).wrapped
        )
        if not measured.IsDone():
            raise ProgramError(f"the kernel found no distance between {first.part} and {second.part}")
        apart_mm = float(measured.Value())
    # Surfaces that do not meet may still lie one within the other; then every vertex does.
    if apart_mm > 0 and (_holds(first, frame.point(_vertex(second))) or _holds(second, frame.local(_vertex(first)))):
        return 0.0
    return apart_mm


@functools.cache
def _faces(body: Body) -> tuple[_Face, ...]:
    """The faces of a body, each with a box that holds it."""
    found = []
    for face in faces_of(body.solid):
        box = Bnd_Box()
        BRepBndLib.Add_s(face.wrapped, box, False)
        low, high = box.CornerMin(), box.CornerMax()
        found.append(_Face(face.wrapped, Box((low.X(), low.Y(), low.Z()), (high.X(), high.Y(), high.Z()))))
    return tuple(found)


def _turned(box: Box, frame: Frame) -> Box:
    """A box that holds a box after it was placed."""
    ends = [(box.low[i], box.high[i]) for i in range(3)]
    corners = [frame.point((x, y, z)) for x, y, z in itertools.product(*ends)]
    return bounding_box([Box(corner, corner) for corner in corners])


@functools.cache
def _vertex(body: Body) -> Vector:
    """One vertex of a body."""
    return body.solid.Vertices()[0].toTuple()


def _holds(body: Body, place: Vector) -> bool:
    """Whether a point lies inside the body's material."""
    sought = _classifier(body)
    sought.Perform(gp_Pnt(*place), _POINT_MM)
    return bool(sought.State() == TopAbs_State.TopAbs_IN)


@functools.cache
def _classifier(body: Body) -> Any:
    """What tells inside from outside, loaded once."""
    return BRepClass3d_SolidClassifier(body.solid.wrapped)


def _compound(faces: Iterable[Any]) -> Any:
    builder, compound = BRep_Builder(), TopoDS_Compound()
    builder.MakeCompound(compound)
    for face in faces:
        builder.Add(compound, face)
    return compound
