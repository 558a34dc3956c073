"""Beside every hole of a template stands how far its station may be off, allotted or general."""

from dataclasses import replace
from pathlib import Path

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.arrange.bars import plan
from fabgen.correct.ledger import correct
from fabgen.design.arranged import Arranged
from fabgen.design.drawing import Text
from fabgen.draw.sheet_list import sheets_of
from fabgen.read.reader import read_design

DESIGNS = sorted((Path(__file__).resolve().parents[2] / "designs").glob("*.yaml"))


def lettering(arranged: Arranged) -> str:
    """All words of the boom's template, in order of drawing."""
    sheets = sheets_of("templates", arranged, plan(arranged.cuts, arranged.design.shop))
    return " ".join(item.text for sheet in sheets for item in sheet.items if isinstance(item, Text))


@pytest.mark.parametrize("path", DESIGNS, ids=lambda path: path.stem)
def test_every_rod_hole_has_its_tolerance(path: Path) -> None:
    design = read_design(path).design
    arranged = arrange(design, correct(design))
    told = [0.1 + 0.01 * k for k in range(len(arranged.holes))]
    marked = tuple(replace(hole, tolerance_mm=told[k]) for k, hole in enumerate(arranged.holes))
    words = lettering(replace(arranged, holes=marked))
    by_number: dict[str, list[float]] = {}
    for hole in marked:
        by_number.setdefault(hole.number, []).append(hole.tolerance_mm)
    missing = [number for number, all_mm in by_number.items() if not any(f"±{mm:g}" in words for mm in all_mm)]
    assert missing == []
