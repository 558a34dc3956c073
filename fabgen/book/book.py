"""The build book: one HTML page that opens offline in any browser and prints on A4.

Other stages hand over what they made; the book arranges it and adds words, which live in text files: `templates/`,
the `.html` beside each section, and `words/`. A section is a file in `sections/` with the constant `PLACE`, its place
in the book, and a function `content(book)` that returns what its template needs, or None where it has nothing to say.
The template of the same name sets `title`. `SHOWS_LENGTHS` marks a section with lengths that may rest on theory,
`NEW_PAGE` one that is taken to the bench by itself.
"""

import functools
import importlib
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import Any

import jinja2
from markupsafe import Markup

from fabgen import registry
from fabgen.book import wording
from fabgen.book.figures import Figure
from fabgen.design.arranged import Arranged, CutPlan
from fabgen.design.findings import Finding, clear
from fabgen.design.fixtures import Fixture
from fabgen.design.response import Response
from fabgen.frozen import frozen
from fabgen.physics.boom_mount import BoomMount

Content = Mapping[str, Any]
SECTIONS = "book/sections"
THEORY = "theory, unmeasured"
_HERE = Path(__file__).parent


@frozen
class Book:
    """What a section can write from.

    Attributes:
        arranged: the arranged design.
        findings: its judgements, worst first.
        cut_plan: which piece is sawn from which bar.
        views: the array as a whole, as drawn.
        pictures: the printed parts, keyed by the size name of the parts list.
        aids: the printed shop aids that the design needs, each with its picture.
        mounts: the mount of each rod on a metal boom as plain numbers, with its element.
        stamped: the design is not clear and every page says so.
        response: what the array solver found; None where it was not asked.
    """

    arranged: Arranged
    findings: tuple[Finding, ...]
    cut_plan: CutPlan
    views: tuple[Figure, ...] = ()
    pictures: tuple[Figure, ...] = ()
    aids: tuple[tuple[Fixture, Figure], ...] = ()
    mounts: tuple[tuple[str, BoomMount], ...] = ()
    stamped: bool = False
    response: Response | None = None

    @property
    def verdict(self) -> str:
        """`clear` or `not clear`."""
        return "clear" if clear(self.findings) else "not clear"

    @property
    def counts(self) -> Mapping[str, int]:
        """How many findings there are of each severity."""
        severities = [finding.severity for finding in self.findings]
        return {severity: severities.count(severity) for severity in ("fail", "warn", "note")}

    @property
    def tolerances(self) -> str:
        """Where the ± on lengths and stations come from."""
        shop = self.arranged.design.shop
        if self.response is not None and self.response.allotment is not None and self.response.allotment.feasible:
            return "allotted from the limits of the design file, element by element"
        if shop.stated_tolerance_mm:
            return f"±{shop.stated_tolerance_mm:g} mm, stated in the design file"
        return f"ISO 2768-1, class {shop.tolerance}, by size"

    @property
    def computed(self) -> bool:
        """Whether any length rests on a computed allowance that nobody measured."""
        return any(line.allowance.origin == "computed" for line in self.arranged.ledger.lines)

    @property
    def status(self) -> str:
        """The ledger's status line; a computed allowance is called theory."""
        return self.arranged.ledger.status + (f" – {THEORY}" if self.computed else "")


@frozen
class Section:
    """One section, written.

    Attributes:
        name: its file's stem, the anchor on the page.
        title: its heading.
        body: its HTML.
        theory: it shows lengths that rest on a computed allowance.
        new_page: it begins on a page of its own, to be taken to the bench.
    """

    name: str
    title: str
    body: Markup
    theory: bool
    new_page: bool


def book_html(book: Book) -> bytes:
    """The book of a design.

    Args:
        book: everything it is written from.

    Returns:
        One HTML document in UTF-8: styles and drawings inside it, no script, no address outside itself.
    """
    page = _environment().get_template("page.html")
    return page.render(book=book, sections=sections(book)).encode("utf-8") + b"\n"


def sections(book: Book) -> tuple[Section, ...]:
    """Every section of `sections/` that has something to say, in the order of their places."""
    environment = _environment()
    modules = [(entry.name, importlib.import_module(entry.module)) for entry in registry.entries(SECTIONS)]
    written = []
    for name, module in sorted(modules, key=lambda named: (named[1].PLACE, named[0])):
        content = module.content(book)
        if content is not None:
            made = environment.get_template(f"{name}.html").make_module({**content, "book": book})
            theory, new_page = book.computed and hasattr(module, "SHOWS_LENGTHS"), hasattr(module, "NEW_PAGE")
            body = Markup(str(made))  # noqa: S704 # the template escaped it
            written.append(Section(name, str(vars(made)["title"]), body, theory, new_page))
    return tuple(written)


@functools.cache
def _environment() -> jinja2.Environment:
    folders: Sequence[Path] = (_HERE / "templates", _HERE / "sections")
    environment = jinja2.Environment(
        loader=jinja2.FileSystemLoader(folders),
        autoescape=True,
        undefined=jinja2.StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    environment.filters.update(wording.FILTERS)
    return environment
