"""What is kept in `records/` beside a design.

Solved and measured mounts are YAML files that are written whole, once, and never replaced; the array's response is one
JSON file that the next one replaces.
"""

import contextlib
import json
import os
from collections.abc import Mapping, Sequence
from dataclasses import asdict
from pathlib import Path
from typing import Any

import yaml

from fabgen.design.response import STORED_NAME, Response, digest
from fabgen.errors import MachineError

_DUMPER: Any = getattr(yaml, "CSafeDumper", yaml.SafeDumper)


def record_bytes(content: Mapping[str, Any], says: Sequence[str] = ()) -> bytes:
    """A record as YAML.

    Args:
        content: plain mappings, sequences, text and numbers, in the order in which they shall stand.
        says: lines of comment for whoever opens the file.
    """
    text = yaml.dump(
        dict(content), Dumper=_DUMPER, sort_keys=False, allow_unicode=True, default_flow_style=False, width=120
    )
    return ("".join(f"# {line}\n" for line in says) + text).encode("utf-8")


def write_new(files: Mapping[str, bytes], *, folder: Path, stem: str) -> tuple[Path, ...]:
    """Write files of one stem that are not there yet, all or none; where any is, all get the next free number.

    Args:
        files: contents by ending, such as `.yaml`.
        folder: where to; made when missing.
        stem: the name before the ending.

    Returns:
        The files, in the order given.

    Raises:
        MachineError: the disk or a permission is in the way.
    """
    count = 1
    try:
        folder.mkdir(parents=True, exist_ok=True)
        while True:
            name = stem if count == 1 else f"{stem}-{count}"
            paths = tuple(folder / f"{name}{ending}" for ending in files)
            if not any(path.exists() for path in paths):
                with contextlib.suppress(FileExistsError):  # another run was faster
                    _write_all(paths, tuple(files.values()))
                    return paths
            count += 1
    except OSError as error:
        raise _cannot_write(error, folder) from error


def write_response(response: Response, *, folder: Path) -> None:
    """Store a response in place of the one before; nothing is touched where it is the same.

    Args:
        response: what to keep.
        folder: the records folder; made when missing.

    Raises:
        MachineError: the disk, a permission or a link that may lead elsewhere is in the way.
    """
    content = asdict(response)
    text = json.dumps({**content, "sha256": digest(content)}, indent=1, ensure_ascii=False) + "\n"
    place, data = folder / STORED_NAME, text.encode("utf-8")
    for each in (folder, folder.parent):
        if each.is_symlink():
            raise MachineError(f"cannot write {place}: {each} is a link that may lead elsewhere")
    fresh = folder / f".{STORED_NAME}.{os.getpid()}"
    try:
        if place.is_file() and place.read_bytes() == data:
            return
        folder.mkdir(parents=True, exist_ok=True)
        for rest in folder.glob(f".{STORED_NAME}.*"):  # a killed run's
            rest.unlink(missing_ok=True)
        _write_beside(fresh, data)
        with contextlib.suppress(FileNotFoundError):  # another run has just stored it, and swept
            fresh.replace(place)
    except OSError as error:
        raise _cannot_write(error, place) from error
    finally:
        with contextlib.suppress(OSError):
            fresh.unlink(missing_ok=True)


def _cannot_write(error: OSError, place: Path) -> MachineError:
    reason = error.strerror or type(error).__name__
    return MachineError(f"cannot write {error.filename or place}: {reason}", "nothing was replaced")


def _write_all(paths: Sequence[Path], contents: Sequence[bytes]) -> None:
    """Write beside, then give each its name, which must be free until the last moment.

    Raises:
        FileExistsError: one is taken.
    """
    fresh = [path.with_name(f".{path.name}.new") for path in paths]
    named: list[Path] = []
    try:
        for place, data in zip(fresh, contents, strict=True):
            _write_beside(place, data)
        for place, path in zip(fresh, paths, strict=True):
            _give_name(place, path)
            named.append(path)
    except OSError:
        for path in named:
            path.unlink(missing_ok=True)
        raise
    finally:
        for place in fresh:
            place.unlink(missing_ok=True)


def _give_name(fresh: Path, path: Path) -> None:
    try:
        os.link(fresh, path)
    except FileExistsError:
        raise
    except OSError:  # a disk without hard links
        path.open("xb").close()
        fresh.replace(path)


def _write_beside(path: Path, data: bytes) -> None:
    with path.open("wb") as out:
        out.write(data)
        out.flush()
        os.fsync(out.fileno())
