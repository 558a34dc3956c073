"""Every printed part and fixture of a demo design through a slicer, when one is installed."""

import functools
import math
import re
import shutil
import subprocess
from pathlib import Path

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.arrange.fixtures import fixtures
from fabgen.correct.ledger import correct
from fabgen.export import stl, threemf
from fabgen.model import prints
from fabgen.model.kernel import bounds_mm, cq
from fabgen.read.reader import read_design

SLICER = "prusa-slicer"
LAYER_MM = 0.2
DESIGN = sorted((Path(__file__).resolve().parents[2] / "designs").glob("*.yaml"))[0]
pytestmark = [
    pytest.mark.slow,
    pytest.mark.skipif(shutil.which(SLICER) is None, reason=f"no {SLICER} on this machine to slice the prints with"),
]
SETTINGS = (
    f"--nozzle-diameter=0.4 --layer-height={LAYER_MM} --first-layer-height={LAYER_MM} --perimeters=2 --skirts=0 "
    "--fill-density=10% --bed-shape=0x0,220x0,220x220,0x220 --center=110,110 --loglevel=2"
).split()


@functools.cache
def printed():
    design = read_design(DESIGN).design
    array = arrange(design, correct(design))
    return (*prints.prints(array), *prints.fixture_prints(fixtures(array)))


def layers_of(data, name, folder):
    """Heights of the layers in which material is laid, and the width and depth of what is laid."""
    source, target = folder / name, folder / "print.gcode"
    source.write_bytes(data)
    run = subprocess.run(
        [SLICER, "--export-gcode", *SETTINGS, "--output", str(target), str(source)],
        capture_output=True,
        text=True,
        check=False,
        timeout=300,
    )
    assert run.returncode == 0, run.stderr
    assert not re.search(r"error|empty layer|no extrusions|out of bounds", run.stdout + run.stderr, re.IGNORECASE)
    return [float(height) for height in re.findall(r"^;Z:([\d.]+)$", target.read_text(), re.MULTILINE)]


def test_every_print_slices_into_all_its_layers(tmp_path):
    for each in printed():
        heights = layers_of(stl.part_bytes(each.product), f"{each.stem}.stl", tmp_path)
        top = bounds_mm(cq.Workplane(each.product.solid))[1][2]
        assert heights == pytest.approx([LAYER_MM * (i + 1) for i in range(len(heights))], abs=1e-6), each.stem
        assert abs(len(heights) - top / LAYER_MM) <= 1, each.stem


def test_the_slicer_reads_3mf_in_millimetres(tmp_path):
    each = min(printed(), key=lambda item: item.product.solid.Volume())
    heights = layers_of(threemf.part_bytes(each.product), f"{each.stem}.3mf", tmp_path)
    top = bounds_mm(cq.Workplane(each.product.solid))[1][2]
    assert math.isclose(len(heights) * LAYER_MM, top, abs_tol=LAYER_MM)
