"""`fabgen check` on 80 elements against importing the three libraries that any command line of its kind loads.

Run with `pytest tests/bench/bench_check.py -s`. Whole processes in turn, processor time, the median of the pairwise
ratios; the limit is 3.
"""

import os
import resource
import statistics
import subprocess
import sys
from pathlib import Path

from tests.many_elements import design_text

LIMIT = 3.0
PAIRS = 9
ROOT = Path(__file__).parents[2]


def seconds(*command: str) -> float:
    """Processor time of a command, user and system."""
    before = resource.getrusage(resource.RUSAGE_CHILDREN)
    environment = os.environ | {"PYTHONPATH": str(ROOT)}
    subprocess.run([sys.executable, *command], check=True, capture_output=True, env=environment)
    after = resource.getrusage(resource.RUSAGE_CHILDREN)
    return after.ru_utime + after.ru_stime - before.ru_utime - before.ru_stime


def test_check_against_its_imports(tmp_path: Path) -> None:
    design = tmp_path / "many.yaml"
    design.write_text(design_text(80), encoding="utf-8")
    check = ("-m", "fabgen", "check", str(design))
    imports = ("-c", "import click, pydantic, yaml")
    seconds(*check)
    seconds(*imports)
    ratios = [seconds(*check) / seconds(*imports) for _ in range(PAIRS)]
    print(f"\ncheck / imports: median {statistics.median(ratios):.2f}, {min(ratios):.2f} to {max(ratios):.2f}")
    assert statistics.median(ratios) < LIMIT
