"""STL of one part: binary, millimetres (the format has no field for the unit)."""

import struct
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from fabgen.design.solids import Product

_HEADER_BYTES = 80


def part_bytes(product: "Product") -> bytes:
    """The part's mesh as a binary STL file; name and unit stand in the header's comment."""
    import numpy as np

    corners = product.mesh.vertices_mm.astype("<f4")[product.mesh.triangles]
    across = np.cross(corners[:, 1] - corners[:, 0], corners[:, 2] - corners[:, 0])
    length = np.linalg.norm(across, axis=1, keepdims=True)
    records = np.zeros(len(corners), dtype=[("normal", "<f4", 3), ("corners", "<f4", (3, 3)), ("spare", "<u2")])
    records["normal"] = across / np.where(length > 0, length, 1.0)
    records["corners"] = corners
    # A header that begins with "solid" would be taken for the text form.
    comment = f"fabgen, unit mm, {product.name}".encode("ascii", "replace")[:_HEADER_BYTES]
    return comment.ljust(_HEADER_BYTES) + struct.pack("<I", len(corners)) + records.tobytes()
