"""A response stored beside its design, and read again while it still fits.

One JSON file, `records/<design stem>/response.json`, keyed by a hash of everything it was computed from.
"""

import errno
import json
import os
from dataclasses import asdict, fields
from pathlib import Path
from types import NoneType, UnionType
from typing import Any, Literal, get_args, get_origin, get_type_hints

from fabgen.design.response import Response

FILE = "response.json"
LARGEST_BYTES = 5_000_000


def load(folder: Path, case_sha256: str) -> Response | None:
    """The stored response, None where there is none that fits.

    Args:
        folder: the records folder.
        case_sha256: of the case it must belong to.
    """
    path = folder / FILE
    try:
        if not path.is_file() or path.stat().st_size > LARGEST_BYTES:
            return None
        content = json.loads(path.read_text(encoding="utf-8"))
        if not isinstance(content, dict) or content.get("case_sha256") != case_sha256:
            return None
        response = _made(Response, content)
    except (OSError, ValueError, TypeError, KeyError, RecursionError):
        return None
    return response if isinstance(response, Response) else None


def store(folder: Path, response: Response) -> None:
    """Write the response, complete or not at all.

    Args:
        folder: the records folder; made when missing.
        response: what to keep.

    Raises:
        OSError: the disk or a permission is in the way.
    """
    if folder.is_symlink() or folder.parent.is_symlink():
        raise OSError(errno.ELOOP, "it is a link that may lead elsewhere", str(folder))
    folder.mkdir(parents=True, exist_ok=True)
    text = json.dumps(asdict(response), indent=1, ensure_ascii=False) + "\n"
    fresh = folder / f".{FILE}.{os.getpid()}"
    try:
        fresh.unlink(missing_ok=True)
        with fresh.open("x", encoding="utf-8", newline="\n") as out:
            out.write(text)
        fresh.replace(folder / FILE)
    finally:
        fresh.unlink(missing_ok=True)


def _made(kind: Any, value: Any) -> Any:
    """A value of the kind that a record's field asks for.

    Raises:
        TypeError: it is of another kind.
    """
    origin, inner = get_origin(kind), get_args(kind)
    if origin is UnionType:
        return None if value is None else _made(next(each for each in inner if each is not NoneType), value)
    if origin is tuple and isinstance(value, list):
        kinds = inner[:1] * len(value) if inner[-1] is Ellipsis else inner
        return tuple(_made(each, item) for each, item in zip(kinds, value, strict=True))
    if hasattr(kind, "__dataclass_fields__") and isinstance(value, dict):
        hints = get_type_hints(kind)
        return kind(**{field.name: _made(hints[field.name], value[field.name]) for field in fields(kind)})
    if origin is Literal and value in inner:
        return value
    if kind is float and isinstance(value, int | float) and not isinstance(value, bool):
        return float(value)
    if kind in (int, str, bool) and type(value) is kind:
        return value
    raise TypeError(f"{value!r} is not {kind}")
