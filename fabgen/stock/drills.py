"""Twist drills in metric and inch sizes."""

import functools
from typing import Literal

from fabgen.frozen import frozen
from fabgen.stock.read_csv import UnknownStockError, rows
from fabgen.units import in_to_mm

DrillSeries = Literal["metric", "inch", "both"]

_TINY_MM = 1e-6


@frozen
class Drill:
    """A twist drill: its name in the trade and its diameter."""

    name: str
    diameter_mm: float
    series: Literal["metric", "inch"]
    source: str


@functools.cache
def drills(series: DrillSeries) -> tuple[Drill, ...]:
    """The drills of a series by growing diameter; of two with one diameter the metric or the fraction is first."""
    found: list[Drill] = []
    if series in ("metric", "both"):
        found += [Drill(r["name"], float(r["bs328_mm"]), "metric", r["source"]) for r in rows("drills_metric")]
    if series in ("inch", "both"):
        found += [
            Drill(r["name"], round(in_to_mm(float(r["b94_11m_in"])), 6), "inch", r["source"])
            for r in rows("drills_inch")
        ]
    if not found:
        raise UnknownStockError("drill series", series, ("metric", "inch", "both"))
    return tuple(sorted(found, key=lambda drill: drill.diameter_mm))


def nearest_drill(diameter_mm: float, series: DrillSeries) -> Drill:
    """The drill nearest to a diameter; of two equally near the smaller."""
    return min(drills(series), key=lambda drill: abs(drill.diameter_mm - diameter_mm))


def smallest_drill_at_least(diameter_mm: float, series: DrillSeries) -> Drill | None:
    """The smallest drill not below a diameter, or None above the largest of the series."""
    return next((drill for drill in drills(series) if drill.diameter_mm >= diameter_mm - _TINY_MM), None)
