"""The nearest word that would have been right."""

import difflib
from collections.abc import Iterable

_LONGEST = 60
_FEW = 12


def nearest(written: str, known: Iterable[str]) -> str:
    """The known word nearest to the written one, without regard to case; empty when none is near."""
    lower = {word.lower(): word for word in known}
    word = written[:_LONGEST].lower().replace("_", "-")
    found = difflib.get_close_matches(word, lower, n=1, cutoff=0.55) or [
        each for each in lower if len(word) > 2 and (each.startswith(word) or word.startswith(each))
    ]
    return lower[found[0]] if found else ""


def suggestion(written: str, known: Iterable[str]) -> str:
    """A fix that names the nearest word first and then, when they are few, all of them."""
    words = list(known)
    listed = ", ".join(words)
    near = nearest(written, words)
    if not near:
        return f"known here: {listed}"
    return f"did you mean `{near}`?" + (f" Known here: {listed}" if 1 < len(words) <= _FEW else "")
