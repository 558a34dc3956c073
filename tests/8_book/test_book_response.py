"""The book's pages on response, tolerances and range, as the solver's numbers make them."""

import re
from collections.abc import Callable
from dataclasses import replace

import pytest

from fabgen.book.book import Book, book_html, sections
from fabgen.check.response.respond import respond
from fabgen.design.allotted import with_tolerances
from fabgen.design.electrical_case import electrical_case
from fabgen.design.limits import Limits
from fabgen.design.response import LeftOver, Response

PAGES = ("millimetre", "response", "range_page")


@pytest.fixture(scope="module")
def limited(book_of: Callable[..., Book]) -> Book:
    """The river gauge with its limits, allotted."""
    return with_response(book_of("river-gauge-434"))


@pytest.fixture(scope="module")
def general(book_of: Callable[..., Book]) -> Book:
    """The same design without limits."""
    return with_response(book_of("river-gauge-434", limits=Limits()))


def with_response(book: Book) -> Book:
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr("fabgen.check.response.allot.SAMPLES", 200)
        patch.setattr("fabgen.check.response.allot.FEWEST", 200)
        case = electrical_case(book.arranged)
        assert case is not None
        response = respond(case)
    return replace(book, arranged=with_tolerances(book.arranged, response), response=response)


def text_of(book: Book, name: str) -> str:
    return next(str(section.body) for section in sections(book) if section.name == name)


def response_of(book: Book) -> Response:
    assert book.response is not None
    return book.response


def test_without_an_answer_the_pages_are_left_out(book_of: Callable[..., Book]) -> None:
    assert not {section.name for section in sections(book_of("river-gauge-434"))} & set(PAGES)


def test_every_page_says_what_is_modelled(limited: Book) -> None:
    for name in PAGES:
        body = text_of(limited, name)
        assert "free space" in body
        for missing in ("mast", "ground", "feed line"):
            assert missing in body
    assert "±0.3 % (1.3 MHz)" in text_of(limited, "response")  # of 434 MHz, 1.302


def test_the_tolerances_of_the_limits_stand_in_every_table(limited: Book) -> None:
    page = book_html(limited).decode("utf-8")
    assert page.count("allotted from the limits") == 3
    assert "ISO 2768-1, class" not in page
    rows = {row.element: row for row in response_of(limited).allotment.rows}  # type: ignore[union-attr]
    assert len({row.length_mm for row in rows.values()}) > 1
    for element, row in rows.items():
        allotted = (
            f'{element}</th><td class="n strong">{row.length_mm:g}</td><td class="n strong">{row.station_mm:g}</td>'
        )
        assert allotted in text_of(limited, "millimetre")
        cells = re.search(rf'<th scope="row">{element}</th>(.*?)</tr>', text_of(limited, "lengths"))
        assert cells
        assert cells[1].endswith(f'<td class="n">{row.length_mm:g}</td>')


def test_without_limits_the_book_says_what_the_general_tolerances_cost(general: Book) -> None:
    body = text_of(general, "millimetre")
    at_95 = response_of(general).spread.at_95
    assert "ISO 2768-1 class m stays" in body
    assert f"{at_95.shift_khz:.0f} kHz" in body
    assert "95 % of builds" in body


def test_the_common_error_stands_apart(limited: Book) -> None:
    body = text_of(limited, "millimetre")
    common = response_of(limited).common
    assert common is not None
    assert f"±{common.twice.shift_khz:.0f}" in body
    assert "outweighs" in body


@pytest.mark.parametrize(
    ("khz", "cut", "said"),
    [
        (-2841.0, False, "would move the array down by 2841 kHz. "),
        (310.0, False, "would move the array up by 310 kHz. "),
        (-12826.6, True, "would move the array down by more than 12827 kHz, the largest shift looked for. "),
    ],
)
def test_a_search_limit_is_never_printed_as_the_shift(general: Book, khz: float, cut: bool, said: str) -> None:
    found = response_of(general)
    for left_cut, told in ((False, "whole array: "), (True, "whole array: more than ")):
        left = LeftOver(khz, cut, found.drawn, left_cut, 0.01, 0.001, ())
        body = text_of(replace(general, response=replace(found, left_over=left)), "millimetre")
        assert said in body
        assert told + f"{-found.drawn.shift_khz:.0f} kHz down" in body


def test_three_panels_two_patterns_and_a_bar_for_each_quantity(limited: Book) -> None:
    response, costs = text_of(limited, "response"), text_of(limited, "millimetre")
    assert re.findall(r"<title>(.*?)</title>", response) == [
        "gain, dBi over the band",
        "front to back, dB over the band",
        "mismatch, SWR over the band",
        "H-plane, across the rods",
        "E-plane, along the rods",
    ]
    assert response.count("frequency in MHz;") == 3
    assert response.count('fill="#d9d9d9"') == 3
    assert costs.count("<rect") == 3 * 2 * len(limited.arranged.design.elements)


def test_a_curve_above_the_picture_is_said_to_be_cut_but_never_at_the_design_frequency(general: Book) -> None:
    found = response_of(general)
    design_mhz = general.arranged.design.frequency_mhz
    poor = tuple(replace(point, mismatch=9.0 + abs(point.frequency_mhz - design_mhz)) for point in found.points)
    ends = tuple(replace(each, mismatch=(9.0, 9.5)) for each in found.fan)
    book = replace(general, response=replace(found, points=poor, fan=ends))
    assert "is drawn along it" in text_of(book, "response")
    assert "is drawn along it" not in text_of(replace(general, response=replace(found, fan=())), "response")
    nominal = re.findall(
        r'<polyline points="([^"]+)" fill="none" stroke="#000" stroke-width="0.6"/>', text_of(book, "response")
    )
    heights = [float(point.split(",")[1]) for point in nominal[2].split()]
    assert heights[len(heights) // 2] > min(heights)


def test_bars_are_as_long_as_their_numbers(limited: Book) -> None:
    """The longest bar of the shift column over the shortest is the ratio of the table's numbers."""
    bars = re.findall(
        r'<rect x="([\d.]+)" y="[\d.]+" width="([\d.]+)" height="[\d.]+" fill="#333"', text_of(limited, "millimetre")
    )
    shift = [float(width) for x, width in bars if float(x) == min(float(x) for x, _ in bars)]
    numbers = [abs(row.shift_khz_per_mm) for row in response_of(limited).sensitivities if row.quantity == "length"]
    assert [width / max(shift) for width in shift] == pytest.approx([n / max(numbers) for n in numbers], abs=1e-3)


def test_the_range_page_says_rise_or_fall_for_every_element(limited: Book) -> None:
    body = text_of(limited, "range_page")
    assert "Receive only" in body
    assert "Never a hand, and never the stick, near a driven rod under power" in body
    assert "wooden stick" in body
    for row in response_of(limited).sensitivities:
        if row.quantity == "length":
            word = "rises" if row.signal_db_per_mm > 0 else "falls"
            assert re.search(rf'<th scope="row">{row.element}</th><td>(hardly )?{word}</td>', body)


def test_thick_rods_get_no_absolute_picture(limited: Book) -> None:
    response = replace(response_of(limited), absolute=False, thickest_wl=0.016, points=(), fan=())
    body = text_of(replace(limited, response=response), "response")
    assert "Nothing absolute is stated" in body
    assert "<svg" not in body


def test_sources_name_the_tables_behind_the_tolerances(limited: Book, general: Book) -> None:
    assert "Classes of tolerance" in text_of(limited, "sources")
    assert "Conductivity of rods" in text_of(general, "sources")
    assert "Classes of tolerance" not in text_of(general, "sources")
