"""Is everything that carries the array of metal?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.stock import tables


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F10: a clamp that is no metal, or a boom of a plastic that is printed."""
    clamp, boom = arranged.design.clamp, arranged.design.boom
    if clamp and clamp.material.kind != "metal":
        advice = f"{clamp.material.name} creeps and breaks in frost and sun; write material: EN AW-6061 T6"
        yield finding("F10", "fail", "clamp plate", advice)
    name = boom.material.name
    if name in tables.material_names() and tables.material(name).printable:
        yield finding("F10", "fail", "boom", f"{name} is a printing plastic; use metal, wood or GRP")
