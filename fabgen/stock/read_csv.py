"""The CSV files of `data/`, each read once, when it is first asked for."""

import csv
import difflib
import functools
from collections.abc import Iterable
from pathlib import Path

Row = dict[str, str]

_DATA = Path(__file__).parent / "data"


class UnknownStockError(KeyError):
    """A name that its table does not hold.

    Attributes:
        message: what is missing, one sentence.
        nearest: the nearest name the table holds; empty when none is near.
        known: all names, in table order.
    """

    def __init__(self, kind: str, name: str, known: Iterable[str]) -> None:
        self.known = tuple(known)
        lower = {each.lower(): each for each in self.known}
        near = difflib.get_close_matches(name.lower(), lower, n=1, cutoff=0.5)
        self.nearest = lower[near[0]] if near else ""
        self.message = f"there is no {kind} '{name[:60]}' in the table"
        super().__init__(self.message)

    def __str__(self) -> str:
        hint = f"; nearest is '{self.nearest}'" if self.nearest else f"; known: {', '.join(self.known[:20])}"
        return self.message + hint


@functools.cache
def rows(table: str) -> tuple[Row, ...]:
    """All rows of `data/<table>.csv` as text, in file order."""
    with (_DATA / f"{table}.csv").open(encoding="utf-8", newline="") as file:
        return tuple(csv.DictReader(file))


@functools.cache
def index(table: str) -> dict[str, Row]:
    """The rows of a table by their first column."""
    return {next(iter(row.values())): row for row in rows(table)}


def row(table: str, key: str, kind: str) -> Row:
    """The row of a table whose first column is `key`.

    Raises:
        UnknownStockError: there is no such row; `kind` names the thing in its message.
    """
    found = index(table)
    if key not in found:
        raise UnknownStockError(kind, key, found)
    return found[key]


def number(cell: str) -> float | None:
    """The number in a cell, None in an empty one."""
    return float(cell) if cell else None
