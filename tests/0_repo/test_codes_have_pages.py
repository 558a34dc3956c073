"""Every code that the program can print has a page, and every page belongs to a code that it can print."""

import ast
import re
from pathlib import Path

import pytest

pytestmark = pytest.mark.house

CODE = re.compile(r"[DLHFCAPSE]\d{2}")


def codes_in(tree: ast.Module) -> set[str]:
    """The codes that stand in a module as text of their own."""
    return {
        node.value
        for node in ast.walk(tree)
        if isinstance(node, ast.Constant) and isinstance(node.value, str) and CODE.fullmatch(node.value)
    }


def test_codes_and_pages_agree(root: Path, modules: dict[str, ast.Module]) -> None:
    printed = set().union(*map(codes_in, modules.values()))
    pages = {path.stem for path in (root / "fabgen/codes").glob("*.md")}
    assert printed
    assert {"without a page": printed - pages, "never printed": pages - printed} == {
        "without a page": set(),
        "never printed": set(),
    }


def test_pages_begin_with_their_meaning(root: Path) -> None:
    for path in sorted((root / "fabgen/codes").glob("*.md")):
        title, _, rest = path.read_text(encoding="utf-8").partition("\n")
        assert 5 < len(title) <= 100, path.name
        assert rest.strip(), f"{path.name} explains nothing below its title"


def test_codes_are_found() -> None:
    assert codes_in(ast.parse("note('H03', f'E01 is text', 'M3')")) == {"H03"}
