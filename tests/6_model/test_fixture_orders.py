"""Which fixtures a design gets: a guide for every drill on a centre line, a gauge and an aid for every rod."""

import functools
from dataclasses import replace
from pathlib import Path

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.arrange.fixtures import fixtures
from fabgen.contents import package_files
from fabgen.correct.ledger import correct
from fabgen.design.solids import Mesh, Product
from fabgen.model import prints
from fabgen.read.reader import read_design

DESIGNS = sorted((Path(__file__).resolve().parents[2] / "designs").glob("*.yaml"))
STEP_DRILL_ABOVE_MM = 6.0
"""Above it thin wall is opened with a step drill or reamer (common practice)."""


@functools.cache
def arranged(path):
    design = read_design(path).design
    return arrange(design, correct(design))


@pytest.fixture(params=DESIGNS, ids=lambda path: path.stem)
def array(request):
    return arranged(request.param)


def numbers(array, part):
    return [dict(each.parameters) for each in fixtures(array) if each.part == part]


def test_there_are_designs_to_try():
    assert len(DESIGNS) >= 4


def test_every_drill_on_a_centre_line_has_its_guide(array):
    wanted = set()
    for hole in array.holes:
        face = "sides" if abs(hole.axis[1]) > 0.5 else "top"
        if hole.across_mm == 0:
            wanted.add((face, hole.pilot_mm))
            if hole.diameter_mm <= STEP_DRILL_ABOVE_MM:
                wanted.add((face, hole.diameter_mm))
    found = [(each["face"], each["bushing_bore_mm"]) for each in numbers(array, "drill_guide")]
    assert sorted(found) == sorted(wanted)


def test_guides_are_for_this_boom_and_this_printer(array):
    boom = array.design.boom
    for each in numbers(array, "drill_guide"):
        across = (each["boom_width_mm"], each["boom_height_mm"])
        assert across == (
            (boom.width_mm, boom.height_mm) if each["face"] == "sides" else (boom.height_mm, boom.width_mm)
        )
        assert each["boom_diameter_mm"] == boom.diameter_mm
        assert each["hole_growth_mm"] == array.design.printer.hole_growth_mm


def test_every_rod_in_a_printed_bore_has_a_gauge_without_growth(array):
    rods = {
        dict(part.parameters)["rod_diameter_mm"]
        for part in array.placed
        if part.source == "printed" and "rod_diameter_mm" in dict(part.parameters)
    }
    gauges = numbers(array, "fit_gauge")
    assert {each["rod_diameter_mm"] for each in gauges} == rods
    assert all("hole_growth_mm" not in each for each in gauges)
    holes = {dict(part.parameters)["hole_diameter_mm"] for part in array.placed if part.part in ("bush", "sleeve")}
    assert {each["hole_diameter_mm"] for each in gauges} - {0.0} == holes


def test_every_whole_rod_has_a_pair_of_aids_clear_of_its_parts(array):
    rods = {cut.rod_mm for cut in array.cuts if cut.stock == "rod" and cut.projection_mm > 0 and cut.half_mm > 0}
    aids = [each for each in fixtures(array) if each.part == "centring_aid"]
    assert {dict(each.parameters)["rod_diameter_mm"] for each in aids} == rods
    assert {each.quantity for each in aids} == {2}
    for part in array.placed:
        if part.part in ("bush", "sleeve"):
            assert all(
                dict(each.parameters)["clear_mm"] >= dict(part.parameters)["flange_diameter_mm"] for each in aids
            )


def test_fixtures_are_named_and_explained_and_no_part_of_the_array(array):
    found = fixtures(array)
    assert len({each.label for each in found}) == len(found) >= 3
    assert all(each.label.isascii() and each.purpose and each.use.endswith(".") for each in found)
    assert {each.part for each in found}.isdisjoint(part.part for part in array.placed)


def test_a_boom_too_small_for_a_guide_gets_none():
    array = arranged(DESIGNS[0])
    small = _with_boom(array, 6.0)
    assert [each.part for each in fixtures(small) if each.part == "drill_guide"] == []
    assert [each.part for each in fixtures(small) if each.part == "fit_gauge"] != []


def _with_boom(array, side_mm):
    boom = replace(array.design.boom, width_mm=side_mm, height_mm=side_mm)
    return replace(array, design=replace(array.design, boom=boom))


def test_file_names_are_plain_and_unique(array, monkeypatch):
    monkeypatch.setattr(
        prints, "print_of", lambda _part, _parameters, name: Product(name, None, Mesh((), ()), (0, 0, 0))
    )
    stems = [each.stem for each in (*prints.prints(array), *prints.fixture_prints(fixtures(array)))]
    assert len(set(stems)) == len(stems)
    for stem in stems:
        assert stem == stem.lower()
        assert set(stem) <= set("abcdefghijklmnopqrstuvwxyz0123456789-")
    assert sum(stem.startswith("fixture-") for stem in stems) == len(fixtures(array))


def test_only_fixtures_writes_only_fixtures():
    array = arranged(next(path for path in DESIGNS if path.stem.startswith("valley")))
    said: list[str] = []
    files = package_files(array, (), stamped=False, only=("fixtures",), say=said.append)
    paths = [file.path for file in files]
    assert paths[0] == "findings.json"
    assert all(path.startswith("prints/fixture-") for path in paths[1:])
    assert len(paths) - 1 == 3 * len(fixtures(array))
    purposes = {file.path: file.purpose for file in files}
    assert purposes["prints/fixture-drill-guide-sides-2.stl"] == (
        "drill guide sides 2, print 1: guides a drill of 2 mm through both side walls"
    )
    assert said == [f"{array.design.name}: fixtures"]
