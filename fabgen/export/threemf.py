"""3MF of one part: core specification, millimetres, one named object.

Written as a small zip archive with fixed dates, because the common writers put random identifiers or the clock in it.
Source: 3MF Core Specification and Reference Guide 1.3, chapters 2 to 4.
"""

import io
import zipfile
from typing import TYPE_CHECKING
from xml.sax.saxutils import quoteattr

if TYPE_CHECKING:
    from fabgen.design.solids import Product

_DECLARATION = '<?xml version="1.0" encoding="UTF-8"?>\n'
_CONTENT_TYPES = (
    _DECLARATION + '<Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types">'
    '<Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/>'
    '<Default Extension="model" ContentType="application/vnd.ms-package.3dmanufacturing-3dmodel+xml"/></Types>\n'
)
_RELATIONSHIPS = (
    _DECLARATION + '<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">'
    '<Relationship Target="/3D/3dmodel.model" Id="rel0" '
    'Type="http://schemas.microsoft.com/3dmanufacturing/2013/01/3dmodel"/></Relationships>\n'
)
_NO_CLOCK = (1980, 1, 1, 0, 0, 0)


def part_bytes(product: "Product") -> bytes:
    """The part's mesh as a 3MF file."""
    archive = io.BytesIO()
    with zipfile.ZipFile(archive, "w", zipfile.ZIP_DEFLATED, compresslevel=9) as package:
        for path, text in (
            ("[Content_Types].xml", _CONTENT_TYPES),
            ("_rels/.rels", _RELATIONSHIPS),
            ("3D/3dmodel.model", _model(product)),
        ):
            entry = zipfile.ZipInfo(path, date_time=_NO_CLOCK)
            entry.compress_type = zipfile.ZIP_DEFLATED
            entry.create_system = 3
            entry.external_attr = 0o644 << 16
            package.writestr(entry, text.encode("utf-8"))
    return archive.getvalue()


def _model(product: "Product") -> str:
    name = quoteattr(product.name)
    vertices = "".join(
        f'<vertex x="{x:.6f}" y="{y:.6f}" z="{z:.6f}"/>\n' for x, y, z in product.mesh.vertices_mm.tolist()
    )
    triangles = "".join(f'<triangle v1="{a}" v2="{b}" v3="{c}"/>\n' for a, b, c in product.mesh.triangles.tolist())
    return (
        f'{_DECLARATION}<model unit="millimeter" xml:lang="en-US" '
        'xmlns="http://schemas.microsoft.com/3dmanufacturing/core/2015/02">\n'
        '<metadata name="Application">fabgen</metadata>\n'
        f'<resources>\n<object id="1" type="model" name={name}>\n<mesh>\n'
        f"<vertices>\n{vertices}</vertices>\n<triangles>\n{triangles}</triangles>\n"
        "</mesh>\n</object>\n</resources>\n"
        '<build>\n<item objectid="1"/>\n</build>\n</model>\n'
    )
