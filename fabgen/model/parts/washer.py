"""Plain washer (ISO 7089).

Frame: axis = local z, from z = 0 to its thickness.
"""

from fabgen.design.part_sizes import washer_size
from fabgen.model.kernel import cq
from fabgen.model.parts.crush_sleeve import tube

SOURCE = "bought"


def washer(*, thread: str = "M3") -> cq.Workplane:
    """A washer.

    Args:
        thread: for example `M3`.

    Returns:
        One solid.
    """
    return tube(washer_size(thread=thread))
