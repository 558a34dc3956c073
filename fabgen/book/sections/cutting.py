"""Cut plan: every bar drawn with its pieces, and the list of pieces."""

from fabgen.book.book import Book, Content
from fabgen.design.arranged import Bar, Cut
from fabgen.design.lettering import CAP_EM, text_width_mm
from fabgen.frozen import frozen
from fabgen.units import format_mm

PLACE = 60
SHOWS_LENGTHS = True
WIDTH_MM = 178.0
HEIGHT_MM = 13.0
LETTERS_MM, SMALL_MM = 2.0, 1.7
NAME_MM = 1.15 * LETTERS_MM
"""The name is bold and wider than its letters are reckoned."""
PITCH_MM = 2.7
NARROW_MM = 0.25


@frozen
class Band:
    """One stretch of a drawn bar.

    Attributes:
        kind: `end` (trimmed off), `piece`, `kerf` or `left`.
        x_mm, width_mm: on paper.
        lines: lettering, one above the other; upright ones read from below.
        upright: whether the lettering only fits turned.
    """

    kind: str
    x_mm: float
    width_mm: float
    lines: tuple[str, ...] = ()
    upright: bool = False


@frozen
class DrawnBar:
    """One bar over the page's width.

    Attributes:
        bar: the bar.
        bands: its stretches from the trimmed end.
        scale_ratio: bar length over paper length.
    """

    bar: Bar
    bands: tuple[Band, ...]
    scale_ratio: float


def drawn(bar: Bar, cuts: dict[str, Cut], *, end_trim_mm: float, kerf_mm: float) -> DrawnBar:
    """Lay one bar out on paper.

    Args:
        bar: the bar of the plan.
        cuts: the pieces by name.
        end_trim_mm: sawn off the rough end.
        kerf_mm: width of a saw cut.
    """
    scale_ratio = bar.length_mm / WIDTH_MM
    bands: list[Band] = []
    reached_mm = 0.0

    def add(kind: str, length_mm: float, lines: tuple[str, ...] = (), *, upright: bool = False) -> None:
        nonlocal reached_mm
        length_mm = min(length_mm, bar.length_mm - reached_mm)
        if length_mm > 0:
            x_mm, width_mm = reached_mm / scale_ratio, length_mm / scale_ratio
            bands.append(Band(kind, round(x_mm, 3), round(width_mm, 3), lines, upright))
        reached_mm += length_mm

    add("end", end_trim_mm)
    for name, sawn_mm in bar.pieces:
        cut = cuts[name]
        trim = (f"+ {_plain(cut.trim_mm)}",) if cut.trim_mm else ()
        lines, upright = _lettering(name, (_plain(cut.cut_mm), *trim), sawn_mm / scale_ratio)
        add("piece", sawn_mm, lines, upright=upright)
        add("kerf", kerf_mm)
    left = f"left {_plain(bar.left_mm)}"
    add("left", bar.left_mm, (left,) if text_width_mm(left, SMALL_MM) < bar.left_mm / scale_ratio - 1 else ())
    return DrawnBar(bar, tuple(bands), scale_ratio)


def content(book: Book) -> Content:
    """Drawn bars, the pieces with their bars, and pieces that fit no bar."""
    arranged, plan = book.arranged, book.cut_plan
    shop = arranged.design.shop
    cuts = {cut.piece: cut for cut in arranged.cuts}
    return {
        "bars": [drawn(bar, cuts, end_trim_mm=shop.end_trim_mm, kerf_mm=shop.saw_kerf_mm) for bar in plan.bars],
        "pieces": [(cut, plan.bar_of(cut.piece)) for cut in arranged.cuts],
        "homeless": [cut.piece for cut in arranged.cuts if not plan.bar_of(cut.piece)],
        "font_mm": {"large": round(LETTERS_MM / CAP_EM, 3), "small": round(SMALL_MM / CAP_EM, 3)},
        "narrow_mm": NARROW_MM,
    }


def _plain(length_mm: float) -> str:
    """A length without trailing zeros."""
    return format_mm(length_mm).rstrip("0").rstrip(".")


def _lettering(name: str, lengths: tuple[str, ...], width_mm: float) -> tuple[tuple[str, ...], bool]:
    """Name, length and trim in as few lines as fit across the piece, else turned, else the name, else nothing."""
    fullest = ((name, " ".join(lengths)), (name, *lengths))
    for upright, along_mm, across_mm in ((False, width_mm, HEIGHT_MM), (True, HEIGHT_MM, width_mm)):
        for lines in fullest if not upright else (*fullest, (name,)):
            longest_mm = max(text_width_mm(line, SMALL_MM if place else NAME_MM) for place, line in enumerate(lines))
            if longest_mm <= along_mm - 1.0 and PITCH_MM * len(lines) <= across_mm:
                return lines, upright
    return (), False
