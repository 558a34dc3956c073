"""Which allowance it is, and how sure in mm and kHz: in the ledger, the cut list and on the bench pages."""

import csv
import io
from collections.abc import Callable

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.arrange.bars import plan
from fabgen.correct.ledger import correct
from fabgen.design.design import Design
from fabgen.draw.sheets.bench import sheets
from fabgen.draw.words import origin_lines
from fabgen.export.tables import cut_list_csv, lengths_csv


def test_ledger_and_cut_list_say_origin_and_u(variant: Callable[..., Design]) -> None:
    design = variant()
    arranged = arrange(design, correct(design))
    lengths = {r["element"]: r for r in csv.DictReader(io.StringIO(lengths_csv(arranged.ledger).decode()))}
    cuts = list(csv.DictReader(io.StringIO(cut_list_csv(arranged, plan(arranged.cuts, design.shop)).decode())))
    for row in cuts:
        if row["element"] == "boom":
            assert row["allowance_origin"] == ""
            continue
        line = lengths[row["element"]]
        for key in ("allowance_origin", "allowance_u_mm", "allowance_u_khz"):
            assert row[key] == line[key]
    first = lengths["D1"]
    khz = 1000 * 434 * float(first["allowance_u_mm"]) / 311.3
    assert float(first["allowance_u_khz"]) == pytest.approx(khz, rel=2e-3)
    assert "closed form; theory, unmeasured" in first["allowance_source"]
    assert lengths["DE"]["allowance_origin"] == "none"


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
