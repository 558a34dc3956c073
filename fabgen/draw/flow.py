"""Pages of lettering: headings, paragraphs, tick lists and tables that run on from page to page.

Frame of a page: origin lower left, x right, y up, mm. A table that does not fit goes on under its repeated head.
"""

from collections.abc import Callable, Sequence

from fabgen.design.drawing import Anchor, Sheet
from fabgen.design.lettering import shortened, text_width_mm
from fabgen.design.pen import LETTERING_MM, Pen
from fabgen.frozen import frozen

LEFT_MM, RIGHT_MM, TOP_MM, FOOT_MM = 15.0, 10.0, 10.0, 18.0
_HEADING_MM = 3.5
_LEADING_MM = 4.2
_ROW_MM = 4.8
_GAP_MM = 2.4
_BOX_MM = 2.8
_NOTE_MM = 8.0


@frozen
class Column:
    """One column of a table.

    Attributes:
        title: over it.
        width_mm: of it.
        anchor: where its cells stand.
        box: an empty box to tick instead of words.
    """

    title: str
    width_mm: float
    anchor: Anchor = "start"
    box: bool = False


class Flow:
    """Pages that fill from the top down."""

    def __init__(self, paper_mm: tuple[float, float]) -> None:
        self.paper_mm = paper_mm
        self._pens: list[Pen] = []
        self._turn()

    @property
    def pen(self) -> Pen:
        """The pen of the page being filled."""
        return self._pens[-1]

    @property
    def width_mm(self) -> float:
        """Room for a line."""
        return self.paper_mm[0] - LEFT_MM - RIGHT_MM

    def need(self, height_mm: float) -> float:
        """Take some height, on a new page when this one has not enough; returns its upper edge."""
        if self.y_mm - height_mm < FOOT_MM:
            self._turn()
        top = self.y_mm
        self.y_mm -= height_mm
        return top

    def heading(self, words: str, *, keep_mm: float = 20.0) -> None:
        """A heading that stays on one page with at least some height of what follows it."""
        if self.y_mm - keep_mm < FOOT_MM:
            self._turn()
        top = self.need(_HEADING_MM + 5.5)
        self.pen.text(LEFT_MM, top - 3.0 - _HEADING_MM, shortened(words, _HEADING_MM, self.width_mm), _HEADING_MM)

    def paragraph(self, words: str, *, indent_mm: float = 0.0, box: bool = False) -> None:
        """Lines of lettering, with a box to tick before the first when asked for."""
        indent_mm += _BOX_MM + 2.0 if box else 0.0
        for count, line in enumerate(wrapped(words, LETTERING_MM, self.width_mm - indent_mm)):
            base = self.need(_LEADING_MM) - LETTERING_MM - 0.6
            self.pen.text(LEFT_MM + indent_mm, base, line)
            if box and count == 0:
                left = LEFT_MM + indent_mm - _BOX_MM - 2.0
                self.pen.rectangle("frame", left, base - 0.1, left + _BOX_MM, base - 0.1 + _BOX_MM)
        self.y_mm -= 0.6

    def table(self, columns: Sequence[Column], rows: Sequence[Sequence[str]]) -> None:
        """A table; a cell too long is shortened, a cell beyond the last column is a note on lines of its own."""
        if self.y_mm - 3 * _ROW_MM < FOOT_MM:
            self._turn()
        self._row(columns, [column.title for column in columns], head=True)
        for row in rows:
            notes = wrapped(row[len(columns)], LETTERING_MM, self.width_mm - _NOTE_MM) if row[len(columns) :] else []
            if self.y_mm - (1 + len(notes)) * _ROW_MM < FOOT_MM:
                self._turn()
                self._row(columns, [column.title for column in columns], head=True)
            self._row(columns, row[: len(columns)], notes)
        self.y_mm -= 1.0

    def sheets(self, name: str, title: str, foot: Callable[[Pen, int, int], None]) -> list[Sheet]:
        """Freeze the pages; the foot is drawn by a function of pen, page number and number of pages."""
        for number, pen in enumerate(self._pens, start=1):
            foot(pen, number, len(self._pens))
        return [pen.sheet(f"{name}-{k}", title, *self.paper_mm) for k, pen in enumerate(self._pens, start=1)]

    def _turn(self) -> None:
        self._pens.append(Pen())
        self.y_mm = self.paper_mm[1] - TOP_MM

    def _row(
        self, columns: Sequence[Column], cells: Sequence[str], notes: Sequence[str] = (), *, head: bool = False
    ) -> None:
        top, x = self.need(_ROW_MM), LEFT_MM
        base = top - LETTERING_MM - 1.0
        for column, cell in zip(columns, cells, strict=True):
            if column.box and not head:
                left = x + (column.width_mm - _BOX_MM) / 2
                self.pen.rectangle("frame", left, base - 0.2, left + _BOX_MM, base - 0.2 + _BOX_MM)
            else:
                words = shortened(cell, LETTERING_MM, column.width_mm - _GAP_MM / 2)
                at = {"start": x, "middle": x + column.width_mm / 2, "end": x + column.width_mm - _GAP_MM}
                self.pen.text(at[column.anchor], base, words, anchor=column.anchor)
            x += column.width_mm
        for note in notes:
            self.pen.text(LEFT_MM + _NOTE_MM, self.need(_ROW_MM) - LETTERING_MM - 1.0, note)
        self.pen.line("outline" if head else "frame", LEFT_MM, self.y_mm, x, self.y_mm)


def wrapped(words: str, height_mm: float, width_mm: float) -> list[str]:
    """Lines of at most a width; a word longer than that is shortened.

    Args:
        words: text of any length.
        height_mm: height of capitals.
        width_mm: room along the baseline.
    """
    lines: list[str] = []
    for word in words.split():
        longer = f"{lines[-1]} {word}" if lines else word
        if lines and text_width_mm(longer, height_mm) <= width_mm:
            lines[-1] = longer
        else:
            lines.append(shortened(word, height_mm, width_mm))
    return lines
