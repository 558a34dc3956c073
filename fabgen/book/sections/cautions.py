"""Cautions that apply to this array, with the bodies that issue the rules."""

from pathlib import Path

from fabgen.book.book import Book, Content
from fabgen.frozen import frozen
from fabgen.physics import exposure

PLACE = 30
FOLDER = Path(__file__).parent.parent / "words" / "cautions"
RADIATED_W = (1.0, 10.0, 100.0, 1000.0)
GROUND_FACTOR = 4.0


@frozen
class Caution:
    """One caution.

    Attributes:
        name: stem of its file.
        title: its heading.
        applies: `always`, or what the array must have for it to apply.
        bodies: who issues the rule, with provenance.
        paragraphs: the text.
    """

    name: str
    title: str
    applies: str
    bodies: tuple[str, ...]
    paragraphs: tuple[str, ...]


def cautions() -> tuple[Caution, ...]:
    """Every caution of `words/cautions`, in the order of the files' numbers."""
    return tuple(_read(path) for path in sorted(FOLDER.glob("*.txt")))


def applying(book: Book) -> tuple[Caution, ...]:
    """The cautions that apply to this array.

    Raises:
        KeyError: a file names a condition that nobody knows.
    """
    holds = {
        "always": True,
        "driven": bool(book.arranged.design.feeds),
        "clamped": any(placed.part == "u_bolt" for placed in book.arranged.placed),
        "drilled": bool(book.arranged.holes),
        "printed": any(placed.source == "printed" for placed in book.arranged.placed),
    }
    return tuple(caution for caution in cautions() if holds[caution.applies])


def content(book: Book) -> Content:
    """The cautions, and distances in front of the array for powers it may be fed with."""
    frequency_mhz = book.arranged.design.frequency_mhz
    limit_w_m2 = exposure.public_limit_w_m2(frequency_mhz)
    distances = []
    if limit_w_m2 is not None:
        for radiated_w in RADIATED_W:
            free_m = exposure.distance_m(radiated_w, limit_w_m2)
            ground_m = exposure.distance_m(radiated_w, limit_w_m2, reflection_factor=GROUND_FACTOR)
            distances.append((radiated_w, free_m, ground_m))
    return {"cautions": applying(book), "limit_w_m2": limit_w_m2, "distances": distances}


def _read(path: Path) -> Caution:
    head, _, text = path.read_text(encoding="utf-8").partition("\n\n")
    title, *fields = head.splitlines()
    pairs = [field.partition(": ")[::2] for field in fields]
    (applies,) = (value for key, value in pairs if key == "applies")
    bodies = tuple(value for key, value in pairs if key == "issued by")
    return Caution(path.stem, title, applies, bodies, tuple(text.strip().splitlines()))
