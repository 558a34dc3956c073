"""The book that `build` writes: real drawings, every printed part pictured, the same bytes under two hash seeds."""

import os
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest

from fabgen.pipeline import check

pytestmark = pytest.mark.slow

DESIGN = "designs/sonde-finder-401.yaml"


@pytest.fixture(scope="module")
def books(root: Path, tmp_path_factory: pytest.TempPathFactory) -> list[Path]:
    """Two books of one design, written by two processes that order their sets differently."""
    found = []
    for seed in ("1", "2"):
        output = tmp_path_factory.mktemp("output")
        command = [sys.executable, "-m", "fabgen", "build", DESIGN, "--only", "book", "--output", str(output)]
        surroundings = os.environ | {"PYTHONPATH": str(root), "PYTHONHASHSEED": seed}
        subprocess.run(command, cwd=root, env=surroundings, check=True, capture_output=True)
        found += output.glob("*/book.html")
    return found


def test_the_same_bytes_with_drawings(books: list[Path]) -> None:
    first, second = books
    assert first.read_bytes() == second.read_bytes()


def test_every_printed_part_has_its_picture(root: Path, books: list[Path]) -> None:
    html = books[0].read_text(encoding="utf-8")
    printed = {placed.size for placed in check(root / DESIGN).arranged.placed if placed.source == "printed"}
    assert printed
    for size in printed:
        assert f"<figcaption>{size}, " in html
    assert html.count("<figcaption>") >= len(printed) + 2


def test_the_real_book_opens_quietly_and_prints(browser: Any, books: list[Path]) -> None:
    browser.open(books[0])
    assert browser.requests() == [books[0].as_uri()]
    assert browser.complaints() == []
    assert browser.pdf().startswith(b"%PDF")


def test_names_inside_drawings_do_not_clash(browser: Any, books: list[Path]) -> None:
    browser.open(books[0])
    clashes = browser.value(
        "(ids => ids.length - new Set(ids).size)([...document.querySelectorAll('[id]')].map(e => e.id))"
    )
    assert clashes == 0
    assert browser.value("document.querySelectorAll('svg').length") > 5
