"""GLB for viewing: metres, y up, one mesh per distinct part and one named node per place."""

from collections.abc import Sequence
from typing import TYPE_CHECKING, Any

from fabgen.design.solids import AssemblyItem, Colour, Mesh, Product

if TYPE_CHECKING:
    import trimesh

    from fabgen.design.arranged import Frame

_M_PER_MM = 1e-3
_METALNESS, _ROUGHNESS = 0.1, 0.6


def assembly_bytes(items: Sequence[AssemblyItem], *, name: str) -> bytes:
    """An assembly as binary glTF 2.0.

    glTF has y up and looks along -z; the array's x stays x (along the boom), its z becomes y, its y becomes -z.

    Args:
        items: every place of every part.
        name: of the whole.
    """
    import numpy as np
    import trimesh

    upright = np.array([[1.0, 0, 0, 0], [0, 0, 1, 0], [0, -1, 0, 0], [0, 0, 0, 1]])
    scene: Any = trimesh.Scene()
    export: Any = trimesh.exchange.gltf.export_glb
    drawn: dict[Product, str] = {}
    for item in items:
        product = item.product
        if product not in drawn:
            scene.geometry[product.name] = _mesh(product.mesh, product.colour)
            drawn[product] = product.name
        place = upright @ np.array(_matrix_m(item.frame))
        scene.graph.update(frame_to=item.name, matrix=place, geometry=drawn[product])

    def sign(tree: dict[str, Any]) -> None:
        tree["asset"]["generator"] = "fabgen"
        tree["scenes"][0]["name"] = name

    return bytes(export(scene, tree_postprocessor=sign))


def _mesh(mesh: Mesh, colour: Colour) -> "trimesh.Trimesh":
    """The mesh in metres with flat shading, in its colour."""
    import trimesh

    visual: Any = trimesh.visual
    material = visual.material.PBRMaterial(
        baseColorFactor=[*(_linear(value) for value in colour), 1.0],
        metallicFactor=_METALNESS,
        roughnessFactor=_ROUGHNESS,
    )
    return trimesh.Trimesh(
        vertices=mesh.vertices_mm * _M_PER_MM,
        faces=mesh.triangles,
        visual=visual.TextureVisuals(material=material),
        process=False,
    )


def _matrix_m(frame: "Frame") -> list[list[float]]:
    """A part's frame as a matrix, the translation in metres."""
    columns = (frame.x, frame.y, frame.z, tuple(value * _M_PER_MM for value in frame.origin))
    return [*([column[row] for column in columns] for row in range(3)), [0.0, 0.0, 0.0, 1.0]]


def _linear(value: float) -> float:
    """One sRGB channel as linear light, which glTF's factors are (IEC 61966-2-1)."""
    return value / 12.92 if value <= 0.04045 else ((value + 0.055) / 1.055) ** 2.4
