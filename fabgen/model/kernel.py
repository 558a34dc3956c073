"""The CAD kernel behind one door: its import, and the few calls that carry no types.

Parts take `cq` from here, so that a missing system library becomes a message with the package's name and no traceback.
"""

import contextlib
import gc
import importlib
import signal
import sys
import threading
from collections.abc import Iterable, Iterator
from types import ModuleType
from typing import Any

from fabgen.design.arranged import Frame
from fabgen.errors import MachineError, ProgramError


def cannot_load(error: ImportError) -> MachineError:
    """The message for a kernel that does not load."""
    if "libGL" in str(error):
        return MachineError(
            f"the CAD kernel needs a system library that is missing: {error}",
            "install the package libgl1 (Debian, Ubuntu: apt-get install libgl1) and run again",
        )
    return MachineError(f"the CAD kernel does not load: {error}", "install fabgen again in a fresh virtual environment")


@contextlib.contextmanager
def _uninterrupted() -> Iterator[None]:
    """Put Ctrl-C off until the end: it crashes the kernel's libraries while they load, or looks like their fault."""
    if threading.current_thread() is not threading.main_thread():
        yield
        return
    pressed: list[int] = []
    before = signal.signal(signal.SIGINT, lambda number, _: pressed.append(number))
    try:
        yield
    finally:
        signal.signal(signal.SIGINT, before)
    if pressed:
        signal.raise_signal(signal.SIGINT)


@contextlib.contextmanager
def _lean() -> Iterator[None]:
    """Spare the kernel's load what nothing here uses: a third of its time.

    Its bindings import all of VTK by the name `vtk`, which only windows need; the modules with the types they name are
    loaded without it, and who asks `vtk` for anything meanwhile gets it. Python would also search the 400,000 objects
    that come along for waste again and again.
    """
    stands_in = "vtk" not in sys.modules
    if stands_in:
        vtk = ModuleType("vtk")
        vtk.__dict__["__getattr__"] = lambda name: getattr(importlib.import_module("vtkmodules.all"), name)
        sys.modules["vtk"] = vtk
    collected = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if stands_in:
            del sys.modules["vtk"]
        gc.freeze()
        if collected:
            gc.enable()


try:
    with _uninterrupted(), _lean():
        import cadquery as cq
        from OCP.Bnd import Bnd_Box
        from OCP.BRepAlgoAPI import BRepAlgoAPI_Common, BRepAlgoAPI_Cut, BRepAlgoAPI_Fuse
        from OCP.BRepBndLib import BRepBndLib
        from OCP.gp import gp_Ax3, gp_Dir, gp_Pnt, gp_Trsf
        from OCP.TopAbs import TopAbs_ShapeEnum
        from OCP.TopExp import TopExp
        from OCP.TopTools import TopTools_IndexedMapOfShape, TopTools_ListOfShape
except ImportError as error:
    raise cannot_load(error) from error

_GROUND = cq.Plane(origin=(0, 0, 0), xDir=(1, 0, 0), normal=(0, 0, 1))
"""Made once: a workplane without it makes all named planes first, which takes longer than many a part."""

Bounds = tuple[tuple[float, float, float], tuple[float, float, float]]

__all__ = [
    "Bounds",
    "bounds_mm",
    "bounds_of",
    "cannot_load",
    "common",
    "cq",
    "cut",
    "fused",
    "location_of",
    "on_bed",
    "part_of",
    "solid_of",
    "volume_mm3",
]


def part_of(shape: cq.Shape) -> cq.Workplane:
    """A part from the result of its booleans: its one solid, alone on a workplane.

    Raises:
        ProgramError: the shape is not exactly one valid solid.
    """
    solids = _solids(shape)
    if len(solids) != 1:
        raise ProgramError(f"a part came out as {len(solids)} solids")
    if not solids[0].isValid():
        raise ProgramError("a part came out as an invalid solid")
    return cq.Workplane(_GROUND, obj=solids[0])


def solid_of(part: cq.Workplane) -> cq.Solid:
    """The one solid of a part.

    Raises:
        ProgramError: the workplane does not hold exactly one solid.
    """
    solids = [solid for shape in part.vals() if isinstance(shape, cq.Shape) for solid in _solids(shape)]
    if len(solids) != 1:
        raise ProgramError(f"a part holds {len(solids)} solids")
    return solids[0]


def faces_of(solid: cq.Shape) -> list[cq.Face]:
    """Its faces. The library's own list takes as long to begin as a small part takes to build."""
    found = TopTools_IndexedMapOfShape()
    TopExp.MapShapes_s(solid.wrapped, TopAbs_ShapeEnum.TopAbs_FACE, found)
    return [cq.Face(found.FindKey(i)) for i in range(1, found.Extent() + 1)]


def _solids(shape: cq.Shape) -> list[cq.Solid]:
    return [shape] if isinstance(shape, cq.Solid) else shape.Solids()


def volume_mm3(part: cq.Workplane) -> float:
    """Volume of a part by the kernel, integrated to a relative error of 1e-6.

    Without a stated error the kernel is off by 2e-5 where one cylinder trims another.
    """
    return float(solid_of(part).Volume(1e-6))


def bounds_mm(part: cq.Workplane) -> Bounds:
    """Lowest and highest corner of the smallest axis-parallel box round a part, without the kernel's usual slack."""
    return bounds_of(solid_of(part))


def bounds_of(shape: cq.Shape) -> Bounds:
    """As `bounds_mm`, of a shape that stands on no workplane."""
    box = Bnd_Box()
    BRepBndLib.AddOptimal_s(shape.wrapped, box, False, False)
    low, high = box.CornerMin(), box.CornerMax()
    return (low.X(), low.Y(), low.Z()), (high.X(), high.Y(), high.Z())


def location_of(frame: Frame) -> cq.Location:
    """Where a frame stands. The library's own way, by a plane, takes twenty times as long."""
    place = gp_Trsf()
    place.SetTransformation(gp_Ax3(gp_Pnt(*frame.origin), gp_Dir(*frame.z), gp_Dir(*frame.x)))
    place.Invert()
    return cq.Location(place)


def on_bed(part: cq.Workplane) -> cq.Workplane:
    """The part moved straight up or down until it stands on z = 0."""
    solid = solid_of(part)
    return cq.Workplane(_GROUND, obj=solid.translate(cq.Vector(0, 0, -bounds_of(solid)[0][2])))


def cut(first: cq.Shape, *tools: cq.Shape) -> cq.Shape:
    """What the tools leave of a shape."""
    return _boolean(BRepAlgoAPI_Cut(), first, tools)


def common(first: cq.Shape, second: cq.Shape) -> cq.Shape:
    """What two shapes share."""
    return _boolean(BRepAlgoAPI_Common(), first, (second,))


def fused(first: cq.Shape, *others: cq.Shape) -> cq.Shape:
    """The union, with faces that continue each other merged."""
    return _boolean(BRepAlgoAPI_Fuse(), first, others).clean()


def _boolean(operation: Any, first: cq.Shape, others: Iterable[cq.Shape]) -> cq.Shape:
    """One boolean, on one thread: at this size several take half as much again of the processor and end no sooner."""
    arguments, tools = TopTools_ListOfShape(), TopTools_ListOfShape()
    arguments.Append(first.wrapped)
    for other in others:
        tools.Append(other.wrapped)
    operation.SetArguments(arguments)
    operation.SetTools(tools)
    operation.SetRunParallel(False)
    operation.Build()
    if not operation.IsDone():
        raise ProgramError("the kernel could not cut or join two solids")
    return cq.Shape.cast(operation.Shape())
