"""What a millimetre costs: tolerances from limits, the common error, another rod, and a bar per element."""

from collections.abc import Callable

from fabgen.book.book import Book, Content
from fabgen.design.response import Response, Sensitivity
from fabgen.design.scale import Axis, axis
from fabgen.frozen import frozen
from fabgen.stock.electrical import tolerance_classes

PLACE = 52
STEP_MM = 0.1
"""Every bar is for this much."""
WIDTH_MM, LEFT_MM, HEAD_MM, FOOT_MM = 178.0, 14.0, 6.0, 9.0
MANY = 36
Bar = tuple[float, float, float, str]


@frozen
class Bars:
    """One kind of cost for every element; bars are x, y, width on paper and fill.

    Attributes:
        name: with its unit.
        x: scale of the cost.
        bars: length dark, station light, by element.
    """

    name: str
    x: Axis
    bars: tuple[Bar, ...]


def content(book: Book) -> Content | None:
    """Limits, tolerances, costs and bars; left out where the solver was not asked."""
    found = book.response
    if found is None:
        return None
    elements = [element.id for element in book.arranged.design.elements]
    row_mm = 3.2 if len(elements) > MANY else 5.0
    return {
        "found": found,
        "limits": _limits(book, found),
        "classes": [each for each in tolerance_classes() if _used(found, each.tolerance_mm)],
        "elements": [(element, HEAD_MM + (k + 0.5) * row_mm) for k, element in enumerate(elements)],
        "groups": _bars(found, elements, row_mm),
        "width_mm": WIDTH_MM,
        "height_mm": HEAD_MM + row_mm * len(elements) + FOOT_MM,
        "foot_mm": HEAD_MM + row_mm * len(elements),
        "row_mm": row_mm,
        "shares": [
            ("twice the part common for certain", found.common.certain),
            ("1u, all alike", found.common.once),
            ("2u, all alike", found.common.twice),
        ]
        if found.common
        else [],
    }


def _used(found: Response, tolerance_mm: float) -> bool:
    rows = found.allotment.rows if found.allotment else ()
    return any(tolerance_mm in (row.length_mm, row.station_mm) for row in rows)


def _limits(book: Book, found: Response) -> list[tuple[str, str, float | None, float, float, float]]:
    """Name, unit, limit, then what the model, the drawing and 95 % of builds have."""
    limits, states = book.arranged.design.limits, (found.modelled, found.drawn, found.spread.at_95)
    rows: list[tuple[str, str, float | None, float, float, float]] = [
        ("shift", "kHz", limits.shift_khz, *(abs(state.shift_khz) for state in states)),  # type: ignore[list-item]
        ("loss of gain", "dB", limits.gain_loss_db, *(state.gain_loss_db for state in states)),  # type: ignore[list-item]
    ]
    if found.absolute:
        ratios, swr = [state.front_to_back_db for state in states], [state.mismatch for state in states]
        rows.append(("least front to back", "dB", limits.front_to_back_db, ratios[0], ratios[1], ratios[2]))
        rows.append(("largest mismatch", "SWR", limits.mismatch, swr[0], swr[1], swr[2]))
    return rows


def _bars(found: Response, elements: list[str], row_mm: float) -> list[Bars]:
    third_mm = (WIDTH_MM - LEFT_MM) / 3
    kinds: tuple[tuple[str, Callable[[Sensitivity], float]], ...] = (
        ("shift, kHz", lambda row: abs(row.shift_khz_per_mm)),
        ("gain, worst in band, 0.001 dB", lambda row: 1000 * row.loss_db_per_mm),
        ("back/front field, 0.001", lambda row: 1000 * row.back_front_per_mm),
    )
    groups = []
    for place, (name, cost) in enumerate(kinds):
        costs = [(row, STEP_MM * cost(row)) for row in found.sensitivities]
        start_mm = LEFT_MM + place * third_mm
        x = axis(0.0, max(value for _, value in costs), start_mm, start_mm + third_mm - 7.0, 4)
        groups.append(Bars(name, x, tuple(_bar(row, value, x, elements, row_mm) for row, value in costs)))
    return groups


def _bar(row: Sensitivity, value: float, x: Axis, elements: list[str], row_mm: float) -> Bar:
    place, half_mm = elements.index(row.element), 0.36 * row_mm
    top_mm = HEAD_MM + (place + 0.5) * row_mm - (half_mm if row.quantity == "length" else 0.0)
    fill = "#333" if row.quantity == "length" else "#b5b5b5"
    return (x.start_mm, round(top_mm, 3), round(x.at(value) - x.start_mm, 3), fill)
