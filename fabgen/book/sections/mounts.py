"""What is in print for each mount, beside what this design uses: values, ranges, sources, and their spread."""

from fabgen.book.book import Book, Content
from fabgen.design.design import Design, Mount
from fabgen.design.ledger import LedgerLine
from fabgen.design.scale import Axis, axis
from fabgen.frozen import frozen
from fabgen.physics.half_wave import shift_khz

PLACE = 55
SHOWS_LENGTHS = True
WIDTH_MM, LEFT_MM, ROW_MM, HEAD_MM, FOOT_MM = 178.0, 16.0, 4.6, 4.2, 9.0


@frozen
class Printed:
    """One published statement over all rods of a mount.

    Attributes:
        model: its name.
        low_mm, high_mm: smallest and largest value over these rods.
        valid: whether every rod lies inside the range that it states.
        is_bound: it bounds the value and cannot be chosen.
        range_text: that range.
        source: citation.
    """

    model: str
    low_mm: float
    high_mm: float
    valid: bool
    is_bound: bool
    range_text: str
    source: str


@frozen
class MountSpread:
    """One mount with its rods and everything in print for it.

    Attributes:
        mount: as designed.
        lines: the ledger's lines of its rods.
        printed: the published statements.
        axis: allowance in mm to place on paper.
        drift_mm_khz: what a bonded joint loses when it turns into an insulated one, in mm of rod and kHz of a half-wave
            rod of the mean length; None where the curve says nothing.
    """

    mount: Mount
    lines: tuple[LedgerLine, ...]
    printed: tuple[Printed, ...]
    axis: Axis
    drift_mm_khz: tuple[float, float] | None

    @property
    def low_mm(self) -> float:
        """Smallest published value."""
        return min(value.low_mm for value in self.printed)

    @property
    def high_mm(self) -> float:
        """Largest published value."""
        return max(value.high_mm for value in self.printed)

    @property
    def used_mm(self) -> tuple[float, float]:
        """Smallest and largest allowance that the ledger adds to these rods."""
        used = [line.allowance.value_mm for line in self.lines]
        return min(used), max(used)

    @property
    def top_mm(self) -> float:
        """Paper height above the first rod."""
        return HEAD_MM * len(self.printed) + 2.0

    @property
    def height_mm(self) -> float:
        """Paper height of the picture."""
        return self.top_mm + ROW_MM * len(self.lines) + FOOT_MM


def spreads(book: Book) -> tuple[MountSpread, ...]:
    """Every mount that something is in print for, in order of its first rod."""
    design, ledger = book.arranged.design, book.arranged.ledger
    rods: dict[str, tuple[Mount, list[LedgerLine]]] = {}
    for element in design.elements:
        line = ledger.line(element.id)
        if element.mount is not None and line.allowance.published:
            rods.setdefault(element.mount.name, (element.mount, []))[1].append(line)
    return tuple(_spread(mount, lines, design) for mount, lines in rods.values())


def content(book: Book) -> Content | None:
    """The mounts; left out when nothing is in print for any of them."""
    found = spreads(book)
    return {"spreads": found, "width_mm": WIDTH_MM, "row_mm": ROW_MM, "head_mm": HEAD_MM} if found else None


def _spread(mount: Mount, lines: list[LedgerLine], design: Design) -> MountSpread:
    printed: dict[str, Printed] = {}
    for line in lines:
        for value in line.allowance.published:
            old = printed.get(value.model)
            printed[value.model] = Printed(
                value.model,
                min(value.value_mm, old.low_mm if old else value.value_mm),
                max(value.value_mm, old.high_mm if old else value.value_mm),
                value.valid and (old is None or old.valid),
                value.is_bound,
                value.range_text,
                value.source,
            )
    ends_mm = [value.low_mm for value in printed.values()] + [value.high_mm for value in printed.values()]
    for line in lines:
        ends_mm += [line.allowance.value_mm + k * line.allowance.u_mm for k in (-2, 2)]
    scale = axis(min(0.0, *ends_mm), max(ends_mm), LEFT_MM, WIDTH_MM - 6.0)
    return MountSpread(mount, tuple(lines), tuple(printed.values()), scale, _drift(mount, lines, printed, design))


def _drift(
    mount: Mount, lines: list[LedgerLine], printed: dict[str, Printed], design: Design
) -> tuple[float, float] | None:
    curve = printed.get("dl6wu")
    if mount.style != "bonded-through" or curve is None or not curve.valid:
        return None
    lost_mm = curve.high_mm / 2
    mean_mm = sum(line.modelled_mm for line in lines) / len(lines)
    return lost_mm, shift_khz(frequency_mhz=design.frequency_mhz, length_mm=mean_mm, change_mm=-lost_mm)
