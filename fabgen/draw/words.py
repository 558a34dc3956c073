"""Words that several sheets share: names of walls, what a hole is, how large a boom is."""

from collections.abc import Sequence

from fabgen.design.arranged import Hole, Wall
from fabgen.design.design import Boom
from fabgen.design.ledger import Ledger, LedgerLine

WALLS: dict[Wall, str] = {"+z": "TOP", "+y": "LEFT", "-y": "RIGHT", "-z": "BOTTOM"}
"""Looking forward from the datum end."""

ABOUT_BARS = "Print at 100 %; both bars must measure 100 mm."

_PLAIN = {"rod", "bush"}
_SIDES: dict[int, Wall] = {0: "+z", 90: "+y", 180: "-z", 270: "-y"}


def wall_of(hole: Hole) -> str:
    """Name of the wall a hole is in; on a round boom the side its axis points to."""
    if hole.wall != "round":
        return WALLS[hole.wall]
    side = _SIDES.get(round(hole.angle_deg) % 360)
    return WALLS[side] if side and abs(hole.angle_deg - round(hole.angle_deg)) < 1e-9 else f"{hole.angle_deg:g}°"


def drill_words(hole: Hole) -> list[str]:
    """The drill, and what the hole is for unless a rod goes through it."""
    return [f"drill {hole.drill}"] if hole.purpose in _PLAIN else [f"drill {hole.drill}", hole.purpose]


def boom_size(boom: Boom) -> str:
    """Section and size: `square tube 20 × 20 × 1.5, corner radius 1`."""
    size = f"⌀{boom.width_mm:g}" if boom.section == "round" else f"{boom.width_mm:g} × {boom.height_mm:g}"
    kind = f"{boom.section} {'tube' if boom.hollow else 'bar'} {size}"
    kind += f" × {boom.wall_mm:g}" if boom.hollow else ""
    return f"{kind}, corner radius {boom.corner_radius_mm:g}" if boom.corner_radius_mm else kind


def ids(names: Sequence[str], most: int = 6) -> str:
    """Some element ids, the middle of a long list left out and counted."""
    if len(names) <= most:
        return ", ".join(names)
    return f"{', '.join(names[: most - 2])} … {names[-1]} ({len(names)})"


def origin_lines(ledger: Ledger) -> list[str]:
    """One sentence per origin: which rods, how sure in mm and kHz, and what the trim is for."""
    groups: dict[str, list[LedgerLine]] = {}
    for line in ledger.lines:
        if line.allowance.needed and line.allowance.origin != "none":
            groups.setdefault(line.allowance.source, []).append(line)
    said = []
    for source, lines in groups.items():
        u_mm = [line.allowance.u_mm for line in lines]
        khz = [line.shift_khz for line in lines]
        said.append(
            f"Allowance of {ids([line.element for line in lines], 8)}: {source}; ±2u (95 %) "
            f"{_span([2 * u for u in u_mm], 2)} mm, {_span([2 * k for k in khz], 0)} kHz of a single rod."
        )
    if said:
        said.append(
            "Trim is that 95 %, up to the cut step, only for someone who will measure: leave it on, then shorten, the "
            "same from both ends and on all rods alike; shorter is higher in frequency."
        )
    return said


def _span(values: list[float], decimals: int) -> str:
    """`0.65` or `0.65 to 1.10`."""
    low, high = f"{min(values):.{decimals}f}", f"{max(values):.{decimals}f}"
    return low if low == high else f"{low} to {high}"


def allowance_words(ledger: Ledger) -> str:
    """The status line, and what kind of knowledge that is."""
    said = {"computed": "theory, unmeasured", "published": "published models, unmeasured"}
    kind = said.get(ledger.status.rpartition(" ")[2])
    return f"{ledger.status} ({kind})" if kind else ledger.status
