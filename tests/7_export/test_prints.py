"""Printed parts as STL, 3MF and STEP: closed, heavy enough, in millimetres, named, and the same bytes every time."""

import hashlib
import io
import os
import re
import struct
import subprocess
import sys
import zipfile

import cadquery as cq
import lib3mf
import numpy as np
import pytest
import trimesh

from fabgen import registry
from fabgen.export import step, stl, threemf
from fabgen.model import prints
from fabgen.model.solids import solid_of

PRINTED = [
    entry.name for entry in registry.entries("model/parts") if entry.function().__globals__.get("SOURCE") == "printed"
]
GROWTH = (("hole_growth_mm", 0.2),)
VOLUME_REL = 0.003  # the contract's limit between mesh and solid
EXTENT_MM = 0.02  # a circle of 84 sides is at most r (1 - cos(π/84)) = 0.0007 r short


def strict_3mf(data):
    """(names, unit, warnings, mesh volume) by the reference reader in strict mode."""
    wrapper = lib3mf.get_wrapper()
    model = wrapper.CreateModel()
    reader = model.QueryReader("3mf")
    reader.SetStrictModeActive(True)
    reader.ReadFromBuffer(data)
    warnings = [reader.GetWarning(i) for i in range(reader.GetWarningCount())]
    names, meshes = [], []
    found = model.GetMeshObjects()
    while found.MoveNext():
        each = found.GetCurrentMeshObject()
        names.append(each.GetName())
        vertices = [list(each.GetVertex(i).Coordinates) for i in range(each.GetVertexCount())]
        triangles = [list(each.GetTriangle(i).Indices) for i in range(each.GetTriangleCount())]
        meshes.append(trimesh.Trimesh(vertices, triangles, process=False))
        assert each.IsManifoldAndOriented()
    items = model.GetBuildItems()
    return names, model.GetUnit(), warnings, meshes, items.Count()


def test_there_are_printed_parts():
    assert {"bush", "push_ring", "saddle", "feed_block"} <= set(PRINTED)


@pytest.mark.parametrize("part", PRINTED)
def test_every_printed_part_in_every_format(part, tmp_path):
    product = prints.print_of(part, GROWTH, f"{part} with growth")
    solid = product.solid
    box = solid.BoundingBox(0.001)
    assert box.zmin == pytest.approx(0, abs=1e-3), "it lies on the bed"
    assert solid.Volume() == pytest.approx(solid_of(part, GROWTH).Volume(), rel=1e-9)

    mesh = trimesh.load(io.BytesIO(stl.part_bytes(product)), file_type="stl")
    assert mesh.is_watertight
    assert mesh.is_winding_consistent
    assert mesh.volume == pytest.approx(solid.Volume(), rel=VOLUME_REL)
    assert mesh.body_count == 1
    assert mesh.extents == pytest.approx([box.xlen, box.ylen, box.zlen], abs=EXTENT_MM)

    names, unit, warnings, meshes, places = strict_3mf(threemf.part_bytes(product))
    assert (names, warnings, places) == ([f"{part} with growth"], [], 1)
    assert unit == lib3mf.ModelUnit.MilliMeter
    assert meshes[0].is_watertight
    assert meshes[0].volume == pytest.approx(solid.Volume(), rel=VOLUME_REL)

    path = tmp_path / "part.step"
    path.write_bytes(step.part_bytes(product))
    read = cq.importers.importStep(str(path)).val()
    assert read.Volume() == pytest.approx(solid.Volume(), rel=1e-6)
    assert read.BoundingBox(0.001).zmin == pytest.approx(0, abs=1e-3)


def test_growth_widens_the_bore_only():
    """A printed bore is drawn larger by what it comes out smaller; the outside stays."""
    plain = prints.print_of("push_ring", (("hole_growth_mm", 0.0),), "plain").solid
    grown = prints.print_of("push_ring", GROWTH, "grown").solid
    assert grown.Volume() < plain.Volume()
    assert grown.BoundingBox().zlen == pytest.approx(plain.BoundingBox().zlen)
    assert grown.BoundingBox().ylen == pytest.approx(plain.BoundingBox().ylen)


def test_stl_says_its_unit_and_has_unit_normals():
    data = stl.part_bytes(prints.print_of("bush", (), "bush rod 4"))
    assert data[:80].rstrip() == b"fabgen, unit mm, bush rod 4"
    (count,) = struct.unpack_from("<I", data, 80)
    assert len(data) == 84 + 50 * count
    normals = np.frombuffer(data, dtype=np.dtype([("n", "<f4", 3), ("c", "<f4", 9), ("s", "<u2")]), offset=84)["n"]
    assert np.linalg.norm(normals, axis=1) == pytest.approx(np.ones(count), abs=1e-5)


def test_names_are_escaped_in_3mf():
    product = prints.print_of("push_ring", (), 'ring <4> & "more"')
    names, _, warnings, _, _ = strict_3mf(threemf.part_bytes(product))
    assert (names, warnings) == (['ring <4> & "more"'], [])


def test_archive_has_no_clock():
    with zipfile.ZipFile(io.BytesIO(threemf.part_bytes(prints.print_of("push_ring", (), "ring")))) as archive:
        assert {entry.date_time for entry in archive.infolist()} == {(1980, 1, 1, 0, 0, 0)}
        assert re.search(rb'<model unit="millimeter"', archive.read("3D/3dmodel.model"))


def every_format():
    product = prints.print_of("bush", GROWTH, "bush")
    return [writer.part_bytes(product) for writer in (stl, threemf, step)]


def test_same_bytes_twice_in_one_process():
    assert every_format() == every_format()


PROGRAM = """
import hashlib, importlib.util, sys
spec = importlib.util.spec_from_file_location("sample", sys.argv[1])
sample = importlib.util.module_from_spec(spec)
spec.loader.exec_module(sample)
print(*(hashlib.sha256(data).hexdigest() for data in sample.every_format()))
"""


@pytest.mark.slow
def test_same_bytes_in_another_process(root):
    environment = os.environ | {"PYTHONHASHSEED": "7", "PYTHONPATH": str(root)}
    run = subprocess.run(
        [sys.executable, "-c", PROGRAM, __file__], env=environment, capture_output=True, text=True, check=True
    )
    assert run.stdout.split() == [hashlib.sha256(data).hexdigest() for data in every_format()]
