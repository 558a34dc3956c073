"""What a package holds: one function per part of it, each loading only what it needs."""

import json
from collections.abc import Callable, Sequence
from dataclasses import asdict, dataclass
from functools import cached_property

from fabgen import __version__
from fabgen.design.arranged import Arranged, CutPlan
from fabgen.design.drawing import Sheet
from fabgen.design.findings import Finding, clear
from fabgen.design.package import PackageFile, Say
from fabgen.design.response import Response
from fabgen.design.solids import AssemblyItem, Print

CROWDED = 120
SPECKS = ("bush", "crush_sleeve", "nut", "push_ring", "screw", "sleeve", "snap_keeper", "washer")
"""Parts left out of the picture of an array of more than so many: specks there, and most of its hidden lines."""

Files = tuple[PackageFile, ...]


@dataclass(frozen=True)
class Order:
    """What a package is to be written from; solids are made when they are first asked for."""

    arranged: Arranged
    findings: tuple[Finding, ...]
    cut_plan: CutPlan
    stamped: bool
    response: Response | None = None

    @cached_property
    def assembly(self) -> tuple[AssemblyItem, ...]:
        """Every placed part with its solid."""
        from fabgen.model.assembly import assembly

        return assembly(self.arranged)

    @cached_property
    def prints(self) -> tuple[Print, ...]:
        """Every distinct printed part of the array in print pose."""
        from fabgen.model.prints import prints

        return prints(self.arranged)


def package_files(
    arranged: Arranged,
    findings: tuple[Finding, ...],
    *,
    stamped: bool,
    only: Sequence[str],
    say: Say,
    response: Response | None = None,
) -> Files:
    """All files of a package but its manifest.

    Args:
        arranged: the arranged design.
        findings: its judgements.
        stamped: every sheet carries the stamp of a design that is not cleared.
        only: parts to write; empty for all.
        say: takes progress.
        response: what the array solver found; None leaves its tables and pictures out.
    """
    from fabgen.arrange.bars import plan

    order = Order(arranged, findings, plan(arranged.cuts, arranged.design.shop), stamped, response)
    files = [_findings(findings)]
    for group, written in _WRITERS.items():
        if not only or group in only:
            say(f"{arranged.design.name}: {group}")
            files += written(order)
    return tuple(files)


def versions() -> dict[str, str]:
    """Program and libraries that shape the bytes of a package."""
    import importlib.metadata

    names = ("cadquery", "cadquery-ocp", "ezdxf", "jinja2", "numpy", "scipy", "svgwrite", "trimesh", "typst")
    return {"fabgen": __version__} | {name: importlib.metadata.version(name) for name in names}


def _findings(findings: tuple[Finding, ...]) -> PackageFile:
    records = [{key: value for key, value in asdict(finding).items() if key != "title"} for finding in findings]
    content = {"verdict": "clear" if clear(findings) else "not clear", "findings": records}
    text = json.dumps(content, indent=2, ensure_ascii=False) + "\n"
    return PackageFile("findings.json", text.encode("utf-8"), "what the checks found")


def _tables(order: Order) -> Files:
    from fabgen.export import response_tables, tables

    electrical = response_tables.files(order.response) if order.response else ()
    return tables.files(order.arranged, order.cut_plan) + electrical


def _templates(order: Order) -> Files:
    from fabgen.draw.sheet_list import sheets_of
    from fabgen.draw.tiling import tile
    from fabgen.export.pdf import pdf
    from fabgen.stock.tables import paper_size_mm

    design = order.arranged.design
    files: list[PackageFile] = []
    pages: list[Sheet] = []
    for sheet in sheets_of("templates", order.arranged, order.cut_plan, stamp=order.stamped):
        files += _drawn(f"templates/{sheet.name}", sheet, f"1:1 template of {sheet.name}")
        tiling = tile(sheet, paper_size_mm(design.shop.paper), number=design.number, revision=design.revision)
        pages += tiling.pages
    title = f"{design.number} {design.revision} templates"
    files.append(PackageFile("templates/templates.pdf", pdf(pages, title), "the templates, tiled at exactly 1:1"))
    return tuple(files)


def _bench(order: Order) -> Files:
    from fabgen.draw.sheet_list import sheets_of
    from fabgen.export.pdf import pdf

    design = order.arranged.design
    pages = sheets_of("bench", order.arranged, order.cut_plan, stamp=order.stamped)
    return (PackageFile("bench.pdf", pdf(pages, f"{design.number} {design.revision} bench"), "for the drill press"),)


def _drawings(order: Order) -> Files:
    from fabgen.draw.sheet_list import sheets_of
    from fabgen.export.pdf import pdf

    files: list[PackageFile] = []
    for sheet in sheets_of("drawings", order.arranged, order.cut_plan, stamp=order.stamped):
        files += _drawn(f"drawings/{sheet.name}", sheet, sheet.title)
        files.append(PackageFile(f"drawings/{sheet.name}.pdf", pdf([sheet], sheet.title), sheet.title))
    return tuple(files)


def _drawn(stem: str, sheet: Sheet, purpose: str) -> list[PackageFile]:
    """One sheet as SVG and DXF."""
    from fabgen.export.dxf import dxf
    from fabgen.export.svg import svg

    return [PackageFile(f"{stem}.svg", svg(sheet), purpose), PackageFile(f"{stem}.dxf", dxf(sheet), purpose)]


def _model(order: Order) -> Files:
    from fabgen.check.pairs import near_pairs
    from fabgen.export import glb, step
    from fabgen.model.confirm import confirm

    confirm(near_pairs(order.arranged))
    name = order.arranged.design.name
    return (
        PackageFile("model/assembly.step", step.assembly_bytes(order.assembly, name=name), "the array, to measure"),
        PackageFile("model/assembly.glb", glb.assembly_bytes(order.assembly, name=name), "the array, to look at"),
    )


def _prints(order: Order) -> Files:
    return tuple(
        file for each in order.prints for file in _printed(each, f"{each.product.name}, print {each.quantity}")
    )


def _fixtures(order: Order) -> Files:
    from fabgen.arrange.fixtures import fixtures
    from fabgen.model.prints import fixture_prints

    aids = fixtures(order.arranged)
    return tuple(
        file
        for aid, each in zip(aids, fixture_prints(aids), strict=True)
        for file in _printed(each, f"{aid.label}, print {aid.quantity}: {aid.purpose}")
    )


def _printed(item: Print, purpose: str) -> Files:
    """One print in the three formats."""
    from fabgen.export import step, stl, threemf

    writers = (("stl", stl), ("3mf", threemf), ("step", step))
    return tuple(
        PackageFile(f"prints/{item.stem}.{ending}", writer.part_bytes(item.product), purpose)
        for ending, writer in writers
    )


def _book(order: Order) -> Files:
    from fabgen.arrange.fixtures import fixtures
    from fabgen.book.book import Book, book_html
    from fabgen.book.figures import figure
    from fabgen.correct.metal_mounts import metal_mounts
    from fabgen.draw.sheet_list import sheets_of
    from fabgen.export.svg import svg
    from fabgen.model.pictures import assembly_picture, part_picture
    from fabgen.model.prints import fixture_prints

    name, shown = order.arranged.design.name, order.assembly
    if len(shown) > CROWDED:
        name += " without bushes, keepers and fasteners"
        large = {placed.name for placed in order.arranged.placed if placed.part not in SPECKS}
        shown = tuple(item for item in shown if item.name in large)
    views = [
        assembly_picture(shown, name=name),
        *sheets_of("drawings", order.arranged, order.cut_plan, stamp=order.stamped),
    ]
    pictures = [part_picture(each.product) for each in order.prints]
    aids = fixtures(order.arranged)
    aid_pictures = [part_picture(each.product) for each in fixture_prints(aids)]
    book = Book(
        order.arranged,
        order.findings,
        order.cut_plan,
        views=tuple(figure(sheet, svg(sheet)) for sheet in views),
        pictures=tuple(figure(sheet, svg(sheet)) for sheet in pictures),
        aids=tuple((aid, figure(sheet, svg(sheet))) for aid, sheet in zip(aids, aid_pictures, strict=True)),
        mounts=metal_mounts(order.arranged.design),
        stamped=order.stamped,
        response=order.response,
    )
    return (PackageFile("book.html", book_html(book), "the build book: opens offline in any browser"),)


_WRITERS: dict[str, Callable[[Order], Files]] = {
    "tables": _tables,
    "templates": _templates,
    "bench": _bench,
    "drawings": _drawings,
    "model": _model,
    "prints": _prints,
    "fixtures": _fixtures,
    "book": _book,
}
GROUPS = tuple(_WRITERS)
"""What `--only` can name."""
