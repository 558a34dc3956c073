"""The four tables of a package as CSV: UTF-8, comma, `.` decimal, three decimals, columns that add up as printed."""

from collections import Counter

from fabgen.design.arranged import Arranged, CutPlan
from fabgen.design.ledger import Ledger
from fabgen.design.package import PackageFile
from fabgen.export.csv_table import csv_bytes

LENGTHS = (
    "element", "role", "station_mm", "rod_mm", "modelled_mm", "allowance_mm", "allowance_origin", "allowance_u_mm",
    "rod_change_mm", "rounding_mm", "cut_mm", "tolerance_mm", "trim_mm",
)  # fmt: skip
DRILLING = (
    "piece", "hole", "element", "station_mm", "wall", "angle_deg", "across_mm", "diameter_mm", "pilot_mm",
    "tolerance_mm", "drill", "purpose",
)  # fmt: skip
CUT_LIST = (
    "piece", "element", "rod_mm", "material", "cut_mm", "trim_mm", "half_mm", "projection_mm", "tolerance_mm", "bar",
)  # fmt: skip
PARTS = ("part", "quantity", "source", "material", "size", "mass_g")


def files(arranged: Arranged, plan: CutPlan) -> tuple[PackageFile, ...]:
    """The four tables.

    Args:
        arranged: the arranged design.
        plan: which bar each piece is sawn from.
    """
    return (
        PackageFile("tables/lengths.csv", lengths_csv(arranged.ledger), "the ledger, modelled to cut"),
        PackageFile("tables/drilling.csv", drilling_csv(arranged), "every hole, by station"),
        PackageFile("tables/cut-list.csv", cut_list_csv(arranged, plan), "every sawn piece"),
        PackageFile("tables/parts.csv", parts_csv(arranged), "the bill of parts"),
    )


def lengths_csv(ledger: Ledger) -> bytes:
    """The ledger, one row per element in order of station."""
    return csv_bytes(
        LENGTHS,
        (
            (
                line.element, line.role, line.station_mm, line.rod_mm, line.modelled_mm, line.allowance.value_mm,
                line.allowance.origin, line.allowance.u_mm, line.rod_change_mm, line.rounding_mm, line.cut_mm,
                line.tolerance_mm, line.trim_mm,
            )
            for line in ledger.lines
        ),
    )  # fmt: skip


def drilling_csv(arranged: Arranged) -> bytes:
    """Every hole, one row per opening."""
    return csv_bytes(
        DRILLING,
        (
            (
                hole.piece, hole.number, hole.element, hole.station_mm, hole.wall, hole.angle_deg, hole.across_mm,
                hole.diameter_mm, hole.pilot_mm, hole.tolerance_mm, hole.drill, hole.purpose,
            )
            for hole in arranged.holes
        ),
    )  # fmt: skip


def cut_list_csv(arranged: Arranged, plan: CutPlan) -> bytes:
    """Every sawn piece with the bar it comes from."""
    return csv_bytes(
        CUT_LIST,
        (
            (
                cut.piece, cut.element, cut.rod_mm, cut.material, cut.cut_mm, cut.trim_mm, cut.half_mm,
                cut.projection_mm, cut.tolerance_mm, plan.bar_of(cut.piece),
            )
            for cut in arranged.cuts
        ),
    )  # fmt: skip


def parts_csv(arranged: Arranged) -> bytes:
    """The bill: one row per distinct part; mass of one."""
    counts = Counter((placed.key, placed.material) for placed in arranged.placed)
    seen: dict[object, None] = {}
    rows = []
    for placed in arranged.placed:
        key = (placed.key, placed.material)
        if key not in seen:
            seen[key] = None
            rows.append(
                (placed.part, counts[key], placed.source, placed.material, placed.size, placed.mass_g),
            )
    return csv_bytes(PARTS, rows)
