"""Files that are no designs: wrong bytes, wrong sizes, wrong kinds of file."""

import os
from pathlib import Path

import pytest

from fabgen.errors import DesignErrors, InputError, MachineError
from fabgen.read.reader import read_design
from fabgen.read.starter import starter

GOOD = starter("trial")


def told(path: Path, data: bytes) -> list[str]:
    path.write_bytes(data)
    with pytest.raises(DesignErrors) as stopped:
        read_design(path, shown_as="d.yaml")
    return [f"{p.place.line}:{p.place.column} {p.code}" for p in stopped.value.problems]


@pytest.mark.parametrize(
    ("data", "expected"),
    [
        (b"", ["1:1 D08"]),
        (b"\n# nothing\n", ["1:1 D08"]),
        (b"- 1\n- 2\n", ["1:1 D08"]),
        (b"fabgen 1\n", ["1:1 D08"]),
        (b"{}", ["1:1 D07"] * 6),
        (b"fabgen: 1\ntitle: caf\xe9\n", ["2:11 D01"]),
        (b"fabgen: 1\ntitle: \x00\n", ["2:8 D01"]),
        ("fabgen: 1\ntitle: x".encode("utf-16"), ["1:1 D01"]),
        ("fabgen: 1\ntitle: a\u2028b\n".encode(), ["2:9 D01"]),
        ("fabgen: 1\ntitle: a\ufeffb\n".encode(), ["2:9 D01"]),
        (b"#" * 1_000_001, ["1:1 D02"]),
        (b"a: " + b"[" * 500_000, ["1:1003 D03"]),
        (b"a: " + b"{x: " * 100_000, ["1:80 D02"]),
        (b"%YAML 1.2\n---\nfabgen: 1\n...\n---\na: 1\n", ["5:1 D04"]),
    ],
)
def test_files_that_are_no_designs(tmp_path: Path, data: bytes, expected: list[str]) -> None:
    assert told(tmp_path / "d.yaml", data) == expected


def test_aliases_do_not_explode(tmp_path: Path) -> None:
    """Nine levels of nine aliases each would be a billion values."""
    levels = ["a0: &a0 [x, x, x, x, x, x, x, x, x]"]
    levels += [f"a{n}: &a{n} [{', '.join([f'*a{n - 1}'] * 9)}]" for n in range(1, 10)]
    codes = told(tmp_path / "d.yaml", "\n".join(levels).encode())
    assert codes.count("10:10 D04") == 1
    assert sum(code.endswith("D04") for code in codes) == 10 + 81


@pytest.mark.parametrize(
    "data", [b"a: 1\n" * 180_000, b"- \n" * 100_000, b"a: {" + b"b: 1, " * 150_000 + b"}", b"x" * 999_999]
)
def test_a_large_wrong_file_is_refused_with_its_reasons(tmp_path: Path, data: bytes) -> None:
    assert 0 < len(told(tmp_path / "d.yaml", data)) <= 501


def test_a_byte_order_mark_and_other_line_ends_change_nothing(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    found = []
    for data in (GOOD.encode(), b"\xef\xbb\xbf" + GOOD.encode(), GOOD.replace("\n", "\r\n").encode()):
        path.write_bytes(data)
        found.append(read_design(path).design)
    assert found[0].elements == found[1].elements == found[2].elements
    assert len({design.sha256 for design in found}) == 3


def test_a_file_that_is_not_there(tmp_path: Path) -> None:
    with pytest.raises(InputError, match="there is no file"):
        read_design(tmp_path / "none.yaml")
    with pytest.raises(InputError, match="is a folder"):
        read_design(tmp_path)


def test_the_nearest_file_is_named_and_links_that_lead_nowhere(tmp_path: Path) -> None:
    (tmp_path / "river.yaml").write_text(GOOD, encoding="utf-8")
    for wrong in ("rivr.yaml", "river.yml.yaml", "river"):
        with pytest.raises(InputError) as stopped:
            read_design(tmp_path / wrong)
        assert stopped.value.fix == "did you mean river.yaml?"
    (tmp_path / "a.yaml").symlink_to("b.yaml")
    (tmp_path / "b.yaml").symlink_to("a.yaml")
    with pytest.raises(InputError, match="a link that leads nowhere"):
        read_design(tmp_path / "a.yaml")
    with pytest.raises(InputError, match="there is no file"):
        read_design(tmp_path / ("x" * 300 + ".yaml"))


def test_a_pipe_does_not_hang(tmp_path: Path) -> None:
    os.mkfifo(tmp_path / "pipe.yaml")
    with pytest.raises(InputError, match="not a regular file"):
        read_design(tmp_path / "pipe.yaml")


@pytest.mark.skipif(os.geteuid() == 0, reason="root may read everything")
def test_a_file_without_permission(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    path.write_text(GOOD, encoding="utf-8")
    path.chmod(0)
    with pytest.raises(MachineError, match="cannot be read"):
        read_design(path)


def test_messages_use_the_name_that_was_given(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    path.write_text(GOOD.replace("fabgen: 1", "fabgen: 3"), encoding="utf-8")
    with pytest.raises(DesignErrors) as stopped:
        read_design(path, shown_as="shelf/d.yaml")
    assert str(stopped.value).splitlines() == [
        "shelf/d.yaml:1:9: D09 fabgen: '3' is not known",
        "  fabgen: 3",
        "          ^",
        "  known here: 1",
    ]
