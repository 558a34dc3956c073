"""The pieces of the book: cautions that apply, drawn bars, axes, distances, wording."""

import re
from collections.abc import Callable
from dataclasses import replace
from pathlib import Path

import pytest

from fabgen import registry
from fabgen.book.book import SECTIONS, Book, sections
from fabgen.book.figures import Figure
from fabgen.book.sections import aids, assembly, boom_sizes, cautions, cutting, drilling, mounts, printing, sources
from fabgen.book.wording import FILTERS
from fabgen.design.arranged import Arranged, Bar, Cut
from fabgen.design.scale import axis
from fabgen.physics import exposure

TOPICS = (
    "overhead-lines", "work-at-height", "wind-and-falling-parts", "clamps-and-masts", "rod-tips-and-eyes", "exposure",
    "earthing-and-lightning", "drilling", "saws-and-blades", "print-fumes", "local-rules",
)  # fmt: skip


def names(book: Book) -> list[str]:
    return [section.name for section in sections(book)]


def without(book: Book, **fields: object) -> Book:
    arranged: Arranged = replace(book.arranged, **fields)
    return replace(book, arranged=arranged)


def test_every_section_has_its_template_and_place(root: Path, book_of: Callable[..., Book]) -> None:
    entries = registry.entries(SECTIONS)
    folder = root / "fabgen" / SECTIONS
    assert [entry.name for entry in entries] == sorted(path.stem for path in folder.glob("*.html"))
    electrical = {"millimetre", "range_page", "response"}  # only where the array solver was asked
    assert set(names(book_of("river-gauge-434"))) | electrical == {entry.name for entry in entries}


def test_sections_come_in_the_order_of_their_places(book_of: Callable[..., Book]) -> None:
    found = names(book_of("river-gauge-434"))
    assert found[:4] == ["summary", "findings", "cautions", "views"]
    assert found.index("lengths") < found.index("cutting") < found.index("drilling") < found.index("assembly")
    assert found[-1] == "sources"


def test_every_topic_of_caution_names_who_issues_it() -> None:
    found = cautions.cautions()
    assert [caution.name.partition("-")[2] for caution in found] == list(TOPICS)
    assert all(caution.bodies and caution.paragraphs for caution in found)


def test_cautions_apply_only_where_they_apply(book_of: Callable[..., Book]) -> None:
    book = book_of("river-gauge-434")
    everything = {caution.name for caution in cautions.applying(book)}
    assert len(everything) == len(TOPICS)
    unprinted = without(book, placed=tuple(p for p in book.arranged.placed if p.source != "printed"))
    assert everything - {c.name for c in cautions.applying(unprinted)} == {"90-print-fumes"}
    unclamped = without(book, placed=tuple(p for p in book.arranged.placed if p.part != "u_bolt"))
    assert everything - {c.name for c in cautions.applying(unclamped)} == {"40-clamps-and-masts"}
    assert everything - {c.name for c in cautions.applying(without(book, holes=()))} == {"80-drilling"}
    unfed = without(book, design=replace(book.arranged.design, feeds=()))
    assert everything - {c.name for c in cautions.applying(unfed)} == {"60-exposure"}


def test_the_turning_radius_says_what_it_is_counted_from(book_of: Callable[..., Book]) -> None:
    """The mast stands beside the boom: its axis, not the clamp, is what the array turns about."""
    told = {}
    for clamp in (True, False):
        book = book_of("river-gauge-434") if clamp else book_of("river-gauge-434", clamp=None)
        body = next(str(section.body) for section in sections(book) if section.name == "summary")
        told[clamp] = body.partition("Turning radius")[2].partition("</tr>")[0]
    assert "from the mast’s axis to the farthest point of boom and rods" in told[True]
    assert "from the balance point to the farthest point" in told[False]


def test_sections_with_nothing_to_say_are_left_out(book_of: Callable[..., Book]) -> None:
    book = book_of("sonde-finder-401")
    assert "mounts" not in names(book)
    assert "views" not in names(replace(book, views=()))
    assert "aids" not in names(replace(book, aids=()))
    unprinted = without(book, placed=tuple(p for p in book.arranged.placed if p.source != "printed"))
    assert "printing" not in names(unprinted)


def test_what_is_bought_for_the_aids_is_added_up(book_of: Callable[..., Book]) -> None:
    """By hand: guides for both side walls and for the top share one bushing; two nuts and set screws each."""
    book = book_of("river-gauge-434")
    bought = dict(aids.content(book)["bought"])
    assert bought["drill bushing DIN 179 2.5 x 5 x 6"] == 3
    assert bought["set screw M4 x 6"] == bought["nut M4"] == 4
    assert bought["screw M3 x 10"] == bought["nut M3"] == 2


def test_a_rod_goes_where_it_belongs(book_of: Callable[..., Book]) -> None:
    steps = assembly.content(book_of("river-gauge-434"))["steps"]
    rods = next(parts for step, parts in steps if "each rod" in step.text)
    assert rods[0] == (("R",), 1, "rod 4 x 345.000")
    assert (("D3", "D4"), 2, "rod 4 x 294.000") in rods
    keepers = next(parts for step, parts in steps if "keeper" in step.text)
    assert keepers == [((), 22, "push-ring keeper rod 4")]


def test_the_trim_of_a_folded_rod_is_not_taken_off_its_bends(book_of: Callable[..., Book]) -> None:
    body = {s.name: s.body for s in sections(book_of("valley-television-637"))}["trimming"]
    assert "is not shortened once it is bent" in body
    assert "Sawn with trim" not in body
    straight = {s.name: s.body for s in sections(book_of("river-gauge-434"))}["trimming"]
    assert "is not shortened once it is bent" not in straight


def test_every_body_that_issues_a_rule_is_spelled_out() -> None:
    letters = [word for short, _ in sources.letters() for word in short.split(", ")]
    bodies = " ".join(body for caution in cautions.cautions() for body in caution.bodies)
    assert set(re.findall(r"\b[A-Z]{2,6}\b", bodies)) <= {*letters, "OET", "EU", "EC", "US"}
    assert len(letters) == len(set(letters))


def test_every_printed_part_has_its_pose(root: Path) -> None:
    parts = [
        entry.name
        for entry in registry.entries("model/parts")
        if "def print_pose" in (root / "fabgen/model/parts" / f"{entry.name}.py").read_text(encoding="utf-8")
    ]
    assert parts
    assert [part for part in parts if not (printing.FOLDER / f"{part}.txt").is_file()] == []


@pytest.mark.parametrize(
    ("radiated_w", "limit_w_m2", "reflection", "expected_m"),
    [(1584.9, 2.0, 1.0, 7.941), (1584.9, 2.0, 4.0, 15.882), (1584.9, 10.0, 1.0, 3.551), (1584.9, 10.0, 4.0, 7.103)],
)
def test_distances_follow_the_far_field_equation(
    radiated_w: float, limit_w_m2: float, reflection: float, expected_m: float
) -> None:
    """100 W into 12 dBi. FCC OET Bulletin 65, 97-01, equation 3 (secondary source), worked by hand to 1e-3 m."""
    found = exposure.distance_m(radiated_w, limit_w_m2, reflection_factor=reflection)
    assert found == pytest.approx(expected_m, abs=1e-3)


def test_the_bulletins_own_example_is_met() -> None:
    """39.811 mW, gain 1, at 20 cm: 0.007920 mW/cm². FCC OET Bulletin 65 example (secondary source)."""
    assert exposure.distance_m(0.039811, 0.0792) == pytest.approx(0.2, rel=1e-4)


def test_public_limits_by_frequency() -> None:
    """ICNIRP, Health Physics 118 (2020) 483, Table 5, whole body, general public (from memory); exact."""
    assert [exposure.public_limit_w_m2(f) for f in (30.1, 144.0, 400.0, 432.0, 2000.0, 5760.0)] == pytest.approx(
        [2.0, 2.0, 2.0, 2.16, 10.0, 10.0]
    )
    assert exposure.public_limit_w_m2(28.0) is None


@pytest.mark.parametrize("stem", ["meter-reading-169", "river-gauge-434", "sonde-finder-401", "valley-television-637"])
def test_drawn_bars_hold_every_piece_end_to_end(book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    drawn = cutting.content(book)["bars"]
    assert [each.bar for each in drawn] == list(book.cut_plan.bars)
    for each in drawn:
        reached_mm = 0.0
        for band in each.bands:
            assert band.x_mm == pytest.approx(reached_mm, abs=2e-3)
            reached_mm = band.x_mm + band.width_mm
        assert reached_mm == pytest.approx(cutting.WIDTH_MM, abs=2e-3)
        pieces = [band for band in each.bands if band.kind == "piece"]
        assert [band.width_mm * each.scale_ratio for band in pieces] == pytest.approx(
            [sawn_mm for _, sawn_mm in each.bar.pieces], abs=0.05
        )


@pytest.mark.parametrize(
    ("bar_mm", "lines", "upright"),
    [
        (1000.0, ("D10", "100 + 1.5"), False),
        (2000.0, ("D10", "100", "+ 1.5"), False),
        (3200.0, ("D10", "100 + 1.5"), True),
        (6000.0, ("D10",), True),
        (9000.0, (), False),
    ],
)
def test_lettering_is_stacked_then_turned_then_left_out(bar_mm: float, lines: tuple[str, ...], upright: bool) -> None:
    cut = Cut("D10", "D10", "rod", 4.0, "x", 100.0, 1.5, 50.0, 40.0, 0.3)
    bar = Bar("rod", bar_mm, (("D10", 101.5),), bar_mm - 101.5)
    drawn = cutting.drawn(bar, {"D10": cut}, end_trim_mm=0.0, kerf_mm=0.0)
    (piece,) = (band for band in drawn.bands if band.kind == "piece")
    assert (piece.lines, piece.upright) == (lines, upright)


def test_a_through_hole_is_one_row(book_of: Callable[..., Book]) -> None:
    book = book_of("river-gauge-434")
    ((_, rows),) = drilling.content(book)["by_piece"]
    assert len(rows) == len({hole.number for hole in book.arranged.holes})
    assert rows[0][1:] == (["+y", "-y"], [90.0, 270.0])
    assert sum(len(walls) for _, walls, _ in rows) == len(book.arranged.holes)


def test_published_values_span_what_the_ledger_holds(book_of: Callable[..., Book]) -> None:
    book = book_of("valley-television-637")
    (spread,) = mounts.spreads(book)
    line = book.arranged.ledger.line("D1")
    assert spread.high_mm - spread.low_mm == pytest.approx(line.allowance.spread_mm)
    assert len(spread.lines) == len(book.arranged.design.elements) - 1
    for value in spread.printed:
        assert spread.axis.start_mm <= spread.axis.at(value.low_mm) <= spread.axis.end_mm


@pytest.mark.parametrize("stem", ["river-gauge-434", "valley-television-637"])
def test_the_picture_of_boom_sizes_puts_this_design_where_it_is(book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    (picture,) = boom_sizes.content(book)["pictures"]
    design = book.arranged.design
    across = picture.x.at(design.boom.width_mm / design.wavelength_mm)
    for line, (x, y) in zip(picture.lines, picture.own, strict=True):
        assert x == across
        assert y == picture.y.at(line.allowance.value_mm)
    ((curve, band),) = zip(picture.curves, picture.bands, strict=True)
    assert len(band) == 2 * len(curve)
    upper, lower = band[: len(curve)], band[len(curve) :][::-1]
    for (_, high), (_, middle), (_, low) in zip(upper, curve, lower, strict=True):
        assert high < middle < low  # paper's y runs down
        assert middle - high == pytest.approx(low - middle, abs=2e-3)
    places = [y for _, y in curve]
    assert places == sorted(places, reverse=True)


def test_printed_curves_pass_through_the_ledger_s_printed_values(book_of: Callable[..., Book]) -> None:
    book = book_of("valley-television-637")
    (picture,) = boom_sizes.content(book)["pictures"]
    across, _ = picture.own[0]
    for value in picture.lines[0].allowance.published:
        ((_, _, curve),) = (each for each in picture.printed if each[0] == value.model)
        x0, y0 = max(point for point in curve if point[0] <= across)
        x1, y1 = min(point for point in curve if point[0] >= across)
        between = y0 + (across - x0) / (x1 - x0) * (y1 - y0)
        assert between == pytest.approx(picture.y.at(value.value_mm), abs=0.02)


def test_a_mount_without_closed_form_says_so(book_of: Callable[..., Book]) -> None:
    book = book_of("meter-reading-169")
    (picture,) = boom_sizes.content(book)["pictures"]
    assert picture.curves == ()
    (body,) = (str(section.body) for section in sections(book) if section.name == "boom_sizes")
    assert "no closed form covers it" in body
    assert "theory, unmeasured" not in body
    assert "boom_sizes" not in names(book_of("sonde-finder-401"))


@pytest.mark.parametrize(("low", "high"), [(0.0, 5.37), (-1.2, 8.8), (3.0, 3.0), (0.0, 0.0), (0.0, 1e-4), (2.0, 900.0)])
def test_axes_begin_and_end_on_round_numbers(low: float, high: float) -> None:
    found = axis(low, high, 10.0, 110.0)
    assert found.low <= low
    assert high <= found.high
    assert found.low < found.high
    assert 2 <= len(found.marks) <= 10
    assert (found.marks[0][1], found.marks[-1][1]) == (10.0, 110.0)
    steps = [b - a for (_, a), (_, b) in zip(found.marks, found.marks[1:], strict=False)]
    assert steps == pytest.approx([steps[0]] * len(steps), abs=2e-3)
    assert found.at((found.low + found.high) / 2) == pytest.approx(60.0)


@pytest.mark.parametrize(
    ("name", "given", "expected"),
    [
        ("mm", -0.0004, "0.000"),
        ("mm", -1.5, "\u22121.500"),
        ("signed", 2.0, "+2.000"),
        ("signed", -2.0, "\u22122.000"),
        ("signed", 0.0001, "0.000"),
        ("short", 100.0, "100"),
        ("short", 0.25, "0.25"),
        ("short", -0.0, "0"),
        ("whole", 1426.08, "1426"),
        ("listed", [], ""),
        ("listed", ["R"], "R"),
        ("listed", ["R", "D1"], "R and D1"),
        ("listed", ["R", "D1", "D2", "D3", "D5"], "R, D1 to D3 and D5"),
        ("listed", ["D9", "D10", "D11"], "D9 to D11"),
        ("prose", "a <b> `c&d`", "a &lt;b&gt; <code>c&amp;d</code>"),
        ("css_string", "RGL-1_a.b 2", '"RGL-1_a.b 2"'),
        ("css_string", '"</', '"\\000022 \\00003c \\00002f "'),
    ],
)
def test_wording(name: str, given: object, expected: str) -> None:
    assert str(FILTERS[name](given)) == expected


def test_a_figure_loses_its_prologue_and_its_names() -> None:
    drawing = '<svg width="9mm" height="4mm" viewBox="0 0 9 4"><g id="text"><text>&lt;</text></g></svg>'
    svg = f'<?xml version="1.0"?>\n{drawing}'
    inline = str(Figure("f", "f", svg, 9.0, 4.0).inline)
    assert inline.startswith('<svg role="img" style="width:9mm"')
    assert "id=" not in inline
    assert "<?xml" not in inline
    assert 'height="4mm"' not in inline
    assert "&lt;" in inline


def test_only_long_drawings_go_across() -> None:
    assert Figure("f", "f", "<svg></svg>", 297.0, 210.0).wide
    assert not Figure("f", "f", "<svg></svg>", 168.0, 70.0).wide
