"""Commands that only read and judge start at once: they load no kernel, mesh, drawing or array library."""

import json
import subprocess
import sys
from pathlib import Path

import pytest

pytestmark = pytest.mark.house

DRAWING = ["matplotlib", "PIL", "ezdxf", "typst", "svgwrite", "jinja2"]
HEAVY = ["cadquery", "OCP", "vtk", "vtkmodules", "trimesh", "lib3mf", "numpy", "scipy", *DRAWING]
DESIGNS = sorted((Path(__file__).resolve().parents[2] / "designs").glob("*.yaml"))

# Runs one command in a fresh interpreter, then says how it ended and which heavy libraries are loaded.
RUN = """
import json, sys
heavy, sys.argv = json.loads(sys.argv[1]), ["fabgen", *sys.argv[2:]]
code = 0
try:
    from fabgen.cli.main import main
    main()
except SystemExit as stop:
    code = stop.code or 0
print("\\n" + json.dumps([code, sorted(set(heavy) & set(sys.modules))]))
"""


def ran(root: Path, where: Path, *arguments: str) -> tuple[int, list[str]]:
    """Exit code of one command and the heavy libraries it loaded."""
    done = subprocess.run(
        [sys.executable, "-c", RUN, json.dumps(HEAVY), *arguments],
        cwd=where,
        env={"PYTHONPATH": str(root), "PATH": "", "LC_ALL": "C.UTF-8"},
        capture_output=True,
        text=True,
        check=False,
    )
    assert done.returncode == 0, done.stderr
    code, loaded = json.loads(done.stdout.splitlines()[-1])
    return code, loaded


@pytest.mark.parametrize("design", DESIGNS, ids=lambda path: path.stem)
def test_check_is_light(root: Path, tmp_path: Path, design: Path) -> None:
    assert ran(root, tmp_path, "check", str(design)) == (0, [])


@pytest.mark.parametrize(
    "arguments",
    [("--help",), ("schema",), ("explain", "H03"), ("new", "trial"), ("build", "--help")],
    ids=lambda arguments: arguments[0].lstrip("-") + ("-help" if arguments[-1] == "--help" else ""),
)
def test_talk_is_light(root: Path, tmp_path: Path, arguments: tuple[str, ...]) -> None:
    assert ran(root, tmp_path, *arguments) == (0, [])


def test_show_is_light(root: Path, tmp_path: Path) -> None:
    assert ran(root, tmp_path, "check", "--show", str(DESIGNS[0])) == (0, [])


def test_there_are_designs_to_try() -> None:
    assert DESIGNS


def test_a_heavy_library_would_be_seen(root: Path, tmp_path: Path) -> None:
    (tmp_path / "sitecustomize.py").write_text("import numpy\n")
    done = subprocess.run(
        [sys.executable, "-c", RUN, json.dumps(HEAVY), "--help"],
        env={"PYTHONPATH": f"{tmp_path}:{root}", "PATH": "", "LC_ALL": "C.UTF-8"},
        capture_output=True,
        text=True,
        check=False,
    )
    assert done.returncode == 0, done.stderr
    assert "numpy" in json.loads(done.stdout.splitlines()[-1])[1]
