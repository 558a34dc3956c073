"""Laws of whole designs: what must hold whatever the numbers are."""

import tempfile
from pathlib import Path

from hypothesis import given, settings
from hypothesis import strategies as st

from fabgen import pipeline
from fabgen.arrange.bars import plan
from fabgen.design.arranged import Arranged

HEAD = """fabgen: 1
title: A law
number: LAW-1
frequency: 434 MHz
units: mm
boom:
  section: {section}
  outside: 20 mm
  wall: 1.5 mm
  material: EN AW-6060 T66
  overhang: {{rear: {rear}, front: {front}}}
mounts: {{line: {{style: insulated-through, hole: 8 mm, allowance: {{origin: published, model: dl6wu}}}}}}
rods: {{diameter: 4 mm, material: EN AW-6060 T66}}
feed: {{kind: straight-dipole, gap: 10 mm, height: 18 mm, cable: 5 mm}}
elements:
"""
SPACINGS = st.lists(st.integers(60, 400), min_size=1, max_size=8)
SECTIONS = st.sampled_from(["round", "square"])


def arranged(at_mm: list[float], *, section: str = "square", rear_mm: float = 60, front_mm: float = 60) -> Arranged:
    """A design whose second element is driven, the others parasitic."""
    rows = []
    for k, place in enumerate(at_mm):
        role = "driven" if k == 1 else "reflector" if k == 0 else "director"
        rows.append(f"  - {{id: E{k}, role: {role}, at: {place}, length: {330 - 3 * k}}}\n")
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "law.yaml"
        path.write_text(HEAD.format(section=section, rear=rear_mm, front=front_mm) + "".join(rows), encoding="utf-8")
        return pipeline.check(path).arranged


def places(spacings: list[int]) -> list[float]:
    at = [0.0, 130.0]
    for spacing in spacings:
        at.append(at[-1] + spacing)
    return at


def rod_holes(found: Arranged) -> list[tuple[str, str, float, float, float]]:
    """Holes of rods and bushes, by element and wall."""
    return sorted(
        (hole.element, hole.wall, hole.angle_deg, hole.station_mm, hole.across_mm)
        for hole in found.holes
        if hole.purpose in ("rod", "bush")
    )


@settings(max_examples=25)
@given(SPACINGS, SECTIONS)
def test_a_design_turned_end_for_end_has_its_holes_turned(spacings: list[int], section: str) -> None:
    at = places(spacings)
    forward = arranged(at, section=section, rear_mm=70, front_mm=55)
    backward = arranged([-place for place in at], section=section, rear_mm=55, front_mm=70)
    length = forward.design.boom.length_mm
    assert backward.design.boom.length_mm == length
    turned = [(e, w, a, round(length - s, 6), c) for e, w, a, s, c in rod_holes(backward)]
    assert rod_holes(forward) == sorted(turned)


@settings(max_examples=25)
@given(SPACINGS, st.integers(60, 400), SECTIONS)
def test_one_more_director_moves_no_other_hole(spacings: list[int], beyond: int, section: str) -> None:
    at = places(spacings)
    before = rod_holes(arranged(at, section=section))
    after = rod_holes(arranged([*at, at[-1] + beyond], section=section))
    added = f"E{len(at)}"
    assert [hole for hole in after if hole[0] != added] == before
    assert len(after) == len(before) + 2


@settings(max_examples=25)
@given(SPACINGS, st.floats(-5000, 5000))
def test_the_models_origin_does_not_matter(spacings: list[int], shift: float) -> None:
    shift = round(shift, 3)
    at = places(spacings)
    here, there = arranged(at), arranged([round(place + shift, 3) for place in at])
    for left, right in zip(rod_holes(here), rod_holes(there), strict=True):
        assert abs(left[3] - right[3]) < 1e-6


@settings(max_examples=15)
@given(SPACINGS)
def test_the_cut_list_fits_its_stock_and_loses_nothing(spacings: list[int]) -> None:
    found = arranged(places(spacings))
    shop = found.design.shop
    bars = plan(found.cuts, shop).bars
    for bar in bars:
        sawn = sum(length for _, length in bar.pieces) + shop.saw_kerf_mm * (len(bar.pieces) - 1)
        assert shop.end_trim_mm + sawn <= bar.length_mm + 1e-6
    assert sorted(name for bar in bars for name, _ in bar.pieces) == sorted(cut.piece for cut in found.cuts)


@settings(max_examples=15)
@given(SPACINGS)
def test_both_walls_of_a_through_hole_face_each_other(spacings: list[int]) -> None:
    found = arranged(places(spacings))
    for number in {hole.number for hole in found.holes}:
        rows = [hole for hole in found.holes if hole.number == number]
        if len(rows) == 2:
            first, second = rows
            assert (first.station_mm, first.diameter_mm) == (second.station_mm, second.diameter_mm)
            assert abs(first.angle_deg - second.angle_deg) == 180.0
