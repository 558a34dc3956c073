"""Plain washer, normal (ISO 7089) or large (ISO 7093-1).

Frame: axis = local z, from z = 0 to its thickness.
"""

from typing import Literal

from fabgen.design.part_sizes import washer_size
from fabgen.model.kernel import cq
from fabgen.model.parts.crush_sleeve import tube

SOURCE = "bought"


def washer(*, thread: str = "M3", series: Literal["normal", "large"] = "normal") -> cq.Workplane:
    """A washer.

    Args:
        thread: for example `M3`.
        series: normal or large.

    Returns:
        One solid.
    """
    return tube(washer_size(thread=thread, series=series))
