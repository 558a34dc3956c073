"""What every test shares: the flag that accepts goldens, and one thread per process for linear algebra."""

import os
from pathlib import Path

import pytest

for _threads in ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS", "MKL_NUM_THREADS"):
    os.environ.setdefault(_threads, "1")

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
