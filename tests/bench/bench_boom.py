"""How fast a boom's effect is had: `python -m pytest tests/bench/bench_boom.py -s`."""

import resource
import subprocess
import sys
import time

import pytest

from fabgen.physics.boom_closed_form import closed_form_allowance
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.physics.boom_uncertainty import Surroundings

pytestmark = pytest.mark.slow

MHZ = 434.2
MOUNTS = {
    "bonded": BoomMount(Style.BONDED_THROUGH, Section.ROUND, 20, 4, wall_mm=1.5),
    "insulated": BoomMount(Style.INSULATED_THROUGH, Section.SQUARE, 20, 4, wall_mm=1.5, hole_mm=8),
    "on top": BoomMount(Style.ON_TOP, Section.SQUARE, 20, 4, axis_height_mm=6),
}
ONE_SOLVE = """
import resource, time
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.physics.boom_solver import solve_at
start = time.perf_counter()
solve_at(BoomMount(Style.INSULATED_THROUGH, Section.SQUARE, 20, 4, wall_mm=1.5, hole_mm=8), 310, 434.2)
print(time.perf_counter() - start, resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024)
"""


def test_one_solve_at_the_default_mesh() -> None:
    """Under 10 s and 1 GB, the free rods of the match included."""
    run = subprocess.run([sys.executable, "-c", ONE_SOLVE], capture_output=True, text=True, check=True)
    seconds, megabytes = (float(figure) for figure in run.stdout.split())
    print(f"one solve {seconds:.1f} s, {megabytes:.0f} MB")
    assert seconds < 10
    assert megabytes < 1000


@pytest.mark.parametrize("name", MOUNTS)
def test_whole_mount_at_both_meshes(name: str) -> None:
    """Under 60 s."""
    from fabgen.physics.boom_solver import free_rod_mode, solve_allowance

    free_rod_mode.cache_clear()
    start = time.perf_counter()
    solved = solve_allowance(MOUNTS[name], 310, MHZ)
    seconds = time.perf_counter() - start
    difference_percent = 100 * solved.mesh_difference_relative
    print(f"{name}: {solved.allowance_mm:.3f} mm, meshes differ {difference_percent:.2f} %, {seconds:.1f} s")
    assert seconds < 60
    assert resource.getrusage(resource.RUSAGE_SELF).ru_maxrss < 1024 * 1024


def test_ledger_of_fifteen_elements() -> None:
    """Under 5 ms by closed forms."""
    near = Surroundings(end_distance_mm=60, neighbour_distance_mm=120)
    closed_form_allowance(MOUNTS["insulated"], 300, MHZ, near)
    start = time.perf_counter()
    for i in range(15):
        closed_form_allowance(MOUNTS["insulated"], 285 + 3 * i, MHZ, near)
    milliseconds = 1000 * (time.perf_counter() - start)
    print(f"15 elements {milliseconds:.2f} ms")
    assert milliseconds < 5
