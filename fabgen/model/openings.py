"""Round openings through the flat walls of a tube, drawn as faces that share their edges.

A general cut computes every intersection; here they are known: a circle on the outer face, a circle on the inner one
and the bit of cylinder between them.
"""

import math
from collections.abc import Iterable
from typing import Any, NamedTuple

from OCP.BRep import BRep_Builder
from OCP.BRepBuilderAPI import BRepBuilderAPI_MakeEdge, BRepBuilderAPI_MakeFace
from OCP.Geom import Geom_CylindricalSurface
from OCP.Geom2d import Geom2d_Line
from OCP.gp import gp_Ax2, gp_Ax3, gp_Circ, gp_Dir, gp_Dir2d, gp_Pnt, gp_Pnt2d
from OCP.TopExp import TopExp
from OCP.TopoDS import TopoDS_Face, TopoDS_Shell, TopoDS_Solid, TopoDS_Wire

from fabgen.design.arranged import Vector
from fabgen.errors import ProgramError
from fabgen.model.kernel import cq, faces_of

_TOLERANCE_MM = 1e-7


class Opening(NamedTuple):
    """One hole through one wall.

    Attributes:
        outer: its centre on the outer face.
        inner: its centre on the inner face.
        axis: outward unit vector, square to the wall.
    """

    outer: Vector
    inner: Vector
    axis: Vector
    diameter_mm: float


def with_openings(tube: cq.Solid, openings: Iterable[Opening]) -> cq.Solid:
    """The tube with its openings.

    Args:
        tube: a prism with flat walls.
        openings: each inside its wall and clear of the others; this is not examined again.

    Raises:
        ProgramError: an opening is on no wall of the tube.
    """
    wanted = tuple(openings)
    wires: dict[tuple[float, ...], list[Any]] = {}
    barrels = []
    for opening in wanted:
        outer, inner, barrel = _barrel(opening)
        wires.setdefault(_plane(opening.outer, opening.axis), []).append(outer)
        wires.setdefault(_plane(opening.inner, _opposite(opening.axis)), []).append(inner)
        barrels.append(barrel)

    builder = BRep_Builder()
    shell = TopoDS_Shell()
    builder.MakeShell(shell)
    for face in faces_of(tube):
        drawn = face.wrapped
        if face.geomType() == "PLANE":
            centre, normal = face.Center().toTuple(), face.normalAt().toTuple()
            for wire in wires.pop(_plane(centre, normal), ()):
                drawn = BRepBuilderAPI_MakeFace(drawn, wire).Face()
        builder.Add(shell, drawn)
    for barrel in barrels:
        builder.Add(shell, barrel)
    if wires:
        raise ProgramError(f"openings on no wall of the tube: planes {sorted(wires)}")
    shell.Closed(True)
    solid = TopoDS_Solid()
    builder.MakeSolid(solid)
    builder.Add(solid, shell)
    return cq.Solid(solid)


def _opposite(axis: Vector) -> Vector:
    x, y, z = axis
    return (-x, -y, -z)


def _plane(point: Vector, normal: Vector) -> tuple[float, ...]:
    """A plane with its side: rounded normal and distance from the origin, without a negative zero."""
    distance = sum(p * n for p, n in zip(point, normal, strict=True))
    return tuple(round(value, 6) + 0.0 for value in (*normal, distance))


def _barrel(opening: Opening) -> tuple[Any, Any, Any]:
    """Wire for the outer face, wire for the inner face, and the cylinder between them, which uses the same edges."""
    radius, length = opening.diameter_mm / 2, math.dist(opening.outer, opening.inner)
    foot_frame = gp_Ax2(gp_Pnt(*opening.inner), gp_Dir(*opening.axis))
    head_frame = gp_Ax2(gp_Pnt(*opening.outer), foot_frame.Direction(), foot_frame.XDirection())
    bottom, top = (BRepBuilderAPI_MakeEdge(gp_Circ(frame, radius)).Edge() for frame in (foot_frame, head_frame))
    seam = BRepBuilderAPI_MakeEdge(TopExp.FirstVertex_s(bottom), TopExp.FirstVertex_s(top)).Edge()

    builder, face = BRep_Builder(), TopoDS_Face()
    builder.MakeFace(face, Geom_CylindricalSurface(gp_Ax3(foot_frame), radius), _TOLERANCE_MM)

    def line(u: float, v: float, du: float, dv: float) -> Any:
        return Geom2d_Line(gp_Pnt2d(u, v), gp_Dir2d(du, dv))

    turn = 2 * math.pi
    builder.UpdateEdge(bottom, line(0, 0, 1, 0), face, _TOLERANCE_MM)
    builder.UpdateEdge(top, line(0, length, 1, 0), face, _TOLERANCE_MM)
    builder.UpdateEdge(seam, line(turn, 0, 0, 1), line(0, 0, 0, 1), face, _TOLERANCE_MM)

    def wire(*edges: Any) -> Any:
        chain = TopoDS_Wire()
        builder.MakeWire(chain)
        for edge in edges:
            builder.Add(chain, edge)
        chain.Closed(True)
        return chain

    builder.Add(face, wire(bottom, seam, top.Reversed(), seam.Reversed()))
    return wire(top.Reversed()), wire(bottom), face.Reversed()
