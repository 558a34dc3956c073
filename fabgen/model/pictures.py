"""Pictures of parts and of the array: the kernel's hidden-line pass as plain lines on a sheet.

Parallel projection, z up on the paper, at a scale of ISO 5455. Edges where faces meet smoothly are left out.
"""

import math
from collections.abc import Iterable, Sequence
from typing import Any

from OCP.BRepAdaptor import BRepAdaptor_Curve
from OCP.BRepLib import BRepLib
from OCP.BRepMesh import BRepMesh_IncrementalMesh
from OCP.BRepTools import BRepTools
from OCP.GCPnts import GCPnts_TangentialDeflection
from OCP.gp import gp_Ax2, gp_Dir, gp_Pnt
from OCP.HLRAlgo import HLRAlgo_Projector
from OCP.HLRBRep import HLRBRep_Algo, HLRBRep_HLRToShape, HLRBRep_PolyAlgo, HLRBRep_PolyHLRToShape

from fabgen.design.arranged import Vector
from fabgen.design.drawing import Item, Point, Polyline, Sheet, box_of, moved
from fabgen.design.solids import AssemblyItem, Product
from fabgen.errors import ProgramError
from fabgen.model.kernel import bounds_of, cq, location_of

SCALES = (10.0, 5.0, 2.0, 1.0, 1 / 2, 1 / 5, 1 / 10, 1 / 20, 1 / 50, 1 / 100)
"""Enlargements and reductions (ISO 5455:1979, from memory)."""
ABOVE: Vector = (0.5, -0.8, 0.55)
BELOW: Vector = (0.5, -0.8, -0.55)
_ALONG_BOOM: Vector = (0.55, -0.75, 0.5)
_CHORD_MM, _ANGLE_RAD = 0.05, 0.15
_FACET_MM, _FACET_RAD = 0.1, 0.6
_MARGIN_MM, _BETWEEN_MM = 4.0, 8.0


def part_picture(product: Product, *, width_mm: float = 120.0, height_mm: float = 75.0) -> Sheet:
    """A part from above and from below, side by side.

    Args:
        product: the part; a printed one in print pose.
        width_mm: largest width of the picture.
        height_mm: largest height of the picture.

    Returns:
        A sheet no larger than its lines ask for; its title says size and scale.
    """
    low, high = bounds_of(product.solid)
    sizes = " × ".join(f"{end - start:.2f}" for start, end in zip(low, high, strict=True))
    views = [visible_lines([product.solid], eye) for eye in (ABOVE, BELOW)]
    return _sheet(views, width_mm, height_mm, product.name, f"{product.name}, {sizes} mm, from above and from below")


def assembly_picture(
    items: Sequence[AssemblyItem], *, name: str, width_mm: float = 180.0, height_mm: float = 120.0
) -> Sheet:
    """The array, or some of its parts together, from the front, right and above.

    Args:
        items: every place to be shown.
        name: what it is.
        width_mm: largest width of the picture.
        height_mm: largest height of the picture.
    """
    return _sheet([_faceted_lines(items, _ALONG_BOOM)], width_mm, height_mm, name, f"{name}, seen from the right")


def visible_lines(shapes: Iterable[cq.Shape], eye: Vector) -> list[tuple[Point, ...]]:
    """Visible sharp edges and outlines, projected.

    Args:
        shapes: what stands together; each hides what lies behind it.
        eye: direction from the object to the eye; not straight up or down.

    Returns:
        Polylines in mm, x to the right and y up as the eye sees them.
    """
    algorithm = HLRBRep_Algo()
    for shape in shapes:
        algorithm.Add(shape.wrapped)
    algorithm.Projector(_projector(eye))
    algorithm.Update()
    algorithm.Hide()
    result = HLRBRep_HLRToShape(algorithm)
    lines = []
    for compound in (result.VCompound(), result.OutLineVCompound()):
        if compound is not None and not compound.IsNull():
            BRepLib.BuildCurves3d_s(compound)
            lines += [_points(edge.wrapped) for edge in cq.Shape.cast(compound).Edges()]
    return lines


def _faceted_lines(items: Sequence[AssemblyItem], eye: Vector) -> list[tuple[Point, ...]]:
    """As `visible_lines`, by the solids' triangles: ten times faster for many parts, circles become polygons."""
    for product in dict.fromkeys(item.product for item in items):
        BRepMesh_IncrementalMesh(product.solid.wrapped, _FACET_MM, False, _FACET_RAD, False)
    placed = [item.product.solid.moved(location_of(item.frame)) for item in items]
    algorithm = HLRBRep_PolyAlgo()
    algorithm.Load(cq.Compound.makeCompound(placed).wrapped)
    algorithm.Projector(_projector(eye))
    algorithm.Update()
    result = HLRBRep_PolyHLRToShape()
    result.Update(algorithm)
    lines = []
    for compound in (result.VCompound(), result.OutLineVCompound()):
        if compound is not None and not compound.IsNull():
            for edge in cq.Shape.cast(compound).Edges():
                start, end = edge.startPoint(), edge.endPoint()
                lines.append(((start.x, start.y), (end.x, end.y)))
    for product in dict.fromkeys(item.product for item in items):
        BRepTools.Clean_s(product.solid.wrapped)
    return _chained(lines)


def _chained(segments: Iterable[tuple[Point, Point]]) -> list[tuple[Point, ...]]:
    """Segments that follow each other end to start, joined."""
    chains: list[list[Point]] = []
    open_at: dict[Point, list[Point]] = {}
    for start, end in segments:
        a, b = ((round(x, 6) + 0.0, round(y, 6) + 0.0) for x, y in (start, end))
        if a == b:
            continue
        chain = open_at.pop(a, None)
        if chain is None and (chain := open_at.pop(b, None)):
            a, b = b, a
        if chain is None:
            chain = [a]
            chains.append(chain)
        chain.append(b)
        open_at[b] = chain
    return [tuple(chain) for chain in chains]


def _projector(eye: Vector) -> Any:
    """Parallel projection with x to the right and y up as the eye sees it."""
    return HLRAlgo_Projector(gp_Ax2(gp_Pnt(0, 0, 0), gp_Dir(*eye), gp_Dir(-eye[1], eye[0], 0.0)))


def _points(edge: Any) -> tuple[Point, ...]:
    """An edge as points near enough to its curve."""
    curve = GCPnts_TangentialDeflection(BRepAdaptor_Curve(edge), _ANGLE_RAD, _CHORD_MM)
    places = [curve.Value(i) for i in range(1, curve.NbPoints() + 1)]
    return tuple((place.X(), place.Y()) for place in places)


def _sheet(views: Sequence[list[tuple[Point, ...]]], width: float, height: float, name: str, title: str) -> Sheet:
    """Views side by side at the largest scale that fits."""
    boxes = [box_of(tuple(point for line in view for point in line)) for view in views]
    wide = sum(box[2] - box[0] for box in boxes)
    high = max(box[3] - box[1] for box in boxes)
    room = width - 2 * _MARGIN_MM - _BETWEEN_MM * (len(views) - 1), height - 2 * _MARGIN_MM
    scale = next((s for s in SCALES if wide * s <= room[0] and high * s <= room[1]), None)
    if scale is None:
        raise ProgramError(f"no scale of ISO 5455 brings {wide:.0f} × {high:.0f} mm on {width:.0f} × {height:.0f} mm")
    items: list[Item] = []
    x = _MARGIN_MM
    for view, (left, bottom, right, top) in zip(views, boxes, strict=True):
        lift = _MARGIN_MM + (high - (top - bottom)) * scale / 2
        for line in view:
            drawn = Polyline("outline", tuple((px * scale, py * scale) for px, py in line))
            items.append(moved(drawn, x - left * scale, lift - bottom * scale))
        x += (right - left) * scale + _BETWEEN_MM
    ratio = f"{scale:g}:1" if scale >= 1 else f"1:{1 / scale:.0f}"
    size = (math.ceil(x - _BETWEEN_MM + _MARGIN_MM), math.ceil(high * scale + 2 * _MARGIN_MM))
    return Sheet(name, f"{title}, scale {ratio}", size[0], size[1], tuple(items))
