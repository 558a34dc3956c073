"""Solids as closed triangle meshes, close enough to weigh and to print.

Curved faces are divided by angle, so that every cylinder gets the same number of sides and the volume of a thin ring
comes out as near as that of a rod.
"""

from collections.abc import Sequence

import numpy as np
from OCP.BRep import BRep_Tool
from OCP.BRepMesh import BRepMesh_IncrementalMesh
from OCP.BRepTools import BRepTools
from OCP.IMeshTools import IMeshTools_MeshAlgoType, IMeshTools_Parameters
from OCP.TopAbs import TopAbs_Orientation
from OCP.TopLoc import TopLoc_Location

from fabgen.design.arranged import Vector
from fabgen.design.solids import Mesh
from fabgen.errors import ProgramError
from fabgen.model.kernel import cq

VIEW_RAD, PRINT_RAD = (0.5, 0.24, 0.12, 0.06), (0.1, 0.05, 0.025)
"""Steps of refinement; the kernel halves the angle: 26 or 53 sides to a circle for viewing, 126 for printing."""
VOLUME_TOLERANCE = 0.0025
"""Largest relative difference of volume; a cylinder of 53 sides is 0.23 % short."""
_CHORD_MM = 0.05
_MERGE_DECIMALS = 6


def mesh_of(solid: cq.Solid, angles_rad: Sequence[float] = PRINT_RAD) -> Mesh:
    """The surface of a solid in triangles.

    Args:
        solid: what to divide; triangles that it carries already are lost.
        angles_rad: angle between neighbouring sides of a curve; the next one is taken until the volume agrees.

    Raises:
        ProgramError: the surface is not closed, or the volume does not come near.
    """
    exact_mm3 = solid.Volume()
    for angle_rad in angles_rad:
        mesh = _triangles(solid, angle_rad)
        if abs(volume_mm3(mesh) / exact_mm3 - 1) <= VOLUME_TOLERANCE:
            _require_closed(mesh)
            return mesh
    raise ProgramError(f"no mesh came near enough to a solid of {exact_mm3:.3f} mm³")


def volume_mm3(mesh: Mesh) -> float:
    """Volume inside a closed mesh (divergence theorem)."""
    corners = np.asarray(mesh.vertices_mm)[np.asarray(mesh.triangles)]
    return float(np.einsum("ij,ij->", corners[:, 0], np.cross(corners[:, 1], corners[:, 2])) / 6)


def _triangles(solid: cq.Solid, angle_rad: float) -> Mesh:

    asked = IMeshTools_Parameters()
    asked.Deflection, asked.Angle, asked.InParallel = _CHORD_MM, angle_rad, False
    # The other algorithm takes a time quadratic in the number of holes of a face.
    asked.MeshAlgo = IMeshTools_MeshAlgoType.IMeshTools_MeshAlgoType_Delabella
    BRepTools.Clean_s(solid.wrapped)
    BRepMesh_IncrementalMesh(solid.wrapped, asked)
    index: dict[Vector, int] = {}
    triangles = []
    for face in solid.Faces():
        place = TopLoc_Location()
        drawn = BRep_Tool.Triangulation_s(face.wrapped, place)
        if drawn is None:
            raise ProgramError("a face that cannot be divided into triangles")
        move = None if place.IsIdentity() else place.Transformation()
        numbers = [0]
        for i in range(1, drawn.NbNodes() + 1):
            point = drawn.Node(i) if move is None else drawn.Node(i).Transformed(move)
            # Faces meet in points that both took from their common edge; adding zero removes the sign of -0.0.
            key = (
                round(point.X(), _MERGE_DECIMALS) + 0.0,
                round(point.Y(), _MERGE_DECIMALS) + 0.0,
                round(point.Z(), _MERGE_DECIMALS) + 0.0,
            )
            numbers.append(index.setdefault(key, len(index)))
        inside_out = face.wrapped.Orientation() == TopAbs_Orientation.TopAbs_REVERSED
        for i in range(1, drawn.NbTriangles() + 1):
            a, b, c = (numbers[n] for n in drawn.Triangle(i).Get())
            if a != b and c not in (a, b):
                triangles.append((a, c, b) if inside_out else (a, b, c))
    BRepTools.Clean_s(solid.wrapped)
    return Mesh(tuple(index), tuple(triangles))


def _require_closed(mesh: Mesh) -> None:
    """Every side of every triangle is used once in each direction."""
    sides = [side for a, b, c in mesh.triangles for side in ((a, b), (b, c), (c, a))]
    used = set(sides)
    if len(used) < len(sides):
        raise ProgramError("a mesh with a side used twice in one direction")
    if any((b, a) not in used for a, b in sides):
        raise ProgramError("a mesh that is not closed")
