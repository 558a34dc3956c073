"""A CSV table says what rows in the file say, and every mistake is told at the table's own line and column."""

from dataclasses import replace
from pathlib import Path

import pytest

from fabgen.design.design import Design
from fabgen.errors import DesignErrors
from fabgen.read.reader import read_design

HEAD = """\
fabgen: 1
title: River gauge link
number: RGL-434-06
frequency: 434.2 MHz
units: mm
boom: {section: square, outside: 20, wall: 1.5, material: EN AW-6060 T66, overhang: {rear: 70, front: 70}}
mounts:
  line: {style: insulated-through, hole: 8}
rods: {diameter: 4, material: EN AW-6060 T66}
feed: {kind: straight-dipole}
elements:
"""
ROWS = """\
  - {id: R, role: reflector, at: 0, length: 340}
  - {id: DE, role: driven, at: 138, length: 322, mount: feed}
  - {id: D1, role: director, at: 190, length: 309, diameter: 3/16 in, finish: painted}
"""
TABLE = """\
id,role,at,length,mount,diameter,finish
R,reflector,0,340,,,
DE,driven,138,322,feed,,
D1,director,190,309,,3/16 in,painted
"""

# Each case: name, a piece of the sound table, what stands in its place, and where which problem is told.
CASES = [
    ("unknown column", "length", "lenght", "t.csv 1:12 D06"),
    ("column with its unit", "length", "length_mm", "t.csv 1:12 D06"),
    ("two columns of one name", "finish", "id", "t.csv 1:34 D05"),
    ("column missing", "id,role", "id,finish", "t.csv 1:1 D07; t.csv 1:36 D05"),
    ("decimal comma", "R,reflector,0,340,,,", "R,reflector,0,340,5,,,", "t.csv 2:23 D22"),
    ("decimal comma in quotes", "0,340", '0,"340,5"', "t.csv 2:15 D13"),
    ("empty length", "0,340", "0,", "t.csv 2:15 D07"),
    ("spaces for a length", "0,340", "0,  ", "t.csv 2:17 D07"),
    ("row too short", "R,reflector,0,340,,,", "R,reflector", "t.csv 2:1 D07; t.csv 2:1 D07"),
    ("misspelt role", "reflector", "reflektor", "t.csv 2:3 D09"),
    ("role in quotes, misspelt", "reflector", '"reflektor"', "t.csv 2:3 D09"),
    ("misspelt mount", "322,feed", "322,fed", "t.csv 3:19 D21"),
    ("unknown mount", "309,,", "309,lin,", "t.csv 4:21 D16"),
    ("negative length", "340", "-340", "t.csv 2:15 D12"),
    ("quote left open", "reflector", '"reflector', "t.csv 2:3 D22"),
    ("text after a quote", "reflector", '"reflector"x', "t.csv 2:14 D22"),
    ("two at one station", "190", "138.0", "t.csv 4:13 D17"),
    ("same id", "D1", "de", "t.csv 4:1 D18"),
    ("semicolons", ",", ";", "t.csv 1:3 D22"),
    ("bars", ",", "|", "t.csv 1:3 D22"),
    ("no header", "id,role,at,length,mount,diameter,finish\n", "", "t.csv 1:1 D22"),
    ("a title above the header", "id,role", "My array, 434 MHz\nid,role", "t.csv 1:1 D22"),
    ("words of another table", "id,role,at", "element,role,station", "t.csv 1:1 D06; t.csv 1:14 D06"),
    ("value in a column without a name", "finish\n", ",\n", "t.csv 4:30 D22"),
    ("tabs", ",", "\t", "t.csv 1:3 D22"),
    (
        "only a header",
        "R,reflector,0,340,,,\nDE,driven,138,322,feed,,\nD1,director,190,309,,3/16 in,painted\n",
        "",
        "d.yaml 11:1 D07",
    ),
]


def read(folder: Path, elements: str) -> Design:
    (folder / "d.yaml").write_text(HEAD + elements, encoding="utf-8")
    return read_design(folder / "d.yaml", shown_as="d.yaml").design


def told(folder: Path, elements: str) -> str:
    with pytest.raises(DesignErrors) as stopped:
        read(folder, elements)
    problems = stopped.value.problems
    assert all(problem.fix and problem.message for problem in problems)
    return "; ".join(f"{p.place.file} {p.place.line}:{p.place.column} {p.code}" for p in problems)


def test_a_table_says_what_rows_say(tmp_path: Path) -> None:
    (tmp_path / "t.csv").write_text(TABLE, encoding="utf-8")
    rows, table = read(tmp_path, ROWS), read(tmp_path, "  table: t.csv\n")
    assert table == replace(rows, sha256=table.sha256)
    assert table.sha256 != rows.sha256


@pytest.mark.parametrize(
    "text",
    [
        "\ufeff" + TABLE,
        TABLE.replace("\n", "\r\n"),
        TABLE.replace(",", " , "),
        TABLE.replace("\n", "\n\n"),
        TABLE.replace("\n", "\n,,,,,,\n"),
        TABLE.replace("driven", '"driven"').replace("3/16 in", '"3/16"""'),
        TABLE.rstrip("\n"),
        TABLE.replace("\n", ",,\n"),
    ],
    ids=[
        "byte order mark",
        "carriage returns",
        "spaces",
        "blank lines",
        "empty rows",
        "quotes",
        "no last line end",
        "empty columns",
    ],
)
def test_spellings_of_one_table(tmp_path: Path, text: str) -> None:
    (tmp_path / "t.csv").write_bytes(text.encode())
    design = read(tmp_path, "  table: t.csv\n")
    assert design == replace(read(tmp_path, ROWS), sha256=design.sha256)


@pytest.mark.parametrize("case", CASES, ids=[case[0] for case in CASES])
def test_a_mistake_is_told_in_the_table(tmp_path: Path, case: tuple[str, str, str, str]) -> None:
    _, old, new, expected = case
    assert old in TABLE
    text = TABLE.replace(old, new) if old == "," else TABLE.replace(old, new, 1)
    (tmp_path / "t.csv").write_text(text, encoding="utf-8")
    assert told(tmp_path, "  table: t.csv\n") == expected


@pytest.mark.parametrize(
    ("elements", "expected"),
    [
        ("  table: u.csv\n", "d.yaml 12:10 D23"),
        ("  table: ../t.csv\n", "d.yaml 12:10 D23"),
        ("  table: sub/t.csv\n", "d.yaml 12:10 D23"),
        ("  table: 'sub\\t.csv'\n", "d.yaml 12:10 D23"),
        ("  table: /etc/hostname\n", "d.yaml 12:10 D23"),
        ("  table: 'C:t.csv'\n", "d.yaml 12:10 D23"),
        ("  table: ..\n", "d.yaml 12:10 D23"),
        ('  table: "t\\0.csv"\n', "d.yaml 12:10 D23"),
        ("  table: folder\n", "d.yaml 12:10 D23"),
        ("  table:\n", "d.yaml 12:3 D07"),
        ("  table: [t.csv]\n", "d.yaml 12:3 D07"),
        ("  {}\n", "d.yaml 11:1 D07"),
        ("  tabel: t.csv\n", "d.yaml 12:3 D06"),
        ("  table: t.csv\n  sep: x\n", "d.yaml 13:3 D06"),
    ],
)
def test_a_table_lies_beside_the_design_file(tmp_path: Path, elements: str, expected: str) -> None:
    (tmp_path / "t.csv").write_text(TABLE, encoding="utf-8")
    (tmp_path / "folder").mkdir()
    assert told(tmp_path, elements) == expected


def test_a_link_does_not_lead_out(tmp_path: Path) -> None:
    inside, outside = tmp_path / "in", tmp_path / "out"
    inside.mkdir()
    outside.mkdir()
    (outside / "t.csv").write_text(TABLE, encoding="utf-8")
    (inside / "t.csv").symlink_to(outside / "t.csv")
    assert told(inside, "  table: t.csv\n") == "d.yaml 12:10 D23"
    (inside / "u.csv").write_text(TABLE, encoding="utf-8")
    (inside / "v.csv").symlink_to("u.csv")
    assert len(read(inside, "  table: v.csv\n").elements) == 3


def test_the_nearest_table_is_named(tmp_path: Path) -> None:
    (tmp_path / "elements.csv").write_text(TABLE, encoding="utf-8")
    with pytest.raises(DesignErrors, match=r"did you mean elements\.csv\?"):
        read(tmp_path, "  table: element.csv\n")


def test_nothing_is_concluded_from_a_row_that_was_refused(tmp_path: Path) -> None:
    """Neither that there are no rows, nor that the boom ends before the clamp's station."""
    text = "id,role,at,length\nDE,driven,0,322,5\nD1,director,190,309,5\n"
    (tmp_path / "t.csv").write_text(text, encoding="utf-8")
    assert told(tmp_path, "  table: t.csv\n") == "t.csv 2:17 D22; t.csv 3:21 D22"
    (tmp_path / "t.csv").write_text(text.replace("322,5", "322"), encoding="utf-8")
    assert told(tmp_path, "  table: t.csv\nclamp: {mast: 38, at: 250}\n") == "t.csv 3:21 D22"


def test_an_empty_table(tmp_path: Path) -> None:
    (tmp_path / "t.csv").write_text("\n\n", encoding="utf-8")
    assert told(tmp_path, "  table: t.csv\n") == "t.csv 1:1 D22"


def test_a_table_that_is_no_text(tmp_path: Path) -> None:
    (tmp_path / "t.csv").write_bytes(TABLE.encode() + b"\xe4\n")
    assert told(tmp_path, "  table: t.csv\n") == "t.csv 5:1 D01"
    (tmp_path / "t.csv").write_bytes(b"PK\x03\x04\x14\x00\x06\x00")
    with pytest.raises(DesignErrors, match="a workbook or another archive"):
        read(tmp_path, "  table: t.csv\n")
    (tmp_path / "t.csv").write_bytes(b"x" * 1_000_001)
    assert told(tmp_path, "  table: t.csv\n") == "t.csv 1:1 D02"
