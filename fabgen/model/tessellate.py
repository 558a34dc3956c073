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
from fabgen.model.kernel import cq, faces_of

VIEW_RAD, PRINT_RAD = (0.24, 0.12, 0.06), (0.15, 0.08, 0.04)
"""Steps of refinement; the kernel halves the angle: 53 sides to a circle for viewing, 84 for printing."""
_MANY_FACES, _COARSE_RAD = 100, 0.5
"""A solid of many small faces, such as a drilled boom, may look coarser: 26 sides to a circle."""
VOLUME_TOLERANCE = 0.0025
"""Largest relative difference of volume; a cylinder of 53 sides is 0.23 % short, one of 84 0.09 %."""
_CHORD_MM = 0.05
_MERGE_DECIMALS = 6


def mesh_of(solid: cq.Solid, angles_rad: Sequence[float] = PRINT_RAD) -> Mesh:
    """The surface of a solid in triangles.

    Args:
        solid: what to divide; triangles that it carries already are lost.
        angles_rad: angle between neighbouring sides of a curve; the next one is taken until the volume agrees.

    Raises:
        ProgramError: the solid has no volume, the surface is not closed, or its volume does not come near.
    """
    exact_mm3 = solid.Volume()
    if exact_mm3 <= 0:
        raise ProgramError(f"a solid of {exact_mm3:.3f} mm³")
    many = angles_rad is VIEW_RAD and len(faces_of(solid)) > _MANY_FACES
    for angle_rad in (_COARSE_RAD, *angles_rad) if many else angles_rad:
        mesh = _triangles(solid, angle_rad)
        if abs(volume_mm3(mesh) / exact_mm3 - 1) <= VOLUME_TOLERANCE:
            _require_closed(mesh)
            return mesh
    raise ProgramError(f"no mesh came near enough to a solid of {exact_mm3:.3f} mm³")


def volume_mm3(mesh: Mesh) -> float:
    """Volume inside a closed mesh (divergence theorem)."""
    corners = mesh.vertices_mm[mesh.triangles]
    return float(np.einsum("ij,ij->", corners[:, 0], np.cross(corners[:, 1], corners[:, 2])) / 6)


def _triangles(solid: cq.Solid, angle_rad: float) -> Mesh:
    asked = IMeshTools_Parameters()
    asked.Deflection, asked.Angle, asked.InParallel = _CHORD_MM, angle_rad, False
    # The other algorithm takes a time quadratic in the number of holes of a face.
    asked.MeshAlgo = IMeshTools_MeshAlgoType.IMeshTools_MeshAlgoType_Delabella
    BRepTools.Clean_s(solid.wrapped)
    BRepMesh_IncrementalMesh(solid.wrapped, asked)
    points: list[Vector] = []
    corners: list[tuple[int, int, int]] = []
    for face in faces_of(solid):
        place = TopLoc_Location()
        drawn = BRep_Tool.Triangulation_s(face.wrapped, place)
        if drawn is None:
            raise ProgramError("a face that cannot be divided into triangles")
        before = len(points) - 1  # the kernel counts from 1
        nodes = [drawn.Node(i) for i in range(1, drawn.NbNodes() + 1)]
        if not place.IsIdentity():
            nodes = [node.Transformed(place.Transformation()) for node in nodes]
        points += [node.Coord() for node in nodes]
        sides = [drawn.Triangle(i).Get() for i in range(1, drawn.NbTriangles() + 1)]
        if face.wrapped.Orientation() == TopAbs_Orientation.TopAbs_REVERSED:
            sides = [(a, c, b) for a, b, c in sides]
        corners += [(a + before, b + before, c + before) for a, b, c in sides]
    BRepTools.Clean_s(solid.wrapped)
    return _merged(points, corners)


def _merged(points: Sequence[Vector], corners: Sequence[tuple[int, int, int]]) -> Mesh:
    """The mesh with every vertex once: faces meet in points that both took from their common edge."""
    rounded = np.round(np.array(points, dtype=np.float64), _MERGE_DECIMALS) + 0.0  # takes the sign from -0.0
    vertices, places = np.unique(rounded, axis=0, return_inverse=True)
    triangles = places.reshape(-1)[np.array(corners, dtype=np.int64)]
    a, b, c = triangles.T
    return Mesh(vertices, triangles[(a != b) & (b != c) & (c != a)])


def _require_closed(mesh: Mesh) -> None:
    """Every side of every triangle is used once in each direction."""
    count = len(mesh.vertices_mm)
    starts, ends = mesh.triangles.reshape(-1), np.roll(mesh.triangles, -1, axis=1).reshape(-1)
    forward, backward = np.sort(starts * count + ends), np.sort(ends * count + starts)
    if np.any(forward[1:] == forward[:-1]):
        raise ProgramError("a mesh with a side used twice in one direction")
    if not np.array_equal(forward, backward):
        raise ProgramError("a mesh that is not closed")
