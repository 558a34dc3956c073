"""A design of any number of elements for the bench of solids: every 60 mm, all of different lengths."""

from pathlib import Path

_HEAD = """\
fabgen: 1
title: Bench of solids
number: BENCH-{count}
revision: A
frequency: 434 MHz
units: mm
polarisation: horizontal
boom:
  section: square
  outside: 20 mm
  wall: 1.5 mm
  corner_radius: 1 mm
  material: EN AW-6060 T66
  overhang: {{rear: 40 mm, front: 40 mm}}
mounts:
  line:
    style: insulated-through
    hole: 8 mm
    bush: {{kind: shoulder, material: ASA}}
    keeper: {{kind: push-ring, material: ASA}}
    allowance: {{origin: none}}
rods: {{diameter: 4 mm, material: EN AW-6060 T66, finish: bare}}
lengths_are: as-cut
feed: {{kind: straight-dipole, gap: 10 mm, height: 18 mm, cable: 5 mm}}
elements:
"""


def write(count: int, folder: Path) -> Path:
    """Write the design file and return its path."""
    rows = [
        "  - {id: R, role: reflector, at: 0, length: 340}",
        "  - {id: DE, role: driven, at: 60, length: 324, mount: feed}",
    ]
    rows += [
        f"  - {{id: D{i}, role: director, at: {60 * (i + 1)}, length: {310 - i / 2}}}" for i in range(1, count - 1)
    ]
    path = folder / f"bench-{count}.yaml"
    path.write_text(_HEAD.format(count=count) + "\n".join(rows) + "\n", encoding="utf-8")
    return path
