"""Designs of any number of elements, for tests of size and speed."""

HEAD = """fabgen: 1
title: Many elements
number: MANY-{count}
revision: A
frequency: 1296.2 MHz
units: mm
boom:
  section: square
  outside: 12 mm
  wall: 1.5 mm
  corner_radius: 1 mm
  material: EN AW-6060 T66
  overhang: {{rear: 110 mm, front: 30 mm}}
mounts:
  line:
    style: insulated-through
    hole: 4.8 mm
    bush: {{kind: shoulder, material: POM-C}}
    keeper: {{kind: push-ring, material: POM-C}}
    allowance: {{origin: published, model: dl6wu}}
rods: {{diameter: 2 mm, material: EN AW-6060 T66}}
elements:
"""
FEED = """feed: {kind: straight-dipole, gap: 6 mm, height: 16 mm, cable: 3 mm}
shop: {stock: {rod: 2 m, boom: 12 m}}
"""


def design_text(count: int) -> str:
    """A design file with `count` elements, most of them directors 55 mm apart."""
    rows = [
        "  - {id: R, role: reflector, at: 0, length: 111.0}",
        "  - {id: DE, role: driven, at: 46.0, length: 106.0, mount: feed, diameter: 4 mm}",
    ]
    for k in range(1, count - 1):
        length = 101.0 - 6.0 * (1 - 0.97**k)
        rows.append(f"  - {{id: D{k}, role: director, at: {46.0 + 55.0 * k:.1f}, length: {length:.2f}}}")
    return HEAD.format(count=count) + "\n".join(rows) + "\n" + FEED
