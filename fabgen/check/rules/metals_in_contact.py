"""Which metals touch outdoors that should not?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged, Interface
from fabgen.design.findings import Finding
from fabgen.stock import tables

APART = "rod in clearance hole"
"""The one interface of metal parts that never touch."""

SMALL = {"screw", "nut", "washer", "u_bolt"}
SOURCE = "anodic index table, secondary source; rule of grouping after MIL-DTL-14072F, 3.13 and Table VI"


def findings(arranged: Arranged) -> Iterator[Finding]:
    """L17: couples beyond the outdoor limit, each pair of metals once; the rods' and the boom's warn.

    Small fasteners of the nobler metal in a large part of the less noble one are the harmless way round: a note.
    """
    index_cv = anodic_indices_cv(arranged)
    limit_cv = tables.galvanic_limit_cv("outdoor")
    parts = {part.name: part for part in arranged.placed}
    couples: dict[tuple[str, str], list[Interface]] = {}
    for meeting in arranged.interfaces:
        metals = {parts[meeting.first].material, parts[meeting.second].material}
        if meeting.kind == APART or len(metals) < 2 or not metals <= index_cv.keys():
            continue
        pair = sorted(metals, key=lambda name: (-index_cv[name], name))
        if abs(index_cv[pair[0]] - index_cv[pair[1]]) > limit_cv:
            couples.setdefault((pair[0], pair[1]), []).append(meeting)
    for (first, second), meetings in couples.items():
        small = all(parts[m.first].part in SMALL or parts[m.second].part in SMALL for m in meetings)
        yield _couple(first, second, abs(index_cv[first] - index_cv[second]), limit_cv, small)


def anodic_indices_cv(arranged: Arranged) -> dict[str, int]:
    """Anodic index in centivolts of every metal in the array that has one, by material."""
    design = arranged.design
    stated = [design.boom.material, *(element.rod.material for element in design.elements)]
    stated += [design.clamp.material] if design.clamp else []
    index_cv = {each.name: each.anodic_index_cv for each in stated}
    for name in {part.material for part in arranged.placed} - index_cv.keys():
        index_cv[name] = tables.material(name).anodic_index_cv if name in tables.material_names() else None
    return {name: cv for name, cv in index_cv.items() if cv is not None}


def _couple(noble: str, base: str, apart_cv: int, limit_cv: int, small: bool) -> Finding:
    advice = (
        "small fasteners of the nobler metal in a large part, usual outdoors: grease every thread and washer, look "
        f"after them each year ({SOURCE})"
        if small
        else f"use one metal for both, or part them with a tinned or plated piece between ({SOURCE})"
    )
    where = f"{noble} on {base}"
    return finding(
        "L17", "note" if small else "warn", where, advice, measured=apart_cv / 100, required=limit_cv / 100, unit="V"
    )
