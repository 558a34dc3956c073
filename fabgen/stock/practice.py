"""Paper and title block, and what a shop can do: hole distances, printed walls, drilling."""

import functools
from typing import Literal

from fabgen.frozen import frozen
from fabgen.stock.read_csv import UnknownStockError, row, rows


@frozen
class Paper:
    """A sheet in portrait, with the margins of its drawing frame (ISO 5457).

    Attributes:
        name: `A4` to `A0`, `Letter`.
        width_mm: short side.
        height_mm: long side.
        binding_margin_mm: frame margin at the left edge of the finished drawing.
        other_margin_mm: frame margin at the three other edges.
        source: standard and provenance.
    """

    name: str
    width_mm: float
    height_mm: float
    binding_margin_mm: float
    other_margin_mm: float
    source: str


@functools.cache
def paper(name: str) -> Paper:
    """A sheet by its name.

    Raises:
        UnknownStockError: the table has no such sheet.
    """
    found = row("paper", name, "paper size")
    return Paper(
        name=name,
        width_mm=float(found["width_mm"]),
        height_mm=float(found["height_mm"]),
        binding_margin_mm=float(found["iso5457_binding_margin_mm"]),
        other_margin_mm=float(found["iso5457_other_margin_mm"]),
        source=found["source"],
    )


def paper_size_mm(name: str) -> tuple[float, float]:
    """Width and height of a sheet in portrait."""
    sheet = paper(name)
    return sheet.width_mm, sheet.height_mm


@frozen
class TitleField:
    """A field of the title block (ISO 7200); `max_characters` is None where the standard sets no number."""

    name: str
    mandatory: bool
    max_characters: int | None


@functools.cache
def title_fields() -> tuple[TitleField, ...]:
    """The fields of the title block in the standard's order."""
    return tuple(
        TitleField(
            found["field"],
            found["obligation"] == "mandatory",
            int(found["iso7200_max_characters"]) if found["iso7200_max_characters"] else None,
        )
        for found in rows("iso7200_fields")
    )


def edge_distance_factor(
    quantity: Literal["end", "edge", "slotted", "pitch along", "pitch across"],
    rule: Literal["minimum", "preferred", "aluminium normal", "aluminium minimum"] = "minimum",
) -> float:
    """Smallest distance from a hole's centre in hole diameters.

    Args:
        quantity: to the end or the edge of the piece, of a slot, or from hole to hole.
        rule: `minimum` is EN 1993-1-8 Table 3.3, `preferred` the shop's two diameters.

    Raises:
        UnknownStockError: the rule does not speak of that quantity.
    """
    for found in rows("edge_distance"):
        if (found["rule"], found["quantity"]) == (rule, quantity):
            return float(found["factor_of_hole_diameter"])
    known = (f"{found['rule']} {found['quantity']}" for found in rows("edge_distance"))
    raise UnknownStockError("edge distance", f"{rule} {quantity}", known)


def print_practice(quantity: str) -> float:
    """A value of printing practice by the name of its row, whose ending is the unit: `longest_bridge_mm`.

    Raises:
        UnknownStockError: the table has no such row.
    """
    return float(row("print_practice", quantity, "printing value")["value"])


def process_range(quantity: str) -> tuple[float, float]:
    """Low and high of a shop process by the name of its row, whose ending is the unit: `pilot_drill_mm`.

    Raises:
        UnknownStockError: the table has no such row.
    """
    found = row("process", quantity, "process value")
    return float(found["low"]), float(found["high"])
