"""Whole packages: the same bytes every time, and titles that no format can be tricked by."""

import csv
import hashlib
import io
import json
import os
import shutil
import subprocess
import sys
import xml.etree.ElementTree as ET
from pathlib import Path

import pytest

from fabgen import pipeline

DESIGNS = Path(__file__).parents[2] / "designs"
NASTY = '<script>alert(1)</script> & "quotes" ../../etc/passwd #let x = 1 $a$ %%d \\\\P ' + "é" * 400
FILES = {
    "manifest.json", "findings.json", "bench.pdf", "book.html", "tables/lengths.csv", "tables/drilling.csv",
    "tables/cut-list.csv", "tables/parts.csv", "model/assembly.step", "model/assembly.glb", "templates/boom.svg",
    "templates/boom.dxf", "templates/clamp-plate.svg", "templates/clamp-plate.dxf", "templates/templates.pdf",
}  # fmt: skip


SURROUNDINGS = (
    {"PYTHONHASHSEED": "1", "TZ": "UTC", "LC_ALL": "C.UTF-8", "HOME": "/"},
    {"PYTHONHASHSEED": "2", "TZ": "Pacific/Auckland", "LC_ALL": "C", "PYTHONUTF8": "0", "HOME": "/nowhere"},
)
"""Hash seed, clock's zone, language and home: none of them a package's business."""


def build(design: Path, output: Path, surroundings: dict[str, str], umask: int) -> str:
    """Build in a process of its own, in the design's folder; what it said."""
    environment = os.environ | surroundings | {"PYTHONPATH": str(DESIGNS.parent)}
    command = [sys.executable, "-m", "fabgen", "build", str(design), "--output", str(output)]
    run = subprocess.run(
        command, env=environment, cwd=design.parent, umask=umask, capture_output=True, encoding="utf-8", check=False
    )
    assert run.returncode == 0, run.stderr
    return run.stderr


def hashes(folder: Path) -> dict[str, str]:
    return {
        str(path.relative_to(folder)): hashlib.sha256(path.read_bytes()).hexdigest()
        for path in sorted(folder.rglob("*"))
        if path.is_file()
    }


@pytest.fixture(scope="module")
def twice(tmp_path_factory: pytest.TempPathFactory) -> tuple[Path, Path]:
    """The river gauge built by two processes, under two file names in two folders, each solved anew."""
    folder = tmp_path_factory.mktemp("twice")
    for place, surroundings, umask in zip(("1", "an other/é"), SURROUNDINGS, (0o022, 0o077), strict=True):
        design = folder / place / f"gauge-{umask}.yaml"
        design.parent.mkdir(parents=True)
        shutil.copy(DESIGNS / "river-gauge-434.yaml", design)
        assert "array response" in build(design, folder / place / "output", surroundings, umask)
    return folder / "1/output/RGL-434-06_A", folder / "an other/é/output/RGL-434-06_A"


@pytest.mark.slow
def test_every_file_has_the_same_bytes_whatever_surrounds_the_run(twice: tuple[Path, Path]) -> None:
    assert hashes(twice[0]) == hashes(twice[1])


@pytest.mark.slow
def test_every_file_has_the_same_bytes_twice_in_one_process(twice: tuple[Path, Path], tmp_path: Path) -> None:
    """The first time with the response that a build stored, the second time with one solved anew."""
    design = twice[0].parent.with_name("gauge-18.yaml")
    fresh = shutil.copy(design, tmp_path / "fresh.yaml")
    for path, solved in ((design, False), (fresh, True)):
        said: list[str] = []
        judged = pipeline.drawn(pipeline.check(path, solve=True, say=said.append))
        assert bool(said) is solved
        folder = pipeline.build(judged, output=tmp_path / str(solved), say=lambda _: None)
        assert hashes(folder) == hashes(twice[0])


@pytest.mark.slow
def test_the_package_holds_what_the_contract_lists(twice: tuple[Path, Path]) -> None:
    folder = twice[0]
    found = set(hashes(folder))
    assert found >= FILES
    for part in ("bush", "push-ring", "feed-block", "feed-lid"):
        for ending in ("stl", "3mf", "step"):
            assert [name for name in found if part in name and name.startswith("prints/") and name.endswith(ending)]
    manifest = json.loads((folder / "manifest.json").read_text(encoding="utf-8"))
    assert {entry["path"] for entry in manifest["files"]} == found - {"manifest.json"}
    for entry in manifest["files"]:
        assert entry["sha256"] == hashlib.sha256((folder / entry["path"]).read_bytes()).hexdigest()
        assert entry["purpose"]
    text = (folder / "manifest.json").read_text(encoding="utf-8") + (folder / "book.html").read_text(encoding="utf-8")
    assert str(folder.parent.parent) not in text
    assert "gauge-18" not in text


@pytest.mark.slow
def test_the_tables_agree_with_each_other(twice: tuple[Path, Path]) -> None:
    def rows(name: str) -> list[dict[str, str]]:
        return list(csv.DictReader(io.StringIO((twice[0] / "tables" / name).read_text(encoding="utf-8"))))

    lengths = {row["element"]: row for row in rows("lengths.csv")}
    for row in rows("cut-list.csv"):
        if row["piece"] in lengths:
            assert row["cut_mm"] == lengths[row["piece"]]["cut_mm"]
            assert row["bar"]
    for row in rows("drilling.csv"):
        if row["purpose"] == "bush":
            assert row["station_mm"] == lengths[row["element"]]["station_mm"]


@pytest.mark.slow
def test_a_nasty_title_is_lettering_in_every_format(tmp_path: Path) -> None:
    text = (DESIGNS / "sonde-finder-401.yaml").read_text(encoding="utf-8")
    title = json.dumps(NASTY, ensure_ascii=False)
    design = tmp_path / "nasty.yaml"
    design.write_text(text.replace("title: Sonde finder", f"title: {title}"), encoding="utf-8")
    judged = pipeline.check(design)
    assert judged.arranged.design.title == NASTY
    judged = pipeline.drawn(judged)
    folder = pipeline.build(judged, output=tmp_path / "output", say=lambda line: None)
    assert folder == tmp_path / "output" / "SF-401-05_B"
    assert sorted(path.name for path in tmp_path.iterdir()) == ["nasty.yaml", "output"]
    book = (folder / "book.html").read_text(encoding="utf-8")
    assert "<script" not in book
    assert "&lt;script&gt;" in book
    for path in folder.rglob("*.svg"):
        tree = ET.parse(path)
        assert not [element for element in tree.iter() if element.tag.endswith("script")]
    for path in folder.rglob("*.pdf"):
        assert path.read_bytes().startswith(b"%PDF")
