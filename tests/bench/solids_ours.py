"""The program's way: `python solids_ours.py DESIGN FOLDER` writes the same files as `solids_plain.py`.

Prints the processor seconds without imports and reading, those that the kernel's confirmation of all near pairs takes
on top, and what it wrote.
"""

import json
import sys
import time
from importlib import import_module
from pathlib import Path

from fabgen import registry
from fabgen.arrange.arrange import arrange
from fabgen.check.pairs import near_pairs
from fabgen.correct.ledger import correct
from fabgen.export import glb, step, stl, threemf
from fabgen.model.assembly import assembly
from fabgen.model.confirm import confirm
from fabgen.model.prints import prints
from fabgen.read.reader import read_design


def main(design: Path, folder: Path) -> None:
    read = read_design(design).design
    arranged = arrange(read, correct(read))
    for placed in arranged.placed:
        registry.entry("model/parts", placed.part).function()
    import_module("trimesh")  # after the kernel, as in a build; its import is not part of the work
    start = time.process_time()
    items = assembly(arranged)
    (folder / "assembly.step").write_bytes(step.assembly_bytes(items, name=arranged.design.name))
    (folder / "assembly.glb").write_bytes(glb.assembly_bytes(items, name=arranged.design.name))
    for count, printed in enumerate(prints(arranged)):
        for ending, writer in (("stl", stl), ("3mf", threemf), ("step", step)):
            (folder / f"print-{count}.{ending}").write_bytes(writer.part_bytes(printed.product))
    seconds = time.process_time() - start
    confirm(near_pairs(arranged))
    confirming = time.process_time() - start - seconds
    files = {path.name: path.stat().st_size for path in sorted(folder.iterdir())}
    print(json.dumps({"seconds": seconds, "confirming": confirming, "places": len(arranged.placed), "files": files}))


if __name__ == "__main__":
    main(Path(sys.argv[1]), Path(sys.argv[2]))
