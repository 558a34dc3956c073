"""Imports run one way: cli → pipeline → stages → design, stock, physics → units, errors, registry, frozen."""

import ast
from collections.abc import Iterator

import pytest

pytestmark = pytest.mark.house

FOUNDATION = {"errors", "frozen", "units", "registry"}
STAGES = {"read", "correct", "arrange", "check", "draw", "model", "export", "book"}
RECORDS = {"design", "stock", "physics"}
# The program on one screen, and the lists of what a package and a coupon package hold.
RUN = {"pipeline", "contents", "coupon"}
# What each part of the package may import besides itself.
ALLOWED = {
    **dict.fromkeys(FOUNDATION, FOUNDATION),
    **dict.fromkeys(RECORDS, FOUNDATION),
    "design": FOUNDATION | {"stock"},  # a part's size looks up its thread or its drill; tables know no design
    **dict.fromkeys(STAGES, FOUNDATION | RECORDS),
    **dict.fromkeys(RUN, FOUNDATION | RECORDS | STAGES | RUN),
    "cli": FOUNDATION | RECORDS | STAGES | RUN,
    "__main__": {"cli"},
    "__init__": set(),
}
# A library behind one wrapper stays replaceable.
HOMES = {
    "cadquery": ("model/", "export/step"),
    "OCP": ("model/", "export/step"),
    "svgwrite": ("export/svg",),
    "ezdxf": ("export/dxf",),
    "typst": ("export/pdf",),
}
# Who writes to the disk; every other stage turns records into records.
WRITERS = ("export/", "cli/commands/new.py", "coupon.py")
WRITING = {"link", "mkdir", "rename", "rmdir", "symlink_to", "touch", "unlink", "write_bytes", "write_text"}
FILE_ACCESS = {"csv", "io", "json", "os", "pathlib", "shutil", "tempfile", "yaml"}


def imported(tree: ast.Module) -> Iterator[tuple[str, int]]:
    """Every module a syntax tree imports, inside functions too, with its line."""
    for node in ast.walk(tree):
        if isinstance(node, ast.Import):
            yield from ((alias.name, node.lineno) for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            if node.module in ("fabgen", "fabgen.stock"):  # `from fabgen import units` names a module
                yield from ((f"{node.module}.{alias.name}", node.lineno) for alias in node.names)
            else:
                yield ("." * node.level + (node.module or ""), node.lineno)


def part_of(path: str) -> str:
    """The part of the package that a module belongs to: its folder, or its own name at the top."""
    return path.split("/", maxsplit=1)[0].removesuffix(".py")


def against_arrows(path: str, tree: ast.Module) -> list[str]:
    here = part_of(path)
    wrong = []
    for name, line in imported(tree):
        top, _, rest = name.partition(".")
        there = rest.partition(".")[0]
        if name.startswith("."):
            wrong.append(f"fabgen/{path}:{line} imports relatively")
        elif top == "fabgen" and there not in {"", "__version__", here} and there not in ALLOWED.get(here, ()):
            wrong.append(f"fabgen/{path}:{line} {here} imports {there}")
        elif top in HOMES and not path.startswith(HOMES[top]):
            wrong.append(f"fabgen/{path}:{line} imports {top}, whose home is {' or '.join(HOMES[top])}")
    return wrong


def files_touched(tree: ast.Module) -> list[str]:
    """What in a module reaches for files."""
    found = [f"line {line}: import {name}" for name, line in imported(tree) if name.split(".")[0] in FILE_ACCESS]
    for node in ast.walk(tree):
        if isinstance(node, ast.Call):
            name = ast.unparse(node.func)
            if name == "open" or name.endswith((".load", ".loadtxt", ".genfromtxt", ".fromfile", ".save", ".savetxt")):
                found.append(f"line {node.lineno}: {name}()")
    return found


def files_written(tree: ast.Module) -> list[str]:
    """What in a module changes the disk."""
    found = []
    for node in ast.walk(tree):
        if not isinstance(node, ast.Call):
            continue
        name = ast.unparse(node.func).rpartition(".")[2]
        words = [*node.args[isinstance(node.func, ast.Name) :], *(each.value for each in node.keywords)]
        opened = {ast.unparse(word)[1:2] for word in words if isinstance(word, ast.Constant)}
        if name in WRITING or (name == "open" and opened & set("wax")):
            found.append(f"line {node.lineno}: {name}()")
    return found


def test_every_import_follows_the_arrows(modules: dict[str, ast.Module]) -> None:
    wrong = [line for path, tree in modules.items() for line in against_arrows(path, tree)]
    assert not wrong, "\n".join(wrong)


def test_every_folder_has_its_place_in_the_arrows(modules: dict[str, ast.Module]) -> None:
    assert {part_of(path) for path in modules} <= set(ALLOWED)


def test_physics_reads_and_writes_no_files(modules: dict[str, ast.Module]) -> None:
    wrong = [
        f"fabgen/{path} {what}"
        for path, tree in modules.items()
        if path.startswith("physics/")
        for what in files_touched(tree)
    ]
    assert not wrong, "\n".join(wrong)


def test_one_stage_writes_files(modules: dict[str, ast.Module]) -> None:
    written = {path: files_written(tree) for path, tree in modules.items()}
    assert {path: found for path, found in written.items() if found and not path.startswith(WRITERS)} == {}
    assert written["export/package.py"]


@pytest.mark.parametrize(
    ("path", "line"),
    [
        ("draw/plan.py", "from fabgen.check.rules import distance"),
        ("draw/plan.py", "import fabgen.arrange.place"),
        ("design/design.py", "from fabgen.correct import ledger"),
        ("stock/drills.py", "from fabgen.design.design import Boom"),
        ("physics/lines.py", "from fabgen.stock import tables"),
        ("design/design.py", "from fabgen import pipeline"),
        ("physics/lines.py", "from fabgen.design.design import Design"),
        ("check/fits.py", "def judge():\n    import cadquery"),
        ("export/glb.py", "from OCP.gp import gp_Pnt"),
        ("draw/plan.py", "import svgwrite"),
        ("read/design.py", "from . import units"),
    ],
)
def test_an_import_against_the_arrows_is_noticed(path: str, line: str) -> None:
    assert len(against_arrows(path, ast.parse(line))) == 1


@pytest.mark.parametrize(
    ("path", "line"),
    [
        ("draw/plan.py", "from fabgen.draw.paper import sheet"),
        ("draw/plan.py", "from fabgen import units"),
        ("model/parts/bush.py", "import cadquery as cq"),
        ("export/step.py", "from OCP.STEPControl import STEPControl_Writer"),
        ("pipeline.py", "from fabgen.check import judge"),
        ("cli/main.py", "from fabgen import __version__, pipeline"),
    ],
)
def test_an_import_along_the_arrows_passes(path: str, line: str) -> None:
    assert against_arrows(path, ast.parse(line)) == []


@pytest.mark.parametrize("line", ["import pathlib", "open('x')", "numpy.load('x')", "from csv import reader"])
def test_file_access_is_noticed(line: str) -> None:
    assert len(files_touched(ast.parse(line))) == 1


@pytest.mark.parametrize("line", ["open('x', 'w')", "path.open(mode='xb')", "path.write_text('x')", "os.mkdir('x')"])
def test_writing_is_noticed(line: str) -> None:
    assert len(files_written(ast.parse(line))) == 1


@pytest.mark.parametrize("line", ["open('x')", "path.open(encoding='utf-8')", "path.read_text()"])
def test_reading_passes(line: str) -> None:
    assert files_written(ast.parse(line)) == []
