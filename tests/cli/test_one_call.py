"""Several designs in one call: one answer for each, and one JSON document whatever happens."""

import json
from pathlib import Path

import pytest

from fabgen import contents, pipeline
from fabgen.cli.main import main
from fabgen.design.package import PackageFile
from fabgen.errors import MachineError
from fabgen.read.starter import starter


@pytest.fixture(autouse=True)
def folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """The current folder, with two designs of one name, one of another and one that is wrong."""
    monkeypatch.chdir(tmp_path)
    for name, number in (("a", "one"), ("b", "ONE"), ("c", "other")):
        text = starter("x").replace("number: 'x'", f"number: {number}")
        Path(f"{name}.yaml").write_text(text, encoding="utf-8")
    Path("wrong.yaml").write_text("fabgen: 1\n", encoding="utf-8")
    monkeypatch.setattr("fabgen.cli.commands.build.judge_file", lambda path, **_: pipeline.check(path))
    monkeypatch.setattr(contents, "package_files", lambda *_, **__: (PackageFile("tables/lengths.csv", b"x\n", "x"),))
    return tmp_path


def run(*words: str) -> int:
    with pytest.raises(SystemExit) as ended:
        main([*words])
    return int(ended.value.code or 0)


@pytest.mark.parametrize("command", ["check", "build"])
def test_two_designs_of_one_name_are_told_in_json(command: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert run(command, "--json", "a.yaml", "c.yaml", "b.yaml") == 2
    first, other, second = json.loads(capsys.readouterr().out)["designs"]
    assert (first["file"], other["file"], second["file"]) == ("a.yaml", "c.yaml", "b.yaml")
    assert first["error"] == second["error"] == "a.yaml and b.yaml both are ONE_A"
    assert (first["exit"], second["exit"]) == (2, 2)
    assert "error" not in other
    assert other["verdict"] == "clear"
    assert not Path("output").exists()


def test_two_designs_of_one_name_fail_a_check_as_they_fail_a_build(capsys: pytest.CaptureFixture[str]) -> None:
    assert run("check", "a.yaml", "b.yaml") == 2
    out, err = capsys.readouterr()
    assert "one_A: clear" in out
    assert err.splitlines()[0] == "fabgen: a.yaml and b.yaml both are ONE_A"


def test_json_keeps_the_order_of_the_call(capsys: pytest.CaptureFixture[str]) -> None:
    assert run("build", "--json", "c.yaml", "wrong.yaml", "a.yaml", "nowhere.yaml") == 2
    records = json.loads(capsys.readouterr().out)["designs"]
    assert [record["file"] for record in records] == ["c.yaml", "wrong.yaml", "a.yaml", "nowhere.yaml"]
    assert [record.get("exit") for record in records] == [None, 2, None, 2]
    assert records[1]["problems"][0]["code"] == "D07"
    assert [Path(record["package"]).name for record in records if "package" in record] == ["other_A", "one_A"]


def test_a_package_that_cannot_be_written_is_one_record(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def broken(*args: object, **keywords: object) -> None:
        raise MachineError("the disk is full", "free some space")

    monkeypatch.setattr(contents, "package_files", broken)
    assert run("build", "--json", "a.yaml") == 3
    (record,) = json.loads(capsys.readouterr().out)["designs"]
    assert (record["verdict"], record["error"], record["exit"]) == ("clear", "the disk is full", 3)


def test_a_bug_in_one_check_stops_no_other(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    from fabgen.cli.commands.check import judge_file as judge

    monkeypatch.delenv("FABGEN_DEBUG", raising=False)
    monkeypatch.setattr(
        "fabgen.cli.commands.check.judge_file",
        lambda path, **keywords: 1 // 0 if path.name == "a.yaml" else judge(path, **keywords),
    )
    assert run("check", "a.yaml", "c.yaml") == 3
    out, err = capsys.readouterr()
    assert "other_A: clear" in out
    assert err.startswith("fabgen: a bug: ZeroDivisionError")


def test_inspect_tells_its_failures_in_json_too(capsys: pytest.CaptureFixture[str]) -> None:
    assert run("inspect", "--json", "a.yaml", "nowhere.csv") == 2
    out, err = capsys.readouterr()
    assert json.loads(out)["error"] == "there is no file nowhere.csv"
    assert err == ""


def test_explain_takes_a_short_code_and_guesses_no_code_from_a_letter(capsys: pytest.CaptureFixture[str]) -> None:
    assert run("explain", "d1") == 0
    assert capsys.readouterr().out.startswith("D01  ")
    assert run("explain", "D") == 2
    assert "lists all codes" in capsys.readouterr().err


def test_a_name_too_long_for_the_disk_is_a_wrong_command_line(capsys: pytest.CaptureFixture[str]) -> None:
    assert run("new", "x" * 300) == 2
    assert "too long" in capsys.readouterr().err
