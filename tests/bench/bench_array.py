"""How fast arrays are solved, as ratios within one run: `python -m pytest tests/bench/bench_array.py -s`.

Ratios against a general moment-method library at 21 segments need the extra `reference`; the others always run.
"""

import csv
import runpy
import time
from collections.abc import Callable
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from fabgen.physics.array import LIGHT_MM_MHZ, RodArray, solve_array
from fabgen.physics.array_gradient import solve_gradient
from fabgen.physics.array_sampling import BuildChanges, expand_array, respond

pytestmark = pytest.mark.slow

VALIDATION = Path(__file__).parents[1] / "9_validation"
CENTRE_MHZ = LIGHT_MM_MHZ / 1000


def best_of(repeats: int, job: Callable[[], object]) -> float:
    """Shortest of several runs in seconds, after one to warm up."""
    job()
    times = []
    for _ in range(repeats):
        start = time.perf_counter()
        job()
        times.append(time.perf_counter() - start)
    return min(times)


def reference_array(case: str) -> RodArray:
    """Array of a case of the reference table, at a wavelength of 1000 mm."""
    with (VALIDATION / "data" / "array_reference_rods.csv").open(encoding="utf-8") as file:
        rows = [row for row in csv.DictReader(file) if row["case"] == case]
    return RodArray(
        tuple(float(row["station_mm"]) for row in rows),
        tuple(float(row["length_mm"]) for row in rows),
        tuple(float(row["diameter_mm"]) for row in rows),
        [row["fed"] for row in rows].index("1"),
    )


@pytest.mark.parametrize(("case", "least"), [("twelve d .0058", 10), ("forty d .005", 20)])
def test_against_the_library(case: str, least: float) -> None:
    pytest.importorskip("PyNEC", reason="the extra `reference` is not installed")
    library = runpy.run_path(str(VALIDATION / "array_reference_library.py"))
    rods = library["read_rods"]()[case]
    array = reference_array(case)
    ours = best_of(20, lambda: solve_array(array, CENTRE_MHZ))
    theirs = best_of(3, lambda: library["library_response"](rods, CENTRE_MHZ))
    print(f"\n{case}: {1e3 * ours:.2f} ms, library {1e3 * theirs:.1f} ms, ratio {theirs / ours:.0f}")
    assert theirs >= least * ours


def test_all_gradients_cost_a_few_solves() -> None:
    """Solve with all derivatives at 12 rods within 5 times the bare solve."""
    array = reference_array("twelve d .0058")
    bare = best_of(40, lambda: solve_array(array, CENTRE_MHZ))
    whole = best_of(40, lambda: solve_gradient(array, CENTRE_MHZ))
    print(f"\nsolve {1e3 * bare:.2f} ms, with gradients {1e3 * whole:.2f} ms, ratio {whole / bare:.1f}")
    assert whole <= 5 * bare


def test_sampled_builds_beat_builds_solved_anew() -> None:
    """2,000 builds of 12 rods, expansion included, at least 10 times faster than solved anew."""
    array = reference_array("twelve d .0058")
    rng = np.random.default_rng(12)
    shape = (2000, array.count)
    changes = BuildChanges(rng.uniform(-0.7, 0.7, shape), rng.uniform(-0.7, 0.7, shape), np.zeros(shape))
    expanded = best_of(3, lambda: respond(expand_array(array, CENTRE_MHZ), changes))

    def anew() -> None:
        for build in range(shape[0]):
            lengths_mm = np.add(array.length_mm, changes.length_mm[build])
            stations_mm = np.add(array.station_mm, changes.station_mm[build])
            solve_array(replace(array, length_mm=tuple(lengths_mm), station_mm=tuple(stations_mm)), CENTRE_MHZ)

    start = time.perf_counter()
    anew()
    full = time.perf_counter() - start
    print(f"\n2000 builds: expanded {expanded:.3f} s, solved anew {full:.2f} s, ratio {full / expanded:.0f}")
    assert full >= 10 * expanded


def test_time_per_solve() -> None:
    """Printed for the record; grows slower than the cube of the rods."""
    times = {}
    for count in (3, 12, 40, 80):
        array = RodArray(tuple(250.0 * n for n in range(count)), (430.0,) * count, (5.0,) * count, 0)
        times[count] = best_of(5, lambda array=array: solve_array(array, CENTRE_MHZ))
    print("\n" + ", ".join(f"{count} rods {1e3 * value:.2f} ms" for count, value in times.items()))
    assert times[80] < 8 * times[40] * 1.5
