"""Limits and modelled diameters: what is read, what is refused and where, and that a shown design reads back."""

from pathlib import Path

import pytest

from fabgen.design.design import Design
from fabgen.design.limits import Limits
from fabgen.errors import DesignErrors
from fabgen.read.reader import read_design
from fabgen.read.schema import schema
from fabgen.read.show import show

BASE = """\
fabgen: 1
title: River gauge link
number: RGL-434-06
frequency: 434.2 MHz
units: mm
boom: {section: square, outside: 20, wall: 1.5, material: EN AW-6060 T66, overhang: {rear: 70, front: 70}}
mounts: {line: {style: insulated-through, hole: 8 mm}}
rods: {diameter: 4 mm, material: EN AW-6060 T66}
elements:
  - {id: R, role: reflector, at: 0, length: 340}
  - {id: DE, role: driven, at: 138, length: 322}
  - {id: D1, role: director, at: 190, length: 309}
feed: {kind: straight-dipole, gap: 10 mm}
"""
ALL = "limits: {band: [430 MHz, 438 MHz], shift: 400 kHz, gain_loss: 0.1 dB, front_to_back: 18 dB, mismatch: 1.5}\n"
LINE = BASE.count("\n") + 1


def read(folder: Path, text: str) -> Design:
    path = folder / "trial.yaml"
    path.write_text(text, encoding="utf-8")
    return read_design(path, shown_as="trial.yaml").design


def test_every_limit_is_read(tmp_path: Path) -> None:
    assert read(tmp_path, BASE + ALL).limits == Limits((430.0, 438.0), 400.0, 0.1, 18.0, 1.5)


def test_each_limit_is_optional(tmp_path: Path) -> None:
    assert read(tmp_path, BASE).limits == Limits()
    assert not read(tmp_path, BASE + "limits: {band: [430 MHz, 438 MHz]}\n").limits.stated
    assert read(tmp_path, BASE + "limits: {shift: 0.4 MHz}\n").limits == Limits(shift_khz=400.0)


@pytest.mark.parametrize(
    ("limits", "column", "code"),
    [
        ("{band: 430 MHz}", 16, "D08"),
        ("{band: [430 MHz]}", 16, "D08"),
        ("{band: [438 MHz, 430 MHz]}", 16, "D19"),
        ("{band: [430, 438]}", 16, "D11"),
        ("{band: [435 MHz, 438 MHz]}", 10, "D19"),
        ("{band: [300 MHz, 600 MHz]}", 10, "D12"),
        ("{shift: 400}", 17, "D11"),
        ("{shift: 40 MHz}", 17, "D12"),
        ("{gain_loss: 0.1}", 21, "D11"),
        ("{gain_loss: 0.1 mm}", 21, "D10"),
        ("{gain_loss: much}", 21, "D10"),
        ("{gain_loss: -0.1 dB}", 21, "D12"),
        ("{front_to_back: 180 dB}", 25, "D12"),
        ("{mismatch: 1}", 20, "D12"),
        ("{mismatch: 1.5 dB}", 20, "D10"),
        ("{front_back: 18 dB}", 10, "D06"),
        ("{shift: 400 kHz, shift: 500 kHz}", 26, "D05"),
    ],
)
def test_what_cannot_be_a_limit_is_told_at_its_place(tmp_path: Path, limits: str, column: int, code: str) -> None:
    with pytest.raises(DesignErrors) as told:
        read(tmp_path, f"{BASE}limits: {limits}\n")
    first = told.value.problems[0]
    assert (first.place.line, first.place.column, first.code) == (LINE, column, code)
    assert first.fix


def test_a_row_overrides_the_modelled_diameter(tmp_path: Path) -> None:
    text = BASE.replace("rods: {diameter: 4 mm", "rods: {diameter: 4 mm, modelled_diameter: 5 mm")
    text = text.replace("length: 309}", "length: 309, modelled_diameter: 3/16 in}")
    design = read(tmp_path, text)
    assert [element.rod.replaces_mm for element in design.elements] == [5.0, 5.0, 4.7625]
    assert [element.rod.replaces_mm for element in read(tmp_path, BASE).elements] == [4.0, 4.0, 4.0]


def test_lengths_as_cut_cannot_follow_another_rod(tmp_path: Path) -> None:
    text = BASE.replace("rods: {diameter: 4 mm", "rods: {diameter: 4 mm, modelled_diameter: 5 mm")
    with pytest.raises(DesignErrors) as told:
        read(tmp_path, text + "lengths_are: as-cut\n")
    problem = told.value.problems[0]
    assert (problem.code, problem.place.line, problem.place.column) == ("D19", 8, 43)


def test_shown_limits_read_back(tmp_path: Path) -> None:
    text = BASE.replace("rods: {diameter: 4 mm", "rods: {diameter: 4 mm, modelled_diameter: 5 mm")
    path = tmp_path / "trial.yaml"
    path.write_text(text + ALL, encoding="utf-8")
    reading = read_design(path)
    shown = show(reading)
    assert f"# line {LINE}" in next(line for line in shown.splitlines() if line.startswith("  gain_loss: 0.1 dB"))
    path.write_text(shown, encoding="utf-8")
    again = read_design(path).design
    assert again.limits == reading.design.limits
    assert again.elements == reading.design.elements


def test_the_schema_offers_the_new_keys() -> None:
    found = schema()
    assert set(found["$defs"]["LimitsKeys"]["properties"]) == {
        "band", "shift", "gain_loss", "front_to_back", "mismatch",
    }  # fmt: skip
    assert "modelled_diameter" in found["$defs"]["RodKeys"]["properties"]
    assert "modelled_diameter" in found["$defs"]["ElementKeys"]["properties"]
