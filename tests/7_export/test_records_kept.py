"""What is kept beside a design: written whole or not at all, and answering only as it was written."""

import json
import os
from collections.abc import Iterator
from dataclasses import replace
from pathlib import Path

import pytest

from fabgen import pipeline
from fabgen.cli.main import main
from fabgen.design.response import STORED_NAME, Response
from fabgen.errors import MachineError
from fabgen.export.records import write_new, write_response
from fabgen.read.records import records_folder
from fabgen.read.stored_response import stored_response


@pytest.fixture(scope="module")
def few_builds() -> Iterator[None]:
    """Enough builds to judge by, few enough to be quick."""
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr("fabgen.check.response.allot.SAMPLES", 300)
        patch.setattr("fabgen.check.response.allot.FEWEST", 300)
        yield


@pytest.fixture(scope="module")
def solved(root: Path, tmp_path_factory: pytest.TempPathFactory, few_builds: None) -> pipeline.Judged:
    design = tmp_path_factory.mktemp("solved") / "gauge.yaml"
    design.write_bytes((root / "designs/river-gauge-434.yaml").read_bytes())
    judged = pipeline.check(design, solve=True)
    assert [path.name for path in design.parent.iterdir()] == ["gauge.yaml"]
    return judged


@pytest.fixture
def response(solved: pipeline.Judged) -> Response:
    assert solved.response is not None
    return solved.response


@pytest.fixture
def design(root: Path, tmp_path: Path) -> Path:
    path = tmp_path / "gauge.yaml"
    path.write_bytes((root / "designs/river-gauge-434.yaml").read_bytes())
    return path


def kept(design: Path) -> Path:
    return records_folder(design) / STORED_NAME


def test_a_stored_response_gives_the_same_judgement_and_tables(
    solved: pipeline.Judged, response: Response, design: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    write_response(response, folder=records_folder(design))
    monkeypatch.delattr("fabgen.check.response.respond.respond")
    said: list[str] = []
    again = pipeline.check(design, solve=True, say=said.append)
    assert said == []
    assert repr(again) == repr(solved)
    made = [
        pipeline.build(judged, output=tmp_path / name, only=["tables", "bench"], say=said.append)
        for judged, name in ((solved, "first"), (again, "second"))
    ]
    first, second = (
        {path.relative_to(folder): path.read_bytes() for path in folder.rglob("*") if path.is_file()} for folder in made
    )
    assert first == second
    assert len(first) == 9


def test_another_design_is_not_answered(response: Response, design: Path) -> None:
    write_response(response, folder=records_folder(design))
    text = design.read_text(encoding="utf-8")
    design.write_text(text.replace("shift: 400 kHz", "shift: 401 kHz"), encoding="utf-8")
    assert pipeline.check(design).response is None


@pytest.mark.parametrize("spoil", ["", "[]", "{", "3", '{"case_sha256": "x"}'])
def test_a_broken_file_does_not_answer(response: Response, design: Path, spoil: str) -> None:
    write_response(response, folder=records_folder(design))
    assert stored_response(design, response.case_sha256) == response
    kept(design).write_text(spoil, encoding="utf-8")
    assert stored_response(design, response.case_sha256) is None


def test_a_changed_file_does_not_answer(response: Response, design: Path) -> None:
    write_response(response, folder=records_folder(design))
    whole = json.loads(kept(design).read_text(encoding="utf-8"))
    whole["allotment"]["rows"][0]["length_mm"] *= 2
    kept(design).write_text(json.dumps(whole), encoding="utf-8")
    assert stored_response(design, response.case_sha256) is None


def test_storing_leaves_nothing_else_behind(response: Response, design: Path) -> None:
    write_response(response, folder=records_folder(design))
    killed = kept(design).with_name(f".{STORED_NAME}.4711")
    killed.write_text("{", encoding="utf-8")
    other = replace(response, thickest_wl=0.01)
    write_response(other, folder=records_folder(design))
    assert stored_response(design, other.case_sha256) == other
    assert [path.name for path in records_folder(design).iterdir()] == [STORED_NAME]


def test_the_same_response_is_not_written_again(response: Response, design: Path) -> None:
    write_response(response, folder=records_folder(design))
    os.utime(kept(design), ns=(0, 0))
    write_response(response, folder=records_folder(design))
    assert kept(design).stat().st_mtime_ns == 0


def test_a_file_where_the_records_should_be(response: Response, design: Path) -> None:
    (design.parent / "records").write_text("mine", encoding="utf-8")
    with pytest.raises(MachineError, match=r"cannot write .*records"):
        write_response(response, folder=records_folder(design))
    assert (design.parent / "records").read_text(encoding="utf-8") == "mine"


@pytest.mark.parametrize("link", ["records", "records/gauge"])
def test_a_link_out_of_the_records_is_not_followed(response: Response, design: Path, link: str) -> None:
    elsewhere = design.parent / "elsewhere"
    elsewhere.mkdir()
    (design.parent / link).parent.mkdir(exist_ok=True)
    (design.parent / link).symlink_to(elsewhere)
    with pytest.raises(MachineError, match="a link that may lead elsewhere"):
        write_response(response, folder=records_folder(design))
    assert list(elsewhere.iterdir()) == []


@pytest.mark.parametrize("links", [True, False])
def test_a_record_is_never_replaced(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, links: bool) -> None:
    """With hard links, and on a disk that has none."""
    if not links:
        monkeypatch.setattr(os, "link", refused)
    for count in ("", "-2", "-3"):
        paths = write_new({".yaml": b"a" + count.encode(), ".svg": b"b"}, folder=tmp_path, stem="m")
        assert [path.name for path in paths] == [f"m{count}.yaml", f"m{count}.svg"]
    assert (tmp_path / "m.yaml").read_bytes() == b"a"
    assert len(list(tmp_path.iterdir())) == 6


def refused(*_: object) -> None:
    raise PermissionError(1, "Operation not permitted")


def test_a_name_taken_at_the_last_moment_stays_the_others(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    plain = os.link

    def raced(fresh: Path, path: Path) -> None:
        if path.name == "m.svg":
            path.write_bytes(b"the other run's")
        plain(fresh, path)

    monkeypatch.setattr(os, "link", raced)
    paths = write_new({".yaml": b"a", ".svg": b"b"}, folder=tmp_path, stem="m")
    assert [path.name for path in paths] == ["m-2.yaml", "m-2.svg"]
    assert {path.name: path.read_bytes() for path in tmp_path.iterdir()} == {
        "m.svg": b"the other run's", "m-2.yaml": b"a", "m-2.svg": b"b",
    }  # fmt: skip


def test_a_full_disk_leaves_no_half_of_a_record(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    plain, calls = os.fsync, []

    def full(descriptor: int) -> None:
        calls.append(descriptor)
        if len(calls) == 2:
            raise OSError(28, "No space left on device", "somewhere")
        plain(descriptor)

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(MachineError, match="cannot write somewhere"):
        write_new({".yaml": b"a", ".svg": b"b"}, folder=tmp_path, stem="m")
    assert list(tmp_path.iterdir()) == []


def test_a_build_says_that_it_solves_and_that_it_could_not_keep_the_answer(
    design: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], few_builds: None
) -> None:
    """The package is the same whether the folder could be written or not."""
    made = []
    for output, free in (("first", False), ("second", True)):
        if not free:
            (tmp_path / "records").write_text("in the way", encoding="utf-8")
        with pytest.raises(SystemExit) as ended:
            main(["build", str(design), "--only", "tables", "--output", str(tmp_path / output)])
        assert ended.value.code == 0
        talk = capsys.readouterr().err
        assert talk.startswith("RGL-434-06_A: array response\n")
        assert ("E08 note: records" in talk) is not free
        if not free:
            (tmp_path / "records").unlink()
        folder = tmp_path / output / "RGL-434-06_A_only_tables"
        made.append({path.name: path.read_bytes() for path in folder.rglob("*") if path.is_file()})
    assert made[0] == made[1]
    assert kept(design).is_file()
