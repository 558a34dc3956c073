"""Which piece is sawn from which bar: best fit first, then a proof that fewer bars cannot do.

One bar of length L gives pieces p1 … pn when end trim + Σ(pi + kerf) ≤ L + kerf: the rough end is trimmed once, and
every piece but the last costs a saw cut after it (a piece that ends flush with the bar costs none).
"""

import math
from collections import defaultdict
from collections.abc import Sequence

from fabgen.design.arranged import Bar, Cut, CutPlan
from fabgen.design.design import Shop

_PLAY_MM = 1e-6


def plan(cuts: Sequence[Cut], shop: Shop) -> CutPlan:
    """Lay all pieces on bars, rods by diameter and material, the boom from its own stock.

    Args:
        cuts: pieces to saw; a piece longer than a bar is left out (a rule reports it).
        shop: stock lengths, kerf and end trim.

    Returns:
        Bars in order, and whether their number is proven to be the least.
    """
    groups: dict[tuple[str, float, str], list[Cut]] = defaultdict(list)
    for cut in cuts:
        groups[(cut.stock, cut.rod_mm, cut.material)].append(cut)
    bars: list[Bar] = []
    proven = True
    for (stock, size_mm, material), group in sorted(groups.items()):
        length_mm = shop.rod_stock_mm if stock == "rod" else shop.boom_stock_mm
        usable_mm = length_mm - shop.end_trim_mm + shop.saw_kerf_mm
        pieces = [(cut.piece, cut.cut_mm + cut.trim_mm) for cut in group]
        fitting = [(name, mm) for name, mm in pieces if mm + shop.saw_kerf_mm <= usable_mm + _PLAY_MM]
        nests = _best_fit([mm + shop.saw_kerf_mm for _, mm in fitting], usable_mm)
        if len(nests) > _lower_bound([mm + shop.saw_kerf_mm for _, mm in fitting], usable_mm):
            from fabgen.arrange.bars_proof import fewest_bars

            nests, sure = fewest_bars([mm + shop.saw_kerf_mm for _, mm in fitting], usable_mm, nests)
            proven = proven and sure
        for count, nest in enumerate(nests, start=1):
            laid = tuple(fitting[index] for index in nest)
            used_mm = shop.end_trim_mm + sum(mm + shop.saw_kerf_mm for _, mm in laid)
            name = f"{stock} {size_mm:g} {material} #{count}"
            bars.append(Bar(name, length_mm, laid, max(0.0, length_mm - used_mm)))
    return CutPlan(tuple(bars), proven)


def _best_fit(sizes: Sequence[float], room: float) -> list[list[int]]:
    """Longest first, each into the fullest bar that still takes it."""
    nests: list[list[int]] = []
    left: list[float] = []
    for index in sorted(range(len(sizes)), key=lambda i: (-sizes[i], i)):
        fits = [(left[k], k) for k in range(len(nests)) if sizes[index] <= left[k] + _PLAY_MM]
        if fits:
            _, best = min(fits)
            nests[best].append(index)
            left[best] -= sizes[index]
        else:
            nests.append([index])
            left.append(room - sizes[index])
    return nests


def _lower_bound(sizes: Sequence[float], room: float) -> int:
    """No plan needs fewer: bound L2 of Martello & Toth, Knapsack Problems, 1990, 8.3.2, from memory.

    For every least size: pieces longer than half a bar need one each, and the shorter ones, down to that size, what
    those leave and as much more as they are longer in all.
    """
    long = [size for size in sizes if size > room / 2 + _PLAY_MM]
    best = max(len(long), math.ceil(sum(sizes) / room - 1e-9))
    for least in {size for size in sizes if size <= room / 2 + _PLAY_MM}:
        shared = [size for size in long if size <= room - least + _PLAY_MM]
        short = sum(size for size in sizes if least <= size <= room / 2 + _PLAY_MM)
        over = short - (len(shared) * room - sum(shared))
        best = max(best, len(long) + max(0, math.ceil(over / room - 1e-9)))
    return best
