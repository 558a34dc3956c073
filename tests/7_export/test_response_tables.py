"""The tables of the array solver: their headers, their rows, and nothing absolute for thick rods."""

import csv
import io
from dataclasses import replace
from pathlib import Path

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.check.response.respond import respond
from fabgen.correct.ledger import correct
from fabgen.design.electrical_case import electrical_case
from fabgen.design.limits import Limits
from fabgen.design.response import Response
from fabgen.export import response_tables
from fabgen.read.reader import read_design


@pytest.fixture(scope="module")
def response(root: Path) -> Response:
    design = replace(read_design(root / "designs/sonde-finder-401.yaml").design, limits=Limits((398.0, 404.0)))
    case = electrical_case(arrange(design, correct(design)))
    assert case is not None
    return respond(case)


def rows(data: bytes) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(data.decode("utf-8"))))


def test_response_table(response: Response) -> None:
    data = response_tables.response_csv(response)
    assert data.splitlines()[0] == b"f_mhz,gain_dbi,front_to_back_db,r_ohm,x_ohm,mismatch"
    found = rows(data)
    frequencies = [float(row["f_mhz"]) for row in found]
    assert len(found) >= 61
    assert frequencies == sorted(set(frequencies))
    assert 401.3 in frequencies
    assert (frequencies[0], frequencies[-1]) == (pytest.approx(398 * 0.985), pytest.approx(404 * 1.015))
    at = found[frequencies.index(401.3)]
    impedance = complex(float(at["r_ohm"]), float(at["x_ohm"]))
    reflection = abs((impedance - 50) / (impedance + 50))
    assert float(at["mismatch"]) == pytest.approx((1 + reflection) / (1 - reflection), abs=2e-3)


def test_sensitivity_table(response: Response) -> None:
    data = response_tables.sensitivity_csv(response)
    head = b"element,quantity,per_mm_shift_khz,per_mm_gain_db,per_mm_back_front,per_mm_r_ohm,per_mm_x_ohm"
    assert data.splitlines()[0] == head
    assert [(row["element"], row["quantity"]) for row in rows(data)] == [
        (element, quantity) for element in ("R", "DE", "D1", "D2", "D3") for quantity in ("length", "station")
    ]
    assert all(float(row["per_mm_back_front"]) >= 0 for row in rows(data))


def test_moving_every_rod_changes_nothing(response: Response) -> None:
    """The sum over all stations is a shift of the whole array, but for the phase that the fed rod gives."""
    found = rows(response_tables.sensitivity_csv(response))
    for column in ("per_mm_gain_db", "per_mm_r_ohm", "per_mm_x_ohm"):
        assert sum(float(row[column]) for row in found if row["quantity"] == "station") == pytest.approx(0, abs=1e-3)


def test_thick_rods_have_no_absolute_table(response: Response) -> None:
    paths = [file.path for file in response_tables.files(response)]
    assert paths == ["tables/response.csv", "tables/sensitivity.csv"]
    thick = [file.path for file in response_tables.files(replace(response, absolute=False, points=()))]
    assert thick == ["tables/sensitivity.csv"]
