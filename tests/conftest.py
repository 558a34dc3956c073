"""What every test shares: the flag that accepts goldens, one thread for linear algebra, laws that repeat exactly."""

import os
from collections.abc import Callable
from pathlib import Path

import hypothesis
import pytest

from fabgen.design.design import Design
from fabgen.read.reader import read_design

for _threads in ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS", "MKL_NUM_THREADS"):
    os.environ.setdefault(_threads, "1")

# The same examples on every machine, and no failure because a shared machine was busy.
hypothesis.settings.register_profile("repeatable", derandomize=True, deadline=None, database=None)
hypothesis.settings.load_profile("repeatable")

ROOT = Path(__file__).resolve().parent.parent


def pytest_addoption(parser: pytest.Parser) -> None:
    parser.addoption(
        "--accept-goldens",
        action="store_true",
        help="write the goldens from this run instead of comparing; read the difference before committing it",
    )


@pytest.fixture(scope="session")
def accept_goldens(request: pytest.FixtureRequest) -> bool:
    """True when this run rewrites the goldens."""
    return bool(request.config.getoption("--accept-goldens"))


@pytest.fixture(scope="session")
def root() -> Path:
    """The top folder of the tree."""
    return ROOT


@pytest.fixture
def variant(tmp_path: Path) -> Callable[..., Design]:
    """The river-gauge demo design with pieces of its text replaced, read."""

    def read(*replacements: tuple[str, str], base: str = "river-gauge-434.yaml") -> Design:
        text = (ROOT / "designs" / base).read_text(encoding="utf-8")
        for old, new in replacements:
            assert old in text, f"{old!r} is not in {base}"
            text = text.replace(old, new)
        path = tmp_path / base
        path.write_text(text, encoding="utf-8")
        for table in (ROOT / "designs").glob("*.csv"):
            (tmp_path / table.name).write_bytes(table.read_bytes())
        return read_design(path).design

    return read
