"""The command line: what goes where, and one exit code for each kind of ending."""

import errno
import io
import json
import os
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest

from fabgen import contents, pipeline
from fabgen.cli.main import main
from fabgen.design.package import PackageFile
from fabgen.errors import MachineError

CLEAR = "river-gauge-434.yaml"


@pytest.fixture
def design(root: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A clear demo design in a folder of its own, which is also the current one."""
    monkeypatch.chdir(tmp_path)
    path = tmp_path / "gauge.yaml"
    path.write_text((root / "designs" / CLEAR).read_text(encoding="utf-8"), encoding="utf-8")
    return path


@pytest.fixture
def light_package(monkeypatch: pytest.MonkeyPatch) -> None:
    """Packages of one small file and few builds tried: these tests are about the command line."""
    monkeypatch.setattr("fabgen.check.response.allot.SAMPLES", 60)
    monkeypatch.setattr("fabgen.check.response.allot.FEWEST", 60)
    monkeypatch.setattr(
        contents, "package_files", lambda *args, **keywords: (PackageFile("tables/lengths.csv", b"x\n", "x"),)
    )


def run(*words: str) -> int:
    with pytest.raises(SystemExit) as ended:
        main([*words])
    return int(ended.value.code or 0)


def unclear(design: Path) -> Path:
    """The same design with its first hole too near to the boom's end."""
    path = design.with_name("unclear.yaml")
    path.write_text(design.read_text(encoding="utf-8").replace("rear: 60 mm", "rear: 3 mm"), encoding="utf-8")
    return path


def test_check_prints_the_verdict_and_ends_with_0(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert run("check", str(design)) == 0
    out, err = capsys.readouterr()
    assert out.splitlines()[-1].startswith("RGL-434-06_A: clear")
    assert err == ""
    assert [path.name for path in design.parent.iterdir()] == ["gauge.yaml"]


def test_check_of_a_design_that_fails_ends_with_1(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert run("check", str(unclear(design))) == 1
    assert "not clear" in capsys.readouterr().out


def test_a_wrong_file_ends_with_2_and_points_at_the_place(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    design.write_text(design.read_text(encoding="utf-8").replace("section: square", "section: sqare"), encoding="utf-8")
    assert run("check", str(design)) == 2
    out, err = capsys.readouterr()
    line = 1 + design.read_text(encoding="utf-8").splitlines().index("  section: sqare")
    assert err.startswith(f"{design}:{line}:12: D")
    assert "square" in err
    assert out == ""


@pytest.mark.parametrize("words", [["check", "nowhere.yaml"], ["check", "."], ["chek"], ["check"], ["check", "--nope"]])
def test_what_cannot_be_read_or_is_no_command_ends_with_2(
    design: Path, capsys: pytest.CaptureFixture[str], words: list[str]
) -> None:
    assert run(*words) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert "Traceback" not in err
    assert err.strip()


def test_json_on_stdout_only(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert run("check", "--json", str(design), "nowhere.yaml") == 2
    out, err = capsys.readouterr()
    first, second = json.loads(out)["designs"]
    assert (first["number"], first["verdict"]) == ("RGL-434-06", "clear")
    assert second["exit"] == 2
    assert err == ""


def test_show_is_a_valid_design_again(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert run("check", "--show", str(design)) == 0
    shown = design.with_name("shown.yaml")
    shown.write_text(capsys.readouterr().out, encoding="utf-8")
    assert pipeline.check(shown).arranged.holes == pipeline.check(design).arranged.holes


@pytest.mark.usefixtures("light_package")
def test_a_failing_design_does_not_stop_the_others(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    bad = design.with_name("bad.yaml")
    bad.write_text("fabgen: 1\n", encoding="utf-8")
    other = unclear(design)
    other.write_text(other.read_text(encoding="utf-8").replace("RGL-434-06", "RGL-434-07"), encoding="utf-8")
    assert run("build", str(bad), str(other), str(design)) == 2
    assert sorted(path.name for path in Path("output").iterdir()) == [".fabgen.lock", "RGL-434-06_A"]


@pytest.mark.usefixtures("light_package")
def test_a_design_that_is_not_clear_writes_nothing_and_names_the_older_package(
    design: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert run("build", str(design)) == 0
    before = {path: path.read_bytes() for path in Path("output").rglob("*") if path.is_file()}
    assert run("build", str(unclear(design))) == 1
    err = capsys.readouterr().err
    assert "nothing was written" in err
    assert "RGL-434-06_A" in err
    assert {path: path.read_bytes() for path in Path("output").rglob("*") if path.is_file()} == before


@pytest.mark.usefixtures("light_package")
def test_stamped_writes_beside_and_still_ends_with_1(design: Path) -> None:
    assert run("build", "--stamped", str(unclear(design)), "--output", "elsewhere") == 1
    manifest = json.loads(Path("elsewhere/RGL-434-06_A_NOT-CLEARED/manifest.json").read_text(encoding="utf-8"))
    assert manifest["verdict"] == "not clear"


@pytest.mark.usefixtures("light_package")
def test_two_designs_of_one_name_stop_the_call(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    twin = design.with_name("twin.yaml")
    twin.write_text(design.read_text(encoding="utf-8"), encoding="utf-8")
    assert run("build", str(design), str(twin)) == 2
    assert "both are RGL-434-06_A" in capsys.readouterr().err
    assert not Path("output").exists()


def test_a_machine_error_ends_with_3(
    design: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def broken(*args: object, **keywords: object) -> None:
        raise MachineError("the CAD kernel needs libGL.so.1", "apt-get install libgl1")

    monkeypatch.setattr(contents, "package_files", broken)
    assert run("build", str(design)) == 3
    err = capsys.readouterr().err
    assert "libGL.so.1" in err
    assert "apt-get install libgl1" in err
    assert not Path("output/RGL-434-06_A").exists()


def test_a_bug_ends_with_3_and_one_message(
    design: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.delenv("FABGEN_DEBUG", raising=False)
    monkeypatch.setattr("fabgen.cli.commands.check.judge_file", lambda path, **_: 1 // 0)
    assert run("check", str(design)) == 3
    err = capsys.readouterr().err
    assert "a bug: ZeroDivisionError" in err
    assert "Traceback" not in err


def test_a_bug_in_one_design_does_not_stop_the_others(
    design: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], light_package: None
) -> None:
    monkeypatch.delenv("FABGEN_DEBUG", raising=False)
    other = design.with_name("other.yaml")
    other.write_text(
        design.read_text(encoding="utf-8").replace("number: RGL-434-06", "number: RGL-434-07"), encoding="utf-8"
    )
    plain = contents.package_files

    def faulty(arranged: Any, *args: Any, **keywords: Any) -> Any:
        return 1 // 0 if arranged.design.number == "RGL-434-06" else plain(arranged, *args, **keywords)

    monkeypatch.setattr(contents, "package_files", faulty)
    assert run("build", "--json", str(design), str(other)) == 3
    first, second = json.loads(capsys.readouterr().out)["designs"]
    assert (first["number"], first["exit"]) == ("RGL-434-06", 3)
    assert "a bug: ZeroDivisionError" in first["error"]
    assert second["package"] == "output/RGL-434-07_A"
    assert [path.name for path in Path("output").iterdir() if not path.name.startswith(".")] == ["RGL-434-07_A"]


def test_explain_prints_a_page_and_guesses(capsys: pytest.CaptureFixture[str], design: Path) -> None:
    assert run("explain", "c10") == 0
    assert capsys.readouterr().out.startswith("C10  Two parts collide")
    assert run("explain", "C1O") == 2
    assert "did you mean C1" in capsys.readouterr().err
    assert run("explain") == 0
    assert "C10  Two parts" in capsys.readouterr().out


def test_new_writes_once_and_only_here(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert run("new", "first") == 0
    path = Path("first.yaml")
    assert pipeline.check(path).clear
    text = path.read_text(encoding="utf-8")
    assert len(text.splitlines()) <= 20
    assert run("new", "first") == 2
    assert run("new", "../first") == 2
    for name in ("", ".", "..", ".hidden", "two\nlines"):
        assert run("new", name) == 2
    assert sorted(each.name for each in Path().iterdir()) == ["first.yaml", "gauge.yaml"]
    assert path.read_text(encoding="utf-8") == text


def test_schema_is_json_and_knows_the_grammar(design: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert run("schema") == 0
    schema = json.loads(capsys.readouterr().out)
    assert {"fabgen", "title", "number", "boom", "mounts", "elements", "feed"} <= set(schema["properties"])


def test_no_colour_when_it_is_not_wanted(design: Path) -> None:
    command = [sys.executable, "-m", "fabgen", "check", str(unclear(design))]
    found = subprocess.run(command, capture_output=True, text=True, check=False, env=_environment() | {"NO_COLOR": "1"})
    assert found.returncode == 1
    assert "\x1b" not in found.stdout + found.stderr


def test_help_says_what_each_command_does_in_full(capsys: pytest.CaptureFixture[str]) -> None:
    assert run("--help") == 0
    commands = capsys.readouterr().out.partition("Commands:")[2]
    assert "judge designs without writing anything" in commands
    assert "..." not in commands


@pytest.mark.parametrize(
    ("words", "code"),
    [
        ("explain | true", 3),
        ("check nowhere.yaml 2>&1 | true", 3),
        ("check wrong.yaml 2> >(true)", 3),
        ("explain >&-", 0),
        ("check nowhere.yaml 2>&-", 2),
    ],
)
def test_output_that_nobody_reads_is_no_traceback_and_no_finding(design: Path, words: str, code: int) -> None:
    design.with_name("wrong.yaml").write_text("x: 1\n" * 200, encoding="utf-8")
    command = f"{sys.executable} -m fabgen {words}; exit ${{PIPESTATUS[0]}}"
    found = subprocess.run(["bash", "-c", command], capture_output=True, text=True, check=False, env=_environment())
    assert found.returncode == code
    assert "Traceback" not in found.stderr
    assert "Exception" not in found.stderr


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="no device that is always full")
def test_output_that_does_not_fit_is_the_machines_fault(design: Path) -> None:
    command = f"{sys.executable} -m fabgen explain > /dev/full"
    found = subprocess.run(["bash", "-c", command], capture_output=True, text=True, check=False, env=_environment())
    assert found.returncode == 3
    assert found.stderr.startswith("fabgen: the output: ")
    assert "bug" not in found.stderr


def test_a_file_that_may_not_be_read_stops_no_other(
    design: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    locked = design.with_name("locked.yaml")
    locked.write_text("fabgen: 1\n", encoding="utf-8")
    opened = Path.open

    def refuse(path: Path, *args: Any, **keywords: Any) -> Any:
        if path.name == locked.name:
            raise PermissionError(errno.EACCES, "Permission denied", str(path))
        return opened(path, *args, **keywords)

    monkeypatch.setattr(Path, "open", refuse)
    monkeypatch.setattr(os, "access", lambda path, mode: Path(path).name != locked.name)
    assert run("check", str(locked), str(design)) == 3
    out, err = capsys.readouterr()
    assert "RGL-434-06_A: clear" in out
    assert err.startswith(f"fabgen: {locked} cannot be read: Permission denied")


def test_a_design_file_that_cannot_be_written_whole_is_not_left_there(
    design: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def full(*args: Any, **keywords: Any) -> Any:
        Path("first.yaml").touch()
        return Full()

    class Full(io.StringIO):
        def write(self, text: str) -> int:
            raise OSError(errno.ENOSPC, "No space left on device")

    monkeypatch.setattr(Path, "open", full)
    assert run("new", "first") == 3
    assert "No space left" in capsys.readouterr().err
    assert not Path("first.yaml").exists()


def _environment() -> dict[str, str]:
    return {**os.environ, "PYTHONPATH": str(Path(contents.__file__).parents[1])}


@pytest.mark.usefixtures("light_package")
def test_build_keeps_the_response_and_a_later_check_uses_it(
    design: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    assert run("check", str(design)) == 0
    out = capsys.readouterr().out
    assert out.splitlines()[-1].endswith("limits not judged")
    assert "E01 note" in out
    assert run("build", str(design)) == 0
    assert (design.parent / "records/gauge/response.json").is_file()
    capsys.readouterr()
    monkeypatch.setattr("fabgen.check.response.respond.respond", None)  # a check does not ask again
    assert run("check", "--json", str(design)) == 0
    (record,) = json.loads(capsys.readouterr().out)["designs"]
    assert record["limits"] == "judged"
    assert "E04" in {finding["code"] for finding in record["findings"]}
    text = design.read_text(encoding="utf-8")
    design.write_text(text.replace("length: 338.4", "length: 338.5"), encoding="utf-8")
    assert run("check", str(design)) == 0
    assert capsys.readouterr().out.splitlines()[-1].endswith("limits not judged")


def test_check_with_response_judges_and_writes_nothing(
    design: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr("fabgen.check.response.allot.SAMPLES", 60)
    monkeypatch.setattr("fabgen.check.response.allot.FEWEST", 60)
    text = design.read_text(encoding="utf-8")
    design.write_text(text.replace("front_to_back: 18 dB", "front_to_back: 30 dB"), encoding="utf-8")
    assert run("check", "--response", str(design)) == 1
    out = capsys.readouterr().out
    assert "E02 fail: front_to_back" in out
    assert "not judged" not in out
    assert [path.name for path in design.parent.iterdir()] == ["gauge.yaml"]
