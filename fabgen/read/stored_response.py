"""A response that a build stored beside its design, read again while it still fits."""

import json
from dataclasses import fields
from pathlib import Path
from types import NoneType, UnionType
from typing import Any, Literal, get_args, get_origin, get_type_hints

from fabgen.design.response import STORED_NAME, Response, digest
from fabgen.read.records import records_folder

LARGEST_BYTES = 5_000_000


def stored_response(design: Path, case_sha256: str) -> Response | None:
    """The stored response, None where there is none that fits and is as it was written.

    Args:
        design: the design file.
        case_sha256: of the case it must belong to.
    """
    path = records_folder(design) / STORED_NAME
    try:
        if not path.is_file() or path.stat().st_size > LARGEST_BYTES:
            return None
        content = json.loads(path.read_text(encoding="utf-8"))
        if content["case_sha256"] != case_sha256 or content.pop("sha256") != digest(content):
            return None
        made = _made(Response, content)
    except (OSError, ValueError, TypeError, KeyError, AttributeError, RecursionError):
        return None
    return made if isinstance(made, Response) else None


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
