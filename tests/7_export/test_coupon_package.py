"""The coupon package: a test array that is itself clear, a piece long enough, a sheet that comes back as a record."""

import csv
import io
from collections.abc import Callable
from pathlib import Path

import pytest

from fabgen.book.procedure import procedure
from fabgen.correct.coupon_record import mount_key, mounted_rods, record_coupon
from fabgen.coupon import coupon_files, coupon_plan, other_rods_mm
from fabgen.design.coupon import CouponPlan
from fabgen.design.coupon_holder_sizes import coupon_holder_size
from fabgen.design.design import Design
from fabgen.draw.coupon_expected import expected_sheet
from fabgen.errors import InputError
from fabgen.export.coupon_files import expected_csv, readings_csv
from fabgen.physics.boom_coupon import good_coupon_boom_mm
from fabgen.read.reader import read_design
from fabgen.read.readings import read_readings

Variant = Callable[..., Design]
BUSHED = (
    "style: insulated-through\n    hole: 8 mm\n    bush: {kind: shoulder, material: ASA}\n"
    "    keeper: {kind: push-ring, material: ASA}\n"
)
RAISED = (
    BUSHED,
    "style: on-top\n    saddle: {height: 14 mm}\n",
)
ROUND = ("section: square\n  outside: 20 mm", "section: round\n  outside: 20 mm")
SHARP = ("  corner_radius: 1 mm\n", "")
THIN = ("rods: {diameter: 4 mm", "rods: {diameter: 3 mm")
CASES = {
    "insulated": (),
    "raised": (RAISED,),
    "round": (ROUND, SHARP),
    "thin rod": (THIN,),
    "flat": (("outside: 20 mm", "outside: [20 mm, 34 mm]"), ("section: square", "section: rectangular")),
}


PLANS: dict[str, tuple[Design, CouponPlan, object, object]] = {}


@pytest.fixture(params=CASES)
def planned(variant: Variant, request: pytest.FixtureRequest) -> tuple[Design, CouponPlan, object, object]:
    if request.param not in PLANS:
        design = variant(*CASES[request.param])
        PLANS[request.param] = (design, *coupon_plan(design, "line"))
    return PLANS[request.param]


def test_the_test_array_is_a_clear_design_of_three_rods(planned) -> None:
    _, plan, _, judged = planned
    assert judged.clear
    design = judged.arranged.design
    assert [element.role for element in design.elements] == ["reflector", "driven", "director"]
    assert design.boom.material.kind == "wood"
    assert all(not line.allowance.needed for line in judged.arranged.ledger.lines)
    assert design.frequency_mhz == plan.frequency_mhz
    assert design.boom.length_mm == pytest.approx(plan.timber_length_mm)
    assert min(design.element("R").station_mm, design.boom.length_mm - design.element("D1").station_mm) >= 60


def test_the_piece_is_long_enough_and_holds_one_rod_in_its_mount(planned) -> None:
    design, plan, piece, _ = planned
    side_mm = max(design.boom.width_mm, design.boom.height_mm)
    assert plan.piece_mm >= good_coupon_boom_mm(side_mm, 434.0) >= 8 * side_mm
    assert piece.design.boom.length_mm == plan.piece_mm
    assert {hole.station_mm for hole in piece.holes if hole.purpose in ("rod", "bush")} <= {plan.piece_mm / 2}
    assert len([part for part in piece.placed if part.part == "rod"]) == 1
    reach_mm = plan.at_mm[2] - plan.at_mm[1] - plan.piece_mm / 2
    assert reach_mm >= 20.0  # the driven rod stands clear of the metal


def test_the_holder_takes_piece_and_mount(planned) -> None:
    design, plan, _, judged = planned
    holder = dict(plan.holder)
    size = coupon_holder_size(**holder)
    assert size.height_mm == plan.height_mm == judged.arranged.design.feeds[0].height_mm
    saddles = sorted({hole.station_mm for hole in judged.arranged.holes if hole.element == "D1"})
    station = judged.arranged.design.element("D1").station_mm
    assert saddles == pytest.approx([station - size.screw_x_mm, station + size.screw_x_mm], abs=1e-3)
    assert size.floor_mm > 0
    assert size.rest_mm >= design.boom.height_mm / 2
    assert size.inner_mm > design.boom.width_mm / 2 + holder["stack_mm"]


def test_the_expected_reading_grows_from_step_to_step(planned) -> None:
    """Off the SWR minimum and on one side of it at every frequency, or nobody could tell the root."""
    _, plan, _, _ = planned
    assert len(plan.free_mm) == 8
    assert len(plan.frequencies_mhz) == 3
    for setup in ("free", "mounted"):
        at_design = [s.swr for s in plan.expected if s.setup == setup and s.frequency_mhz == plan.frequency_mhz]
        assert at_design == sorted(at_design, reverse=True)
        assert min(at_design) > 1.3
        assert max(at_design) < 3.5
    assert plan.mounted_mm[0] - plan.free_mm[0] == pytest.approx(plan.allowance_mm, abs=0.26)


def test_the_filled_in_sheet_comes_back_as_the_expected_allowance(planned, tmp_path: Path) -> None:
    """The sheet, filled in with what was expected, rounded as an instrument would, is read and fitted."""
    design, plan, _, _ = planned
    expected = {(s.setup, f"{s.length_mm:.3f}", f"{s.frequency_mhz:.3f}"): s for s in plan.expected}
    head, table = [], []
    for line in readings_csv(plan).decode("utf-8").splitlines():
        (head if line.startswith("#") else table).append(line)
    rows = list(csv.DictReader(io.StringIO("\n".join(table))))
    assert len(rows) == 48
    for row in rows:
        row["swr"] = f"{expected[row['setup'], row['length_mm'], row['frequency_mhz']].swr:.2f}"
    out = io.StringIO()
    writer = csv.DictWriter(out, rows[0])
    writer.writeheader()
    writer.writerows(rows)
    path = tmp_path / "filled.csv"
    path.write_text("\n".join(head) + "\n" + out.getvalue(), encoding="utf-8")
    sheet = read_readings(path)
    assert sheet.mount_key == mount_key(mounted_rods(design, "line")[0][1])
    found = record_coupon(design, "line", sheet, "2026-11-30")
    assert found.fit.allowance_mm == pytest.approx(plan.allowance_mm, abs=2 * found.fit.u_mm)


def test_the_sheet_is_empty_and_the_expected_table_full(planned) -> None:
    _, plan, _, _ = planned
    rows = [line for line in readings_csv(plan).decode("utf-8").splitlines() if not line.startswith("#")][1:]
    assert all(row.endswith(",,,,,") for row in rows)
    expected = list(csv.DictReader(io.StringIO(expected_csv(plan).decode("utf-8"))))
    assert len(expected) == len(rows)
    assert all(all(row.values()) for row in expected)


def test_the_procedure_names_what_is_used(planned) -> None:
    design, plan, _, _ = planned
    text = procedure(plan, design).decode("utf-8")
    assert max(map(len, text.splitlines())) <= 120
    for said in (f"{plan.piece_mm:g} mm long", f"{plan.free_mm[0]:.1f} mm", "two frequencies or more", "no gloves",
                 "fabgen record river-gauge-434.yaml readings.csv --mount line"):  # fmt: skip
        assert said in text
    assert "{" not in text.replace("{origin: measured}", "")


def test_the_picture_has_a_panel_for_every_reading(planned) -> None:
    _, plan, _, _ = planned
    sheet = expected_sheet(plan)
    titles = [item.text for item in sheet.items if getattr(item, "text", "").startswith(("SWR", "reflection"))]
    assert len(titles) == 5


def test_a_mount_without_metal_has_no_coupon(variant: Variant, root: Path) -> None:
    with pytest.raises(InputError, match="no rod is carried by a mount stick2"):
        coupon_plan(variant(), "stick2")
    wood = read_design(root / "designs/sonde-finder-401.yaml").design
    with pytest.raises(InputError):
        coupon_plan(wood, "stick")


def test_a_mount_with_two_kinds_of_rod_needs_two_coupons(variant: Variant) -> None:
    design = variant(("length: 281.7}", "length: 281.7, diameter: 5 mm}"))
    assert other_rods_mm(design, "line") == (5.0,)
    assert other_rods_mm(variant(), "line") == ()
    assert dict(coupon_plan(design, "line")[0].holder)["rod_diameter_mm"] == 4.0


@pytest.mark.slow
def test_a_package_is_whole_and_the_same_twice(variant: Variant) -> None:
    design = variant()
    files = [{file.path: file.data for file in coupon_files(design, "line", lambda _: None)[1]} for _ in range(2)]
    assert files[0] == files[1]
    assert {
        "procedure.txt", "readings.csv", "expected.csv", "expected.svg", "test-array.yaml",
        "test-array/templates/templates.pdf", "test-array/tables/cut-list.csv", "piece/templates/templates.pdf",
        "piece/templates/boom.svg", "piece/tables/drilling.csv", "prints/coupon-holder.stl",
    } <= set(files[0])  # fmt: skip
