"""GLB read back by a general mesh library: metres, y up, meshes once per part, colours, and the same bytes."""

import hashlib
import io
import json
import os
import struct
import subprocess
import sys

import numpy as np
import pytest
import trimesh

from fabgen.design.arranged import Frame
from fabgen.design.solids import AssemblyItem, Product
from fabgen.export import glb
from fabgen.model.parts.boom import boom
from fabgen.model.parts.bush import bush
from fabgen.model.parts.rod import rod
from fabgen.model.tessellate import VIEW_RAD, mesh_of

SINGLE_M = 1e-6  # glTF stores 32-bit floats


def product(name, part, colour):
    return Product(name, part.val(), mesh_of(part.val(), VIEW_RAD), colour)


def sample(rods=3):
    """A boom 260 long with rods 300 mm and bushes, placed by hand."""
    tube = product("boom", boom(), (0.6, 0.7, 0.72))
    collar = product("bush", bush(), (0.9, 0.5, 0.1))
    bar = product("rod", rod(), (0.84, 0.85, 0.86))
    items = [AssemblyItem("boom", tube, Frame())]
    for i in range(rods):
        x = 40.0 + 60 * i
        items.append(AssemblyItem(f"D{i} rod", bar, Frame((x, 0, 1.0), z=(0, 1, 0))))
        items.append(AssemblyItem(f"D{i} bush +y", collar, Frame((x, 10, 0), z=(0, 1, 0))))
        items.append(AssemblyItem(f"D{i} bush -y", collar, Frame((x, -10, 0), z=(0, -1, 0))))
    return items


def tree_of(data):
    magic, version, length, chunk = struct.unpack_from("<4sIII", data)
    assert (magic, version, length) == (b"glTF", 2, len(data))
    return json.loads(data[20 : 20 + chunk])


def test_extents_are_metres_with_y_up():
    """Boom along x, rods along -z, the boom's top towards +y."""
    scene = trimesh.load(io.BytesIO(glb.assembly_bytes(sample(), name="A")), file_type="glb")
    low, high = scene.bounds
    assert low == pytest.approx([0, -0.010, -0.150], abs=SINGLE_M)
    assert high == pytest.approx([0.260, 0.010, 0.150], abs=SINGLE_M)


def test_every_place_is_where_it_was_put():
    items = sample()
    scene = trimesh.load(io.BytesIO(glb.assembly_bytes(items, name="A")), file_type="glb")
    for item in items:
        matrix, _ = scene.graph.get(item.name)
        for local in ((0.0, 0.0, 0.0), (7.0, -3.0, 11.0)):
            x, y, z = item.frame.point(local)
            seen = matrix @ np.array([*(value / 1000 for value in local), 1.0])
            assert seen[:3] == pytest.approx([x / 1000, z / 1000, -y / 1000], abs=SINGLE_M)


def test_meshes_once_per_part_and_a_named_node_per_place():
    items = sample()
    tree = tree_of(glb.assembly_bytes(items, name="RGL_A"))
    assert len(tree["meshes"]) == 3
    assert [node["name"] for node in tree["nodes"]] == [item.name for item in items]
    assert tree["scenes"][0]["name"] == "RGL_A"
    assert tree["asset"] == {"version": "2.0", "generator": "fabgen"}


def test_meshes_are_closed_and_as_heavy_as_the_solids():
    scene = trimesh.load(io.BytesIO(glb.assembly_bytes(sample(), name="A")), file_type="glb")
    for name, solid in (("boom", boom()), ("bush", bush()), ("rod", rod())):
        mesh = scene.geometry[name]
        mesh.merge_vertices()
        assert mesh.is_watertight
        assert mesh.volume * 1e9 == pytest.approx(solid.val().Volume(), rel=0.003)


def test_colours_are_linear_light():
    """IEC 61966-2-1: sRGB 0.9, 0.5, 0.1 are 0.787, 0.214, 0.010 of linear light; stored in steps of 1/255."""
    tree = tree_of(glb.assembly_bytes(sample(), name="A"))
    (bush_mesh,) = [mesh for mesh in tree["meshes"] if mesh["name"] == "bush"]
    material = tree["materials"][bush_mesh["primitives"][0]["material"]]
    factor = material["pbrMetallicRoughness"]["baseColorFactor"]
    assert factor == pytest.approx([0.787, 0.214, 0.010, 1.0], abs=0.5 / 255 + 5e-4)


def test_same_bytes_twice_in_one_process():
    assert glb.assembly_bytes(sample(), name="A") == glb.assembly_bytes(sample(), name="A")


PROGRAM = """
import hashlib, importlib.util, sys
spec = importlib.util.spec_from_file_location("sample", sys.argv[1])
sample = importlib.util.module_from_spec(spec)
spec.loader.exec_module(sample)
print(hashlib.sha256(sample.glb.assembly_bytes(sample.sample(), name="A")).hexdigest())
"""


@pytest.mark.slow
def test_same_bytes_in_another_process(root):
    environment = os.environ | {"PYTHONHASHSEED": "7", "PYTHONPATH": str(root)}
    run = subprocess.run(
        [sys.executable, "-c", PROGRAM, __file__], env=environment, capture_output=True, text=True, check=True
    )
    assert run.stdout.strip() == hashlib.sha256(glb.assembly_bytes(sample(), name="A")).hexdigest()
