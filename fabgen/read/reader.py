"""Reading a design file: all of its problems in one run, or the design with what is worth noting about it."""

import hashlib
from dataclasses import replace
from pathlib import Path

from pydantic_core import ValidationError

from fabgen.design.design import Design
from fabgen.design.findings import Finding
from fabgen.frozen import frozen
from fabgen.read.contradictions import find_contradictions
from fabgen.read.csv_table import insert_table
from fabgen.read.gather import aliases, gather, gather_root
from fabgen.read.grammar import FileKeys
from fabgen.read.kind import Context
from fabgen.read.nearest import nearest
from fabgen.read.notes import notes_on
from fabgen.read.reasons import Reasons
from fabgen.read.records import read_records
from fabgen.read.resolve import resolve
from fabgen.read.source import Problems, read_source
from fabgen.read.yaml_tree import Map, Scalar, parse


@frozen
class Reading:
    """A design and how it was read.

    Attributes:
        design: every value in force.
        notes: what is readable but deserves a second look; severity warn or note.
        tree: the file's keys and values with their places.
        reasons: where each value comes from that the file leaves out, by path.
    """

    design: Design
    notes: tuple[Finding, ...]
    tree: Map
    reasons: dict[str, str]


def read_design(path: Path, *, shown_as: str | None = None) -> Reading:
    """Read and validate one design file with its table.

    Args:
        path: the YAML file.
        shown_as: the name that messages use; the path as given by default.

    Returns:
        The design, complete, with its records and notes.

    Raises:
        DesignErrors: everything that is wrong with the file, in file order; or with its records.
        InputError: there is no such file.
        MachineError: the file cannot be read.
    """
    shown = shown_as if shown_as is not None else str(path)
    source = read_source(path, shown)
    problems = Problems(shown)
    tree = parse(source, problems)
    table = insert_table(tree, path, shown, problems)
    context = Context(unit=_unit(tree))
    keys = _validate(tree, context, problems)
    for broken in context.broken:
        gather(broken, tree, problems)
    find_contradictions(keys, tree, problems)
    problems.stop()
    reasons = Reasons()
    records, stored = read_records(path)
    sha256 = hashlib.sha256(source.data + table + stored).hexdigest()
    design = replace(resolve(keys, path.stem, sha256, reasons), records=records)
    return Reading(design, notes_on(design, keys, context.other_unit), tree, reasons.by_path)


def _unit(tree: Map) -> str | None:
    """The unit of bare lengths; when `units` itself is misspelt or wrong, one report of that is enough."""
    known = aliases(FileKeys)
    written = [value for key, value in tree.items() if (key if key in known else nearest(key, known)) == "units"]
    return None if not written else "in" if str(written[0]) == "in" else "mm"


def _validate(tree: Map, context: Context, problems: Problems) -> FileKeys:
    """Validate the file; unknown and missing keys of the top level are reported and then left aside."""
    try:
        return FileKeys.validate(tree, context)
    except ValidationError as error:
        gather_root(error, tree, problems)
        known = dict(tree)
        for reason in error.errors(include_url=False, include_input=False, include_context=False):
            key = str(reason["loc"][0])
            if reason["type"] == "missing":
                known[key] = Scalar.absent(tree)
            else:
                known.pop(key, None)
        context.broken.clear()
        context.other_unit.clear()
        return FileKeys.validate(known, context)
