"""What the model stage hands to the writers: distinct parts with solids and meshes, and where each of them stands.

The solids are the kernel's own objects, carried through untouched; nothing here loads the kernel.
"""

from dataclasses import dataclass
from typing import TYPE_CHECKING, Any

from fabgen.design.arranged import Frame
from fabgen.frozen import frozen

if TYPE_CHECKING:
    import numpy as np
    from numpy.typing import NDArray

Colour = tuple[float, float, float]
"""Red, green, blue from 0 to 1, sRGB."""


@dataclass(frozen=True, slots=True, eq=False)
class Mesh:
    """A closed surface of triangles in mm.

    Attributes:
        vertices_mm: one row (x, y, z) per vertex, each vertex once.
        triangles: one row of three vertices per triangle, counter-clockwise seen from outside.
    """

    vertices_mm: "NDArray[np.float64]"
    triangles: "NDArray[np.int64]"


@dataclass(frozen=True, slots=True, eq=False)
class Product:
    """One distinct part; the same object at every place where the part stands.

    Attributes:
        name: readable, ASCII, unique within its assembly.
        solid: the kernel's solid (`cadquery.Solid`) in the part's own frame.
        mesh: the same surface in triangles.
        colour: by kind of material.
    """

    name: str
    solid: Any
    mesh: Mesh
    colour: Colour


@frozen
class AssemblyItem:
    """One place of a part: occurrence name, part, and where the part's frame stands."""

    name: str
    product: Product
    frame: Frame


@frozen
class Print:
    """One distinct printed part as it lies on the bed (z = 0), bores drawn larger by the printer's growth.

    Attributes:
        stem: of its files, ASCII, without a space.
        product: solid and mesh in print pose.
        quantity: how many the array needs.
    """

    stem: str
    product: Product
    quantity: int
