"""How numbers and words are set in the book: the template filters."""

import re
from collections.abc import Callable, Iterable
from typing import Any

from markupsafe import Markup, escape

from fabgen.units import format_mm

MINUS = "\u2212"
_NUMBERED = re.compile(r"(.*?)([1-9][0-9]*)")


def _mm(length_mm: float) -> str:
    """A length in mm with three decimals, as in every table of the package."""
    return format_mm(length_mm).replace("-", MINUS)


def _signed(length_mm: float) -> str:
    """A length that is added, with its sign; 0.000 has none."""
    text = _mm(length_mm)
    return text if text.startswith(MINUS) or float(format_mm(length_mm)) == 0 else f"+{text}"


def _short(value: float, decimals: int = 3) -> str:
    """A number without trailing zeros."""
    text = f"{round(value, decimals) + 0.0:.{decimals}f}"
    return (text.rstrip("0").rstrip(".") if "." in text else text).replace("-", MINUS)


def _whole(value: float) -> str:
    """A number without decimals."""
    return _short(value, 0)


def _listed(words: Iterable[str]) -> str:
    """Words in a row, runs of numbers closed up: `R, D1 to D10 and D12`."""
    found = _runs(list(words))
    return found[0] if len(found) == 1 else f"{', '.join(found[:-1])} and {found[-1]}" if found else ""


def _runs(words: list[str]) -> list[str]:
    """`D1, D2, D3` as `D1 to D3`; anything shorter stays."""
    found: list[list[str]] = []
    for word in words:
        if found and _NUMBERED.fullmatch(word) and word == _next(found[-1][-1]):
            found[-1].append(word)
        else:
            found.append([word])
    return [part for run in found for part in ([f"{run[0]} to {run[-1]}"] if len(run) > 2 else run)]


def _next(word: str) -> str:
    match = _NUMBERED.fullmatch(word)
    return f"{match[1]}{int(match[2]) + 1}" if match else ""


def _prose(text: str) -> Markup:
    """One paragraph of plain text; what stands between backquotes is set as typed."""
    return Markup(re.sub(r"`([^`]+)`", r"<code>\1</code>", str(escape(" ".join(text.split())))))  # noqa: S704 # escaped


def _css_string(text: str) -> Markup:
    """Text as a string of a style sheet; whatever is not plain becomes a code point, so nothing can end it."""
    plain = (c if c.isascii() and (c.isalnum() or c in " .-_") else f"\\{ord(c):06x} " for c in text)
    return Markup('"{}"').format(Markup("".join(plain)))  # noqa: S704 # only letters, digits and escapes are left


FILTERS: dict[str, Callable[..., Any]] = {
    "mm": _mm,
    "signed": _signed,
    "short": _short,
    "whole": _whole,
    "listed": _listed,
    "prose": _prose,
    "css_string": _css_string,
}
