"""Solved and measured mounts, read from the folder `records/<design stem>` beside the design file."""

from pathlib import Path

from fabgen.design.records import Record
from fabgen.errors import DesignErrors, Problem
from fabgen.read.source import read_source

FOLDER = "records"


def records_folder(design: Path) -> Path:
    """Where the records of a design file are kept.

    Args:
        design: the design file.
    """
    return design.parent / FOLDER / design.stem


def read_records(design: Path) -> tuple[tuple[Record, ...], bytes]:
    """Every record of a design file.

    Args:
        design: the design file.

    Returns:
        The records in order of file name, and the bytes they were read from, one after the other.

    Raises:
        DesignErrors: a file of that folder is no record.
        MachineError: one cannot be read.
    """
    folder = records_folder(design)
    if not folder.is_dir():
        return (), b""
    from fabgen.read.record_file import record  # most designs have none

    records: list[Record] = []
    data: list[bytes] = []
    problems: list[Problem] = []
    for path in sorted(folder.glob("*.yaml")):
        shown = f"{FOLDER}/{design.stem}/{path.name}"
        try:
            source = read_source(path, shown)
            records.append(record(source))
            data.append(source.data)
        except DesignErrors as error:
            problems += error.problems
    if problems:
        raise DesignErrors(tuple(problems))
    return tuple(records), b"".join(data)
