"""The sheet of readings: three kinds of reading, named values above, and every mistake with its row and column."""

from pathlib import Path

import pytest

from fabgen.errors import DesignErrors
from fabgen.read.readings import read_readings

HEAD = "setup,step,length_mm,frequency_mhz,re,im,magnitude,phase_deg,swr"


def read(tmp_path: Path, *lines: str):
    path = tmp_path / "readings.csv"
    path.write_text("\n".join(lines) + "\n", encoding="utf-8")
    return read_readings(path)


def test_three_kinds_of_reading(tmp_path: Path) -> None:
    sheet = read(
        tmp_path,
        "#mount,line",
        "#mount_key,abc123",
        "#boom_piece_mm,208.0",
        "#swr_noise,0.01",
        HEAD,
        "free,1,305.0,434.0,0.3,-0.4,,,",
        "mounted,1,309.5,434.0,,,0.5,90,",
        "free,2,303.0,430,,,,,2.0",
        "free,3,301.0,430,,,,,",
        ",,,,,,,,",
    )
    first, second, third = sheet.readings
    assert (first.setup, first.length_mm, first.frequency_mhz, first.kind) == ("free", 305.0, 434.0, "reflection")
    assert first.reflection == 0.3 - 0.4j
    assert second.reflection == pytest.approx(0.5j)
    assert third.kind == "swr"
    assert third.reflection == pytest.approx(1 / 3)
    assert (sheet.mount_key, sheet.piece_mm) == ("abc123", 208.0)
    assert (sheet.reflection_noise_ratio, sheet.swr_noise_ratio) == (0.005, 0.01)


def test_columns_may_be_left_out_and_stand_in_any_order(tmp_path: Path) -> None:
    sheet = read(tmp_path, "frequency_mhz,swr,length_mm,setup", "434,1.8,300,free")
    assert sheet.readings[0].length_mm == 300.0
    assert sheet.piece_mm is None


@pytest.mark.parametrize(
    ("row", "said", "column"),
    [
        ("free,1,305.0,434.0,0.3,-0.4,,,x", "two kinds of reading", 31),
        ("free,1,305.0,434.0,0.3x,-0.4,,,", "row 2, re: '0.3x' is no number", 20),
        ("free,1,305.0,434.0,1.3,-0.4,,,", "row 2, re: 1.3 is out of range", 20),
        ("free,1,305.0,434.0,0.8,-0.8,,,", "gives back more than came in", 20),
        ("free,1,305.0,434.0,0.3,,,,", "row 2: `im` is empty", 1),
        ("open,1,305.0,434.0,0.3,-0.4,,,", "neither free nor mounted", 1),
        ("free,1,305,0,434,0,0.3,-0.4,,,", "this row has 11 cells, the header has 9 columns", 30),
        ("free,1,nan,434.0,0.3,-0.4,,,", "row 2, length_mm: 'nan' is no number", 8),
        ("free,1,305.0,434.0,,,,,0.9", "row 2, swr: 0.9 is out of range", 24),
    ],
)
def test_a_mistake_is_told_with_row_and_column(tmp_path: Path, row: str, said: str, column: int) -> None:
    with pytest.raises(DesignErrors) as stopped:
        read(tmp_path, HEAD, row)
    assert stopped.value.exit_code == 2
    problem = stopped.value.problems[0]
    assert problem.code == "D41"
    assert said in problem.message
    assert (problem.place.line, problem.place.column) == (2, column)


def test_a_spreadsheet_may_quote_its_cells(tmp_path: Path) -> None:
    sheet = read(tmp_path, '"setup","length_mm","frequency_mhz","swr"', '"free","300","434","1.8"')
    assert sheet.readings[0].length_mm == 300.0


def test_semicolons_are_told_once(tmp_path: Path) -> None:
    with pytest.raises(DesignErrors) as stopped:
        read(tmp_path, HEAD.replace(",", ";"), "free;1;305,0;434,0;0,3;-0,4;;;")
    (problem,) = stopped.value.problems
    assert (problem.code, problem.place.line, problem.place.column) == ("D22", 1, 6)


def test_all_mistakes_come_in_one_run(tmp_path: Path) -> None:
    with pytest.raises(DesignErrors) as stopped:
        read(tmp_path, "setup,lenght_mm,frequency_mhz,re,im", "free,1,2,3,4")
    said = [problem.message for problem in stopped.value.problems]
    assert "column `lenght_mm` is not known" in said
    assert "column `length_mm` is missing" in said
    assert any("length_mm" in problem.fix for problem in stopped.value.problems)


def test_an_empty_sheet_names_the_columns(tmp_path: Path) -> None:
    with pytest.raises(DesignErrors, match="no line names the columns"):
        read(tmp_path, "")
