"""Put a hole's lettering where it covers nothing: the nearest free place out of a fixed list."""

from collections.abc import Sequence
from dataclasses import dataclass

from fabgen.design.drawing import Anchor, Box, Fill, Item, Text
from fabgen.design.lettering import text_width_mm
from fabgen.design.overlaps import bounds
from fabgen.design.pen import Pen

_CLEAR_MM = 0.6
_HEIGHTS_MM = (2.0, 1.8)
_LEADING = 1.45
_REACHES_MM = (1.5, 6.0, 14.0, 26.0, 40.0, 60.0)


@dataclass(slots=True)
class FreePlaces:
    """Boxes that lettering has to keep off, and the room it has to stay in."""

    room: Box
    taken: list[Box]

    def keep_off(self, items: Sequence[Item]) -> None:
        """Add the boxes of holes, arrows and texts."""
        self.taken += [bounds(item) for item in items if item.layer == "drill" or isinstance(item, Fill | Text)]

    def letter(self, pen: Pen, lines: Sequence[str], x_mm: float, y_mm: float, radius_mm: float) -> bool:
        """Letter some lines beside a hole, with a leader where they stand away from it.

        Args:
            pen: records them.
            lines: from the top down.
            x_mm: the hole's centre.
            y_mm: the hole's centre.
            radius_mm: of the hole.

        Returns:
            False when no place was free; nothing is lettered then.
        """
        for height_mm in _HEIGHTS_MM:
            width_mm = max(text_width_mm(line, height_mm) for line in lines)
            block_mm = height_mm * (1 + _LEADING * (len(lines) - 1))
            for reach_mm in _REACHES_MM:
                for side in (1, -1):
                    for lift_mm in (0.0, radius_mm + block_mm / 2 + 1.0, -radius_mm - block_mm / 2 - 1.0):
                        near = x_mm + side * (radius_mm + reach_mm)
                        x0 = near if side > 0 else near - width_mm
                        y0 = y_mm + lift_mm - block_mm / 2
                        box = (
                            x0 - _CLEAR_MM,
                            y0 - 0.4 * height_mm,
                            x0 + width_mm + _CLEAR_MM,
                            y0 + block_mm + _CLEAR_MM,
                        )
                        if not self._free(box):
                            continue
                        anchor: Anchor = "start" if side > 0 else "end"
                        for count, line in enumerate(lines):
                            level = y0 + block_mm - height_mm - count * height_mm * _LEADING
                            pen.text(near, level, line, height_mm, anchor=anchor)
                        if reach_mm > _REACHES_MM[0]:
                            end = near - side * 0.8
                            pen.line("dim", x_mm + side * radius_mm, y_mm, end, y0 + block_mm / 2)
                        self.taken.append(box)
                        return True
        return False

    def _free(self, box: Box) -> bool:
        x0, y0, x1, y1 = box
        left, low, right, high = self.room
        if x0 < left or x1 > right or y0 < low or y1 > high:
            return False
        return all(x1 <= a or x0 >= c or y1 <= b or y0 >= d for a, b, c, d in self.taken)
