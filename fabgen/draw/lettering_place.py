"""Put lettering where it covers nothing: no hole, no line, no other lettering.

Coordinates are the sheet's, in mm. A place is tried against everything that was drawn before, so what must stay where
it is goes first.
"""

import itertools
import math
from collections import defaultdict
from collections.abc import Iterable, Iterator, Sequence
from typing import NamedTuple

from fabgen.design.drawing import Anchor, Box, Circle, Fill, Item, Line, Point, Text
from fabgen.design.lettering import text_box, text_width_mm
from fabgen.design.overlaps import bounds
from fabgen.design.pen import Pen
from fabgen.draw.clipping import clipped

SMALLEST_MM = 1.8
"""Smallest lettering. Source: ISO 3098-1, nominal sizes (from memory)."""

_CLEAR_MM = 0.45
_LIFT_MM = 0.6
_LEADING = 1.5
_BESIDE_MM = 1.2
_REACHES_MM = (5.0, 9.0, 14.0, 20.0, 28.0)
_BIN_MM, _LONG_MM = 20.0, 120.0


class Spot(NamedTuple):
    """A hole to be lettered.

    Attributes:
        x_mm, y_mm: its centre.
        radius_mm: its radius.
        low_mm, high_mm: lower and upper edge of its wall, which its lettering does not leave.
        left_mm, right_mm: ends of its wall.
    """

    x_mm: float
    y_mm: float
    radius_mm: float
    low_mm: float
    high_mm: float
    left_mm: float
    right_mm: float


class Drawn:
    """What lettering has to keep off, found quickly by its place along x."""

    def __init__(self, items: Iterable[Item]) -> None:
        self._bins: dict[int, list[tuple[Box, Item]]] = defaultdict(list)
        self._long: list[tuple[Box, Item]] = []
        self.add(items)

    def add(self, items: Iterable[Item]) -> None:
        """Add items that were drawn."""
        for item in items:
            box = bounds(item)
            if box[2] - box[0] > _LONG_MM:
                self._long.append((box, item))
            else:
                for k in range(math.floor(box[0] / _BIN_MM), math.floor(box[2] / _BIN_MM) + 1):
                    self._bins[k].append((box, item))

    def is_free(self, box: Box) -> bool:
        """Whether nothing runs through a box."""
        return not any(_touches(box, around, item) for around, item in self._near(box))

    def is_open(self, line: Line) -> bool:
        """Whether a leader crosses no hole, arrow or lettering; it may cross lines."""
        for around, item in self._near(bounds(line)):
            solid = item.layer == "drill" or isinstance(item, Fill | Text)
            if solid and clipped(line, around):
                return False
        return True

    def _near(self, box: Box) -> Iterator[tuple[Box, Item]]:
        yield from self._long
        for k in range(math.floor(box[0] / _BIN_MM), math.floor(box[2] / _BIN_MM) + 1):
            yield from self._bins[k]


def letter_hole(pen: Pen, drawn: Drawn, spot: Spot, above: Sequence[str], below: Sequence[str]) -> bool:
    """Letter a hole on its own wall: beside it, else farther along with a leader.

    Args:
        pen: records the lettering.
        drawn: what it keeps off; what is lettered is added.
        spot: the hole.
        above: what stands above the hole's axis, in order of reading; its words may be put on lines of their own.
        below: what stands below it.

    Returns:
        False when no place was free; nothing is lettered then.
    """
    texts = _beside(drawn, spot, above, below) or _led(drawn, spot, [" ".join(above), " ".join(below)])
    for item in texts:
        pen.items.append(item)
    drawn.add(texts)
    return bool(texts)


def usual_height_mm(room_mm: float) -> float:
    """Height of lettering that suits the room between a wall's centre line and its edge."""
    return next((h for h in (2.5, 2.0) if room_mm >= 1.5 * h + _LIFT_MM + _CLEAR_MM), SMALLEST_MM)


def _beside(drawn: Drawn, spot: Spot, above: Sequence[str], below: Sequence[str]) -> list[Item]:
    """The first free block right or left of the hole."""
    usual = usual_height_mm((spot.high_mm - spot.low_mm) / 2)
    blocks = sorted(itertools.product(_splits(above), _splits(below)), key=lambda pair: len(pair[0]) + len(pair[1]))
    stacks = [[*up, *down] for up, down in blocks]
    nothing: list[str] = []
    blocks += [pair for stack in stacks for pair in ((stack, nothing), (nothing, stack))]
    for (up, down), height_mm in itertools.product(blocks, dict.fromkeys((usual, SMALLEST_MM))):
        for side in (1, -1):
            block = _block(spot, up, down, height_mm, spot.x_mm + side * (spot.radius_mm + _BESIDE_MM), side)
            if _fits(drawn, spot, block):
                return list(block)
    return []


def _splits(words: Sequence[str]) -> list[list[str]]:
    """Words on one line, with the last on a line of its own, and each on its own; shortest block first."""
    one, last, each = [" ".join(words)], [" ".join(words[:-1]), words[-1]], list(words)
    return [one, last, each] if len(words) > 2 else [one, each] if len(words) > 1 else [one]


def _led(drawn: Drawn, spot: Spot, lines: list[str]) -> list[Item]:
    """A block farther along the wall with a leader to the hole's edge."""
    for height_mm in (usual_height_mm((spot.high_mm - spot.low_mm) / 2), SMALLEST_MM):
        for reach_mm in _REACHES_MM:
            for side in (1, -1):
                for up, down in ((lines, []), ([], lines)):
                    x_mm = spot.x_mm + side * (spot.radius_mm + reach_mm)
                    block = _block(spot, up, down, height_mm, x_mm, side)
                    if not _fits(drawn, spot, block):
                        continue
                    middle = (text_box(block[0])[3] + text_box(block[-1])[1]) / 2
                    turn = math.atan2(middle - spot.y_mm, x_mm - side * 0.6 - spot.x_mm)
                    start = (spot.radius_mm + 0.05) * math.cos(turn), (spot.radius_mm + 0.05) * math.sin(turn)
                    leader = Line("dim", spot.x_mm + start[0], spot.y_mm + start[1], x_mm - side * 0.6, middle)
                    if drawn.is_open(leader):
                        return [*block, leader]
    return []


def _block(spot: Spot, up: list[str], down: list[str], height_mm: float, x_mm: float, side: int) -> list[Text]:
    """Lines above and below the hole's axis, from the top down, starting or ending at x."""
    anchor: Anchor = "start" if side > 0 else "end"
    pitch = height_mm * _LEADING
    depth = -text_box(Text("text", 0.0, 0.0, up[-1], height_mm))[1] if up else 0.0
    tops = [spot.y_mm + _LIFT_MM + depth + pitch * (len(up) - 1 - k) for k in range(len(up))]
    bottoms = [spot.y_mm - _LIFT_MM - 1.06 * height_mm - pitch * k for k in range(len(down))]
    return [
        Text("text", x_mm, y, line, height_mm, anchor)
        for y, line in zip([*tops, *bottoms], [*up, *down], strict=True)
        if line
    ]


def _fits(drawn: Drawn, spot: Spot, block: list[Text]) -> bool:
    boxes = [text_box(text) for text in block]
    if any(box[1] < spot.low_mm or box[3] > spot.high_mm for box in boxes):
        return False
    if any(box[0] < spot.left_mm or box[2] > spot.right_mm for box in boxes):
        return False
    return all(drawn.is_free(_grown(box)) for box in boxes)


def free_place(drawn: Drawn, width_mm: float, height_mm: float, wanted_mm: Iterable[Point]) -> Box | None:
    """The first of some places (lower left corners) at which a box of that size covers nothing; None without one."""
    for x, y in wanted_mm:
        box = (x, y, x + width_mm, y + height_mm)
        if drawn.is_free(_grown(box)):
            return box
    return None


def mark_hole(pen: Pen, drawn: Drawn, spot: Spot, number: str) -> bool:
    """Letter a hole's number alone, as small as lettering may be; False when even that finds no place."""
    width = text_width_mm(number, SMALLEST_MM)
    for drop in (_LIFT_MM, -_LIFT_MM - SMALLEST_MM):
        for aside in (spot.radius_mm + 0.8, -spot.radius_mm - 0.8 - width):
            text = Text("text", spot.x_mm + aside, spot.y_mm + drop, number, SMALLEST_MM)
            if _fits(drawn, spot, [text]):
                pen.items.append(text)
                drawn.add([text])
                return True
    return False


def _grown(box: Box) -> Box:
    return (box[0] - _CLEAR_MM, box[1] - _CLEAR_MM, box[2] + _CLEAR_MM, box[3] + _CLEAR_MM)


def _touches(box: Box, around: Box, item: Item) -> bool:
    if box[0] > around[2] or around[0] > box[2] or box[1] > around[3] or around[1] > box[3]:
        return False
    if isinstance(item, Circle) and item.layer == "drill":
        dx = max(box[0] - item.x_mm, 0.0, item.x_mm - box[2])
        dy = max(box[1] - item.y_mm, 0.0, item.y_mm - box[3])
        return math.hypot(dx, dy) < item.radius_mm
    if item.layer == "drill" or isinstance(item, Fill | Text):
        return True
    return bool(clipped(item, box))
