"""Every mistake of a design file is told with its code, line and column, all of them in one run.

Each case replaces one piece of a sound design; the places were read off the marked lines by eye.
"""

from pathlib import Path

import pytest

from fabgen import registry
from fabgen.errors import DesignErrors
from fabgen.read.reader import read_design

BASE = """\
fabgen: 1
title: River gauge link
number: RGL-434-06
frequency: 434.2 MHz
units: mm
boom:
  section: square
  outside: 20 mm
  wall: 1.5 mm
  material: EN AW-6060 T66
  overhang: {rear: 70 mm, front: 70 mm}
mounts:
  line: {style: insulated-through, hole: 8 mm}
rods: {diameter: 4 mm, material: EN AW-6060 T66}
elements:
  - {id: R, role: reflector, at: 0, length: 340}
  - {id: DE, role: driven, at: 138, length: 322}
  - {id: D1, role: director, at: 190, length: 309}
feed: {kind: straight-dipole, gap: 10 mm}
clamp: {mast: 38 mm}
"""
ELEMENTS = BASE[BASE.index("  - {id: R") : BASE.index("feed:")]
BOOM = BASE[BASE.index("boom:") : BASE.index("mounts:")]

CARBON = (
    "material: EN AW-6060 T66\n",
    "material: {name: carbon tube, kind: grp, density: 1600, conductive: true}\n",
)

# Each case: name, pieces of the sound design and what stands in their places, and where which problem is told.
TEXT = [
    ("tab in the indentation", "  section: square", "\tsection: square", "7:1 D03"),
    (
        "two tabs are two problems",
        "  section: square\n  outside: 20 mm",
        "\tsection: square\n\toutside: 20 mm",
        "7:1 D03; 8:1 D03",
    ),
    ("control character", "River gauge", "River\x07gauge", "2:13 D01"),
    ("right-to-left mark", "River gauge", "River\u202egauge", "2:13 D01"),
    ("bracket left open", "front: 70 mm}", "front: 70 mm", "11:13 D03"),
    ("quote left open", "title: River", "title: 'River", "2:8 D03"),
    ("colon in a text", "title: River gauge", "title: River: gauge", "2:13 D03"),
    ("key without colon", "number: RGL-434-06", "number RGL-434-06", "3:1 D03"),
    ("keys out of line", "  wall: 1.5 mm", "   wall: 1.5 mm", "9:8 D03"),
    ("row in a mapping", "rods: {", "- rods: {", "14:1 D03"),
    ("value begins with a sign", "title: River", "title: @River", "2:8 D03"),
    ("comma forgotten", "diameter: 4 mm, material", "diameter: 4 mm material: x", "14:31 D03"),
    ("no-break space in the indentation", "  section: square", "\u00a0 section: square", "7:1 D03"),
    ("space without width", "units: mm", "un\u200bits: mm", "5:3 D01"),
    ("no space after the colon", "units: mm", "units:mm", "5:1 D03"),
    ("alias", "wall: 1.5 mm", "wall: *w", "9:9 D04"),
    ("anchor", "wall: 1.5 mm", "wall: &w 1.5 mm", "9:9 D04"),
    ("anchor and alias", "  outside: 20 mm\n  wall: 1.5 mm", "  outside: &w 20 mm\n  wall: *w", "8:12 D04; 9:9 D04"),
    ("merge key", "rods: {diameter", "rods: {<<: {finish: bare}, diameter", "14:8 D04"),
    ("tag", "length: 340", "length: !!int 340", "16:45 D04"),
    ("tag on a mapping", "rods: {", "rods: !rod {", "14:7 D04"),
    ("second document", "feed:", "---\nfeed:", "19:1 D04"),
    ("key is a list", "rods:", "? [rods]\n:", "14:3 D08; 17:5 D07"),
    ("too deep", "title: River gauge link", "title: [[[[[[[[[[[[[[[[[[[[[x]]]]]]]]]]]]]]]]]]]]]", "2:27 D02"),
    ("doubled key", "units: mm", "units: mm\nunits: in", "6:1 D05"),
    ("doubled key in a row", "id: R,", "id: R, id: R,", "16:13 D05"),
    ("doubled section", "clamp:", "rods: {diameter: 5 mm, material: ASA}\nclamp:", "20:1 D05"),
]
KEYS = [
    ("misspelt top key", "title:", "titel:", "2:1 D06"),
    ("unknown top key", "units: mm", "units: mm\nantenna: big", "6:1 D06"),
    ("misspelt key in a section", "wall:", "wal:", "9:3 D06"),
    ("misspelt key in a row", "length: 340", "lenght: 340", "16:37 D06"),
    ("misspelt key, deep", "hole: 8 mm}", "hole: 8 mm, bush: {materiel: ASA}}", "13:55 D06"),
    ("unknown unit in a key", "wall: 1.5 mm", "wall_mm: 1.5 mm", "9:3 D06"),
    ("title missing", "title: River gauge link\n", "", "1:1 D07"),
    ("boom missing", BOOM, "", "1:1 D07"),
    ("key missing in a section", "  section: square\n", "", "6:1 D07"),
    ("key missing in a row", ", length: 340", "", "16:5 D07"),
    ("role missing", "role: director, ", "", "18:5 D07"),
    ("front missing", ", front: 70 mm", "", "11:3 D07"),
    ("rods missing", "rods: {diameter: 4 mm, material: EN AW-6060 T66}\n", "", "15:5 D07"),
    ("rod diameter missing", "diameter: 4 mm, ", "", "14:7 D07"),
    ("mounts missing", "mounts:\n  line: {style: insulated-through, hole: 8 mm}\n", "", "1:1 D07"),
    ("value missing", "number: RGL-434-06", "number:", "3:1 D07"),
    ("value is null", "wall: 1.5 mm", "wall: ~", "9:9 D07"),
    ("mount without value", "line: {style: insulated-through, hole: 8 mm}", "line:", "13:3 D07"),
    ("mount without a name", "  line: {", "  ~: {", "13:3 D07"),
    ("mounts is a list", "mounts:\n  line: {style: insulated-through, hole: 8 mm}", "mounts: [line]", "12:9 D08"),
    ("two lengths in one", "outside: 20 mm", "outside: 20 x 20 mm", "8:12 D08"),
    ("no rows", ELEMENTS, "  []\n", "15:1 D07"),
    ("elements without value", ELEMENTS, "", "15:1 D07"),
    ("section is a word", "feed: {kind: straight-dipole, gap: 10 mm}", "feed: straight-dipole", "19:7 D08"),
    ("section is a list", "clamp: {mast: 38 mm}", "clamp: [38 mm]", "20:8 D08"),
    ("row is a number", "  - {id: R,", "  - 5\n  - {id: R,", "16:5 D08"),
    (
        "elements is a word",
        f"elements:\n{ELEMENTS}",
        "elements: rows.csv\n",
        "15:11 D08",
    ),
    ("list for one value", "wall: 1.5 mm", "wall: [1.5 mm]", "9:9 D08"),
    ("mapping for one value", "wall: 1.5 mm", "wall: {t: 1.5 mm}", "9:9 D08"),
    ("three sides", "outside: 20 mm", "outside: [20, 20, 20]", "8:12 D08"),
    (
        "decimal comma makes two sides",
        "section: square\n  outside: 20 mm",
        "section: rectangular\n  outside: [30,5, 20]",
        "8:12 D08",
    ),
    ("bed of two", "clamp:", "printer: {bed: [220, 220]}\nclamp:", "20:16 D08"),
]
VALUES = [
    ("format version", "fabgen: 1", "fabgen: 2", "1:9 D09"),
    ("version as text", "fabgen: 1", "fabgen: v1", "1:9 D09"),
    ("unknown section", "section: square", "section: squar", "7:12 D09"),
    ("capitals count", "role: reflector", "role: Reflector", "16:19 D09"),
    ("unknown style", "style: insulated-through", "style: insulated", "13:17 D09"),
    ("unknown units", "units: mm", "units: cm", "5:8 D09"),
    ("unknown feed", "kind: straight-dipole", "kind: dipole", "19:14 D09"),
    ("unknown paper", "clamp:", "shop: {paper: A3}\nclamp:", "20:15 D09"),
    ("unknown tolerance", "clamp:", "shop: {tolerance: fine}\nclamp:", "20:19 D09"),
    ("unknown station word", "{mast: 38 mm}", "{mast: 38 mm, at: middle}", "20:26 D09"),
    ("decimal comma", "outside: 20 mm", "outside: 20,5 mm", "8:12 D13"),
    ("decimal comma in braces", "gap: 10 mm}", "gap: 4,5 mm}", "19:36 D13"),
    ("decimal comma in braces, bare", "length: 340}", "length: 340,5}", "16:45 D13"),
    ("decimal comma in a frequency", "434.2 MHz", "434,2 MHz", "4:12 D13"),
    ("decimal comma in braces, decibels", "clamp:", "limits: {gain_loss: 0,1 dB}\nclamp:", "20:21 D13"),
    ("decimal comma of a number", "clamp:", "limits: {mismatch: '1,5'}\nclamp:", "20:20 D13"),
    ("thousands comma", "length: 340}", "length: '1,340'}", "16:45 D13"),
    ("base 60", "at: 138", "at: 4:1", "17:32 D10"),
    ("not a number", "length: 340", "length: .nan", "16:45 D10"),
    ("infinite", "length: 340", "length: .inf", "16:45 D10"),
    ("hexadecimal", "length: 340", "length: 0x154", "16:45 D10"),
    ("underscore", "length: 340", "length: 3_40", "16:45 D10"),
    ("words for a length", "length: 340", "length: long", "16:45 D10"),
    ("unknown unit", "wall: 1.5 mm", "wall: 1.5 mn", "9:9 D10"),
    ("inches for a frequency", "434.2 MHz", "434.2 mm", "4:12 D10"),
    ("frequency without a unit", "434.2 MHz", "434.2", "4:12 D11"),
    ("no units, bare lengths", "units: mm\n", "", "15:34 D11; 15:45 D11; 16:32 D11; 16:45 D11; 17:34 D11; 17:47 D11"),
    ("truth value for a length", "wall: 1.5 mm", "wall: yes", "9:9 D10"),
    ("reference in another unit", "gap: 10 mm", "reference: 200 kohm", "19:42 D10"),
    ("reference in megahertz", "gap: 10 mm", "reference: 200 MHz", "19:42 D10"),
    ("reference with a comma", "gap: 10 mm", "reference: '37,5 ohm'", "19:42 D13"),
    ("reference too large", "gap: 10 mm", "reference: 2000 ohm", "19:42 D12"),
    ("negative wall", "wall: 1.5 mm", "wall: -1.5 mm", "9:9 D12"),
    ("zero length", "length: 340", "length: 0", "16:45 D12"),
    ("rod of 40 m", "diameter: 4 mm", "diameter: 40 m", "14:18 D12"),
    ("boom of 0.4 mm", "outside: 20 mm", "outside: 0.4 mm", "8:12 D12"),
    ("length of 40 m", "length: 340", "length: 40 m", "16:45 D12"),
    ("frequency too high", "434.2 MHz", "43420 MHz", "4:12 D12"),
    ("frequency too low", "434.2 MHz", "434.2 kHz", "4:12 D12"),
    ("number with a slash", "RGL-434-06", "RGL/434", "3:9 D14"),
    ("number that climbs", "RGL-434-06", "../RGL", "3:9 D14"),
    ("number too long", "RGL-434-06", "RRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRRR", "3:9 D14"),
    ("revision of the stamped folder", "number: RGL-434-06", "number: RGL-434-06\nrevision: A_NOT-CLEARED", "4:11 D14"),
    ("id with a space", "id: D1", "id: D 1", "18:10 D14"),
    ("id that is a part", "id: D1", "id: Boom", "18:10 D14"),
    ("id begins with a digit", "id: D1", "id: 1D", "18:10 D14"),
    ("mount named feed", "  line: {", "  feed: {", "13:3 D14"),
    ("mount with a bad name", "  line: {", "  my line: {", "13:3 D14"),
    (
        "title too long",
        "River gauge link",
        "xxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxx",
        "2:8 D12",
    ),
    ("title with an invisible mark", "River gauge link", '"River\\u200bgauge"', "2:8 D14"),
    ("date that is none", "units: mm", "units: mm\nsheet: {date: 2026-02-30}", "6:15 D10"),
    ("date of a week", "units: mm", "units: mm\nsheet: {date: 2026-W10-1}", "6:15 D10"),
    ("date the other way", "units: mm", "units: mm\nsheet: {date: 01.03.2026}", "6:15 D10"),
    ("unknown material", "  material: EN AW-6060", "  material: EN-AW 6060", "10:13 D15"),
    (
        "stated material without density",
        "material: EN AW-6060 T66}",
        "material: {name: EN AW-6082 T6, kind: metal}}",
        "14:34 D07",
    ),
    (
        "stated material, density in g",
        "material: EN AW-6060 T66}",
        "material: {name: EN AW-6082 T6, kind: metal, density: 2.7}}",
        "14:78 D12",
    ),
    (
        "stated material, bad number",
        "material: EN AW-6060 T66}",
        "material: {name: EN AW-6082 T6, kind: metal, density: 2700 kg}}",
        "14:78 D10",
    ),
]
CONTRADICTIONS = [
    ("unknown mount", "at: 190,", "at: 190, mount: lin,", "18:46 D16"),
    ("mount not chosen", "mounts:\n", "mounts:\n  other: {style: on-top}\n", "17:5 D07; 19:5 D07"),
    ("mounts differ in capitals", "mounts:\n", "mounts:\n  Line: {style: on-top}\n", "14:3 D18; 17:5 D07; 19:5 D07"),
    ("driven rod with a mount", "at: 138,", "at: 138, mount: line,", "17:44 D21"),
    ("reflector on the feed", "at: 0,", "at: 0, mount: feed,", "16:44 D21"),
    ("feed missing", "feed: {kind: straight-dipole, gap: 10 mm}\n", "", "17:20 D21"),
    ("two at one station", "at: 190", "at: 138.0", "18:34 D17"),
    ("same id twice", "id: D1", "id: R", "18:10 D18"),
    ("ids differ in capitals", "id: D1", "id: r", "18:10 D18"),
    ("id of half a rod", "id: D1", "id: DE-left", "18:10 D18"),
    ("wall too thick", "wall: 1.5 mm", "wall: 10 mm", "9:9 D19"),
    ("corners too round", "wall: 1.5 mm", "wall: 1.5 mm\n  corner_radius: 10 mm", "10:18 D19"),
    ("round boom with corners", "section: square", "section: round\n  corner_radius: 1 mm", "8:3 D19"),
    ("square boom with two sides", "outside: 20 mm", "outside: [20 mm, 30 mm]", "8:3 D19"),
    ("rectangular boom with one side", "section: square", "section: rectangular", "8:12 D19"),
    ("two ends of the boom", "front: 70 mm}", "front: 70 mm, length: 400 mm}", "11:41 D19"),
    ("boom too short", "front: 70 mm}", "length: 200 mm}", "11:35 D19"),
    ("clamp past the end", "{mast: 38 mm}", "{mast: 38 mm, at: 400 mm}", "20:26 D12"),
    ("bonded without bond", "style: insulated-through", "style: bonded-through", "13:3 D07"),
    (
        "bonded with bush",
        "style: insulated-through, hole: 8 mm",
        "style: bonded-through, bond: weld, bush: {kind: shoulder}",
        "13:45 D19",
    ),
    ("insulated with bond", "hole: 8 mm", "hole: 8 mm, bond: press", "13:48 D19"),
    ("hole on top", "style: insulated-through, hole: 8 mm", "style: on-top, hole: 8 mm", "13:25 D19"),
    ("saddle through the boom", "hole: 8 mm", "hole: 8 mm, saddle: {height: 12 mm}", "13:48 D19"),
    ("middle screw and keeper", "hole: 8 mm", "hole: 8 mm, hold: middle-screw, keeper: {kind: snap}", "13:68 D19"),
    ("middle screw on top", "style: insulated-through, hole: 8 mm", "style: on-top, hold: middle-screw", "13:31 D19"),
    ("metal mount on wood", "  material: EN AW-6060 T66\n", "  material: oak\n", "13:17 D20"),
    ("wooden mount on metal", "style: insulated-through", "style: through-nonmetal", "13:17 D20"),
    ("through a boom that conducts", *CARBON, "style: insulated-through", "style: through-nonmetal", "13:17 D20"),
    (
        "no allowance asked for in a boom that conducts",
        *CARBON,
        "style: insulated-through, hole: 8 mm",
        "style: through-nonmetal, hole: 8 mm, allowance: none",
        "13:17 D20",
    ),
    ("metal mount on a boom that conducts", *CARBON, "13:17 D20"),
    (
        "wall screws in a round boom",
        "section: square",
        "section: round",
        "style: insulated-through, hole: 8 mm",
        "style: bonded-through, bond: wall-screws",
        "13:39 D20",
    ),
    (
        "allowance without source",
        "hole: 8 mm",
        "hole: 8 mm, allowance: {origin: stated, value: 4 mm, uncertainty: 1 mm}",
        "13:48 D07",
    ),
    ("stated as a word", "hole: 8 mm", "hole: 8 mm, allowance: stated", "13:48 D07; 13:48 D07; 13:48 D07"),
    (
        "model with the wrong origin",
        "hole: 8 mm",
        "hole: 8 mm, allowance: {origin: computed, model: lawson}",
        "13:78 D19",
    ),
    ("unknown origin", "hole: 8 mm", "hole: 8 mm, allowance: guessed", "13:59 D09"),
    (
        "value for a published allowance",
        "hole: 8 mm",
        "hole: 8 mm, allowance: {origin: published, value: 3 mm}",
        "13:79 D19",
    ),
    ("folded without spacing", "kind: straight-dipole", "kind: folded-dipole", "19:1 D07"),
    ("straight with spacing", "gap: 10 mm}", "gap: 10 mm, spacing: 30 mm}", "19:43 D19"),
    (
        "two diameters of the driven rod",
        "length: 322",
        "length: 322, diameter: 5 mm",
        "gap: 10 mm",
        "rod: 6 mm",
        "19:36 D19",
    ),
    ("no drill so large", ", hole: 8 mm", "", "diameter: 4 mm", "diameter: 40 mm", "13:3 D07"),
    ("gap as long as the rod", "length: 322", "length: 150", "gap: 10 mm", "gap: 80 mm", "19:36 D19"),
    (
        "spacing as long as the rod",
        "feed: {kind: straight-dipole, gap: 10 mm}",
        "feed: {kind: folded-dipole, spacing: 170 mm}",
        "19:38 D19",
    ),
    (
        "allowance of the feed",
        "feed: {kind: straight-dipole, gap: 10 mm}",
        "feed: {kind: straight-dipole, allowance: {origin: none, value: 1 mm}}",
        "19:57 D19",
    ),
    (
        "many at once",
        "title:",
        "titel:",
        "RGL-434-06",
        "a/b",
        "434.2",
        "434,2",
        "square",
        "squar",
        "20 mm",
        "20,5 mm",
        "wall: 1.5 mm",
        "bore: 3 mm",
        "2:1 D06; 3:9 D14; 4:12 D13; 7:12 D09; 8:12 D13; 9:3 D06",
    ),
    (
        "a section's mistake does not hide another's",
        "20 mm",
        "20 mn",
        "length: 340",
        "length: 340, mount: lin",
        "8:12 D10; 16:57 D16",
    ),
    ("no bush fits the hole", "hole: 8 mm", "hole: 4 mm", "13:42 D19"),
    (
        "rod thicker than its hole",
        "style: insulated-through, hole: 8 mm",
        "style: bonded-through, bond: weld, hole: 3 mm",
        "13:51 D19",
    ),
    (
        "saddle that sinks",
        "style: insulated-through, hole: 8 mm",
        "style: on-top, saddle: {height: 1.5 mm}",
        "13:42 D19",
    ),
    ("feed that sinks", "gap: 10 mm", "height: 1.5 mm", "19:39 D19"),
    ("limbs that overlap", "kind: straight-dipole", "kind: folded-dipole, spacing: 4 mm", "19:38 D19"),
    ("longer than any boom", "at: 190", "at: 30 m", "18:34 D12"),
    ("no overhang", "rear: 70 mm", "rear: 0 mm", "11:20 D12"),
]

CASES = [*TEXT, *KEYS, *VALUES, *CONTRADICTIONS]


def problems_of(folder: Path, text: str) -> DesignErrors:
    path = folder / "d.yaml"
    path.write_text(text, encoding="utf-8")
    with pytest.raises(DesignErrors) as stopped:
        read_design(path, shown_as="d.yaml")
    return stopped.value


def test_the_sound_design_is_read(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    path.write_text(BASE, encoding="utf-8")
    assert [element.id for element in read_design(path).design.elements] == ["R", "DE", "D1"]


@pytest.mark.parametrize("case", CASES, ids=[case[0] for case in CASES])
def test_a_mistake_is_told_where_it_is(tmp_path: Path, case: tuple[str, ...]) -> None:
    _, *edits, expected = case
    text = BASE
    for old, new in zip(edits[::2], edits[1::2], strict=True):
        assert old in text
        text = text.replace(old, new, 1)
    error = problems_of(tmp_path, text)
    told = [f"{problem.place.line}:{problem.place.column} {problem.code}" for problem in error.problems]
    assert "; ".join(told) == expected
    for problem in error.problems:
        assert registry.code_page(problem.code)
        assert problem.message
        assert problem.fix
        assert str(problem).startswith(f"d.yaml:{problem.place.line}:{problem.place.column}: {problem.code} ")


def test_a_table_of_a_thousand_rods_is_enough(tmp_path: Path) -> None:
    rows = [f"  - {{id: D{n}, role: director, at: {n}, length: 309}}\n" for n in range(1, 1002)]
    driven = next(row for row in ELEMENTS.splitlines(keepends=True) if "driven" in row)
    error = problems_of(tmp_path, BASE.replace(ELEMENTS, "".join(rows) + driven.replace("138", "2000")))
    assert [(problem.code, problem.place.line) for problem in error.problems] == [("D12", 1016)]


def test_there_are_enough_cases() -> None:
    assert len(CASES) >= 80
    assert len({case[0] for case in CASES}) == len(CASES)


def test_every_code_of_the_file_is_met(root: Path) -> None:
    met = {place.split()[1] for case in CASES for place in case[-1].split("; ")}
    codes = {code for code in registry.codes() if code.startswith("D") and code < "D22"}
    assert met == codes
