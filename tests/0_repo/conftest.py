"""What the house rules read: the tracked files, and the syntax tree of every module of the package."""

import ast
import subprocess
from pathlib import Path

import pytest


@pytest.fixture(scope="session")
def tracked(root: Path) -> tuple[str, ...]:
    """Every file under version control that is still there, as a path from the top folder."""
    listed = subprocess.run(
        ["git", "ls-files", "-z"], cwd=root, check=True, capture_output=True, text=True
    ).stdout.split("\0")
    return tuple(name for name in listed if name and (root / name).is_file())


@pytest.fixture(scope="session")
def texts(root: Path, tracked: tuple[str, ...]) -> dict[str, str]:
    """The tracked files that are text, by path."""
    found = {}
    for name in tracked:
        data = (root / name).read_bytes()
        if b"\0" not in data:
            found[name] = data.decode("utf-8")
    return found


@pytest.fixture(scope="session")
def modules(root: Path) -> dict[str, ast.Module]:
    """The syntax tree of every module of the package, by its path inside fabgen/."""
    package = root / "fabgen"
    return {
        path.relative_to(package).as_posix(): ast.parse(path.read_text(encoding="utf-8"))
        for path in sorted(package.rglob("*.py"))
    }
