"""STEP files read back by the kernel's own reader: names, places, colours, holes; and the same bytes every time."""

import hashlib
import os
import subprocess
import sys

import cadquery as cq
import numpy as np
import pytest
from OCP.Quantity import Quantity_Color, Quantity_TOC_sRGB
from OCP.STEPCAFControl import STEPCAFControl_Reader
from OCP.TCollection import TCollection_ExtendedString
from OCP.TDataStd import TDataStd_Name
from OCP.TDF import TDF_Label, TDF_LabelSequence
from OCP.TDocStd import TDocStd_Document
from OCP.XCAFDoc import XCAFDoc_ColorSurf, XCAFDoc_DocumentTool

from fabgen.design.arranged import Frame
from fabgen.design.solids import AssemblyItem, Mesh, Product
from fabgen.export import step
from fabgen.model.parts.boom import boom
from fabgen.model.parts.bush import bush
from fabgen.model.parts.rod import rod

HOLES = ((40, 90, 1.5, 8), (40, 270, 1.5, 8), (100, 90, 0, 8), (100, 270, 0, 8), (120, 0, -3, 3.3), (130, 180, 2, 4.2))
LEFT, RIGHT = (0.0, 1.0, 0.0), (0.0, -1.0, 0.0)
NO_MESH = Mesh(np.empty((0, 3)), np.empty((0, 3), int))


def product(name, part, colour):
    return Product(name, part.val(), NO_MESH, colour)


def sample(rods=2):
    """A boom with its rods and bushes, placed by hand."""
    tube = product("boom 20 x 20 x 1.5", boom(length_mm=160, holes=HOLES), (0.6, 0.7, 0.72))
    collar = product("bush rod 4 hole 8", bush(), (0.9, 0.5, 0.1))
    items = [AssemblyItem("boom", tube, Frame())]
    for i in range(rods):
        x = 40.0 + 60 * i
        bar = product(f"rod 4 x {300 - 10 * i}", rod(length_mm=300 - 10 * i), (0.84, 0.85, 0.86))
        items += [
            AssemblyItem(f"D{i} rod", bar, Frame((x, 0, 0), z=LEFT)),
            AssemblyItem(f"D{i} bush +y", collar, Frame((x, 10, 0), z=LEFT)),
            AssemblyItem(f"D{i} bush -y", collar, Frame((x, -10, 0), z=RIGHT)),
        ]
    return items


def name_of(label):
    name = TDataStd_Name()
    return name.Get().ToExtString() if label.FindAttribute(TDataStd_Name.GetID_s(), name) else None


def labels(sequence):
    return [sequence.Value(i) for i in range(1, sequence.Length() + 1)]


def read(data, folder):
    """(name of the whole, [(occurrence, part, colour, placed shape)])."""
    path = folder / "read.step"
    path.write_bytes(data)
    document = TDocStd_Document(TCollection_ExtendedString("XmlOcaf"))
    reader = STEPCAFControl_Reader()
    reader.SetNameMode(True)
    reader.SetColorMode(True)
    reader.ReadFile(str(path))
    assert reader.Transfer(document)
    shapes = XCAFDoc_DocumentTool.ShapeTool_s(document.Main())
    colours = XCAFDoc_DocumentTool.ColorTool_s(document.Main())
    free = TDF_LabelSequence()
    shapes.GetFreeShapes(free)
    (whole,) = labels(free)
    places = TDF_LabelSequence()
    shapes.GetComponents_s(whole, places)
    found = []
    for place in labels(places):
        part = TDF_Label()
        assert shapes.GetReferredShape_s(place, part)
        colour = Quantity_Color()
        assert colours.GetColor(shapes.GetShape_s(part), XCAFDoc_ColorSurf, colour)
        rgb = tuple(round(value, 4) for value in colour.Values(Quantity_TOC_sRGB))
        found.append((name_of(place), name_of(part), rgb, cq.Shape.cast(shapes.GetShape_s(place))))
    return name_of(whole), found


def test_names_and_colours_are_read_back(tmp_path):
    whole, found = read(step.assembly_bytes(sample(), name="RGL-434-06_A"), tmp_path)
    assert whole == "RGL-434-06_A"
    assert [(name, part) for name, part, _, _ in found] == [
        ("boom", "boom 20 x 20 x 1.5"),
        ("D0 rod", "rod 4 x 300"),
        ("D0 bush +y", "bush rod 4 hole 8"),
        ("D0 bush -y", "bush rod 4 hole 8"),
        ("D1 rod", "rod 4 x 290"),
        ("D1 bush +y", "bush rod 4 hole 8"),
        ("D1 bush -y", "bush rod 4 hole 8"),
    ]
    assert {part: colour for _, part, colour, _ in found} == {
        "boom 20 x 20 x 1.5": (0.6, 0.7, 0.72),
        "rod 4 x 300": (0.84, 0.85, 0.86),
        "rod 4 x 290": (0.84, 0.85, 0.86),
        "bush rod 4 hole 8": (0.9, 0.5, 0.1),
    }


def test_every_place_is_where_it_was_put(tmp_path):
    items = sample()
    _, found = read(step.assembly_bytes(items, name="A"), tmp_path)
    for item, (_, _, _, shape) in zip(items, found, strict=True):
        local = item.product.solid.Center().toTuple()
        assert shape.Center().toTuple() == pytest.approx(item.frame.point(local), abs=1e-6)
        assert shape.Volume() == pytest.approx(item.product.solid.Volume(), rel=1e-9)
        assert len(shape.Solids()) == 1


def test_holes_are_read_back_from_the_step_file(tmp_path):
    """Axis, centre on the wall and diameter of each row to 0.001 mm."""
    _, found = read(step.assembly_bytes(sample(), name="A"), tmp_path)
    (tube,) = [shape for name, _, _, shape in found if name == "boom"]
    seen = []
    for face in tube.Faces():
        if face.geomType() == "CYLINDER" and abs(face._geomAdaptor().Cylinder().Axis().Direction().X()) < 0.5:
            cylinder = face._geomAdaptor().Cylinder()
            centre = face.Center()
            axis = cylinder.Axis().Location()
            on_y = abs(centre.z - axis.Z()) < 1 and abs(centre.y) > 8
            wall = ("+y" if centre.y > 0 else "-y") if on_y else ("+z" if centre.z > 0 else "-z")
            seen.append((axis.X(), wall, axis.Z() if on_y else axis.Y(), 2 * cylinder.Radius()))
    walls = {90: "+y", 270: "-y", 0: "+z", 180: "-z"}
    expected = [(station, walls[angle], across, diameter) for station, angle, across, diameter in HOLES]
    assert len(seen) == len(expected)
    for got, want in zip(sorted(seen), sorted(expected), strict=True):
        assert got[1] == want[1]
        assert (got[0], *got[2:]) == pytest.approx((want[0], *want[2:]), abs=0.001)


def test_parts_are_written_once_and_without_curves_on_surfaces():
    text = step.assembly_bytes(sample(rods=6), name="A").decode("ascii")
    assert text.count("MANIFOLD_SOLID_BREP(") == 8
    assert text.count("NEXT_ASSEMBLY_USAGE_OCCURRENCE(") == 19
    assert "PCURVE" not in text
    assert "SURFACE_CURVE" not in text


def test_no_clock_and_no_kernel_talk_in_the_header(capfd):
    text = step.assembly_bytes(sample(), name="O'Neil").decode("ascii")
    assert "FILE_NAME('O''Neil','',(''),(''),'fabgen','fabgen','');" in text
    assert capfd.readouterr() == ("", "")


def test_same_bytes_twice_in_one_process():
    """The kernel counts occurrences over the whole process and breaks lines by length; neither may show."""
    items = sample(rods=6)
    first = step.assembly_bytes(items, name="A")
    for _ in range(3):
        assert step.assembly_bytes(items, name="A") == first
    assert step.assembly_bytes(sample(rods=6), name="A") == first


PROGRAM = """
import hashlib, importlib.util, sys
spec = importlib.util.spec_from_file_location("sample", sys.argv[1])
sample = importlib.util.module_from_spec(spec)
spec.loader.exec_module(sample)
print(hashlib.sha256(sample.step.assembly_bytes(sample.sample(rods=6), name="A")).hexdigest())
"""


@pytest.mark.slow
def test_same_bytes_in_other_processes(root):
    here = hashlib.sha256(step.assembly_bytes(sample(rods=6), name="A")).hexdigest()
    for seed in ("1", "2"):
        environment = os.environ | {"PYTHONHASHSEED": seed, "PYTHONPATH": str(root)}
        run = subprocess.run(
            [sys.executable, "-c", PROGRAM, __file__], env=environment, capture_output=True, text=True, check=True
        )
        assert run.stdout.strip() == here


def test_single_part(tmp_path):
    data = step.part_bytes(product("bush rod 4 hole 8", bush(), (0.9, 0.5, 0.1)))
    path = tmp_path / "bush.step"
    path.write_bytes(data)
    shape = cq.importers.importStep(str(path)).val()
    assert shape.Volume() == pytest.approx(bush().val().Volume(), rel=1e-9)
    assert b"PRODUCT('bush rod 4 hole 8'" in data
    assert data == step.part_bytes(product("bush rod 4 hole 8", bush(), (0.9, 0.5, 0.1)))
