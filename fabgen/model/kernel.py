"""The CAD kernel behind one door: its import, and the few calls that carry no types.

Parts take `cq` from here, so that a missing system library becomes a message with the package's name and no traceback.
"""

import contextlib
import signal
import threading
from collections.abc import Iterator

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


try:
    with _uninterrupted():
        import cadquery as cq
        from OCP.Bnd import Bnd_Box
        from OCP.BRepBndLib import BRepBndLib
except ImportError as error:
    raise cannot_load(error) from error

_GROUND = cq.Plane(origin=(0, 0, 0), xDir=(1, 0, 0), normal=(0, 0, 1))
"""Made once: a workplane without it makes all named planes first, which takes longer than many a part."""

Bounds = tuple[tuple[float, float, float], tuple[float, float, float]]

__all__ = ["Bounds", "bounds_mm", "cannot_load", "cq", "fused", "on_bed", "part_of", "solid_of", "volume_mm3"]


def part_of(shape: cq.Shape) -> cq.Workplane:
    """A part from the result of its booleans: its one solid, alone on a workplane.

    Raises:
        ProgramError: the shape is not exactly one valid solid.
    """
    solids = shape.Solids()
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
    solids = [solid for shape in part.vals() if isinstance(shape, cq.Shape) for solid in shape.Solids()]
    if len(solids) != 1 or not isinstance(solids[0], cq.Solid):
        raise ProgramError(f"a part holds {len(solids)} solids")
    return solids[0]


def volume_mm3(part: cq.Workplane) -> float:
    """Volume of a part by the kernel, integrated to a relative error of 1e-6.

    Without a stated error the kernel is off by 2e-5 where one cylinder trims another.
    """
    return float(solid_of(part).Volume(1e-6))


def bounds_mm(part: cq.Workplane) -> Bounds:
    """Lowest and highest corner of the smallest axis-parallel box round a part, without the kernel's usual slack."""
    box = Bnd_Box()
    BRepBndLib.AddOptimal_s(solid_of(part).wrapped, box, False, False)
    low, high = box.CornerMin(), box.CornerMax()
    return (low.X(), low.Y(), low.Z()), (high.X(), high.Y(), high.Z())


def on_bed(part: cq.Workplane) -> cq.Workplane:
    """The part moved straight up or down until it stands on z = 0."""
    return cq.Workplane(solid_of(part).translate(cq.Vector(0, 0, -bounds_mm(part)[0][2])))


def fused(first: cq.Shape, *others: cq.Shape) -> cq.Shape:
    """The union, with faces that continue each other merged."""
    return first.fuse(*others).clean()
