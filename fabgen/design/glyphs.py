"""Marks on fixtures: letters and digits of square cells, legible when printed with a coarse nozzle.

Cells of one letter never meet in a corner only, so that a raised or sunk mark is a proper solid.
"""

Corner = tuple[int, int]

_ROWS = {
    "0": ("111", "101", "101", "101", "111"),
    "1": ("010", "110", "010", "010", "111"),
    "2": ("111", "001", "111", "100", "111"),
    "3": ("111", "001", "111", "001", "111"),
    "4": ("101", "101", "111", "001", "001"),
    "5": ("111", "100", "111", "001", "111"),
    "6": ("111", "100", "111", "101", "111"),
    "7": ("111", "001", "001", "001", "001"),
    "8": ("111", "101", "111", "101", "111"),
    "9": ("111", "101", "111", "001", "111"),
    ".": ("0", "0", "0", "0", "1"),
    "H": ("101", "101", "111", "101", "101"),
    "L": ("100", "100", "100", "100", "111"),
    "O": ("111", "101", "101", "101", "111"),
    "P": ("111", "101", "111", "100", "100"),
    "R": ("1111", "1001", "1111", "1010", "1011"),
    "T": ("111", "010", "010", "010", "010"),
}
LETTERS = frozenset(_ROWS)
HEIGHT_CELLS = 5
_SIDES = (((0, -1), (0, 0), (1, 0)), ((1, 0), (1, 0), (1, 1)), ((0, 1), (1, 1), (0, 1)), ((-1, 0), (0, 1), (0, 0)))
"""Of one cell: where the neighbour is, and where its side begins and ends."""


def width_cells(text: str) -> int:
    """Width of a text in cells, one empty column between letters."""
    return sum(len(_ROWS[letter][0]) + 1 for letter in text) - 1


def starts(text: str) -> tuple[int, ...]:
    """First column of every letter of a text."""
    return tuple(width_cells(text[:i]) + 1 if i else 0 for i in range(len(text)))


def area_cells(text: str) -> int:
    """Area of a text in cells."""
    return sum(row.count("1") for letter in text for row in _ROWS[letter])


def outlines(letter: str) -> tuple[tuple[Corner, ...], ...]:
    """Closed outlines of a letter's cells, from its lower left corner: the outside first, then the holes.

    Only corners where an outline turns are named; the outside runs counter-clockwise, a hole clockwise.
    """
    rows = _ROWS[letter]
    cells = {
        (column, HEIGHT_CELLS - 1 - down)
        for down, row in enumerate(rows)
        for column, cell in enumerate(row)
        if cell == "1"
    }
    # Each cell contributes its four sides, counter-clockwise; sides between two cells are not on an outline.
    following = {
        (x + ax, y + ay): (x + bx, y + by)
        for x, y in sorted(cells)
        for (dx, dy), (ax, ay), (bx, by) in _SIDES
        if (x + dx, y + dy) not in cells
    }
    found = []
    while following:
        first = min(following)
        loop = [first]
        while (corner := following.pop(loop[-1])) != first:
            loop.append(corner)
        found.append(tuple(corner for corner in loop if _turns(corner, loop)))
    return tuple(found)


def _turns(corner: Corner, loop: list[Corner]) -> bool:
    at = loop.index(corner)
    before, after = loop[at - 1], loop[(at + 1) % len(loop)]
    return not (before[0] == after[0] or before[1] == after[1])
