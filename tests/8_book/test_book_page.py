"""The page holds what a builder needs, is sound HTML, stands alone, and is the same bytes every time."""

import hashlib
import re
import subprocess
import sys
from collections.abc import Callable
from dataclasses import replace
from html.parser import HTMLParser
from pathlib import Path

import pytest

from fabgen.book.book import Book, book_html, sections
from fabgen.design.design import AllowanceChoice
from fabgen.design.findings import Finding
from fabgen.units import format_mm

DESIGNS = ("meter-reading-169", "river-gauge-434", "sonde-finder-401", "valley-television-637")
VOID = {"meta", "br", "col", "img", "link", "input", "hr"}
# Attributes with which a page can ask for something else.
REACHING = {"src", "href", "srcset", "action", "data", "poster", "formaction", "background", "ping", "xlink:href"}
NASTY = (
    '</style></title><script>alert("x")</script>\n../../etc/passwd \\ "quoted" & \'single\' %s {{ 7*7 }}' + "w" * 410
)


class Reader(HTMLParser):
    """Keeps tags open and shut, text, addresses and ids."""

    def __init__(self) -> None:
        super().__init__()
        self.open: list[str] = []
        self.wrong: list[str] = []
        self.addresses: list[str] = []
        self.tags: list[str] = []
        self.ids: list[str] = []
        self.handlers: list[str] = []
        self.text: list[str] = []

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.append(tag)
        for name, given in attrs:
            if name in REACHING:
                self.addresses.append(given or "")
            if name.startswith("on"):
                self.handlers.append(name)
            if name == "id":
                self.ids.append(given or "")
        if tag not in VOID:
            self.open.append(tag)

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.handle_starttag(tag, attrs)
        if tag not in VOID:
            self.open.pop()

    def handle_endtag(self, tag: str) -> None:
        if not self.open or self.open.pop() != tag:
            self.wrong.append(f"</{tag}> at {self.getpos()}")

    def handle_data(self, data: str) -> None:
        if "style" not in self.open:
            self.text.append(data)


def read(book: Book) -> Reader:
    reader = Reader()
    reader.feed(book_html(book).decode("utf-8"))
    reader.close()
    return reader


def text_of(book: Book) -> str:
    return re.sub(r"\s+", " ", " ".join(read(book).text))


@pytest.mark.parametrize("stem", DESIGNS)
def test_tags_are_balanced_and_nothing_reaches_out(book_of: Callable[..., Book], stem: str) -> None:
    reader = read(book_of(stem))
    assert reader.wrong == []
    assert reader.open == []
    assert len(reader.ids) == len(set(reader.ids))
    assert {address for address in reader.addresses if not address.startswith("#")} == set()
    assert {address.removeprefix("#") for address in reader.addresses} <= set(reader.ids)
    assert reader.handlers == []
    assert not {"script", "link", "iframe", "img", "object", "embed", "base", "form"} & set(reader.tags)


@pytest.mark.parametrize("stem", DESIGNS)
def test_styles_reach_nothing_either(book_of: Callable[..., Book], stem: str) -> None:
    html = book_html(book_of(stem)).decode()
    assert "url(" not in html
    assert "@import" not in html
    assert "default-src 'none'" in html


@pytest.mark.parametrize("stem", DESIGNS)
def test_every_number_of_the_tables_is_there(book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    text = text_of(book)
    for line in book.arranged.ledger.lines:
        for length_mm in (line.station_mm, line.modelled_mm, line.cut_mm, line.allowance.value_mm):
            assert format_mm(length_mm) in text
    for hole in book.arranged.holes:
        assert f"{hole.number} {hole.element}" in text
        assert format_mm(hole.station_mm) in text
        assert hole.drill in text
    for cut in book.arranged.cuts:
        assert f"{cut.piece} " in text
        assert format_mm(cut.cut_mm) in text
    for placed in book.arranged.placed:
        assert placed.size in text
    for bar in book.cut_plan.bars:
        assert bar.name in text
    for aid, _ in book.aids:
        assert f"{aid.quantity} {aid.label} {aid.purpose}" in text
        assert all(f"{number} × {need}" in text for number, need in aid.needs)
    for figure in (*book.views, *book.pictures, *(figure for _, figure in book.aids)):
        assert figure.caption in text


@pytest.mark.parametrize("stem", DESIGNS)
def test_the_verdict_comes_before_everything_but_the_title(book_of: Callable[..., Book], stem: str) -> None:
    text = "".join(read(book_of(stem)).text)
    assert text.index("Verdict:") < text.index("At a glance")
    assert text.count("Verdict: ") == 2  # once more above the findings


@pytest.mark.parametrize("stem", DESIGNS)
def test_allowances_say_where_they_come_from(book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    text = text_of(book)
    assert book.arranged.ledger.status in text
    for line in book.arranged.ledger.lines:
        assert re.sub(r"\s+", " ", line.allowance.source) in text
        for published in line.allowance.published:
            assert published.source in text
            assert published.range_text in text


def test_computed_lengths_are_called_theory_wherever_they_stand(book_of: Callable[..., Book]) -> None:
    book = book_of("river-gauge-434")
    assert book.computed
    shown = {section.name for section in sections(book) if section.theory}
    assert {"summary", "views", "lengths", "mounts", "boom_sizes", "trimming", "cutting", "parts", "measuring"} <= shown
    assert book_html(book).decode().count('class="theory"') == len(shown)
    published = book_of("valley-television-637")
    assert not published.computed
    assert 'class="theory"' not in book_html(published).decode()
    assert {s.name for s in sections(published) if "theory, unmeasured" in s.body} == {"boom_sizes"}


def test_findings_stand_with_code_numbers_and_page(book_of: Callable[..., Book]) -> None:
    finding = Finding("L17", "fail", "screw on <rod>", 0.4, 0.15, "V", "use one metal & grease", "Two metals touch")
    book = replace(book_of("valley-television-637"), findings=(finding,))
    text = text_of(book)
    assert "Verdict: not clear" in text
    assert re.search(r"L17 fail screw on <rod> Two metals touch use one metal & grease 0\.4 0\.15 V", text)
    assert "What to do:" in text


def test_a_design_without_findings_says_so(book_of: Callable[..., Book]) -> None:
    assert "No check found anything to say." in text_of(replace(book_of("river-gauge-434"), findings=()))


def test_the_stamp_is_on_stamped_books_alone(book_of: Callable[..., Book]) -> None:
    stamped = book_of("sonde-finder-401", stamped=True)
    assert "NOT CLEARED" in text_of(stamped)
    assert "At least one check fails" not in text_of(stamped)
    fault = Finding("A03", "fail", "R", 350.0, 300.0, "mm", "buy longer bars")
    assert "At least one check fails" in text_of(replace(stamped, findings=(fault,)))
    assert "NOT CLEARED" not in book_html(book_of("sonde-finder-401")).decode()


def test_proven_is_said_only_of_a_proven_plan(book_of: Callable[..., Book]) -> None:
    book = book_of("river-gauge-434")
    assert book.cut_plan.proven
    assert "proven : no plan needs fewer" in text_of(book)
    doubtful = replace(book, cut_plan=replace(book.cut_plan, proven=False))
    assert "not proven to be the fewest" in text_of(doubtful)
    assert "no plan needs fewer" not in text_of(doubtful)


def test_a_piece_without_a_bar_is_named(book_of: Callable[..., Book]) -> None:
    book = book_of("river-gauge-434")
    bars = tuple(bar for bar in book.cut_plan.bars if not bar.name.endswith("#2"))
    lost = [name for bar in book.cut_plan.bars if bar not in bars for name, _ in bar.pieces]
    assert len(lost) > 3
    text = text_of(replace(book, cut_plan=replace(book.cut_plan, bars=bars)))
    assert "DE-left, DE-right, D5 to D7, D9 and D10 fit no bar of the stated stock" in text
    assert "no plan needs fewer" not in text


def test_unsure_allowances_show_u_and_twice_u(book_of: Callable[..., Book]) -> None:
    book = book_of("river-gauge-434")
    line = book.arranged.ledger.line("D5")
    expected = f"{format_mm(line.allowance.u_mm)} ±{format_mm(2 * line.allowance.u_mm)}"
    assert expected in text_of(book)
    assert f"{line.shift_khz:.0f} ±{2 * line.shift_khz:.0f}" in text_of(book)


def test_a_stated_value_has_no_common_part_of_ours(book_of: Callable[..., Book]) -> None:
    assert "not stated" in text_of(book_of("meter-reading-169"))


def test_an_allowance_asked_away_is_called_unknown(book_of: Callable[..., Book]) -> None:
    book = book_of("valley-television-637")
    none = AllowanceChoice("none")
    elements = tuple(
        replace(e, mount=replace(e.mount, allowance=none)) if e.mount else e for e in book.arranged.design.elements
    )
    text = text_of(book_of("valley-television-637", elements=elements))
    assert "how far that is off is not known" in text
    assert "How sure the allowance is" not in text


def test_a_bonded_mount_says_what_a_bad_joint_costs(book_of: Callable[..., Book]) -> None:
    """Half of the printed 13.143 mm; 637 MHz × 6.571 mm over the mean parasitic length of the table, by hand."""
    book = book_of("valley-television-637")
    lengths_mm = [line.modelled_mm for line in book.arranged.ledger.lines if line.role != "driven"]
    khz = 637_000 * 6.5713 / (sum(lengths_mm) / len(lengths_mm))
    assert f"6.6 mm or {khz:.0f} kHz of a half-wave rod here" in text_of(book)
    assert "What bonds" not in text_of(book_of("river-gauge-434"))


def test_a_screw_in_the_middle_is_said_to_bond_nothing(book_of: Callable[..., Book]) -> None:
    book = book_of("river-gauge-434")
    elements = tuple(
        replace(e, mount=replace(e.mount, hold="middle-screw", keeper=None)) if e.mount else e
        for e in book.arranged.design.elements
    )
    assert "What does not bond" in text_of(book_of("river-gauge-434", elements=elements))
    assert "What does not bond" not in text_of(book)


@pytest.mark.parametrize("field", ["title", "number", "revision"])
def test_words_of_the_design_stay_words(book_of: Callable[..., Book], field: str) -> None:
    html = book_html(book_of("river-gauge-434", **{field: NASTY})).decode()
    reader = Reader()
    reader.feed(html)
    assert reader.wrong == []
    assert "script" not in reader.tags
    assert NASTY.splitlines()[1][:30] in "".join(reader.text)
    style = html.partition("<style>")[2].partition("</style>")[0]
    assert "alert" not in style or field != "title"
    assert "@page across" in style
    assert style.count("{") == style.count("}") + style.count("\\00007b") - style.count("\\00007d")


def test_the_same_bytes_twice(book_of: Callable[..., Book]) -> None:
    assert book_html(book_of("river-gauge-434")) == book_html(book_of("river-gauge-434"))


def test_the_same_bytes_under_two_hash_seeds(root: Path) -> None:
    script = (
        "import hashlib, sys; from pathlib import Path; "
        "from fabgen.pipeline import check; from fabgen.arrange.bars import plan; "
        "from fabgen.book.book import Book, book_html; "
        "judged = check(Path('designs/meter-reading-169.yaml')); array = judged.arranged; "
        "book = Book(array, judged.findings, plan(array.cuts, array.design.shop)); "
        "print(hashlib.sha256(book_html(book)).hexdigest())"
    )
    sums = {
        subprocess.run(
            [sys.executable, "-c", script],
            cwd=root,
            env={"PYTHONPATH": str(root), "PYTHONHASHSEED": seed, "LC_ALL": "C.UTF-8"},
            capture_output=True,
            text=True,
            check=True,
        ).stdout.strip()
        for seed in ("1", "2")
    }
    assert len(sums) == 1
    assert len(sums.pop()) == len(hashlib.sha256().hexdigest())


def test_the_reader_sees_a_fault() -> None:
    reader = Reader()
    reader.feed("<p><b>x</p><img src='http:'>")
    assert reader.wrong
    assert reader.addresses == ["http:"]
