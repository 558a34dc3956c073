"""The designs of one call: each is told for itself, one that fails stops no other, the exit code is the worst."""

import contextlib
from collections.abc import Iterator, Mapping, Sequence
from pathlib import Path
from typing import Any

from fabgen.cli import report
from fabgen.errors import FabgenError, InputError


class Call:
    """What is told about designs.

    Args:
        designs: the files, as named.
        as_json: gather one JSON document in place of text.
    """

    def __init__(self, designs: Sequence[Path], *, as_json: bool) -> None:
        self.designs, self.as_json = designs, as_json
        self.records: list[dict[str, Any]] = [{} for _ in designs]
        self.code = 0

    @contextlib.contextmanager
    def telling(self, number: int) -> Iterator[dict[str, Any]]:
        """Work on one design and fill in its record; what stops it is told there and goes no further."""
        try:
            yield self.records[number]
        except Exception as caught:  # noqa: BLE001 - told; the other designs go on all the same
            error = report.expected(caught)
            self._fail(number, error)
            if not self.as_json:
                report.tell(error)

    def judged(self, clear: bool) -> None:
        """Count a verdict."""
        self.code = max(self.code, 0 if clear else 1)

    def has_twins(self, names: Mapping[int, str]) -> bool:
        """Whether two designs would go to one folder, on a disk that keeps no capitals apart; they are told.

        Args:
            names: number and revision of each design that could be judged, by its place in the call.
        """
        owners: dict[str, int] = {}
        found = False
        for second, name in names.items():
            first = owners.setdefault(name.casefold(), second)
            if first == second:
                continue
            found = True
            message = f"{self.designs[first]} and {self.designs[second]} both are {name}"
            error = InputError(message, "give one of them another number or revision")
            self._fail(first, error)
            self._fail(second, error)
            if not self.as_json:
                report.tell(error)
        return found

    def end(self) -> int:
        """Print the JSON document if one is wanted, and return the exit code."""
        if self.as_json:
            report.print_json({"designs": self.records})
        return self.code

    def _fail(self, number: int, error: FabgenError) -> None:
        self.code = max(self.code, error.exit_code)
        self.records[number].update(report.error_record(self.designs[number], error))
