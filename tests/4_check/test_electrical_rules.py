"""Limits and other rods: every finding of the array solver with its code, figure and severity."""

from dataclasses import fields, replace
from pathlib import Path
from typing import Any

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.check import limits as rules
from fabgen.check.response.respond import respond
from fabgen.check.rules.other_rod import findings as other_rod
from fabgen.correct.ledger import correct
from fabgen.design.allotted import with_tolerances
from fabgen.design.arranged import Arranged
from fabgen.design.electrical_case import METHOD, ElectricalCase, electrical_case
from fabgen.design.findings import Finding
from fabgen.design.limits import Limits
from fabgen.design.response import STORED_NAME, Response
from fabgen.export.records import write_response
from fabgen.read.reader import read_design
from fabgen.read.records import records_folder
from fabgen.read.stored_response import stored_response

BAND = (430.0, 438.0)
SET = {"rounding_mm": (0.2,) * 12, "allowance_u_mm": (0.5,) * 12, "common_u_mm": (0.1,) * 12}
"""What other stages may come to say otherwise about the demo design, held still."""


def arranged_with(root: Path, limits: Limits, stem: str = "river-gauge-434") -> Arranged:
    design = replace(read_design(root / "designs" / f"{stem}.yaml").design, limits=limits)
    return arrange(design, correct(design))


def case_with(arranged: Arranged, **changes: Any) -> ElectricalCase:
    case = electrical_case(arranged)
    assert case is not None
    return replace(case, **changes)


@pytest.fixture(autouse=True)
def few_builds(monkeypatch: pytest.MonkeyPatch) -> None:
    """Enough builds to judge by, few enough to be quick."""
    monkeypatch.setattr("fabgen.check.response.allot.SAMPLES", 300)
    monkeypatch.setattr("fabgen.check.response.allot.FEWEST", 300)


@pytest.fixture
def sound(root: Path) -> Arranged:
    return arranged_with(root, Limits(BAND, 400.0, 0.1, 18.0, 1.5))


def found(case: ElectricalCase, response: Response | None = None) -> list[tuple[str, str, str]]:
    judged = rules.judged(case, response or respond(case))
    return [(finding.code, finding.severity, finding.where) for finding in judged]


def one(case: ElectricalCase, code: str) -> Finding:
    return next(finding for finding in rules.judged(case, respond(case)) if finding.code == code)


def test_limits_that_hold_find_nothing_but_the_common_error(sound: Arranged) -> None:
    """An allowance of 5 mm known to 10 % is worth three times the shift that is allowed."""
    assert found(case_with(sound)) == [("E04", "warn", "shift")]
    finding = one(case_with(sound), "E04")
    assert finding.required == 400.0
    assert finding.measured is not None
    assert 1000 < finding.measured < 1600
    assert "2u" in finding.advice


def test_a_known_allowance_is_not_told(sound: Arranged) -> None:
    assert found(case_with(sound, allowance_u_mm=(0.0,) * 12)) == []


def test_what_the_model_misses_itself(sound: Arranged) -> None:
    """The model has 22.5 dB and 1.26 in this band."""
    case = case_with(sound, limits=Limits(BAND, front_to_back_db=25.0, mismatch=1.1), allowance_u_mm=(0.0,) * 12)
    assert found(case) == [("E02", "fail", "front_to_back"), ("E02", "fail", "mismatch")]
    finding = one(case, "E02")
    assert (finding.measured, finding.required, finding.unit) == (pytest.approx(22.504, abs=0.05), 25.0, "dB")
    assert "2.5 dB" in finding.advice
    assert "free space" in finding.advice


def test_what_no_shop_can_hold(sound: Arranged) -> None:
    case = case_with(sound, limits=Limits(BAND, shift_khz=20.0), allowance_u_mm=(0.0,) * 12)
    assert found(case) == [("E03", "fail", "shift")]
    finding = one(case, "E03")
    assert finding.measured is not None
    assert finding.measured > 100
    assert "rounding" in finding.advice
    unrounded = replace(case, rounding_mm=(0.0,) * 12)
    assert "finest" in one(unrounded, "E03").advice


def test_limits_that_only_miss_together(sound: Arranged) -> None:
    """Each limit is kept by 95 % of builds, not all of them at once."""
    case = case_with(sound, limits=Limits(BAND, shift_khz=1.0), allowance_u_mm=(0.0,) * 12)
    response = respond(case)
    spread = replace(response.spread, inside_share=0.93, at_95=replace(response.spread.at_95, shift_khz=0.9))
    assert found(case, replace(response, spread=spread)) == [("E03", "fail", "limits")]


def test_thick_rods_are_told_and_nothing_absolute_is_judged(sound: Arranged) -> None:
    """11 mm at 434 MHz is 0.0159 wavelengths."""
    thick = (11.0,) * 12
    case = case_with(sound, diameter_mm=thick, modelled_diameter_mm=thick, limits=Limits(BAND, None, None, 50.0, 1.01))
    response = respond(case)
    assert ("E07", "warn", "rods") in found(case, response)
    assert response.points == ()
    assert response.fan == ()
    assert {code for code, *_ in found(case, response)} == {"E07"}


def test_no_limits_no_word(root: Path) -> None:
    arranged = arranged_with(root, Limits())
    response, told = rules.electrical(arranged, case_with(arranged), None)
    assert (response, told) == (None, ())


def test_lengths_as_cut_cannot_be_modelled(sound: Arranged) -> None:
    """What the boom takes is in them, and the solver knows free rods only."""
    as_cut = replace(sound, design=replace(sound.design, lengths_are="as-cut"))
    response, told = rules.electrical(as_cut, electrical_case(as_cut), None, solve=True)
    assert response is None
    assert [(finding.code, finding.severity) for finding in told] == [("E01", "note")]
    assert "as cut" in told[0].advice


def test_limits_without_an_answer_are_not_judged(sound: Arranged) -> None:
    response, told = rules.electrical(sound, case_with(sound), None)
    assert response is None
    assert [(finding.code, finding.severity) for finding in told] == [("E01", "note")]


def test_a_stored_response_answers_without_the_solver(sound: Arranged, monkeypatch: pytest.MonkeyPatch) -> None:
    said: list[str] = []
    case = case_with(sound)
    found_anew = rules.electrical(sound, case, None, solve=True, say=said.append)
    assert said == ["RGL-434-06_A: array response"]
    monkeypatch.delattr("fabgen.check.response.respond.respond")
    for solve in (False, True):
        assert rules.electrical(sound, case, found_anew[0], solve=solve, say=said.append) == found_anew
    assert len(said) == 1


def test_a_computation_that_changes_changes_its_name(sound: Arranged) -> None:
    """A stored response answers as long as the name stays: where these figures move, METHOD must change with them."""
    response = respond(case_with(sound, **SET))
    assert response.allotment is not None
    assert response.common is not None
    outcomes = (response.modelled, response.drawn, response.spread.at_95, response.common.twice)
    figures = [[f"{getattr(each, field.name):.3g}" for field in fields(each)] for each in outcomes]
    tolerances_mm = [(row.length_mm, row.station_mm) for row in response.allotment.rows]
    assert (METHOD, figures, tolerances_mm[:3]) == (
        "thin-rod array, response 5",
        [
            ["0", "0", "22.5", "1.26"],
            ["-208", "0.0083", "22.1", "1.26"],
            ["393", "0.0197", "21.7", "1.3"],
            ["1.05e+03", "0.05", "20.6", "1.28"],
        ],
        [(0.5, 1.0), (0.5, 1.0), (0.2, 0.5)],
    )


def test_a_rod_that_no_length_makes_good(root: Path, variant: Any) -> None:
    rods = "rods: {diameter: 4 mm, material"
    design = variant((rods, "rods: {diameter: 0.1 mm, modelled_diameter: 60 mm, material"))
    design = replace(design, elements=tuple(replace(e, length_mm=250.0) for e in design.elements))
    told = list(other_rod(arrange(design, correct(design))))
    assert {(finding.code, finding.severity) for finding in told} == {("E05", "fail")}


def test_a_rod_outside_the_range_of_the_method(variant: Any) -> None:
    design = variant(("rods: {diameter: 4 mm, material", "rods: {diameter: 4 mm, modelled_diameter: 8 mm, material"))
    told = list(other_rod(arrange(design, correct(design))))
    assert {(finding.code, finding.severity, finding.unit) for finding in told} == {("E06", "warn", "wl")}


def test_a_change_that_leaves_too_much(sound: Arranged) -> None:
    """Lengths left as modelled: all rods alike move the response, some rods alone spoil it."""
    case = case_with(sound, modelled_diameter_mm=(5.0,) * 12, limits=Limits())
    assert found(case) == [("E09", "warn", "rods, shift")]
    some = case_with(sound, modelled_diameter_mm=(4.0,) * 3 + (8.0,) * 3 + (4.0,) * 6, limits=Limits())
    assert ("E09", "warn", "rods, gain") in found(some)
    assert ("E09", "warn", "rods, back/front field") in found(some)


def test_allotted_tolerances_reach_ledger_cuts_and_holes(sound: Arranged) -> None:
    response = respond(case_with(sound))
    assert response.allotment is not None
    allotted = with_tolerances(sound, response)
    rows = {row.element: row for row in response.allotment.rows}
    assert {line.element: line.tolerance_mm for line in allotted.ledger.lines} == {
        name: row.length_mm for name, row in rows.items()
    }
    assert {cut.piece: cut.tolerance_mm for cut in allotted.cuts if cut.piece.startswith("DE")} == {
        "DE-left": rows["DE"].length_mm / 2,
        "DE-right": rows["DE"].length_mm / 2,
    }
    for before, after in zip(sound.holes, allotted.holes, strict=True):
        wanted = rows[after.element].station_mm if after.element in rows else before.tolerance_mm
        if after.purpose not in ("rod", "bush"):
            wanted = min(wanted, before.tolerance_mm)
        assert after == replace(before, tolerance_mm=wanted)


@pytest.mark.parametrize("kept", [(1,), (0, 1), (1, 2)])
@pytest.mark.parametrize("factor", [0.25, 1.0, 2.2])
def test_odd_arrays_are_answered(sound: Arranged, kept: tuple[int, ...], factor: float, tmp_path: Path) -> None:
    """One rod, two rods, rods far from half a wavelength: numbers that can be stored and read, and no exception."""
    case = case_with(sound)
    per_rod = {name: value for name, value in vars_of(case).items() if isinstance(value, tuple) and len(value) == 12}
    some: dict[str, Any] = {name: tuple(value[index] for index in kept) for name, value in per_rod.items()}
    some["modelled_mm"] = tuple(factor * length for length in some["modelled_mm"])
    odd = replace(case, fed=kept.index(1), **some)
    response = respond(odd)
    design = tmp_path / "odd.yaml"
    write_response(response, folder=records_folder(design))
    assert repr(stored_response(design, odd.sha256)) == repr(response)
    text = (records_folder(design) / STORED_NAME).read_text(encoding="utf-8")
    assert "NaN" not in text
    assert "Infinity" not in text
    assert found(odd, response)


def vars_of(case: ElectricalCase) -> dict[str, Any]:
    return {field.name: getattr(case, field.name) for field in fields(case)}
