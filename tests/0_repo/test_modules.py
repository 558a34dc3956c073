"""One file is one thing: short modules, documented functions, frozen records, and a top level without clutter."""

import ast
import fnmatch
import tomllib
from collections.abc import Iterator
from pathlib import Path

import pytest

pytestmark = pytest.mark.house

LONGEST_MODULE_LINES = 350
LONGEST_PIPELINE_LINES = 120
TOP = {
    "CHANGELOG.md",
    "DEVELOPERS.md",
    "LICENSE",
    "README.md",
    "constraints.txt",
    "designs",
    "fabgen",
    "output",
    "pyproject.toml",
    "tests",
}


def undocumented(tree: ast.Module) -> Iterator[str]:
    """Public functions and classes without a docstring, and the module itself."""
    if not ast.get_docstring(tree):
        yield "the module"
    for owner in (tree, *(node for node in tree.body if isinstance(node, ast.ClassDef))):
        for node in owner.body:
            if isinstance(node, ast.FunctionDef | ast.AsyncFunctionDef | ast.ClassDef):
                overload = any(ast.unparse(mark).endswith("overload") for mark in node.decorator_list)
                if not node.name.startswith("_") and not overload and not ast.get_docstring(node):
                    yield node.name


def loose_records(path: str, tree: ast.Module) -> Iterator[str]:
    """Dataclasses that could be changed after they are made.

    One that caches a property needs its dict; one that gathers, outside the records that stages pass on, holds
    collections that grow.
    """
    for node in ast.walk(tree):
        if isinstance(node, ast.ClassDef) and not node.name.startswith("_"):
            text = ast.unparse(node)
            gathers = any(kind in text for kind in (": list[", ": dict[", ": set["))
            if gathers and not path.startswith("design/"):
                continue
            for mark in map(ast.unparse, node.decorator_list):
                frozen = "frozen=True" in mark and ("slots=True" in mark or "cached_property" in text)
                if mark.startswith("dataclass") and not frozen:
                    yield node.name


def test_top_level_holds_what_it_should(tracked: tuple[str, ...]) -> None:
    assert {name.partition("/")[0] for name in tracked if not name.startswith(".")} == TOP


def test_output_is_kept_empty(tracked: tuple[str, ...]) -> None:
    assert [name for name in tracked if name.startswith("output/")] == ["output/.gitkeep"]


def test_modules_are_short(root: Path) -> None:
    lengths = {
        path.relative_to(root).as_posix(): len(path.read_text(encoding="utf-8").splitlines())
        for path in (root / "fabgen").rglob("*.py")
    }
    assert {path: lines for path, lines in lengths.items() if lines > LONGEST_MODULE_LINES} == {}
    assert lengths["fabgen/pipeline.py"] < LONGEST_PIPELINE_LINES


def test_public_names_are_documented(modules: dict[str, ast.Module]) -> None:
    wrong = [f"fabgen/{path}: {name}" for path, tree in modules.items() for name in undocumented(tree)]
    assert not wrong, "\n".join(wrong)


def test_records_are_frozen(modules: dict[str, ast.Module]) -> None:
    wrong = [f"fabgen/{path}: {name}" for path, tree in modules.items() for name in loose_records(path, tree)]
    assert not wrong, "\n".join(wrong)


def test_test_files_have_names_of_their_own(root: Path) -> None:
    names = [path.name for path in (root / "tests").rglob("*.py") if path.name != "conftest.py"]
    assert sorted(names) == sorted(set(names))


def test_everything_in_the_package_is_shipped(root: Path, tracked: tuple[str, ...]) -> None:
    settings = tomllib.loads((root / "pyproject.toml").read_text(encoding="utf-8"))
    patterns = settings["tool"]["setuptools"]["package-data"]["*"]
    packages = {Path(name).parent for name in tracked if name.startswith("fabgen/") and name.endswith("__init__.py")}
    left_out = []
    for name in tracked:
        path = Path(name)
        if path.parts[0] != "fabgen" or path.suffix == ".py":
            continue
        owner = next(folder for folder in path.parents if folder in packages)
        inside = path.relative_to(owner)
        if not any(len(inside.parts) == len(Path(p).parts) and fnmatch.fnmatch(str(inside), p) for p in patterns):
            left_out.append(name)
    assert left_out == []


def test_every_folder_of_modules_is_a_package(root: Path) -> None:
    folders = {path.parent for path in (root / "fabgen").rglob("*.py")}
    assert [str(folder) for folder in sorted(folders) if not (folder / "__init__.py").is_file()] == []


def test_faults_are_noticed() -> None:
    tree = ast.parse("@dataclass(frozen=True)\nclass Hole:\n    def row(self): ...\ndef f(): ...\ndef _g(): ...\n")
    assert list(undocumented(tree)) == ["the module", "Hole", "f", "row"]
    assert list(loose_records("design/holes.py", tree)) == ["Hole"]
