"""Every message names the nearest valid name, the range or an example, whichever helps."""

from pathlib import Path

import pytest

from fabgen.errors import DesignErrors
from fabgen.read.nearest import nearest, suggestion
from fabgen.read.reader import read_design
from fabgen.read.starter import starter

# Each case: a piece of the starter, what stands in its place, and the fix that is told.
FIXES = [
    ("title:", "titel:", "did you mean `title`?"),
    ("role: driven", "role: Driven", "did you mean `driven`? Known here: reflector, driven, director"),
    ("units: mm", "units: mm\nwall: 1.5", "it belongs in boom"),
    ("units: mm", "units: mm\nmast: 38", "it belongs in clamp"),
    ("hole: 8}", "hole: 8, bush: {outside: 8}}", "known here: kind, material, bore"),
    ("kind: straight-dipole", "kind: straight-dipole, height: 1", "more than 2 mm, or leave it out"),
    ("material: EN AW-6060 T66, over", "material: EN AW 6060 T66, over", "did you mean `EN AW-6060 T66`?"),
    ("hole: 8}", "hole: 8}\n  top: {style: on-top}", "one of line, top"),
    ("clamp:", "rod: {diameter: 4}\nclamp:", "it belongs in feed"),
    ("diameter: 4", "diameter: 400", "allowed are 0.1 mm to 60 mm; for example 4 mm"),
    ("outside: 20", "outside: 0.4", "allowed are 3 mm to 600 mm; for example 20 mm; was 0.4 in (10.16 mm) meant?"),
    ("434.2 MHz", "434.2", "write 434.2 MHz"),
    ("434.2 MHz", "434.2 GHz", "allowed are 20 MHz to 6000 MHz; for example 434.2 MHz"),
    ("wall: 1.5", "wall: '1,5'", "write 1.5; for example 1.5 mm; allowed are 0.2 mm to 30 mm"),
    (", section: square", "", "add section: round"),
    ("feed: {kind: straight-dipole}\n", "", "add feed: {kind: straight-dipole}"),
    ("at: 138, ", "", "add at: 138 mm"),
    ("length: 340", "length: 1,340", "write 1340 or 1.340"),
    ("length: 340", "length: '1.340,5 mm'", "write 1340.5 mm"),
    (
        "kind: straight-dipole",
        "kind: straight-dipole, reference: 200 kohm",
        "reference impedance in ohm, for example 200 ohm",
    ),
    (
        "kind: straight-dipole",
        "kind: straight-dipole, reference: 0.2",
        "reference impedance in ohm, 1 to 1000; for example 200 ohm",
    ),
    ("mast: 38", "mast: 1-1/2", "write 1-1/2 in; allowed are 8 mm to 300 mm"),
    (
        "units: mm\n",
        "units: in\n",
        "allowed are 0.2 mm to 30 mm (0.00787 in to 1.181 in); for example 1.5 mm; was 1.5 mm",
    ),
    ("units: mm", "units:mm", "write units: mm"),
    ("length: 340", "length:340", "write a space after the colon: length: 340"),
    ("length: 340", "length_mm: 340", "write length; the unit stands beside the number, or once in `units`"),
    ("id: D1", "element: D1", "did you mean `id`?"),
    ("outside: 20", "outside: 20x30", "for example [30 mm, 20 mm]"),
    ("4, material: EN AW-6060 T66", "4, material: aluminium", "did you mean `EN AW-6060 T66`?"),
    ("mounts:\n  line: {style: insulated-through, hole: 8}", "mounts: [line]", "for example mounts: {line: {style: "),
    ("clamp: {mast: 38}", "limits: {shift: 400}", "write 400 kHz"),
    ("clamp: {mast: 38}", "limits: {gain_loss: 0,1 dB}", "write 0.1 dB"),
    ("clamp: {mast: 38}", "limits: {mismatch: '1,5'}", "write 1.5"),
    ("clamp: {mast: 38}", "limits: {band: [430,5 MHz, 438 MHz]}", "the decimal mark is a point"),
    ("style: insulated-through, hole: 8", "style: bonded-through", "add bond: wall-screws, weld or press"),
]


@pytest.mark.parametrize(("old", "new", "fix"), FIXES)
def test_the_cheapest_fix_is_named(tmp_path: Path, old: str, new: str, fix: str) -> None:
    text = starter("trial").replace("{section: square, outside: 20", "{outside: 20, section: square")
    assert old in text
    path = tmp_path / "d.yaml"
    path.write_text(text.replace(old, new, 1), encoding="utf-8")
    with pytest.raises(DesignErrors) as stopped:
        read_design(path)
    fixes = [problem.fix for problem in stopped.value.problems]
    assert any(each.startswith(fix) for each in fixes), fixes


def test_a_bare_length_names_both_units_where_both_are_likely(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    path.write_text(starter("trial").replace("units: mm\n", "").replace("diameter: 4", "diameter: 1"), encoding="utf-8")
    with pytest.raises(DesignErrors) as stopped:
        read_design(path)
    fixes = {problem.place.column: problem.fix for problem in stopped.value.problems if problem.place.line == 8}
    assert fixes[18].startswith("1 mm and 1 in (25.4 mm) are both likely: write the unit")
    assert len(stopped.value.problems) == 13
    assert {problem.code for problem in stopped.value.problems} == {"D11"}


def test_nearest_names() -> None:
    words = ["straight-dipole", "folded-dipole"]
    assert nearest("FOLDED_DIPOLE", words) == "folded-dipole"
    assert nearest("straight", words) == "straight-dipole"
    assert nearest("x", words) == ""
    assert suggestion("x", ["only"]) == "known here: only"
    assert suggestion("onl", ["only"]) == "did you mean `only`?"


def test_a_fraction_without_a_unit_names_the_only_unit_that_reads_it(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    path.write_text(starter("trial").replace("units: mm\n", "").replace("at: 138", "at: 1/2"), encoding="utf-8")
    with pytest.raises(DesignErrors) as stopped:
        read_design(path)
    fix = next(problem.fix for problem in stopped.value.problems if "1/2" in problem.message)
    assert fix.startswith("write 1/2 in, or `units: in` for the whole file")


@pytest.mark.parametrize("written", ["Units: mm", "unit: mm", "units_: in"])
def test_a_misspelt_units_is_one_problem(tmp_path: Path, written: str) -> None:
    path = tmp_path / "d.yaml"
    path.write_text(starter("trial").replace("units: mm", written), encoding="utf-8")
    with pytest.raises(DesignErrors) as stopped:
        read_design(path)
    assert stopped.value.problems[0].fix == "did you mean `units`?"
    assert "D11" not in [problem.code for problem in stopped.value.problems]
