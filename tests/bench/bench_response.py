"""What the answer to a design takes: `python -m pytest tests/bench/bench_response.py -s`.

Twelve rods with limits, 2,000 builds tried at 16 frequencies, against as many bare solves of the array in the same run.
"""

import time
from dataclasses import replace
from pathlib import Path

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.check.response.allot import SAMPLES
from fabgen.check.response.arrays import drawn_array
from fabgen.check.response.respond import respond
from fabgen.correct.ledger import correct
from fabgen.design.electrical_case import electrical_case
from fabgen.physics.array import solve_array
from fabgen.read.reader import read_design

pytestmark = pytest.mark.slow

BARE = 200
FREQUENCIES = 16


def test_two_thousand_builds_at_sixteen_frequencies(root: Path) -> None:
    design = read_design(root / "designs/river-gauge-434.yaml").design
    case = electrical_case(arrange(design, correct(design)))
    assert case is not None
    drawn = drawn_array(case)
    respond(replace(case, frequency_mhz=434.1))
    start = time.process_time()
    for _ in range(BARE):
        solve_array(drawn, 434.0)
    bare_s = (time.process_time() - start) / BARE
    start = time.process_time()
    response = respond(case)
    whole_s = time.process_time() - start
    print(f"\n{response.spread.samples} builds: {whole_s:.2f} s, a bare solve {1e3 * bare_s:.2f} ms")
    assert response.spread.samples == SAMPLES
    assert whole_s < 0.15 * SAMPLES * FREQUENCIES * bare_s
