"""In what order the parts go on, and which of them cannot go on in any.

Every part belongs to a task, a phase of the work on one element. A task waits for others: a rod for its bushes, a block
for the nuts under its floor, everything that stands in the boom's bore for the sleeves that are pushed in from its end.
A rod goes in along itself, from the left or the right; what lies in its way on both sides must come after it.
"""

import heapq
from bisect import bisect_left, bisect_right
from collections import defaultdict
from collections.abc import Iterable, Mapping
from enum import IntEnum
from itertools import groupby
from typing import Literal

from fabgen.design.arranged import Arranged, Placed, Shape
from fabgen.design.spans import span_mm
from fabgen.frozen import frozen


class Phase(IntEnum):
    """The phases of the work in the order in which they are usually done."""

    SLEEVES = 1
    CLAMP = 2
    NUTS = 3
    BLOCKS = 4
    BUSHES = 5
    RODS = 6
    JOINTS = 7
    MIDDLE_SCREWS = 8
    KEEPERS = 9
    HALF_RODS = 10
    BENT_RODS = 11
    TERMINALS = 12
    CABLE = 13
    LIDS = 14
    MAST = 15


WORDS = {
    Phase.SLEEVES: "Push the sleeves into the boom from its end, to the clamp's place.",
    Phase.CLAMP: "Bolt the clamp's plate to the boom.",
    Phase.NUTS: "Press the nuts into the traps of the feed's block; they cannot be reached later.",
    Phase.BLOCKS: "Screw the blocks to the boom's top; a feed's cable goes down in front on the left.",
    Phase.BUSHES: "Push the bushes into the walls from outside, flanges out.",
    Phase.RODS: "Push each rod through from its side and centre it.",
    Phase.JOINTS: "Make the joints between rods and boom: bright metal, on both sides.",
    Phase.MIDDLE_SCREWS: "Turn the screw through the boom's top into each rod's middle.",
    Phase.KEEPERS: "Push a keeper on from each tip until it meets its seat.",
    Phase.HALF_RODS: "Push the half rods into the feed's block from both sides until they meet the rib.",
    Phase.BENT_RODS: "Push the bent rod into the slots of its saddle from the front.",
    Phase.TERMINALS: "Fit the terminal screws with the cable's tags, finger tight, then half a turn.",
    Phase.CABLE: "Fasten the cable with a drip loop; measure the match, and trim a straight fed rod at its tips.",
    Phase.LIDS: "Close the feed's lid.",
    Phase.MAST: "Hang the array on the mast with its U-bolts.",
}

_PHASES = {
    "crush_sleeve": Phase.SLEEVES,
    "saddle": Phase.BLOCKS,
    "feed_block": Phase.BLOCKS,
    "folded_saddle": Phase.BLOCKS,
    "bush": Phase.BUSHES,
    "sleeve": Phase.BUSHES,
    "rod": Phase.RODS,
    "folded_rod": Phase.BENT_RODS,
    "push_ring": Phase.KEEPERS,
    "snap_keeper": Phase.KEEPERS,
    "feed_lid": Phase.LIDS,
    "nut": Phase.NUTS,
}
_SCREWS = {
    "saddle screw": Phase.BLOCKS,
    "feed screw": Phase.BLOCKS,
    "lid screw": Phase.LIDS,
    "terminal": Phase.TERMINALS,
    "retainer": Phase.TERMINALS,
    "middle screw": Phase.MIDDLE_SCREWS,
}
_AFTER = {
    Phase.BLOCKS: (Phase.NUTS,),
    Phase.RODS: (Phase.BUSHES, Phase.BLOCKS),
    Phase.JOINTS: (Phase.RODS,),
    Phase.MIDDLE_SCREWS: (Phase.RODS,),
    Phase.KEEPERS: (Phase.RODS,),
    Phase.HALF_RODS: (Phase.BLOCKS,),
    Phase.BENT_RODS: (Phase.BLOCKS,),
    Phase.TERMINALS: (Phase.HALF_RODS, Phase.BENT_RODS),
    Phase.CABLE: (Phase.TERMINALS,),
    Phase.LIDS: (Phase.CABLE,),
}
"""What a task waits for on its own element."""

_IN_BORE = (Phase.CLAMP, Phase.BLOCKS, Phase.BUSHES, Phase.RODS)
_RINGS = ("bush", "sleeve", "push_ring")
_TOUCH_MM = 1e-6

Task = tuple[Phase, str]


@frozen
class Step:
    """One step of the work.

    Attributes:
        number: counted from 1.
        text: what to do.
        elements: whose parts these are.
        parts: occurrence names that go on in this step.
    """

    number: int
    text: str
    elements: tuple[str, ...]
    parts: tuple[str, ...]


@frozen
class Stuck:
    """Something that cannot go on: a closed `loop` that nothing can thread, or an `order` that waits for itself."""

    element: str
    kind: Literal["loop", "order"]
    text: str


@frozen
class AssemblyOrder:
    """The steps, and what has no place among them."""

    steps: tuple[Step, ...]
    stuck: tuple[Stuck, ...]


def assembly_order(arranged: Arranged) -> AssemblyOrder:
    """A possible order of assembly, the usual one where there is a choice.

    Args:
        arranged: the arranged design.

    Returns:
        Its steps, and what cannot be put on.
    """
    tasks = _tasks(arranged)
    waits = _waits(tasks)
    blocked = _blocked_rods(arranged)
    for rod, ways in blocked:
        _let_through(_task_of(rod), ways, waits)
    ordered = _sorted(tasks, waits)
    stuck = [*_loops(arranged)]
    stuck += [_locked_out(rod, ways) for rod, ways in blocked if _task_of(rod) in _all_before(_task_of(rod), waits)]
    return AssemblyOrder(_steps(tasks, ordered), tuple(stuck))


def _locked_out(rod: Placed, ways: list[set[Task]]) -> Stuck:
    owners = ", ".join(sorted({owner for way in ways for _, owner in way}))
    text = (
        f"the rod {rod.name} cannot go in from any side: parts of {owners} are in its way and must be there before it"
    )
    return Stuck(rod.owner, "order", text)


def _task_of(part: Placed) -> Task:
    return phase_of(part), part.owner


def phase_of(part: Placed) -> Phase:
    """The phase in which a part goes on."""
    if part.owner == "clamp" and part.part != "crush_sleeve":
        return Phase.MAST if part.name.startswith("mast") else Phase.CLAMP
    for words, phase in _SCREWS.items():
        if part.part in ("screw", "washer") and words in part.name:
            return phase
    if part.part == "rod" and part.name != part.owner:
        return Phase.HALF_RODS
    return _PHASES.get(part.part, Phase.JOINTS)


def _tasks(arranged: Arranged) -> dict[Task, list[str]]:
    """Every task with the parts that go on in it; a welded or pressed joint and a cable have none."""
    tasks: dict[Task, list[str]] = defaultdict(list)
    for part in arranged.placed:
        if part.part != "boom":
            tasks[_task_of(part)].append(part.name)
    for element in arranged.design.elements:
        if element.mount and element.mount.bond and (Phase.RODS, element.id) in tasks:
            tasks.setdefault((Phase.JOINTS, element.id), [])
        if (Phase.TERMINALS, element.id) in tasks:
            tasks[Phase.CABLE, element.id] = []
    return dict(tasks)


def _waits(tasks: Mapping[Task, list[str]]) -> dict[Task, set[Task]]:
    """What each task waits for."""
    sleeves = {task for task in tasks if task[0] is Phase.SLEEVES}
    waits = {}
    for phase, owner in tasks:
        own = {(before, owner) for before in _AFTER.get(phase, ())} & tasks.keys()
        waits[phase, owner] = own | (sleeves if phase in _IN_BORE else set())
    return waits


def _blocked_rods(arranged: Arranged) -> list[tuple[Placed, list[set[Task]]]]:
    """Rods that have something of another element in their way on every side they could come from.

    What overlaps a rod at its place is a collision and no matter of order.
    """
    others = sorted(
        ((shape, part) for part in arranged.placed if part.part not in ("boom", "rod") for shape in part.shapes),
        key=lambda pair: span_mm(pair[0], 0),
    )
    spans = [span_mm(shape, 0) for shape, _ in others]
    starts = [low for low, _ in spans]
    widest_mm = max((high - low for low, high in spans), default=0.0)
    blocked = []
    for rod in (part for part in arranged.placed if part.part == "rod"):
        bar = rod.shapes[0]
        low, high = span_mm(bar, 0)
        near = others[bisect_left(starts, low - widest_mm) : bisect_right(starts, high)]
        crossing = [
            (shape, part)
            for shape, part in near
            if part.owner != rod.owner and _overlap(bar, shape, 0) and _overlap(bar, shape, 2)
        ]
        ways = [
            {_task_of(part) for shape, part in crossing if _beyond(bar, shape, side)}
            for side in (1, -1)
            if side * sum(span_mm(bar, 1)) >= -_TOUCH_MM
        ]
        if all(ways):
            blocked.append((rod, ways))
    return blocked


def _beyond(bar: Shape, shape: Shape, side: int) -> bool:
    """Whether a shape stands beyond a rod's tip: the left one for side 1, the right one for −1."""
    (low, high), (other_low, other_high) = span_mm(bar, 1), span_mm(shape, 1)
    return other_low >= high - _TOUCH_MM if side > 0 else other_high <= low + _TOUCH_MM


def _overlap(first: Shape, second: Shape, axis: int) -> bool:
    (low, high), (other_low, other_high) = span_mm(first, axis), span_mm(second, axis)
    return min(high, other_high) - max(low, other_low) > _TOUCH_MM


def _let_through(rod: Task, ways: list[set[Task]], waits: dict[Task, set[Task]]) -> None:
    """Let what is in a rod's way on one side wait for it: a side on which the rod waits for none of it."""
    needed = _all_before(rod, waits)
    side = next((way for way in ways if not way & needed), ways[0])
    for task in side:
        waits[task].add(rod)


def _all_before(task: Task, waits: Mapping[Task, set[Task]]) -> set[Task]:
    """Everything a task waits for, at once or in the end."""
    found: set[Task] = set()
    stack = [task]
    while stack:
        for before in waits[stack.pop()] - found:
            found.add(before)
            stack.append(before)
    return found


def _sorted(tasks: Mapping[Task, list[str]], waits: Mapping[Task, set[Task]]) -> list[Task]:
    """Tasks in an order that keeps every wait, the earliest phase first; those in a circle are left out."""
    place = {task: count for count, task in enumerate(tasks)}
    left = {task: len(before) for task, before in waits.items()}
    followers: dict[Task, list[Task]] = defaultdict(list)
    for task, before in waits.items():
        for other in before:
            followers[other].append(task)
    ready = [(task[0], place[task], task) for task, count in left.items() if count == 0]
    heapq.heapify(ready)
    ordered = []
    while ready:
        *_, task = heapq.heappop(ready)
        ordered.append(task)
        for follower in followers[task]:
            left[follower] -= 1
            if left[follower] == 0:
                heapq.heappush(ready, (follower[0], place[follower], follower))
    return ordered


def _loops(arranged: Arranged) -> Iterable[Stuck]:
    """Bent rods that would have to be threaded: through the boom, or into a closed ring."""
    rings = {part.owner: part for part in arranged.placed if part.part in _RINGS}
    top_mm = arranged.design.boom.top_mm
    for part in arranged.placed:
        if part.part != "folded_rod":
            continue
        if min(span_mm(shape, 2)[0] for shape in part.shapes) < top_mm - 1e-6:
            yield Stuck(
                part.owner, "loop", "a closed loop cannot be threaded through the boom: carry it above the boom"
            )
        elif part.owner in rings:
            ring = rings[part.owner]
            yield Stuck(part.owner, "loop", f"a closed loop cannot be threaded into {ring.name}: use an open saddle")


def _steps(tasks: Mapping[Task, list[str]], ordered: list[Task]) -> tuple[Step, ...]:
    """Neighbouring tasks of one phase become one step."""
    steps = []
    for number, (phase, group) in enumerate(groupby(ordered, key=lambda task: task[0]), start=1):
        own = list(group)
        parts = tuple(name for task in own for name in tasks[task])
        steps.append(Step(number, WORDS[phase], tuple(owner for _, owner in own), parts))
    return tuple(steps)
