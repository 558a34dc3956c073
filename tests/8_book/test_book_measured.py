"""A measured mount in the book: the point in the picture of boom sizes, and what measured means beside the ledger."""

from collections.abc import Callable
from dataclasses import replace

import pytest

from fabgen.book.book import Book, sections
from fabgen.book.sections import boom_sizes
from fabgen.design.mount_geometry import mount_geometry
from fabgen.design.records import MeasuredRecord
from fabgen.physics.boom_closed_form import rod_slope_ohm_per_wl
from fabgen.physics.boom_mount import ETA_OHM


@pytest.fixture
def measured(book_of: Callable[..., Book]) -> Book:
    design = book_of("river-gauge-434").arranged.design
    element = design.element("D1")
    assert element.mount is not None
    wl_mm = design.wavelength_mm
    factor = 5.0 * rod_slope_ohm_per_wl(4 / wl_mm, 310 / wl_mm) / (ETA_OHM * 20)
    drawn = mount_geometry(design, element, element.mount)
    record = MeasuredRecord("records/r/m.yaml", "line", "2026-11-30", drawn, 310.0, 5.0, 0.1, factor, 0.05)
    elements = tuple(
        replace(e, mount=replace(e.mount, allowance=replace(e.mount.allowance, origin="auto"))) if e.mount else e
        for e in design.elements
    )
    return book_of("river-gauge-434", records=(record,), elements=elements)


def test_the_measured_point_stands_in_the_picture(measured: Book, book_of: Callable[..., Book]) -> None:
    """The coupon's rod of 310 mm took 5 mm; the picture is drawn for the mean rod, whose slope S is larger."""
    (picture,) = boom_sizes.content(measured)["pictures"]
    ((date, (x, y), (top, bottom)),) = picture.measured
    wl_mm = measured.arranged.design.wavelength_mm
    slopes = [rod_slope_ohm_per_wl(4 / wl_mm, mm / wl_mm) for mm in (310.0, picture.length_mm)]
    expected_mm = 5.0 * slopes[0] / slopes[1]
    assert date == "2026-11-30"
    assert x == pytest.approx(picture.x.at(20 / wl_mm), abs=1e-3)
    assert y == pytest.approx(picture.y.at(expected_mm), abs=1e-3)
    assert (top, bottom) == pytest.approx(
        (picture.y.at(expected_mm * 1.04), picture.y.at(expected_mm * 0.96)), abs=2e-3
    )
    assert boom_sizes.content(book_of("river-gauge-434"))["pictures"][0].measured == ()


def test_the_words_follow(measured: Book) -> None:
    bodies = {section.name: str(section.body) for section in sections(measured)}
    assert "measured 2026-11-30" in bodies["boom_sizes"]
    assert "Square: measured with a coupon" in bodies["boom_sizes"]
    assert "<strong>Measured.</strong>" in bodies["lengths"]
    assert "records/r/m.yaml" in bodies["lengths"]
    assert measured.status == "allowances: measured"
