"""README and DEVELOPERS keep their promises: two commands that run as they stand, a decision for every dependency."""

import re
import subprocess
import sys
import tomllib
from pathlib import Path
from typing import Any

import pytest

pytestmark = pytest.mark.house

STAGES = {"read", "correct", "arrange", "check", "draw", "model", "export", "book", "design", "physics", "stock"}
SPINE = {"cadquery", "numpy", "pyyaml", "trimesh", "svgwrite"}


@pytest.fixture(scope="module")
def readme(root: Path) -> str:
    return (root / "README.md").read_text(encoding="utf-8")


@pytest.fixture(scope="module")
def developers(root: Path) -> str:
    return (root / "DEVELOPERS.md").read_text(encoding="utf-8")


@pytest.fixture(scope="module")
def project(root: Path) -> dict[str, Any]:
    return tomllib.loads((root / "pyproject.toml").read_text(encoding="utf-8"))["project"]


def requirement_names(project: dict[str, Any]) -> set[str]:
    """Every library that the project or one of its extras asks for."""
    lines = [*project["dependencies"], *(line for extra in project["optional-dependencies"].values() for line in extra)]
    return {re.match(r"[\w.-]+", line)[0].lower() for line in lines}


def fences(text: str) -> list[tuple[str, str]]:
    """Language and content of every fenced block."""
    return re.findall(r"^```(\w*)\n(.*?)^```$", text, re.MULTILINE | re.DOTALL)


def test_first_block_installs_and_builds(root: Path, readme: str) -> None:
    language, block = fences(readme)[0]
    assert language == "sh"
    assert "venv" in block
    assert "-c constraints.txt" in block
    design = re.search(r"fabgen build (designs/\S+\.yaml)", block)
    assert design
    assert (root / design[1]).is_file()


def test_second_block_runs_the_quick_suite(readme: str) -> None:
    language, block = fences(readme)[1]
    assert language == "sh"
    assert "-c constraints.txt" in block
    assert "test]" in block
    assert re.search(r"pytest .*-m ['\"]not slow['\"]", block)


def test_system_packages_stand_above_the_blocks(readme: str) -> None:
    above = readme.partition("```sh")[0]
    line = re.search(r"`apt-get install [^`]+`", above)
    assert line
    assert {"python3", "python3-venv", "libgl1", "git"} <= set(line[0].strip("`").split())


def test_files_that_the_documents_name_exist(root: Path, readme: str, developers: str) -> None:
    pictures = re.findall(r"!\[[^\]]+\]\(([^)]+)\)", readme)
    assert len(pictures) >= 2
    links = re.findall(r"\]\(([\w./-]+)\)", readme + developers)
    named = re.findall(r"`((?:fabgen|tests|designs)/[\w./-]+\.\w+)`", readme + developers)
    short = [f"fabgen/{path}" for path in re.findall(r"`(\w+/[\w/]+\.py)`", developers) if path.split("/")[0] in STAGES]
    assert len(short) >= 8
    assert [path for path in {*links, *named, *short} if not (root / path).is_file()] == []


def test_the_design_in_the_readme_is_clear(root: Path, tmp_path: Path, readme: str) -> None:
    text = next(block for language, block in fences(readme) if language == "yaml")
    design = tmp_path / "readme.yaml"
    design.write_text(text, encoding="utf-8")
    done = subprocess.run(
        [sys.executable, "-m", "fabgen", "check", str(design)], cwd=root, capture_output=True, text=True, check=False
    )
    assert done.returncode == 0, done.stdout + done.stderr


def test_every_command_is_in_the_readme(readme: str) -> None:
    for command in ("check", "build", "schema", "new", "explain", "coupon", "record", "solve", "inspect"):
        assert f"fabgen {command}" in readme


def test_decisions_are_numbered_and_say_what_they_cost(developers: str) -> None:
    log = developers.partition("## Decision log")[2].partition("\n## ")[0]
    rows = [
        [cell.strip() for cell in row.strip("|").split("|")] for row in re.findall(r"^\| *\d.*$", log, re.MULTILINE)
    ]
    assert [int(row[0]) for row in rows] == list(range(1, len(rows) + 1))
    assert {len(row) for row in rows} == {4}
    assert all(len(cell) > 3 for row in rows for cell in row[1:])


def test_every_dependency_has_its_decision(developers: str, project: dict[str, Any]) -> None:
    log = developers.partition("## Decision log")[2].partition("\n## ")[0].lower()
    assert [name for name in sorted(requirement_names(project) - SPINE) if f"`{name}`" not in log] == []


def test_every_dependency_is_pinned(root: Path, project: dict[str, Any]) -> None:
    pins = (root / "constraints.txt").read_text(encoding="utf-8").lower().splitlines()
    pinned = {line.partition("==")[0] for line in pins if not line.startswith("#")}
    assert all("==" in line for line in pins if not line.startswith("#"))
    assert requirement_names(project) <= pinned


def test_the_version_has_one_source(root: Path, project: dict[str, Any]) -> None:
    from fabgen import __version__

    assert project["dynamic"] == ["version"]
    assert f"## {__version__}" in (root / "CHANGELOG.md").read_text(encoding="utf-8")


def test_fences_are_found() -> None:
    assert fences("a\n```sh\nls\n```\n```yaml\nx: 1\n```\n") == [("sh", "ls\n"), ("yaml", "x: 1\n")]
