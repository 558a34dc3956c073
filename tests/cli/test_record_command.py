"""`fabgen record` on the command line: a record and a picture beside the design, used by the next check."""

import json
from collections.abc import Callable
from pathlib import Path

import pytest
import yaml

from fabgen.physics.coupon_array import coupon_array

Ran = Callable[..., tuple[int, str, str]]
WL_MM = 299_792.458 / 434.0


@pytest.fixture
def bench(root: Path, tmp_path: Path) -> Path:
    """A design and a filled-in sheet: the true allowance is 4.7 mm, readings without noise rounded to 0.0001."""
    text = (root / "designs/river-gauge-434.yaml").read_text(encoding="utf-8")
    (tmp_path / "gauge.yaml").write_text(
        text.replace("allowance: {origin: computed}", "allowance: auto"), encoding="utf-8"
    )
    plan = coupon_array(
        rods_mm=(0.43 * WL_MM,),
        rod_diameter_mm=4.0,
        frequency_mhz=434.0,
        spacing_mm=138.0,
        expected_allowance_mm=4.5,
        cut_step_mm=0.5,
    )
    rows = ["#boom_piece_mm,208", "setup,length_mm,frequency_mhz,re,im"]
    for setup, lengths, taken in (("free", plan.free_mm, 0.0), ("mounted", plan.mounted_mm, 4.7)):
        for mm in lengths:
            reflection = plan.reflection(mm - taken, 434.0)
            rows.append(f"{setup},{mm},434,{reflection.real:.4f},{reflection.imag:.4f}")
    (tmp_path / "sheet.csv").write_text("\n".join(rows) + "\n", encoding="utf-8")
    return tmp_path


@pytest.fixture(autouse=True)
def in_the_designs_folder(bench: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(bench)


def test_a_coupon_overrules_theory_for_the_whole_table(ran: Ran, bench: Path) -> None:
    call = ("record", "gauge.yaml", "sheet.csv", "--mount", "line", "--date", "2026-11-30")
    (code, first, _), (again, second, _) = ran(*call), ran(*call)
    assert (code, again) == (0, 0)
    folder = bench / "records/gauge"
    names = sorted(path.name for path in folder.iterdir())
    stem = "measured-line-2026-11-30"
    assert names == [f"{stem}-2.svg", f"{stem}-2.yaml", f"{stem}.svg", f"{stem}.yaml"]
    assert (folder / f"{stem}.yaml").read_bytes() == (folder / f"{stem}-2.yaml").read_bytes()
    assert second == first.replace(stem, f"{stem}-2")
    record = yaml.safe_load((folder / f"{stem}.yaml").read_text(encoding="utf-8"))
    assert record["fit"]["allowance_mm"] == pytest.approx(4.7, abs=2 * record["fit"]["u_mm"])
    assert record["date"] == "2026-11-30"
    assert len(record["readings"]) == 16
    judged = json.loads(ran("check", "--json", "gauge.yaml")[1])["designs"][0]
    assert judged["status"] == "allowances: measured"
    picture = (folder / f"{stem}.svg").read_text(encoding="utf-8")
    assert "reflection, imaginary part, 434 MHz" in picture


def test_refusals_write_nothing(ran: Ran, bench: Path) -> None:
    text = (bench / "sheet.csv").read_text(encoding="utf-8")
    (bench / "short.csv").write_text(text.replace("#boom_piece_mm,208", "#boom_piece_mm,120"), encoding="utf-8")
    (bench / "bad.csv").write_text(text.replace("free,", "fre,", 1), encoding="utf-8")
    for sheet, code, said in (
        ("short.csv", 1, "120 mm long"),
        ("bad.csv", 2, "bad.csv:3:1: D41"),
        ("no.csv", 2, "no file"),
    ):
        found, _, told = ran("record", "gauge.yaml", sheet, "--mount", "line", "--date", "2026-11-30")
        assert (found, said in told) == (code, True), told
    assert not (bench / "records").exists()
