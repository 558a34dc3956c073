"""Defaults that must hold: a clip snaps on within 2 % strain and stays, a spigot reaches through a round wall."""

import math
from pathlib import Path

import pytest

from fabgen.check.rules.keeper_grip import strain_percent
from fabgen.design.design import Design
from fabgen.design.keeper_sizes import snap_keeper_size
from fabgen.read.reader import read_design

TEXT = """fabgen: 1
title: T
number: T-1
frequency: 434 MHz
units: mm
boom: {{section: {section}, outside: 25, wall: {wall}, material: EN AW-6060 T66, overhang: {{rear: 80, front: 80}}}}
mounts:
  m: {{style: insulated-through, bush: {{kind: shoulder}}, keeper: {{kind: {keeper}}}}}
rods: {{diameter: {rod}, material: EN AW-6060 T66}}
elements:
  - {{id: R, role: reflector, at: 0, length: 340}}
  - {{id: DE, role: driven, at: 138, length: 322, mount: feed}}
feed: {{kind: straight-dipole, rod: 4 mm}}
"""


def read(tmp_path: Path, *, section: str = "square", wall: float = 1.5, keeper: str = "snap", rod: float = 4) -> Design:
    path = tmp_path / "t.yaml"
    path.write_text(TEXT.format(section=section, wall=wall, keeper=keeper, rod=rod), encoding="utf-8")
    return read_design(path).design


@pytest.mark.parametrize("rod", [1.6, 2, 2.5, 3, 3.2, 4, 5, 6, 6.35, 8, 10])
def test_a_clip_left_to_the_program_snaps_on_and_stays(tmp_path: Path, rod: float) -> None:
    mount = read(tmp_path, rod=rod).element("R").mount
    assert mount is not None
    assert mount.keeper is not None
    percent = strain_percent(mount.keeper, rod)
    assert percent is not None
    assert 0 < percent <= 2.0
    clip = snap_keeper_size(
        rod_diameter_mm=rod, bore_mm=mount.keeper.bore_mm, outside_diameter_mm=mount.keeper.outside_mm
    )
    assert clip.mouth_mm < clip.bore_mm < rod
    assert mount.keeper.outside_mm >= rod + 1.2 - 1e-9


def test_a_spigot_reaches_through_a_round_wall(tmp_path: Path) -> None:
    """At the side of the hole the wall of a 25 × 1.5 tube ends at 12.5 − √(11² − (h/2)²) below the crown."""
    mount = read(tmp_path, section="round").element("R").mount
    assert mount is not None
    assert mount.bush is not None
    through_mm = 12.5 - math.sqrt(11**2 - (mount.hole_mm / 2) ** 2)
    assert through_mm + 1.0 <= mount.bush.spigot_length_mm <= through_mm + 1.1 + 1e-9
    flat = read(tmp_path, section="square").element("R").mount
    assert flat is not None
    assert flat.bush is not None
    assert flat.bush.spigot_length_mm == 2.5
