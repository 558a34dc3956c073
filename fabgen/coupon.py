"""A coupon package: what one mount's measurement needs, planned from the drawn mount and written like any package."""

import math
import tempfile
from dataclasses import replace
from pathlib import Path

from fabgen.arrange.arrange import arrange
from fabgen.correct.case import as_boom_mount
from fabgen.correct.coupon_record import mount_key, mounted_rods
from fabgen.correct.ledger import correct
from fabgen.correct.rod_change import free_length_mm
from fabgen.design.arranged import Arranged, Box, Shape
from fabgen.design.coupon import CouponPlan, Expected
from fabgen.design.coupon_holder_sizes import least_height_mm
from fabgen.design.design import AllowanceChoice, Design, Element
from fabgen.design.package import PackageFile, Say
from fabgen.design.readings import Setup
from fabgen.design.records import MountGeometry
from fabgen.errors import InputError
from fabgen.physics.boom_coupon import good_coupon_boom_mm
from fabgen.physics.boom_differences import nearest_closed_form_mm
from fabgen.pipeline import Judged, check
from fabgen.stock.tables import material_names

THINNEST_DRIVEN_MM = 4.0
"""A driven rod must take a terminal screw."""

LOWEST_MM, HEIGHT_STEP_MM, HEIGHT_TRIES = 18.0, 2.0, 16
BESIDE_DRIVEN_MM = 30.0
"""Between the piece of boom and the driven rod: the feed block stands there."""

USUAL_ROD = "EN AW-6060 T66"


def coupon_plan(design: Design, mount: str) -> tuple[CouponPlan, Arranged, Judged]:
    """Plan the coupon of a mount.

    Args:
        design: as read.
        mount: the user's name for the mount.

    Returns:
        The plan, the piece of boom arranged with its rod and mount, and the test array judged.

    Raises:
        InputError: no rod has this mount on metal, or no test array for it can be built.
    """
    element, geometry = mounted_rods(design, mount)[0]
    rods_mm = [free_length_mm(design, other) for other, same in mounted_rods(design, mount) if same == geometry]
    boom_mm = max(geometry.outside_mm, geometry.height_mm)
    piece_mm = 2.0 * math.ceil(good_coupon_boom_mm(boom_mm, design.frequency_mhz) / 2)
    plan = _plan(design, element, geometry, rods_mm, piece_mm)
    piece = _piece(design, element, plan)
    stack_mm, rest_mm = _reach(piece)
    least = max(LOWEST_MM, math.ceil(least_height_mm(rest_mm=rest_mm)))
    for tries in range(HEIGHT_TRIES):
        plan = _at_height(plan, design, least + tries * HEIGHT_STEP_MM, stack_mm, rest_mm)
        judged = _judged(plan, design)
        if judged.clear:
            return plan, piece, judged
    failing = next(finding for finding in judged.findings if finding.severity == "fail")
    raise InputError(f"no test array for mount {mount}: {failing.code} {failing.where}: {failing.advice}")


def other_rods_mm(design: Design, mount: str) -> tuple[float, ...]:
    """Diameters of rods that the same mount carries and that this coupon says nothing about.

    Args:
        design: as read.
        mount: the user's name for the mount.
    """
    diameters = [geometry.rod_diameter_mm for _, geometry in mounted_rods(design, mount)]
    return tuple(sorted(set(diameters[1:]) - {diameters[0]}))


def coupon_files(design: Design, mount: str, say: Say) -> tuple[CouponPlan, tuple[PackageFile, ...]]:
    """All files of a coupon package but its manifest.

    Args:
        design: as read.
        mount: the user's name for the mount.
        say: takes progress.
    """
    from fabgen.book.procedure import procedure
    from fabgen.contents import package_files
    from fabgen.draw.coupon_expected import expected_sheet
    from fabgen.export import step, stl, threemf
    from fabgen.export.coupon_files import expected_csv, readings_csv, test_array_yaml
    from fabgen.export.svg import svg
    from fabgen.model.prints import print_of

    say(f"{design.name}: planning the coupon of mount {mount}")
    plan, piece, array = coupon_plan(design, mount)
    files = [
        PackageFile("procedure.txt", procedure(plan, design), "what to do, in order"),
        PackageFile("readings.csv", readings_csv(plan), "the sheet to fill in"),
        PackageFile("expected.csv", expected_csv(plan), "what the feed should read at every step"),
        PackageFile("expected.svg", svg(expected_sheet(plan)), "the same, drawn"),
        PackageFile("test-array.yaml", test_array_yaml(plan, design), "the three-rod test array, a design file"),
    ]
    for folder, arranged, findings, only in (
        ("test-array", array.arranged, array.findings, ("tables", "templates", "bench", "prints")),
        ("piece", piece, (), ("tables", "templates", "bench", "prints")),
    ):
        made = package_files(arranged, findings, stamped=False, only=only, say=say)
        files += [replace(file, path=f"{folder}/{file.path}") for file in made if file.path != "findings.json"]
    holder = print_of("coupon_holder", plan.holder, f"coupon holder rod {plan.rod_diameter_mm:g}")
    for ending, writer in (("stl", stl), ("3mf", threemf), ("step", step)):
        name = f"prints/coupon-holder.{ending}"
        files.append(PackageFile(name, writer.part_bytes(holder), "holds the director's station, print 1"))
    return plan, tuple(files)


def _plan(
    design: Design, element: Element, geometry: MountGeometry, rods_mm: list[float], piece_mm: float
) -> CouponPlan:
    from fabgen.physics.coupon_array import LEAST_SPACING_WL, coupon_array

    wl_mm, rod_mm = design.wavelength_mm, geometry.rod_diameter_mm
    middle_mm = sum(rods_mm) / len(rods_mm)
    allowance_mm = nearest_closed_form_mm(as_boom_mount(geometry), middle_mm, geometry.frequency_mhz)
    driven_mm = max(rod_mm, THINNEST_DRIVEN_MM)
    trims = coupon_array(
        rods_mm=rods_mm,
        rod_diameter_mm=rod_mm,
        driven_diameter_mm=driven_mm,
        frequency_mhz=design.frequency_mhz,
        spacing_mm=max(LEAST_SPACING_WL * wl_mm, piece_mm / 2 + BESIDE_DRIVEN_MM),
        expected_allowance_mm=max(0.0, allowance_mm),
        cut_step_mm=design.shop.cut_step_mm,
    )
    series: tuple[tuple[Setup, tuple[float, ...], float], ...] = (
        ("free", trims.free_mm, 0.0),
        ("mounted", trims.mounted_mm, trims.expected_allowance_mm),
    )
    expected = tuple(
        Expected(setup, count, length_mm, mhz, trims.reflection(length_mm - taken_mm, mhz))
        for setup, lengths_mm, taken_mm in series
        for count, length_mm in enumerate(lengths_mm, start=1)
        for mhz in trims.frequencies_mhz
    )
    reflector, driven, director = trims.array.station_mm
    return CouponPlan(
        mount=element.mount.name if element.mount else "",
        mount_key=mount_key(geometry),
        style=geometry.style,
        number=design.number,
        revision=design.revision,
        title=design.title,
        frequency_mhz=design.frequency_mhz,
        wavelength_mm=wl_mm,
        rod_diameter_mm=rod_mm,
        driven_diameter_mm=driven_mm,
        material=element.rod.material.name if element.rod.material.name in material_names() else USUAL_ROD,
        at_mm=(reflector, driven, director),
        reflector_mm=trims.array.length_mm[0],
        driven_mm=trims.array.length_mm[1],
        free_mm=trims.free_mm,
        mounted_mm=trims.mounted_mm,
        allowance_mm=trims.expected_allowance_mm,
        piece_mm=piece_mm,
        height_mm=0.0,
        timber_mm=20.0 if wl_mm < 1200.0 else 30.0,
        holder=(),
        expected=expected,
    )


def _piece(design: Design, element: Element, plan: CouponPlan) -> Arranged:
    """The piece of boom with one rod in its mount, arranged as any boom is."""
    assert element.mount is not None
    half_mm = plan.piece_mm / 2
    boom = replace(design.boom, rear_mm=half_mm, front_mm=half_mm, length_mm=plan.piece_mm)
    rod = replace(
        element,
        id="D1",
        role="director",
        at_mm=0.0,
        station_mm=half_mm,
        length_mm=plan.mounted_mm[0],
        mount=replace(element.mount, allowance=AllowanceChoice("none")),
    )
    alone = replace(
        design,
        title=f"Coupon piece for mount {plan.mount}",
        number=f"{design.number[:36]}-CP",
        boom=boom,
        elements=(rod,),
        lengths_are="as-cut",
        feeds=(),
        clamp=None,
        records=(),
    )
    return arrange(alone, correct(alone))


def _reach(piece: Arranged) -> tuple[float, float]:
    """How far the mount stands out of the piece's side, and how far below the rod's axis everything ends."""
    boom = piece.design.boom
    boxes = [_box(shape) for part in piece.placed if part.part != "rod" for shape in part.shapes]
    (rod,) = (part for part in piece.placed if part.part == "rod")
    rod_box = _box(rod.shapes[0])
    axis_mm = (rod_box.low[2] + rod_box.high[2]) / 2
    side_mm = max(max(box.high[1], -box.low[1]) for box in boxes) - boom.width_mm / 2
    return max(0.0, round(side_mm, 3)), round(axis_mm - min(box.low[2] for box in boxes), 3)


def _box(shape: Shape) -> Box:
    return shape if isinstance(shape, Box) else shape.box


def _at_height(plan: CouponPlan, design: Design, height_mm: float, stack_mm: float, rest_mm: float) -> CouponPlan:
    numbers = {
        "boom_width_mm": design.boom.width_mm,
        "height_mm": height_mm,
        "hole_growth_mm": design.printer.hole_growth_mm,
        "rest_mm": rest_mm,
        "rod_diameter_mm": plan.rod_diameter_mm,
        "stack_mm": stack_mm,
    }
    return replace(plan, height_mm=height_mm, holder=tuple(sorted(numbers.items())))


def _judged(plan: CouponPlan, design: Design) -> Judged:
    """The test array's own design file, read and judged as the user would."""
    from fabgen.export.coupon_files import test_array_yaml

    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "test-array.yaml"
        path.write_bytes(test_array_yaml(plan, design))
        return check(path)
