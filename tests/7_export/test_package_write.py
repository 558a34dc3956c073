"""A package is there as a whole or not at all, whatever happens while it is written."""

import errno
import json
import os
import subprocess
import sys
import textwrap
from pathlib import Path

import pytest

from fabgen.design.package import PackageFile
from fabgen.errors import MachineError, ProgramError
from fabgen.export import package

LISTS_A = b'{"files": [{"path": "tables/a.csv"}]}'
LISTS_A_AND_B = b'{"files": [{"path": "tables/a.csv"}, {"path": "model/b.step"}]}'
OLD = (PackageFile("manifest.json", LISTS_A, "m"), PackageFile("tables/a.csv", b"old a", "a"))
NEW = (
    PackageFile("manifest.json", LISTS_A_AND_B, "m"),
    PackageFile("tables/a.csv", b"new a", "a"),
    PackageFile("model/b.step", b"new b", "b"),
)


def contents(folder: Path) -> dict[str, bytes]:
    return {str(path.relative_to(folder)): path.read_bytes() for path in folder.rglob("*") if path.is_file()}


def expected(files: tuple[PackageFile, ...]) -> dict[str, bytes]:
    return {file.path: file.data for file in files}


def test_a_new_package_replaces_the_old_one_whole(tmp_path: Path) -> None:
    package.write(OLD, output=tmp_path, name="X-1_A")
    folder = package.write(NEW, output=tmp_path, name="X-1_A")
    assert contents(folder) == expected(NEW)
    assert sorted(path.name for path in tmp_path.iterdir()) == [".fabgen.lock", "X-1_A"]


def test_without_the_exchange_two_renames_do_the_same(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(package, "_exchange", lambda first, second: False)
    package.write(OLD, output=tmp_path, name="X-1_A")
    package.write(NEW, output=tmp_path, name="X-1_A")
    assert contents(tmp_path / "X-1_A") == expected(NEW)


KILLER = textwrap.dedent(
    """
    import os, sys
    from pathlib import Path
    from fabgen.design.package import PackageFile
    from fabgen.export import package

    output, deadly, exchange = Path(sys.argv[1]), int(sys.argv[2]), sys.argv[3] == "exchange"
    count = 0

    def mortal(function):
        def wrapped(*args, **keywords):
            global count
            count += 1
            if count == deadly:
                os._exit(9)
            return function(*args, **keywords)
        return wrapped

    for owner, name in ((os, "fsync"), (os, "mkdir"), (os, "rmdir"), (os, "unlink"), (Path, "rename"), (Path, "open"),
                        (Path, "mkdir"), (package, "_exchange")):
        setattr(owner, name, mortal(getattr(owner, name)))
    if not exchange:
        package._exchange = lambda first, second: False
    lists = b'{"files": [{"path": "tables/a.csv"}, {"path": "model/b.step"}]}'
    files = [PackageFile("manifest.json", lists, "m"), PackageFile("tables/a.csv", b"new a", "a"),
             PackageFile("model/b.step", b"new b", "b")]
    package.write(files, output=output, name="X-1_A")
    """
)


@pytest.mark.parametrize("way", ["exchange", "renames"])
def test_a_kill_at_any_step_leaves_the_old_package_or_the_new_one(tmp_path: Path, way: str) -> None:
    new = expected(NEW)
    seen = set()
    for deadly in range(1, 60):
        output = tmp_path / str(deadly)
        package.write(OLD, output=output, name="X-1_A")
        environment = os.environ | {"PYTHONPATH": str(Path(package.__file__).parents[2])}
        run = subprocess.run(
            [sys.executable, "-c", KILLER, str(output), str(deadly), way], env=environment, check=False
        )
        target = output / "X-1_A"
        if not target.exists():
            assert way == "renames"
            package.write(OLD, output=output, name="other")  # any next run repairs it
        found = contents(target)
        assert found in (expected(OLD), new)
        seen.add("old" if found == expected(OLD) else "new")
        package.write(NEW, output=output, name="X-1_A")
        assert contents(target) == expected(NEW)
        assert {path.name for path in output.iterdir()} <= {".fabgen.lock", "X-1_A", "other"}
        if run.returncode == 0:
            break
        assert run.returncode == 9
    else:
        pytest.fail("the run never finished")
    assert seen == {"old", "new"}


def test_a_full_disk_changes_nothing(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    package.write(OLD, output=tmp_path, name="X-1_A")
    calls = []

    def full(descriptor: int) -> None:
        calls.append(descriptor)
        if len(calls) == 2:
            raise OSError(errno.ENOSPC, os.strerror(errno.ENOSPC), "somewhere")

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(MachineError, match="the disk is full") as raised:
        package.write(NEW, output=tmp_path, name="X-1_A")
    assert raised.value.exit_code == 3
    assert contents(tmp_path / "X-1_A") == expected(OLD)
    assert sorted(path.name for path in tmp_path.iterdir()) == [".fabgen.lock", "X-1_A"]


def test_a_rename_that_fails_puts_the_old_package_back(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(package, "_exchange", lambda first, second: False)
    package.write(OLD, output=tmp_path, name="X-1_A")
    plain = Path.rename

    def failing(path: Path, target: Path) -> Path:
        if path.name == ".fabgen.new":
            raise OSError(errno.EIO, os.strerror(errno.EIO), str(path))
        return plain(path, target)

    monkeypatch.setattr(Path, "rename", failing)
    with pytest.raises(MachineError, match="Input/output error"):
        package.write(NEW, output=tmp_path, name="X-1_A")
    assert contents(tmp_path / "X-1_A") == expected(OLD)
    assert sorted(path.name for path in tmp_path.iterdir()) == [".fabgen.lock", "X-1_A"]


def test_what_a_killed_run_left_goes_with_the_next_of_any_name(tmp_path: Path) -> None:
    for place in (".fabgen.new/tables/stale.csv", ".fabgen.old/X-1_A/manifest.json", ".fabgen.old/X-2_A/manifest.json"):
        (tmp_path / place).parent.mkdir(parents=True)
        (tmp_path / place).write_bytes(b"{}")
    (tmp_path / "X-1_A").mkdir()
    package.write(NEW, output=tmp_path, name="X-3_A")
    assert sorted(path.name for path in tmp_path.iterdir()) == [".fabgen.lock", "X-1_A", "X-2_A", "X-3_A"]
    assert contents(tmp_path / "X-1_A") == {}
    assert contents(tmp_path / "X-3_A") == expected(NEW)
    assert contents(tmp_path / "X-2_A") == {"manifest.json": b"{}"}


def test_a_write_protected_package_is_not_replaced(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Asked, not tried: a folder whose files cannot go would stand in the way of every later run."""
    package.write(OLD, output=tmp_path, name="X-1_A")
    allowed = os.access
    monkeypatch.setattr(
        os, "access", lambda path, mode: allowed(path, mode) and not (Path(path).name == "tables" and mode & os.W_OK)
    )
    with pytest.raises(MachineError, match="tables: no permission to write there"):
        package.write(NEW, output=tmp_path, name="X-1_A")
    assert contents(tmp_path / "X-1_A") == expected(OLD)


def test_the_lock_never_empties_what_it_finds(tmp_path: Path) -> None:
    (tmp_path / "mine").write_text("mine", encoding="utf-8")
    (tmp_path / ".fabgen.lock").symlink_to(tmp_path / "mine")
    package.write(OLD, output=tmp_path, name="X-1_A")
    assert (tmp_path / "mine").read_text(encoding="utf-8") == "mine"


HOLDER = """
import sys
from pathlib import Path
from fabgen.export import package
with package._locked(Path(sys.argv[1]), print):
    print("held", flush=True)
    sys.stdin.readline()
"""


def test_a_second_run_says_that_it_waits(tmp_path: Path) -> None:
    environment = os.environ | {"PYTHONPATH": str(Path(package.__file__).parents[2])}
    said: list[str] = []
    with subprocess.Popen(
        [sys.executable, "-c", HOLDER, str(tmp_path)],
        env=environment, stdin=subprocess.PIPE, stdout=subprocess.PIPE, text=True,
    ) as holder:  # fmt: skip
        assert holder.stdin is not None
        assert holder.stdout is not None
        assert holder.stdout.readline() == "held\n"

        def say(line: str) -> None:
            said.append(line)
            if "waiting" in line:
                assert not (tmp_path / "X-1_A").exists()
                holder.stdin.write("\n")  # type: ignore[union-attr]
                holder.stdin.flush()  # type: ignore[union-attr]

        package.write(OLD, output=tmp_path, name="X-1_A", say=say)
    assert said == [f"another run is writing to {tmp_path}: waiting for it to end", "X-1_A: writing 2 files"]
    assert contents(tmp_path / "X-1_A") == expected(OLD)


def test_a_file_where_the_output_folder_should_be(tmp_path: Path) -> None:
    (tmp_path / "output").write_text("mine")
    with pytest.raises(MachineError, match="a file stands where the folder should be"):
        package.write(NEW, output=tmp_path / "output", name="X-1_A")
    assert (tmp_path / "output").read_text() == "mine"


def test_a_file_where_the_package_should_be(tmp_path: Path) -> None:
    (tmp_path / "X-1_A").write_text("mine")
    with pytest.raises(MachineError, match="is not a folder"):
        package.write(NEW, output=tmp_path, name="X-1_A")
    assert (tmp_path / "X-1_A").read_text() == "mine"


@pytest.mark.parametrize("place", ["notes.txt", "tables/readings.csv"])
def test_a_builders_own_file_is_never_thrown_away(tmp_path: Path, place: str) -> None:
    folder = package.write(OLD, output=tmp_path, name="X-1_A")
    (folder / place).write_text("mine")
    (folder / ".hidden").write_text("a file manager's")
    with pytest.raises(MachineError, match=f"holds {place}, which is of no package"):
        package.write(NEW, output=tmp_path, name="X-1_A")
    assert (folder / place).read_text() == "mine"
    assert (folder / "tables" / "a.csv").read_bytes() == b"old a"
    (folder / place).unlink()
    package.write(NEW, output=tmp_path, name="X-1_A")
    assert contents(folder) == expected(NEW)


def test_a_sheet_that_was_filled_in_is_never_thrown_away(tmp_path: Path) -> None:
    sheet = PackageFile("readings.csv", b"step,reading\n1,\n", "to fill in")
    listed = package.manifest(
        [sheet], number="X-1", revision="A", design_sha256="0" * 64, verdict="clear", versions={"fabgen": "1"}
    )
    folder = package.write([sheet, listed], output=tmp_path, name="X-1_A")
    assert package.write([sheet, listed], output=tmp_path, name="X-1_A") == folder
    (folder / "readings.csv").write_text("step,reading\n1,0.3\n")
    with pytest.raises(MachineError, match="which was changed") as raised:
        package.write([sheet, listed], output=tmp_path, name="X-1_A")
    assert "move it out" in raised.value.fix
    assert (folder / "readings.csv").read_text() == "step,reading\n1,0.3\n"


def test_a_folder_that_is_no_package_is_not_replaced(tmp_path: Path) -> None:
    (tmp_path / "X-1_A").mkdir()
    (tmp_path / "X-1_A" / "thesis.txt").write_text("mine")
    with pytest.raises(MachineError, match="holds thesis"):
        package.write(NEW, output=tmp_path, name="X-1_A")
    assert (tmp_path / "X-1_A" / "thesis.txt").read_text() == "mine"


def test_a_link_where_the_package_should_be_is_not_followed(tmp_path: Path) -> None:
    (tmp_path / "elsewhere").mkdir()
    (tmp_path / "output").mkdir()
    (tmp_path / "output" / "X-1_A").symlink_to(tmp_path / "elsewhere")
    with pytest.raises(MachineError, match="is not a folder"):
        package.write(NEW, output=tmp_path / "output", name="X-1_A")
    assert list((tmp_path / "elsewhere").iterdir()) == []


def test_a_folder_without_permission(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def refused(path: Path, *args: object, **keywords: object) -> None:
        raise PermissionError(errno.EACCES, os.strerror(errno.EACCES), str(path))

    monkeypatch.setattr(Path, "mkdir", refused)
    with pytest.raises(MachineError, match="output: no permission to write there") as raised:
        package.write(NEW, output=tmp_path / "output", name="X-1_A")
    assert "--output" in raised.value.fix
    assert list(tmp_path.iterdir()) == []


@pytest.mark.parametrize("name", ["../X", "a/b", "", ".", "..", "/X"])
def test_names_never_lead_outside_the_output_folder(tmp_path: Path, name: str) -> None:
    with pytest.raises(ProgramError):
        package.write(NEW, output=tmp_path / "output", name=name)
    assert list(tmp_path.iterdir()) == []


@pytest.mark.parametrize("path", ["../x", "/x", "a/../../x"])
def test_files_never_lead_outside_the_package(tmp_path: Path, path: str) -> None:
    with pytest.raises(ProgramError):
        package.write((PackageFile(path, b"", ""),), output=tmp_path / "output", name="X-1_A")
    assert [p.name for p in tmp_path.rglob("*")] == ["output", ".fabgen.lock"]


def test_the_manifest_lists_every_file_with_its_hash() -> None:
    made = package.manifest(
        NEW[1:], number="X-1", revision="A", design_sha256="0" * 64, verdict="clear", versions={"fabgen": "1"}
    )
    record = json.loads(made.data)
    assert list(record) == ["fabgen", "number", "revision", "design_sha256", "verdict", "versions", "files"]
    assert [file["path"] for file in record["files"]] == ["model/b.step", "tables/a.csv"]
    # SHA-256 of the six bytes `new b` and `new a`, by another implementation.
    openssl = subprocess.run(["openssl", "dgst", "-sha256", "-r"], input=b"new b", capture_output=True, check=False)
    if openssl.returncode == 0:
        assert record["files"][0]["sha256"] == openssl.stdout.decode().split()[0]


def test_another_designs_package_of_the_same_name_is_left_alone(tmp_path: Path) -> None:
    def files(number: str, revision: str) -> tuple[PackageFile, ...]:
        made = package.manifest(
            NEW[1:], number=number, revision=revision, design_sha256="", verdict="clear", versions={"fabgen": "1"}
        )
        return (*NEW[1:], made)

    package.write(files("a_b", "c"), output=tmp_path, name="a_b_c")
    with pytest.raises(MachineError, match="is the package of number a_b revision c"):
        package.write(files("a", "b_c"), output=tmp_path, name="a_b_c")
    package.write(files("a_b", "c"), output=tmp_path, name="a_b_c")
