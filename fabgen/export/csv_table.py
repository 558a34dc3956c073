"""CSV as every table of a package has it: UTF-8, comma, `.` decimal, lines end in a line feed."""

import csv
import io
from collections.abc import Iterable, Sequence

from fabgen.units import format_mm


def csv_bytes(header: Sequence[str], rows: Iterable[Sequence[str | float | int]]) -> bytes:
    """A table; real numbers get three decimals.

    Args:
        header: names of the columns.
        rows: cells.
    """
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(header)
    for row in rows:
        writer.writerow([format_mm(cell) if isinstance(cell, float) else cell for cell in row])
    return out.getvalue().encode("utf-8")
