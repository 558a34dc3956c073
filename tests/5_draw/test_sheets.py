"""Every sheet of every shape of boom: nothing covered, nothing lost, bars, walls, stamp, the same twice."""

import io
import math

import pytest

from fabgen.design.arranged import Hole
from fabgen.design.drawing import Circle, Line, Text
from fabgen.design.lettering import text_box
from fabgen.design.overlaps import overlaps
from fabgen.draw.lettering_place import Drawn, Spot, letter_hole
from fabgen.draw.sheet_list import sheets_of
from fabgen.draw.tiling import tile
from fabgen.stock.tables import paper_size_mm

PLACES = ("templates", "bench", "drawings")


def words(sheet):
    return [item.text for item in sheet.items if isinstance(item, Text)]


def every_sheet(shape, *, stamp=False):
    arranged, plan = shape
    return [sheet for place in PLACES for sheet in sheets_of(place, arranged, plan, stamp=stamp)]


def test_lettering_covers_nothing_and_nothing_runs_through_it(shape):
    for sheet in every_sheet(shape):
        assert [str(found) for found in overlaps(sheet, lines=True)] == [], sheet.name


def test_letters_that_reach_deep_and_high_keep_apart(arranged_as):
    """A number with J, Q or _ stands over a title with Ä: neither may cost a design its verdict."""
    for sheet in every_sheet(arranged_as("deep-and-tall")):
        assert [str(found) for found in overlaps(sheet)] == [], sheet.name


def test_pages_of_the_templates_lose_no_lettering(shape):
    arranged, plan = shape
    design = arranged.design
    for sheet in sheets_of("templates", arranged, plan):
        tiling = tile(sheet, paper_size_mm(design.shop.paper), number=design.number, revision=design.revision)
        assert tiling.dropped == ()
        for page in tiling.pages:
            assert [str(found) for found in overlaps(page)] == [], page.name


def test_templates_carry_a_bar_both_ways(shape):
    arranged, plan = shape
    sheets = sheets_of("templates", arranged, plan)
    assert [sheet.name for sheet in sheets] == (["boom", "clamp-plate"] if arranged.clamp_mm else ["boom"])
    for sheet in sheets:
        bars = [
            (line.x1_mm - line.x0_mm, line.y1_mm - line.y0_mm)
            for line in sheet.on("scale")
            if isinstance(line, Line) and math.dist((line.x0_mm, line.y0_mm), (line.x1_mm, line.y1_mm)) > 50
        ]
        assert sorted(bars) == [pytest.approx((0, 100), abs=1e-9), pytest.approx((100, 0), abs=1e-9)]


def test_every_hole_is_lettered_with_element_station_and_drill(shape):
    arranged, plan = shape
    [sheet, *_] = sheets_of("templates", arranged, plan)
    said = " ".join(words(sheet))
    for hole in arranged.holes:
        for wanted in (hole.number, hole.element, f"{hole.station_mm:.3f}", f"drill {hole.drill}"):
            assert wanted in said
        if hole.purpose not in ("rod", "bush"):
            assert hole.purpose in said


def test_all_walls_are_kept_with_centre_line_and_arrow(shape):
    arranged, plan = shape
    [sheet, *_] = sheets_of("templates", arranged, plan)
    said = words(sheet)
    assert {"TOP", "LEFT", "RIGHT", "BOTTOM", "DATUM END", "FRONT END"} <= set(said)
    long = [line for line in sheet.on("centre") if isinstance(line, Line) and abs(line.x1_mm - line.x0_mm) > 200]
    assert len(long) == (3 if arranged.design.boom.section == "round" else 4)


def test_a_cut_out_template_still_tells_its_ends_and_stations(arranged_as):
    """Nothing outside the paper's outline is left: on every wall both ends are named, ticks stand at round stations."""
    for name in ("square", "rectangular", "round", "solid"):
        arranged, plan = arranged_as(name)
        [sheet, *_] = sheets_of("templates", arranged, plan)
        edges = [item.points_mm for item in sheet.on("outline") if hasattr(item, "points_mm") and item.closed]
        boxes = [(*min(points), *max(points)) for points in edges]
        low = min(box[1] for box in boxes)

        def inside(x, y, boxes=boxes):
            return any(box[0] < x < box[2] and box[1] - 1e-9 <= y <= box[3] + 1e-9 for box in boxes)

        here = [item for item in sheet.items if isinstance(item, Text) and inside(item.x_mm, item.y_mm)]
        walls = 5 if name == "round" else 4
        for words, most_mm in (("DATUM END", 5.0), ("FRONT END", arranged.design.boom.length_mm)):
            xs = [item.x_mm + sheet.station_at_x0_mm for item in here if item.text == words]
            assert len(xs) == walls
            assert all(most_mm - 25.0 < x <= most_mm for x in xs)
        ticks = {
            round(line.x0_mm + sheet.station_at_x0_mm, 6)
            for line in sheet.on("dim")
            if isinstance(line, Line) and line.y0_mm == low < line.y1_mm
        }
        assert ticks == {50.0 * k for k in range(1, math.ceil(arranged.design.boom.length_mm / 50))}
        for item in here:
            if item.layer == "dim" and item.text.isdigit():
                assert abs(item.x_mm + sheet.station_at_x0_mm - int(item.text)) < 10.0


def test_every_sheet_of_a_design_that_is_not_clear_is_stamped(shape):
    for sheet in every_sheet(shape, stamp=True):
        assert any("NOT CLEARED" in item.text for item in sheet.on("stamp")), sheet.name


def test_sheets_are_the_same_twice(shape):
    assert every_sheet(shape) == every_sheet(shape)


def test_a_long_title_is_shortened_and_taken_as_written(arranged_as):
    for sheet in every_sheet(arranged_as("long-title")):
        titles = [text for text in words(sheet) if "<b>" in text]
        assert titles
        assert all(text.endswith("…") for text in titles)


def holes_and_lettering(above, low_mm, high_mm, taken=()):
    from fabgen.design.pen import Pen

    pen = Pen()
    pen.circle("drill", 0, 0, 2)
    pen.line("centre", -100, 0, 100, 0)
    for item in taken:
        pen.items.append(item)
    before = list(pen.items)
    done = letter_hole(pen, Drawn(before), Spot(0, 0, 2, low_mm, high_mm, -60, 60), above, ["H01", "drill 4 mm"])
    return done, pen.items[len(before) :]


def test_lettering_stands_beside_its_hole_when_there_is_room():
    done, items = holes_and_lettering(["D1", "250.000"], -9, 9)
    assert done
    assert [item.text for item in items] == ["D1 250.000", "H01 drill 4 mm"]
    over, under = map(text_box, items)
    assert over[1] > 0.3
    assert under[3] < -0.3
    assert 2 < over[0] < 5


def test_lettering_moves_to_the_other_side_of_a_hole():
    _, items = holes_and_lettering(["D1", "250.000"], -9, 9, [Circle("drill", 9, 0, 3)])
    assert all(text_box(item)[2] < -2 for item in items)


def test_lettering_stands_off_with_a_leader_when_both_sides_are_taken():
    near = [Circle("drill", side * 6, y, r) for side in (-1, 1) for y, r in ((5, 1), (-1.6, 0.6))]
    done, items = holes_and_lettering(["D1", "250.000"], -9, 9, near)
    assert done
    assert isinstance(items[-1], Line)


def test_lettering_that_has_no_place_is_refused():
    done, items = holes_and_lettering(["D1", "250.000"], -1.5, 1.5)
    assert (done, items) == (False, [])


def test_a_hole_without_room_is_listed_above_the_paper(arranged_as):
    arranged, plan = arranged_as("dense")
    [sheet, *_] = sheets_of("templates", arranged, plan)
    upright = [item.text for item in sheet.items if isinstance(item, Text) and item.angle_deg == 90]
    assert any("LEFT + RIGHT  DIRECTOR-LONG-02 152.300 ±0.5 drill 6 mm" in text for text in upright)


def clamp_circles(arranged, plan):
    sheet = sheets_of("templates", arranged, plan)[1]
    [edge] = sheet.on("outline")
    xs, ys = [x for x, _ in edge.points_mm], [y for _, y in edge.points_mm]
    middle = ((min(xs) + max(xs)) / 2, (min(ys) + max(ys)) / 2)
    circles = [item for item in sheet.on("drill") if isinstance(item, Circle)]
    return sheet, (max(xs) - min(xs), max(ys) - min(ys)), [
        (round(c.x_mm - middle[0], 6), round(c.y_mm - middle[1], 6), 2 * c.radius_mm) for c in circles
    ]  # fmt: skip


@pytest.mark.parametrize("name", ["square", "upright", "round", "rectangular"])
def test_clamp_plate_is_drawn_from_the_placed_part(name, arranged_as):
    arranged, plan = arranged_as(name)
    sheet, size, holes = clamp_circles(arranged, plan)
    plate = dict(arranged.part("clamp plate").parameters)
    assert size == pytest.approx((plate["width_mm"], plate["height_mm"]))
    assert sorted(holes) == [pytest.approx(hole) for hole in sorted(plate["holes"])]
    said = " ".join(words(sheet))
    assert "Printed face towards the mast" in said
    assert "mast U-bolt" in said
    assert ("boom U-bolt" if name == "round" else "boom bolt") in said


@pytest.mark.parametrize("name", ["square", "upright"])
def test_boom_bolts_of_the_plate_meet_the_boom_s_holes(name, arranged_as):
    arranged, plan = arranged_as(name)
    _, _, holes = clamp_circles(arranged, plan)
    frame = arranged.part("clamp plate").frame
    places = [frame.point((x, y, 0.0)) for x, y, _ in holes]
    bolts = [hole for hole in arranged.holes if hole.purpose == "clamp bolt"]
    assert bolts
    for hole in bolts:
        assert any(_on_axis(place, hole) for place in places)


def _on_axis(place, hole: Hole):
    aside = place[2] if abs(hole.axis[1]) > 0.5 else place[1]
    return math.hypot(place[0] - hole.station_mm, aside - hole.across_mm) < 1e-6


def bench_lines(arranged, plan):
    """Words of all bench pages, line by line from the top, cells separated by bars."""
    lines = []
    for sheet in sheets_of("bench", arranged, plan):
        rows = {}
        for item in sheet.items:
            if isinstance(item, Text):
                rows.setdefault(round(item.y_mm, 3), []).append((item.x_mm, item.text))
        lines += ["|".join(text for _, text in sorted(row)) for _, row in sorted(rows.items(), reverse=True)]
    return lines


def test_bench_lists_every_hole_once_in_drilling_order(shape):
    arranged, plan = shape
    listed = [line.split("|") for line in bench_lines(arranged, plan) if line[:1] == "H" and line[1:2].isdigit()]
    by_number = {hole.number: hole for hole in arranged.holes}
    assert sorted(cells[0] for cells in listed) == sorted(by_number)
    for cells in listed:
        hole = by_number[cells[0]]
        assert cells[1:3] == [hole.element, f"{hole.station_mm:.3f}"]
        assert hole.drill in cells
        assert hole.purpose in cells
        through = sum(other.number == hole.number for other in arranged.holes) == 2
        assert (" + " in cells[4]) == through
    side = [round(by_number[cells[0]].angle_deg) % 180 != 90 for cells in listed]
    assert side == sorted(side)
    for kind in (False, True):
        stations = [float(cells[2]) for cells, other in zip(listed, side, strict=True) if other == kind]
        assert stations == sorted(stations)


def test_bench_saws_every_piece_in_the_plan_s_order(shape):
    arranged, plan = shape
    cuts = {cut.piece: cut for cut in arranged.cuts}
    rows = [line.split("|") for line in bench_lines(arranged, plan)]
    sawn = [cells for cells in rows if len(cells) > 2 and cells[0].isdigit() and cells[1] in cuts]
    assert [cells[1] for cells in sawn] == [name for bar in plan.bars for name, _ in bar.pieces]
    for cells in sawn:
        cut = cuts[cells[1]]
        assert cells[2] == f"{cut.cut_mm:.3f}"
        assert (f"{cut.half_mm:.3f}" in cells) == bool(cut.half_mm)
    notes = " ".join(" ".join(cells) for cells in rows)
    assert all(cut.note in notes for cut in arranged.cuts)


def test_bench_says_what_the_lengths_rest_on(arranged_as):
    for name, status in (("square", "allowances: computed (theory, unmeasured)"), ("round-solid", "none needed")):
        for sheet in sheets_of("bench", *arranged_as(name)):
            assert status in " ".join(words(sheet))


def test_bench_of_a_usual_array_takes_two_pages(arranged_as):
    assert len(sheets_of("bench", *arranged_as("square"))) == 2
    assert len(sheets_of("bench", *arranged_as("letter"))) == 2
    pages = sheets_of("bench", *arranged_as("dense"))
    assert 2 < len(pages) < 8
    assert any("bench page 1 of" in text for text in words(pages[0]))


def test_bench_names_the_checks_and_fits(arranged_as):
    said = " ".join(
        words(sheet)[k] for sheet in sheets_of("bench", *arranged_as("square")) for k in range(len(words(sheet)))
    )
    for wanted in ("Datum end sawn square", "TOP line scribed", "Your boom measured", "100 mm", "Never drill through"):
        assert wanted in said
    for fit in ("4.000", "8.000", "4.200", "7.800 × 2.5", "12.000", "3.700"):
        assert fit in said


def test_bench_names_the_length_of_a_sleeve_through_both_walls(arranged_as):
    """Boom 20 mm, the far end 0.3 mm inside: no spigot in one wall is bought or measured."""
    said = [text for sheet in sheets_of("bench", *arranged_as("sleeve")) for text in words(sheet)]
    assert "7.800 × 19.7" in said


def view_of(arranged_as, name):
    arranged, plan = arranged_as(name)
    [sheet] = sheets_of("drawings", arranged, plan)
    return arranged, sheet


SCALES = {f"1:{k}" for k in (1, 2, 5, 10, 20, 50, 100)}
"""ISO 5455:1979, reductions (from memory)."""
FORMATS_MM = {"A4": (297, 210), "A3": (420, 297), "A2": (594, 420), "Letter": (279.4, 215.9)}
"""ISO 216, turned; Letter 8 1/2 × 11 in."""


def test_general_view_is_drawn_at_the_scale_it_names(shape):
    arranged, plan = shape
    [sheet] = sheets_of("drawings", arranged, plan)
    [scale] = [text.partition(",")[0] for text in words(sheet) if text.endswith(", do not drill")]
    assert scale in SCALES
    ratio = int(scale.partition(":")[2])
    size = next(text for text in words(sheet) if text in FORMATS_MM)
    assert (sheet.width_mm, sheet.height_mm) == pytest.approx(FORMATS_MM[size])
    spans = []
    for item in sheet.on("outline"):
        if hasattr(item, "points_mm"):
            xs = [x for x, _ in item.points_mm]
            spans.append((max(xs) - min(xs)) * ratio)
    assert sum(abs(span - arranged.design.boom.length_mm) < 1e-6 for span in spans) == 2


def test_running_dimensions_stand_at_their_stations(shape):
    arranged, plan = shape
    [sheet] = sheets_of("drawings", arranged, plan)
    [scale] = [text.partition(",")[0] for text in words(sheet) if text.endswith(", do not drill")]
    ratio = 1 / int(scale.partition(":")[2])
    said = {item.text: item for item in sheet.on("dim") if isinstance(item, Text) and item.angle_deg == 90}
    origin = next(item for item in sheet.on("dim") if isinstance(item, Circle))
    legs = [item.points_mm for item in sheet.on("dim") if hasattr(item, "points_mm") and len(item.points_mm) == 3]
    for line in arranged.ledger.lines:
        text = said[f"{line.station_mm:.3f} {line.element}"]
        leg = min(legs, key=lambda points: abs(points[-1][0] - (text.x_mm - text.height_mm / 2)))
        assert leg[-1][0] == pytest.approx(text.x_mm - text.height_mm / 2, abs=1e-6)
        assert leg[0][0] - origin.x_mm == pytest.approx(ratio * line.station_mm, abs=1e-6)
    assert f"{arranged.design.boom.length_mm:.3f} front end" in said


def test_title_block_leaves_a_blank_for_what_the_design_leaves_out(arranged_as):
    for name in ("square", "blank"):
        arranged, sheet = view_of(arranged_as, name)
        said = words(sheet)
        for caption in ("legal owner", "creator", "approval person", "date of issue", "title", "identification number"):
            assert caption in said
        fields = arranged.design.sheet
        for value in (fields.owner, fields.creator, fields.date):
            assert not value or value in said
    assert not any("2026" in text for text in said)


def test_element_table_gives_station_and_cut_length(shape):
    arranged, plan = shape
    [sheet] = sheets_of("drawings", arranged, plan)
    rows = {}
    for item in sheet.items:
        if isinstance(item, Text) and item.height_mm == 2.0:
            rows.setdefault(round(item.y_mm, 3), []).append((item.x_mm, item.text))
    said = " | ".join(" ".join(text for _, text in sorted(row)) for row in rows.values())
    for line in arranged.ledger.lines:
        assert f"{line.element} {line.role} {line.station_mm:.3f} {line.cut_mm:.3f} {line.rod_mm:.3f}" in said


def test_drawings_are_clean_for_cad(arranged_as):
    import ezdxf

    from fabgen.export.dxf import dxf

    arranged, plan = arranged_as("round")
    for sheet in [*sheets_of("templates", arranged, plan), *sheets_of("drawings", arranged, plan)]:
        document = ezdxf.read(io.StringIO(dxf(sheet).decode("utf-8")))
        audit = document.audit()
        assert (audit.errors, audit.fixes) == ([], [])
        assert document.header["$INSUNITS"] == 4


def test_join_lines_of_pages_run_through_no_lettering(arranged_as):
    arranged, plan = arranged_as("square")
    design = arranged.design
    [sheet, *_] = sheets_of("templates", arranged, plan)
    tiling = tile(sheet, paper_size_mm(design.shop.paper), number=design.number, revision=design.revision)
    for page in tiling.pages:
        assert [str(found) for found in overlaps(page, lines=True)] == []
