"""What the uncertainty of the allowances moves: random and common parts apart, where the array's response is known.

To first order: every rod's error times what a millimetre of that rod shifts the response. Random parts add in
quadrature, the part common to all rods adds as it is (JCGM 100:2008, 5.1.2 and 5.2.2).
"""

import math
from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.where import names
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.design.ledger import LedgerLine
from fabgen.design.response import Response


def mount_shift(arranged: Arranged, response: Response | None) -> Iterator[Finding]:
    """L19: the shift that u means, once for the whole design; nothing where no allowance is uncertain.

    Args:
        arranged: with its ledger.
        response: what the array solver found; None: the shift of a single rod is told instead.
    """
    lines = [line for line in arranged.ledger.lines if line.allowance.u_mm > 0]
    if not lines:
        return
    where = names([line.element for line in arranged.ledger.lines], [line.element for line in lines])
    low_mm, high_mm = (pick(line.allowance.u_mm for line in lines) for pick in (min, max))
    said = f"u is {low_mm:.2f} mm" if f"{low_mm:.2f}" == f"{high_mm:.2f}" else f"u is {low_mm:.2f} to {high_mm:.2f} mm"
    if response is None:
        worst = max(lines, key=lambda line: line.shift_khz)
        advice = (
            f"{said}; on a single half-wave rod ({worst.element}) that is ±{2 * worst.shift_khz:.0f} kHz (95 %); "
            "`fabgen check --response` says what it is on this array"
        )
        yield finding("L19", "note", where, advice, measured=2 * worst.shift_khz, unit="kHz")
        return
    random_khz, common_khz = shifts_khz(lines, response)
    advice = (
        f"{said}; on this array ±{2 * common_khz:.0f} kHz in common to all rods and ±{2 * random_khz:.0f} kHz at "
        "random (95 % each); a coupon or trimming takes off the common part, care with each mount the random one"
    )
    yield finding("L19", "note", where, advice, measured=2 * math.hypot(random_khz, common_khz), unit="kHz")


def shifts_khz(lines: list[LedgerLine], response: Response) -> tuple[float, float]:
    """Standard uncertainty of the array's shift, the random and the common part, positive.

    Args:
        lines: of the ledger.
        response: with the shift per millimetre of every rod's length.
    """
    per_mm = {row.element: row.shift_khz_per_mm for row in response.sensitivities if row.quantity == "length"}
    random, common = 0.0, 0.0
    for line in lines:
        slope = per_mm.get(line.element, 0.0)
        correlated = min(line.allowance.correlated_u_mm, line.allowance.u_mm)
        common += slope * correlated
        random += slope**2 * (line.allowance.u_mm**2 - correlated**2)
    return math.sqrt(random), abs(common)
