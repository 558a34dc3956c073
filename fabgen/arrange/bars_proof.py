"""The fewest bars, proven by integer programming where counting is not enough."""

from collections.abc import Sequence

import numpy as np
from scipy.optimize import Bounds, LinearConstraint, milp

_EFFORT = 80_000
"""Nodes of the search tree times places to choose from; beyond it the plan counts as unproven.

A limit in seconds would make other files on another machine. Some ten seconds, measured on one core.
"""


def fewest_bars(sizes_mm: Sequence[float], room_mm: float, known: list[list[int]]) -> tuple[list[list[int]], bool]:
    """Pack pieces into the fewest bars.

    The assignment form of bin packing (Martello & Toth, Knapsack Problems, 1990, ch. 8), solved by branch and cut.

    Args:
        sizes_mm: what each piece uses of a bar, kerf included.
        room_mm: what a bar offers, in the same unit.
        known: a valid plan, as lists of indices.

    Returns:
        The plan with the fewest bars found, and whether none with fewer exists.
    """
    count, bars = len(sizes_mm), len(known) - 1
    pieces = count * bars
    cost = np.concatenate([np.zeros(pieces), np.ones(bars)])
    once = np.zeros((count, pieces + bars))
    fill = np.zeros((bars, pieces + bars))
    for bar in range(bars):
        for piece in range(count):
            once[piece, piece * bars + bar] = 1.0
            fill[bar, piece * bars + bar] = sizes_mm[piece]
        fill[bar, pieces + bar] = -room_mm
    order = np.zeros((max(bars - 1, 0), pieces + bars))
    for bar in range(bars - 1):
        order[bar, pieces + bar], order[bar, pieces + bar + 1] = -1.0, 1.0
    upper = np.ones(pieces + bars)
    for piece in range(count):
        upper[piece * bars + min(piece + 1, bars) : (piece + 1) * bars] = 0.0
    result = milp(
        cost,
        constraints=[
            LinearConstraint(once, 1.0, 1.0),
            LinearConstraint(fill, -np.inf, 0.0),
            LinearConstraint(order, -np.inf, 0.0),
        ],
        integrality=np.ones(pieces + bars),
        bounds=Bounds(0.0, upper),
        options={"node_limit": max(1, _EFFORT // pieces)},
    )
    if result.x is None:
        return known, bool(result.status == 2)
    taken = result.x[:pieces].reshape(count, bars)
    nests = [[piece for piece in range(count) if taken[piece, bar] > 0.5] for bar in range(bars)]
    return [nest for nest in nests if nest], bool(result.status == 0)
