"""What is readable but deserves a second look is told, and what is usual is not."""

from pathlib import Path

import pytest

from fabgen import registry
from fabgen.errors import DesignErrors
from fabgen.read.reader import read_design
from fabgen.read.starter import starter

GOOD = starter("trial")
DESIGNS = sorted((Path(__file__).resolve().parents[2] / "designs").glob("*.yaml"))

# Each case: pieces of the starter and what stands in their places, and the notes as code, severity and where.
CASES = [
    ("a usual array", "", "", []),
    ("rod in inches", "diameter: 4", "diameter: 0.16", [("D30", "warn", "diameter, d.yaml line 9")]),
    ("rod in inches, with a unit", "diameter: 4", "diameter: 0.16 mm", [("D30", "warn", "diameter, d.yaml line 9")]),
    ("boom in millimetres", "outside: 20", "outside: 20 in", [("D30", "warn", "outside, d.yaml line 6")]),
    ("mast in inches", "mast: 38", "mast: 12 mm", []),
    ("one length in inches", "length: 296", "length: 11.7", [("D30", "warn", "D1")]),
    ("rows out of order", "at: 0", "at: 400", [("D31", "note", "DE after R")]),
    ("as cut", "clamp:", "lengths_are: as-cut\nclamp:", [("D32", "note", "lengths_are")]),
    ("solid bar", ", wall: 1.5", "", [("D33", "note", "boom")]),
    ("solid oak", ", wall: 1.5, material: EN AW-6060 T66", ", material: oak", []),
    ("long rod", "length: 340", "length: 600", [("D34", "warn", "R")]),
    ("wrong frequency", "434.2", "145.2", [("D34", "warn", "R, DE, D1"), ("D36", "warn", "")]),
    ("far neighbours", "at: 210", "at: 1210", [("D36", "warn", "DE to D1")]),
    ("near neighbours", "at: 210", "at: 145", [("D36", "warn", "DE to D1")]),
    ("unused mount", "mounts:", "mounts:\n  old: {style: on-top}", [("D35", "note", "mounts.old")]),
    ("nothing is driven", "role: driven", "role: director", [("D35", "note", "feed")]),
]


@pytest.mark.parametrize("case", CASES, ids=[case[0] for case in CASES])
def test_what_deserves_a_second_look(tmp_path: Path, case: tuple[str, str, str, list[tuple[str, str, str]]]) -> None:
    _, old, new, expected = case
    text = GOOD.replace(old, new, 1)
    if "through-nonmetal" not in text and "oak" in text:
        text = text.replace("insulated-through", "through-nonmetal")
    if "old:" in text:
        text = text.replace("length: 340", "length: 340, mount: line").replace(
            "length: 296", "length: 296, mount: line"
        )
    path = tmp_path / "d.yaml"
    path.write_text(text, encoding="utf-8")
    notes = read_design(path, shown_as="d.yaml").notes
    found = [(note.code, note.severity, note.where) for note in notes]
    assert found == [each for each in expected if each[2]]
    for note in notes:
        assert note.title == registry.code_title(note.code)
        assert note.advice


def test_the_other_unit_is_named(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    path.write_text(GOOD.replace("outside: 20,", "outside: 20 in,"), encoding="utf-8")
    assert [note.advice for note in read_design(path).notes] == ["if 20 mm was meant, write `20 mm`"]
    path.write_text(GOOD.replace("units: mm", "units: in"), encoding="utf-8")
    with pytest.raises(DesignErrors, match=r"was 1\.5 mm meant"):
        read_design(path)


@pytest.mark.parametrize("path", DESIGNS, ids=lambda path: path.stem)
def test_nothing_warns_in_the_demo_designs(path: Path) -> None:
    assert [note for note in read_design(path).notes if note.severity != "note"] == []
