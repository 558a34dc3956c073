"""Axes and bars: round numbers for ticks, millimetres of paper for quantities."""

import math

from fabgen.frozen import frozen


@frozen
class Axis:
    """A straight scale from one quantity to places on paper.

    Attributes:
        low, high: ends of the axis in the quantity's own unit; ticks stand on both.
        start_mm, end_mm: where they stand on paper.
        marks: round numbers from low to high as printed, and where they stand.
    """

    low: float
    high: float
    start_mm: float
    end_mm: float
    marks: tuple[tuple[str, float], ...]

    def at(self, quantity: float) -> float:
        """Place on paper in mm."""
        return _between(quantity, self.low, self.high, self.start_mm, self.end_mm)


def axis(low: float, high: float, start_mm: float, end_mm: float, most_count: int = 8) -> Axis:
    """An axis that holds a range and begins and ends on a round number.

    Args:
        low: smallest quantity to show.
        high: largest.
        start_mm: paper place of the axis' lower end.
        end_mm: of its upper end.
        most_count: steps, at most one more.
    """
    room = high - low or max(abs(high), 1.0)
    power = 10.0 ** math.floor(math.log10(room / most_count))
    step = next(k * power for k in (1, 2, 5, 10) if room / (k * power) <= most_count)
    first, last = math.floor(low / step + 1e-9), math.ceil(high / step - 1e-9)
    last = max(last, first + 1)
    ticks = [round(k * step, 9) + 0.0 for k in range(first, last + 1)]
    marks = tuple((f"{tick:g}", _between(tick, ticks[0], ticks[-1], start_mm, end_mm)) for tick in ticks)
    return Axis(ticks[0], ticks[-1], start_mm, end_mm, marks)


def _between(quantity: float, low: float, high: float, start_mm: float, end_mm: float) -> float:
    return round(start_mm + (quantity - low) / (high - low) * (end_mm - start_mm), 3)
