"""Records of solved and measured mounts: YAML files that are written whole, once, and never replaced."""

import os
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import Any

import yaml

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
    """Write files of one stem that are not there yet; where any is, all of them get the next free number.

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
                for path, data in zip(paths, files.values(), strict=True):
                    _write_whole(path, data)
                return paths
            count += 1
    except OSError as error:
        reason = error.strerror or type(error).__name__
        raise MachineError(f"cannot write {error.filename or folder}: {reason}", "nothing was replaced") from error


def _write_whole(path: Path, data: bytes) -> None:
    """Write beside, then give it its name; the name must be free until the last moment."""
    fresh = path.with_name(f".{path.name}.new")
    try:
        with fresh.open("wb") as out:
            out.write(data)
            out.flush()
            os.fsync(out.fileno())
        os.link(fresh, path)
    finally:
        fresh.unlink(missing_ok=True)
