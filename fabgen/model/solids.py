"""One solid per distinct part, built once by the part's file in `model/parts`."""

import functools
from collections.abc import Callable

from fabgen import registry
from fabgen.design.arranged import Parameters, Placed
from fabgen.model import kernel
from fabgen.model.kernel import cq

_GROWTH = "hole_growth_mm"


@functools.cache
def solid_of(part: str, parameters: Parameters = ()) -> cq.Solid:
    """The solid of a distinct part in the part's own frame.

    Args:
        part: a file in `model/parts`.
        parameters: its keyword arguments, as in `Placed.parameters`.

    Raises:
        ProgramError: there is no such part, or it did not come out as one solid; a cut that leaves two pieces is valid
            geometry to the kernel, so pieces are counted.
    """
    return kernel.solid_of(_maker(part)(**dict(parameters)))


@functools.cache
def _maker(part: str) -> Callable[..., cq.Workplane]:
    """The function that builds a part, found once."""
    return registry.entry("model/parts", part).function()


def finished(placed: Placed) -> cq.Solid:
    """The solid of a placed part as it goes together.

    A printed bore is drawn larger by what it comes out smaller; here it has the size that it comes out with.
    """
    return solid_of(placed.part, without_growth(placed.parameters))


def without_growth(parameters: Parameters) -> Parameters:
    """A part's parameters for the bores as they come out of the printer."""
    return tuple((name, value) for name, value in parameters if name != _GROWTH)
