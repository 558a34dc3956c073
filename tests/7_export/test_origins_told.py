"""Which allowance it is, and how sure in mm and kHz: in the ledger and on the bench pages."""

import csv
import io
from collections.abc import Callable

from fabgen.arrange.arrange import arrange
from fabgen.arrange.bars import plan
from fabgen.correct.ledger import correct
from fabgen.design.design import Design
from fabgen.draw.sheets.bench import sheets
from fabgen.draw.words import origin_lines
from fabgen.export import tables
from fabgen.export.tables import lengths_csv


def test_the_ledger_says_origin_and_u(variant: Callable[..., Design]) -> None:
    design = variant()
    lengths = {r["element"]: r for r in csv.DictReader(io.StringIO(lengths_csv(correct(design)).decode()))}
    assert lengths["D1"]["allowance_origin"] == "computed"
    assert float(lengths["D1"]["allowance_u_mm"]) > 0.2
    assert lengths["DE"]["allowance_origin"] == "none"


def test_the_tables_headers_are_the_contracts() -> None:
    assert ",".join(tables.LENGTHS) == (
        "element,role,station_mm,rod_mm,modelled_mm,allowance_mm,allowance_origin,allowance_u_mm,rod_change_mm,"
        "rounding_mm,cut_mm,tolerance_mm,trim_mm"
    )
    assert ",".join(tables.DRILLING) == (
        "piece,hole,element,station_mm,wall,angle_deg,across_mm,diameter_mm,pilot_mm,tolerance_mm,drill,purpose"
    )
    assert ",".join(tables.CUT_LIST) == (
        "piece,element,rod_mm,material,cut_mm,trim_mm,half_mm,projection_mm,tolerance_mm,bar"
    )
    assert ",".join(tables.PARTS) == "part,quantity,source,material,size,mass_g"


def test_the_bench_pages_say_it_too(variant: Callable[..., Design]) -> None:
    design = variant()
    arranged = arrange(design, correct(design))
    told = " ".join(origin_lines(arranged.ledger))
    assert "R, D1" in told
    assert "closed form; theory, unmeasured" in told
    assert "±2u (95 %)" in told
    assert "kHz of a single rod" in told
    assert "leave it on, then shorten" in told
    lettered = " ".join(
        item.text for sheet in sheets(arranged, plan(arranged.cuts, design.shop)) for item in sheet.items
        if hasattr(item, "text")
    )  # fmt: skip
    assert "kHz of a single rod" in lettered.replace("\n", " ")
    bare = variant(("lengths_are: free-space", "lengths_are: as-cut"))
    assert origin_lines(correct(bare)) == []
