"""The plain way with the same numbers: `python solids_plain.py DESIGN FOLDER` writes solids as a first script would.

Drills hole by hole, builds each part afresh for each place, gathers them in the library's assembly, exports with the
defaults. Prints the processor seconds without imports and reading, then what it wrote.
"""

import json
import sys
import time
from pathlib import Path

import cadquery as cq

from fabgen import registry
from fabgen.arrange.arrange import arrange
from fabgen.correct.ledger import correct
from fabgen.read.reader import read_design

MAKERS = {}


def drilled(*, section, width_mm, height_mm, wall_mm, corner_radius_mm, length_mm, holes):
    """The boom: an extruded tube, then one cut per hole."""
    assert section == "square"
    tube = cq.Workplane("YZ").rect(width_mm, height_mm).extrude(length_mm).edges("|X").fillet(corner_radius_mm)
    tube = tube.cut(cq.Workplane("YZ").rect(width_mm - 2 * wall_mm, height_mm - 2 * wall_mm).extrude(length_mm))
    for station, angle, across, diameter in holes:
        drill = cq.Workplane("XY").center(station, across).circle(diameter / 2).extrude(height_mm)
        tube = tube.cut(drill.rotate((0, 0, 0), (1, 0, 0), -angle))
    return tube


def built(placed):
    """One part, from scratch."""
    if placed.part == "boom":
        return drilled(**dict(placed.parameters))
    return MAKERS[placed.part](**dict(placed.parameters))


def main(design: Path, folder: Path) -> None:
    read = read_design(design).design
    arranged = arrange(read, correct(read))
    for part in {placed.part for placed in arranged.placed}:
        MAKERS[part] = registry.entry("model/parts", part).function()
    start = time.process_time()
    assembly = cq.Assembly(name=arranged.design.name)
    printed = {}
    for placed in arranged.placed:
        part = built(placed)
        plane = cq.Plane(origin=placed.frame.origin, xDir=placed.frame.x, normal=placed.frame.z)
        grey = cq.Color(0.8, 0.8, 0.8) if placed.metal else cq.Color(0.9, 0.5, 0.1)
        assembly.add(part, name=placed.name, loc=cq.Location(plane), color=grey)
        if placed.source == "printed":
            printed.setdefault(placed.key, placed)
    assembly.export(str(folder / "assembly.step"))
    assembly.export(str(folder / "assembly.glb"))
    for count, placed in enumerate(printed.values()):
        part = registry.entry("model/parts", placed.part).function("print_pose")(built(placed))
        for ending in ("stl", "3mf", "step"):
            cq.exporters.export(part, str(folder / f"print-{count}.{ending}"))
    seconds = time.process_time() - start
    files = {path.name: path.stat().st_size for path in sorted(folder.iterdir())}
    print(json.dumps({"seconds": seconds, "places": len(arranged.placed), "files": files}))


if __name__ == "__main__":
    main(Path(sys.argv[1]), Path(sys.argv[2]))
