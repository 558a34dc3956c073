"""The book opens in a browser without a word in the console and without asking anyone for anything; it prints on A4."""

import re
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pymupdf
import pytest

from fabgen.book.book import Book, book_html
from fabgen.units import MM_PER_IN

pytestmark = pytest.mark.slow

DESIGNS = ("meter-reading-169", "river-gauge-434", "sonde-finder-401", "valley-television-637")
MM = 72 / float(MM_PER_IN)
A4_MM = (210.0, 297.0)
PAPER_MM = 0.3
"""A browser's page is whole points of a pixel grid: up to 0.2 mm off the paper."""
EDGE_MM = 8.0
"""Nothing is printed nearer to the paper's edge: most printers leave out 5 mm."""


def written(folder: Path, html: bytes) -> Path:
    page = folder / "book.html"
    page.write_bytes(html)
    return page


@pytest.mark.parametrize("stem", DESIGNS)
def test_opens_quietly_and_alone(browser: Any, tmp_path: Path, book_of: Callable[..., Book], stem: str) -> None:
    page = written(tmp_path, book_html(book_of(stem)))
    browser.open(page)
    assert browser.requests() == [page.as_uri()]
    assert browser.blocked() == []
    assert browser.complaints() == []


@pytest.mark.parametrize("width_px", [1200, 760])
def test_nothing_is_wider_than_the_screen(
    browser: Any, tmp_path: Path, book_of: Callable[..., Book], width_px: int
) -> None:
    browser.open(written(tmp_path, book_html(book_of("river-gauge-434"))))
    size = {"width": width_px, "height": 900, "deviceScaleFactor": 1, "mobile": False}
    browser.call("Emulation.setDeviceMetricsOverride", **size)
    wide = browser.value(
        "[...document.querySelectorAll('table, svg, p, pre')]"
        ".filter(e => e.getBoundingClientRect().right > innerWidth).map(e => e.outerHTML.slice(0, 80))"
    )
    browser.call("Emulation.clearDeviceMetricsOverride")
    assert wide == []


@pytest.mark.parametrize("stem", DESIGNS)
def test_prints_on_a4_with_nothing_cut(browser: Any, tmp_path: Path, book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    browser.open(written(tmp_path, book_html(book)))
    pages = pymupdf.open("pdf", browser.pdf())
    assert 5 < len(pages) < 40
    for page in pages:
        assert (page.rect.width / MM, page.rect.height / MM) == pytest.approx(A4_MM, abs=PAPER_MM)
        for x0, y0, x1, y1, *_ in page.get_text("words"):
            assert min(x0, y0) > EDGE_MM * MM
            assert x1 < page.rect.width - EDGE_MM * MM
            assert y1 < page.rect.height - EDGE_MM * MM
    words = {word[4] for page in pages for word in page.get_text("words")}
    expected = {f"{line.cut_mm:.3f}" for line in book.arranged.ledger.lines}
    expected |= {f"{hole.station_mm:.3f}" for hole in book.arranged.holes}
    expected |= {hole.number for hole in book.arranged.holes}
    assert expected - words == set()


def test_every_printed_page_names_drawing_status_and_stamp(
    browser: Any, tmp_path: Path, book_of: Callable[..., Book]
) -> None:
    browser.open(written(tmp_path, book_html(book_of("river-gauge-434", stamped=True))))
    pages = pymupdf.open("pdf", browser.pdf())
    for number, page in enumerate(pages, start=1):
        text = re.sub(r"\s+", " ", page.get_text())
        for words in ("RGL-434-06 A", "allowances: computed – theory, unmeasured", "NOT CLEARED"):
            assert words in text, (number, words)
        assert f"page {number} of {len(pages)}" in text


def test_no_row_is_split_between_pages(browser: Any, tmp_path: Path, book_of: Callable[..., Book]) -> None:
    """Every row of the drilling table has its hole, its station and its purpose on one line of one page."""
    book = book_of("valley-television-637")
    browser.open(written(tmp_path, book_html(book)))
    pages = pymupdf.open("pdf", browser.pdf())
    lines: dict[tuple[int, int], list[str]] = {}
    for page in pages:
        for _, y0, _, _, word, *_ in page.get_text("words"):
            lines.setdefault((page.number, round(y0)), []).append(word)
    for hole in book.arranged.holes:
        assert any({hole.number, f"{hole.station_mm:.3f}"} <= set(line) for line in lines.values()), hole


def test_a_request_and_a_complaint_would_be_seen(browser: Any, tmp_path: Path) -> None:
    html = b"<!DOCTYPE html><title>t</title><img src='missing.png'><script>console.error('x')</script>"
    browser.open(written(tmp_path, html))
    assert len(browser.requests()) == 2
    assert browser.complaints()


def test_a_foreign_address_is_refused_by_the_page_itself(
    browser: Any, tmp_path: Path, book_of: Callable[..., Book]
) -> None:
    html = book_html(book_of("sonde-finder-401")).replace(b"</main>", b"<img src='missing.png'></main>")
    browser.open(written(tmp_path, html))
    assert browser.blocked() == ["csp"]
    assert "Content Security Policy" in str(browser.complaints())
