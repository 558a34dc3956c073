"""How fast solids and their files are made, against a plain script: `python -m pytest tests/bench/bench_solids.py -s`.

Both sides are whole processes that read one design file and write the same set of files. `solids_plain.py` drills hole
by hole, builds each part afresh for each place and exports with the library's defaults; `solids_ours.py` goes through
the program's model stage and writers. The limits are ratios, so that they hold on any machine. Only the program also
confirms every near pair by the kernel, as every build does: the whole process includes it, the time of the same files
does not, and the bench shows both.
"""

import json
import math
import os
import resource
import runpy
import subprocess
import sys
from dataclasses import dataclass
from pathlib import Path

import pytest

pytestmark = pytest.mark.slow

HERE = Path(__file__).parent
WHOLE, WITHOUT_IMPORTS, EXPONENT = 6.0, 15.0, 1.2


@dataclass(frozen=True)
class Run:
    """One process: processor seconds as a whole, of its files without imports, of confirming, and what it wrote."""

    whole_s: float
    work_s: float
    confirming_s: float
    places: int
    files: dict[str, int]


def run(script: str, design: Path, folder: Path) -> Run:
    """Processor time is compared: it stays the same when the machine has other work, and the kernel's threads count."""
    folder.mkdir()
    before = resource.getrusage(resource.RUSAGE_CHILDREN)
    environment = os.environ | {"PYTHONPATH": str(HERE.parents[1])}
    done = subprocess.run(
        [sys.executable, str(HERE / script), str(design), str(folder)],
        env=environment, capture_output=True, text=True, check=True,
    )  # fmt: skip
    after = resource.getrusage(resource.RUSAGE_CHILDREN)
    whole = after.ru_utime + after.ru_stime - before.ru_utime - before.ru_stime
    said = json.loads(done.stdout.splitlines()[-1])
    return Run(whole, said["seconds"], said.get("confirming", 0.0), said["places"], said["files"])


def design_of(count: int, folder: Path) -> Path:
    return runpy.run_path(str(HERE / "solids_design.py"))["write"](count, folder)


def show(name: str, measured: Run) -> None:
    print(
        f"{name}: whole process {measured.whole_s:.2f} s, without imports {measured.work_s:.2f} s, "
        f"confirming {measured.confirming_s:.2f} s; {measured.places} places"
    )
    print("  writes " + ", ".join(f"{file} {size / 1e3:.0f} kB" for file, size in measured.files.items()))


def least(runs: list[Run]) -> Run:
    """The run that the machine disturbed least."""
    return min(runs, key=lambda each: each.whole_s)


def test_against_a_plain_script(tmp_path):
    """The two sides take turns, so that a slow minute of the machine falls on both."""
    design = design_of(80, tmp_path)
    ours, plain = [], []
    for i in range(3):
        ours.append(run("solids_ours.py", design, tmp_path / f"ours-{i}"))
        if i < 2:
            plain.append(run("solids_plain.py", design, tmp_path / f"plain-{i}"))
    ours, plain = least(ours), least(plain)
    print()
    show("fabgen, 80 elements", ours)
    show("plain script, 80 elements", plain)
    whole, work = plain.whole_s / ours.whole_s, plain.work_s / ours.work_s
    print(f"ratio: whole process {whole:.1f}; without imports, the same files {work:.1f}")
    print(f"without imports, the confirmation on top {plain.work_s / (ours.work_s + ours.confirming_s):.1f}")
    assert set(ours.files) == set(plain.files)
    assert ours.places == plain.places
    assert whole >= WHOLE
    assert work >= WITHOUT_IMPORTS


def test_growth_with_the_number_of_elements(tmp_path):
    times = {}
    for count in (40, 200):
        runs = [run("solids_ours.py", design_of(count, tmp_path), tmp_path / f"{count}-{i}") for i in range(3)]
        times[count] = min(each.work_s + each.confirming_s for each in runs)
        show(f"fabgen, {count} elements", runs[-1])
    exponent = math.log(times[200] / times[40]) / math.log(5)
    print(f"from 40 to 200 elements the time grows as N^{exponent:.2f}")
    assert exponent <= EXPONENT
