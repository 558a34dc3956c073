"""What is sawn from which bar, in sawing order: a drawn bar and a table for each."""

from fabgen.design.arranged import Arranged, Bar, Cut, CutPlan
from fabgen.design.lettering import text_width_mm
from fabgen.draw.flow import LEFT_MM, Column, Flow
from fabgen.draw.words import origin_lines
from fabgen.units import format_mm

_COLUMNS = (
    Column("", 8.0, box=True),
    Column("saw", 10.0),
    Column("piece", 48.0),
    Column("stop", 24.0, "end"),
    Column("with trim", 26.0, "end"),
    Column("centre mark", 30.0, "end"),
    Column("±", 16.0, "end"),
    Column("stands out", 22.0, "end"),
)
_BAR_HIGH_MM = 4.5
_LETTERS_MM = 1.8


def cuts(flow: Flow, arranged: Arranged, plan: CutPlan) -> None:
    """Letter every bar with its pieces.

    Args:
        flow: the pages.
        arranged: for the pieces.
        plan: for the bars.
    """
    shop = arranged.design.shop
    flow.heading("Saw cuts, bar by bar", keep_mm=50.0)
    flow.paragraph(
        f"Trim {shop.end_trim_mm:g} mm off the rough end of every bar; the kerf is {shop.saw_kerf_mm:g} mm. Saw to the "
        "stop length; saw to the length with trim only if the finished array will be measured and its rods shortened. "
        "The centre mark is from either end; rods stand out of the boom equally on both sides."
    )
    for line in origin_lines(arranged.ledger):
        flow.paragraph(line)
    if plan.proven:
        flow.paragraph("Proven: these pieces cannot be had from fewer bars.")
    by_name = {cut.piece: cut for cut in arranged.cuts}
    for bar in plan.bars:
        rows = [_row(by_name[name], count) for count, (name, _) in enumerate(bar.pieces, start=1)]
        flow.heading(f"{bar.name}: {bar.length_mm:g} mm, {bar.left_mm:.1f} mm left", keep_mm=34.0)
        _drawn(flow, bar, shop.end_trim_mm, shop.saw_kerf_mm)
        flow.table(_COLUMNS, rows)
    left_over = [cut for cut in arranged.cuts if not plan.bar_of(cut.piece)]
    if left_over:
        flow.heading("Longer than any bar of this shop", keep_mm=24.0)
        flow.table(_COLUMNS, [_row(cut, count) for count, cut in enumerate(left_over, start=1)])


def _row(cut: Cut, count: int) -> list[str]:
    cells = [
        "",
        f"{count}",
        cut.piece,
        format_mm(cut.cut_mm),
        format_mm(cut.cut_mm + cut.trim_mm) if cut.trim_mm else "",
        format_mm(cut.half_mm) if cut.half_mm else "",
        format_mm(cut.tolerance_mm),
        format_mm(cut.projection_mm) if cut.projection_mm else "",
    ]
    return [*cells, cut.note] if cut.note else cells


def _drawn(flow: Flow, bar: Bar, trim_mm: float, kerf_mm: float) -> None:
    """The bar at the width of the page; its rough end and what is left are crossed out."""
    top = flow.need(_BAR_HIGH_MM + 2.0)
    pen, scale = flow.pen, flow.width_mm / bar.length_mm
    low, high = top - 1.0 - _BAR_HIGH_MM, top - 1.0
    pen.rectangle("frame", LEFT_MM, low, LEFT_MM + flow.width_mm, high)
    x = LEFT_MM + trim_mm * scale
    pen.line("frame", LEFT_MM, low, x, high)
    for name, length_mm in bar.pieces:
        end = x + length_mm * scale
        pen.rectangle("outline", x, low, end, high)
        if text_width_mm(name, _LETTERS_MM) + 1.0 < end - x:
            pen.text((x + end) / 2, (low + high) / 2, name, _LETTERS_MM, anchor="middle", level="middle")
        x = end + kerf_mm * scale
    if bar.left_mm > 0 and x < LEFT_MM + flow.width_mm:
        pen.line("frame", x, low, LEFT_MM + flow.width_mm, high)
