"""The nearest word that would have been right."""

import difflib
import re
from collections.abc import Iterable

_LONGEST = 60
_FEW = 12

_MEANT = {
    "element": ("id",), "name": ("id",), "station": ("at",), "position": ("at",), "type": ("role", "kind", "section"),
    "aluminium": ("EN AW-6060 T66",), "aluminum": ("EN AW-6060 T66",), "alu": ("EN AW-6060 T66",),
    "stainless steel": ("stainless 1.4301",), "nylon": ("PA12",), "fibreglass": ("GRP",), "fiberglass": ("GRP",),
    "wood": ("spruce",), "pine": ("spruce",),
}  # fmt: skip
"""Other words of the trade for what is known here by another name."""

_UNIT_IN_NAME = re.compile(r"(.+?)[ _-]*[_( -](?:mm|in|cm|m|mhz)\)?")


def nearest(written: str, known: Iterable[str]) -> str:
    """The known word nearest to the written one, without regard to case; empty when none is near."""
    lower = {word.lower(): word for word in known}
    word = written[:_LONGEST].lower()
    for meant in (*_MEANT.get(word, ()), _without_unit(word)):
        if meant.lower() in lower:
            return lower[meant.lower()]
    word = word.replace("_", "-")
    found = difflib.get_close_matches(word, lower, n=1, cutoff=0.55) or [
        each for each in lower if len(word) > 2 and (each.startswith(word) or word.startswith(each))
    ]
    return lower[found[0]] if found else ""


def suggestion(written: str, known: Iterable[str]) -> str:
    """A fix that names the nearest word first and then, when they are few, all of them."""
    words = list(known)
    key, colon, value = written.partition(":")
    if colon and key in words:
        return f"write a space after the colon: {key}: {value.strip()}"
    if (key := _without_unit(written)) in words:
        return f"write {key}; the unit stands beside the number, or once in `units`"
    listed = ", ".join(words)
    near = nearest(written, words)
    if not near:
        return f"known here: {listed}"
    return f"did you mean `{near}`?" + (f" Known here: {listed}" if 1 < len(words) <= _FEW else "")


def _without_unit(word: str) -> str:
    """The key of `length_mm` or `length (mm)`; empty when the word has no unit in it."""
    found = _UNIT_IN_NAME.fullmatch(word[:_LONGEST])
    return found[1] if found else ""
