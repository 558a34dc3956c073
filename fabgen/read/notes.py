"""What is readable but deserves a second look: findings with D codes, never failures."""

from collections.abc import Iterator
from itertools import pairwise

from fabgen import registry
from fabgen.design.design import Design, Element
from fabgen.design.findings import Finding, Severity, in_order
from fabgen.read.grammar import FileKeys
from fabgen.read.kind import OtherUnit
from fabgen.units import in_to_mm, mm_to_in

USUAL_LENGTH_WL = (0.25, 0.7)
"""Lengths of rods in arrays of half-wave elements; common practice, wide."""

USUAL_SPACING_WL = (0.02, 0.8)
"""Distance from rod to rod in arrays of half-wave elements; common practice, wide."""


def notes_on(design: Design, keys: FileKeys, other_unit: list[OtherUnit]) -> tuple[Finding, ...]:
    """Everything worth a second look.

    Args:
        design: the design as read.
        keys: the file as written.
        other_unit: values that are only likely in the other unit.
    """
    found = [_other_unit(value) for value in other_unit if value.key != "length"]
    found += _lengths(design, keys.units)
    found += _spacings(design)
    found += _order(keys)
    found += _unused(design, keys)
    if design.lengths_are == "as-cut":
        advice = "the lengths are cut as written; write `lengths_are: free-space` if the model knows no boom"
        found.append(_finding("D32", "note", "lengths_are", advice))
    boom = design.boom
    if not boom.hollow and boom.material.kind == "metal":
        advice = "`wall` is left out, so the boom is a solid bar; add wall: 1.5 mm if it is a tube"
        found.append(_finding("D33", "note", "boom", advice))
    return in_order(found)


def _finding(
    code: str, severity: Severity, where: str, advice: str, measured: float | None = None, unit: str = ""
) -> Finding:
    return Finding(code, severity, where, measured, None, unit, advice, registry.code_title(code))


def _other_unit(value: OtherUnit) -> Finding:
    where = f"{value.key}, {value.place.file} line {value.place.line}"
    advice = f"if {value.meant} was meant, write `{value.number} {value.other_unit}`"
    return _finding("D30", "warn", where, advice, value.read_mm, "mm")


def _lengths(design: Design, unit: str | None) -> Iterator[Finding]:
    """Rods far from half a wavelength, told once for all of them."""
    low, high = (limit * design.wavelength_mm for limit in USUAL_LENGTH_WL)
    odd = [element for element in design.elements if not low <= element.length_mm <= high]
    if not odd:
        return
    first_mm = odd[0].length_mm
    swapped = in_to_mm if unit == "mm" else mm_to_in
    other = "inches" if unit == "mm" else "millimetres"
    if unit and all(low <= swapped(element.length_mm) <= high for element in odd):
        advice = f"read in {other} these lengths would be half waves at {design.frequency_mhz:g} MHz; check `units`"
        yield _finding("D30", "warn", _names(odd), advice, first_mm, "mm")
    else:
        advice = (
            f"rods of such arrays have {low:.4g} mm to {high:.4g} mm at {design.frequency_mhz:g} MHz; "
            "check length, units and frequency"
        )
        yield _finding("D34", "warn", _names(odd), advice, first_mm, "mm")


def _spacings(design: Design) -> Iterator[Finding]:
    """Neighbours that stand unusually near or far, told once for each kind."""
    low, high = (limit * design.wavelength_mm for limit in USUAL_SPACING_WL)
    pairs = [(rear, front, front.station_mm - rear.station_mm) for rear, front in pairwise(design.elements)]
    for odd, limit in (
        ([pair for pair in pairs if pair[2] < low], f"nearer than {low:.4g} mm"),
        ([pair for pair in pairs if pair[2] > high], f"farther apart than {high:.4g} mm"),
    ):
        if odd:
            rear, front, spacing_mm = odd[0]
            more = f" and {len(odd) - 1} more" if len(odd) > 1 else ""
            advice = f"neighbours are seldom {limit} at {design.frequency_mhz:g} MHz; check `at` and units"
            yield _finding("D36", "warn", f"{rear.id} to {front.id}{more}", advice, spacing_mm, "mm")


def _order(keys: FileKeys) -> Iterator[Finding]:
    rows = [row for row in keys.elements or () if row is not None]
    for before, row in pairwise(rows):
        if row.at_mm < before.at_mm:
            advice = "tables and drawings list the rods from the rear to the front; nothing needs to be changed"
            yield _finding("D31", "note", f"{row.id} after {before.id}", advice)
            return


def _unused(design: Design, keys: FileKeys) -> Iterator[Finding]:
    used = {element.mount.name for element in design.elements if element.mount is not None}
    for name in keys.mounts or {}:
        if name not in used:
            yield _finding("D35", "note", f"mounts.{name}", "no rod names it; delete it or name it in a row")
    if keys.feed is not None and not design.feeds:
        yield _finding("D35", "note", "feed", "no rod is driven; give one row `role: driven` or delete `feed`")


def _names(elements: list[Element]) -> str:
    names = ", ".join(element.id for element in elements[:4])
    return f"{names} and {len(elements) - 4} more" if len(elements) > 4 else names
