"""The pen that records a sheet: lines, lettering, dimensions and the 100 mm bar.

Coordinates are the sheet's: origin lower left, x right, y up, mm at 1:1. The pen only adds items; `Pen.sheet` freezes
them. Dimensioning follows ISO 129-1: narrow lines, filled arrow heads, values readable from below or from the right.
"""

import math
from collections.abc import Iterable, Sequence
from typing import Literal

from fabgen.design.drawing import Anchor, Arc, Circle, Fill, Item, Layer, Line, Point, Polyline, Sheet, Text
from fabgen.design.lettering import text_width_mm

LETTERING_MM = 2.5
"""Usual height of capitals. Source: ISO 3098-1, nominal sizes 1.8, 2.5, 3.5, 5, 7, 10, 14, 20 mm (from memory)."""

_ARROW_MM, _ARROW_HALF_DEG = 2.5, 10.0
_GAP_MM, _BEYOND_MM = 1.0, 1.5
_LINE_PITCH = 1.5
_JOG_MM = 1.5, 4.5
_TICK_MM, _END_TICK_MM = 1.2, 2.0


class Pen:
    """Records items in drawing order."""

    def __init__(self) -> None:
        self.items: list[Item] = []

    def sheet(
        self,
        name: str,
        title: str,
        width_mm: float,
        height_mm: float,
        station_at_x0_mm: float | None = None,
    ) -> Sheet:
        """Freeze what was drawn.

        Args:
            name: ASCII stem of the file.
            title: one line for people.
            width_mm: of the sheet.
            height_mm: of the sheet.
            station_at_x0_mm: boom station at the left edge when x runs along the boom.
        """
        return Sheet(name, title, width_mm, height_mm, tuple(self.items), station_at_x0_mm)

    def add(self, items: Iterable[Item]) -> None:
        """Add items that are already recorded."""
        self.items.extend(items)

    def line(self, layer: Layer, x0_mm: float, y0_mm: float, x1_mm: float, y1_mm: float) -> None:
        """A straight line; dashes start at the first point."""
        self.items.append(Line(layer, x0_mm, y0_mm, x1_mm, y1_mm))

    def polyline(self, layer: Layer, points_mm: Sequence[Point], *, closed: bool = False) -> None:
        """Straight lines through points; points in mm."""
        self.items.append(Polyline(layer, tuple(points_mm), closed))

    def rectangle(self, layer: Layer, x0_mm: float, y0_mm: float, x1_mm: float, y1_mm: float) -> None:
        """An upright rectangle between two opposite corners."""
        corners = ((x0_mm, y0_mm), (x1_mm, y0_mm), (x1_mm, y1_mm), (x0_mm, y1_mm))
        self.items.append(Polyline(layer, corners, closed=True))

    def circle(self, layer: Layer, x_mm: float, y_mm: float, radius_mm: float) -> None:
        """A full circle."""
        self.items.append(Circle(layer, x_mm, y_mm, radius_mm))

    def arc(
        self, layer: Layer, x_mm: float, y_mm: float, radius_mm: float, *, start_deg: float, end_deg: float
    ) -> None:
        """A counter-clockwise arc; angles from the x axis."""
        end_deg = start_deg + (end_deg - start_deg) % 360
        self.items.append(Arc(layer, x_mm, y_mm, radius_mm, start_deg, end_deg))

    def fill(self, layer: Layer, points_mm: Sequence[Point]) -> None:
        """A filled polygon; points in mm."""
        self.items.append(Fill(layer, tuple(points_mm)))

    def dot(self, x_mm: float, y_mm: float, diameter_mm: float, layer: Layer = "drill") -> None:
        """A filled dot, drawn as a regular polygon of 24 corners on the diameter."""
        angles = [math.tau * k / 24 for k in range(24)]
        r = diameter_mm / 2
        self.fill(layer, [(x_mm + r * math.cos(a), y_mm + r * math.sin(a)) for a in angles])

    def cross(self, x_mm: float, y_mm: float, reach_mm: float, layer: Layer = "centre", angle_deg: float = 0.0) -> None:
        """A centre cross of four arms drawn from the centre, so that dashes always cross in ink.

        Args:
            x_mm: centre.
            y_mm: centre.
            reach_mm: length of each arm.
            layer: where the arms go.
            angle_deg: direction of the first arm.
        """
        for quarter in range(4):
            u, v = _direction(angle_deg + 90 * quarter)
            self.line(layer, x_mm, y_mm, x_mm + reach_mm * u, y_mm + reach_mm * v)

    def text(
        self,
        x_mm: float,
        y_mm: float,
        text: str,
        height_mm: float = LETTERING_MM,
        *,
        anchor: Anchor = "start",
        angle_deg: float = 0.0,
        level: Literal["baseline", "middle", "top"] = "baseline",
        layer: Layer = "text",
    ) -> Text:
        """One line of lettering.

        Args:
            x_mm: anchor.
            y_mm: anchor.
            text: what is lettered, taken as written.
            height_mm: height of capitals.
            anchor: which end, or the middle, of the line stands at the anchor.
            angle_deg: direction of reading.
            level: what of a capital's height stands at the anchor.
            layer: the layer.

        Returns:
            The recorded item, for a look at its box.
        """
        drop_mm = {"baseline": 0.0, "middle": height_mm / 2, "top": height_mm}[level]
        u, v = _direction(angle_deg + 90)
        item = Text(layer, x_mm - u * drop_mm, y_mm - v * drop_mm, text, height_mm, anchor, angle_deg)
        self.items.append(item)
        return item

    def arrow(
        self, x_mm: float, y_mm: float, direction_deg: float, length_mm: float = _ARROW_MM, layer: Layer = "dim"
    ) -> None:
        """A filled arrow head of 20° with its tip at a point.

        Args:
            x_mm: tip.
            y_mm: tip.
            direction_deg: where it points.
            length_mm: from base to tip.
            layer: the layer.
        """
        reach_mm = length_mm / math.cos(math.radians(_ARROW_HALF_DEG))
        corners = [(x_mm, y_mm)]
        for turn in (180 - _ARROW_HALF_DEG, 180 + _ARROW_HALF_DEG):
            u, v = _direction(direction_deg + turn)
            corners.append((x_mm + reach_mm * u, y_mm + reach_mm * v))
        self.fill(layer, corners)

    def dimension(
        self,
        x0_mm: float,
        y0_mm: float,
        x1_mm: float,
        y1_mm: float,
        text: str,
        *,
        offset_mm: float,
        height_mm: float = LETTERING_MM,
    ) -> None:
        """A linear dimension between two points, parallel to their connection.

        Arrows and value go outside where they find no room between the extension lines.

        Args:
            x0_mm: first point.
            y0_mm: first point.
            x1_mm: second point.
            y1_mm: second point.
            text: the value.
            offset_mm: dimension line from the points, positive to the left looking from the first to the second.
            height_mm: height of capitals.
        """
        angle_deg = math.degrees(math.atan2(y1_mm - y0_mm, x1_mm - x0_mm))
        length_mm = math.hypot(x1_mm - x0_mm, y1_mm - y0_mm)
        (u, v), (p, q) = _direction(angle_deg), _direction(angle_deg + 90)
        x0_mm, y0_mm, x1_mm, y1_mm = (
            x0_mm + offset_mm * p,
            y0_mm + offset_mm * q,
            x1_mm + offset_mm * p,
            y1_mm + offset_mm * q,
        )
        side = math.copysign(1.0, offset_mm)
        for x, y in ((x0_mm, y0_mm), (x1_mm, y1_mm)):
            near_mm, far_mm = side * _GAP_MM - offset_mm, side * _BEYOND_MM
            self.line("dim", x + near_mm * p, y + near_mm * q, x + far_mm * p, y + far_mm * q)
        inside = length_mm >= 2 * _ARROW_MM + 1
        tail_mm = 0.0 if inside else 2 * _ARROW_MM
        width_mm = text_width_mm(text, height_mm)
        above = inside and length_mm >= width_mm + 2 * _ARROW_MM
        end_mm = tail_mm if above else max(tail_mm, _ARROW_MM) + width_mm + 1
        self.line("dim", x0_mm - tail_mm * u, y0_mm - tail_mm * v, x1_mm + end_mm * u, y1_mm + end_mm * v)
        self.arrow(x0_mm, y0_mm, angle_deg + (180 if inside else 0))
        self.arrow(x1_mm, y1_mm, angle_deg + (0 if inside else 180))
        middle_mm = length_mm / 2 if above else length_mm + end_mm - width_mm / 2 - 0.5
        upside_down = not -90 < angle_deg <= 90
        lift_mm = -_GAP_MM if upside_down else _GAP_MM
        x, y = x0_mm + middle_mm * u + lift_mm * p, y0_mm + middle_mm * v + lift_mm * q
        reading_deg = angle_deg + (180 if upside_down else 0)
        self.text(x, y, text, height_mm, anchor="middle", angle_deg=reading_deg, layer="dim")

    def running(
        self,
        values: Sequence[tuple[float, str]],
        *,
        origin_x_mm: float,
        from_y_mm: float,
        line_y_mm: float,
        height_mm: float = LETTERING_MM,
    ) -> float:
        """Superimposed running dimensions along x from one origin, values upright beyond the dimension line.

        Values that stand too close are spread and led to their extension lines by a jog; nothing is left out.

        Args:
            values: x coordinate in mm on the sheet and the value to letter, in any order.
            origin_x_mm: where the dimensions start, marked by the origin circle.
            from_y_mm: where the extension lines start, at the object.
            line_y_mm: the dimension line, above or below the object.
            height_mm: height of capitals.

        Returns:
            How far the lettering reaches in y.

        Source: ISO 129-1, superimposed running dimensioning: origin circle, one arrow head per value.
        """
        values = sorted(values)
        up = math.copysign(1.0, line_y_mm - from_y_mm)
        start_y, jog_y = line_y_mm + up * _JOG_MM[0], line_y_mm + up * _JOG_MM[1]
        text_y = jog_y + up * _GAP_MM
        xs = [x for x, _ in values]
        self.circle("dim", origin_x_mm, line_y_mm, 1.25)
        for end in (min(xs), max(xs)):
            if abs(end - origin_x_mm) <= 1.25:
                continue
            near = origin_x_mm + math.copysign(1.25, end - origin_x_mm)
            self.line("dim", near, line_y_mm, end, line_y_mm)
        for (x, value), slot in zip(values, spread(xs, height_mm * _LINE_PITCH), strict=True):
            self.polyline("dim", [(x, from_y_mm + up * _GAP_MM), (x, start_y), (slot, jog_y)])
            if abs(x - origin_x_mm) > _ARROW_MM:
                self.arrow(x, line_y_mm, 0 if x > origin_x_mm else 180)
            anchor: Anchor = "start" if up > 0 else "end"
            self.text(slot, text_y, value, height_mm, anchor=anchor, angle_deg=90, level="middle", layer="dim")
        return text_y + up * max(text_width_mm(value, height_mm) for _, value in values)

    def bar_100(self, x_mm: float, y_mm: float, *, up: bool = False, label: str = "100 mm") -> None:
        """A bar of exactly 100 mm with end ticks and a tick every 10 mm, to be measured before anything is drilled.

        It reaches 2 mm to each side of its line, and its label 4.5 mm to the left of it, looking along it.

        Args:
            x_mm: start.
            y_mm: start.
            up: run upwards instead of to the right.
            label: lettered at its middle.
        """
        u, v = (0.0, 1.0) if up else (1.0, 0.0)
        self.line("scale", x_mm, y_mm, x_mm + 100 * u, y_mm + 100 * v)
        for along_mm in range(0, 101, 10):
            left, right = (_END_TICK_MM, _END_TICK_MM) if along_mm in (0, 100) else (0.0, _TICK_MM)
            x, y = x_mm + along_mm * u, y_mm + along_mm * v
            self.line("scale", x - left * v, y + left * u, x + right * v, y - right * u)
        x, y = x_mm + 50 * u - v, y_mm + 50 * v + u
        self.text(x, y, label, anchor="middle", angle_deg=90 if up else 0, layer="scale")


def spread(wanted_mm: Sequence[float], pitch_mm: float) -> list[float]:
    """Places at least one pitch apart that are as near as possible to the wanted ones.

    Args:
        wanted_mm: places in rising order.
        pitch_mm: least distance of neighbours.

    Returns:
        Places in the same order; the sum of squared shifts is the smallest (pooled adjacent groups).
    """
    groups: list[tuple[float, int]] = []
    for i, place in enumerate(wanted_mm):
        mean, count = place - i * pitch_mm, 1
        while groups and groups[-1][0] >= mean:
            other_mean, other_count = groups.pop()
            mean = (mean * count + other_mean * other_count) / (count + other_count)
            count += other_count
        groups.append((mean, count))
    bases = [mean for mean, count in groups for _ in range(count)]
    return [base + i * pitch_mm for i, base in enumerate(bases)]


def _direction(angle_deg: float) -> tuple[float, float]:
    """Unit vector of an angle, exact for quarter turns."""
    quarter, rest = divmod(angle_deg, 90)
    if rest == 0:
        return ((1.0, 0.0), (0.0, 1.0), (-1.0, 0.0), (0.0, -1.0))[int(quarter) % 4]
    return (math.cos(math.radians(angle_deg)), math.sin(math.radians(angle_deg)))
