"""A table of measurements as spreadsheets export it; what no build can measure is judged in the tests of `check`."""

from pathlib import Path

import pytest

from fabgen.design.arranged import Arranged
from fabgen.design.as_built import Measured
from fabgen.errors import DesignErrors
from fabgen.pipeline import check
from fabgen.read.measured_csv import read_measured
from fabgen.read.starter import starter


@pytest.fixture(scope="module")
def arranged(tmp_path_factory: pytest.TempPathFactory) -> Arranged:
    path = tmp_path_factory.mktemp("measured") / "d.yaml"
    path.write_text(starter("trial"), encoding="utf-8")
    return check(path).arranged


def table(arranged: Arranged) -> str:
    rows = [f"{line.element},{line.cut_mm:.1f},{line.station_mm:.1f}" for line in arranged.ledger.lines]
    return "\n".join(["element,length_mm,station_mm", *rows]) + "\n"


def read(arranged: Arranged, path: Path, text: str) -> tuple[Measured, ...]:
    path.write_text(text, encoding="utf-8")
    return read_measured(path, arranged, None)


def test_spellings_of_one_table(arranged: Arranged, tmp_path: Path) -> None:
    text = table(arranged)
    sound = read(arranged, tmp_path / "m.csv", text)
    assert [row.length_mm for row in sound] == [round(line.cut_mm, 1) for line in arranged.ledger.lines]
    for other in (
        "\ufeff" + text,
        text.replace("\n", ",,\r\n"),
        text.replace("length_mm", '"Length (mm)"'),
        text.replace("\n", "\n\n"),
        text.replace("station_mm", "station_mm,remarks"),
    ):
        assert read(arranged, tmp_path / "m.csv", other) == sound


@pytest.mark.parametrize(
    ("old", "new", "expected"),
    [
        ("element,length_mm,station_mm\n", "", "1:1 D22"),
        ("element", "bench sheet\nelement", "1:1 D22"),
        ("\n", ",\nR,300,70,5,", "2:10 D22"),
        ("length_mm", "lengths_cm", "1:9 D06"),
        ("346.5", "346,5", "2:9 D22"),
    ],
)
def test_a_mistake_is_told_once(arranged: Arranged, tmp_path: Path, old: str, new: str, expected: str) -> None:
    text = table(arranged)
    assert old in text
    with pytest.raises(DesignErrors) as stopped:
        read(arranged, tmp_path / "m.csv", text.replace(old, new, 1))
    assert [f"{p.place.line}:{p.place.column} {p.code}" for p in stopped.value.problems] == [expected]
    assert stopped.value.problems[0].fix
