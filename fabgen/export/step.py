"""STEP: an assembly with one product per distinct part and one named occurrence per place, or a single part.

Units are mm. Curves on surfaces are left out: readers compute them again from the surfaces, at a tenth of the file.
The kernel would also write the clock, a count of all occurrences since the process began, and colours in the order of
memory addresses; a pass over the text takes these away and adds the colours in the order of the parts.
"""

import io
import re
from collections.abc import Sequence
from itertools import count
from typing import TYPE_CHECKING, Any

from fabgen.design.solids import AssemblyItem, Colour, Product
from fabgen.errors import ProgramError

if TYPE_CHECKING:
    from fabgen.design.arranged import Frame

_REPRESENTATION = re.compile(r"\n#\d+ = ADVANCED_BREP_SHAPE_REPRESENTATION\('[^']*',\(([^)]*)\),\s*#(\d+)\);")
_SOLID = re.compile(r"\n#(\d+) = MANIFOLD_SOLID_BREP\(")
_OCCURRENCE = re.compile(
    r"NEXT_ASSEMBLY_USAGE_OCCURRENCE\(\s*'\d+'\s*,\s*'((?:[^']|'')*)'\s*,\s*''\s*,\s*(#\d+)\s*,\s*(#\d+)\s*,\s*\$\s*\);"
)
_HEADER = re.compile(r"FILE_NAME\(.*?\);\n", flags=re.DOTALL)

_STYLE = (
    "FILL_AREA_STYLE_COLOUR('',{})",
    "FILL_AREA_STYLE('',({}))",
    "SURFACE_STYLE_FILL_AREA({})",
    "SURFACE_SIDE_STYLE('',({}))",
    "SURFACE_STYLE_USAGE(.BOTH.,{})",
    "PRESENTATION_STYLE_ASSIGNMENT(({}))",
)
"""From a colour to what a solid can be styled with, each round the one before."""


def assembly_bytes(items: Sequence[AssemblyItem], *, name: str) -> bytes:
    """An assembly as a STEP file (ISO 10303-21, application protocol 214).

    Args:
        items: every place of every part.
        name: of the whole, printable ASCII.

    Raises:
        ProgramError: the kernel did not write the parts that it was given.
    """
    from OCP.XCAFDoc import XCAFDoc_DocumentTool

    document = _document()
    shapes = XCAFDoc_DocumentTool.ShapeTool_s(document.Main())
    whole = shapes.NewShape()
    _name(whole, name)
    labels: dict[Product, Any] = {}
    for item in items:
        product = item.product
        if product not in labels:
            labels[product] = _part(document, product.solid, product.name)
        _name(shapes.AddComponent(whole, labels[product], _location(item.frame)), item.name)
    shapes.UpdateAssemblies()
    return _text(_written(document), name, [product.colour for product in labels])


def part_bytes(product: Product) -> bytes:
    """One part as a STEP file, in its own frame.

    Raises:
        ProgramError: the kernel did not write the parts that it was given.
    """
    document = _document()
    _part(document, product.solid, product.name)
    return _text(_written(document), product.name, [product.colour])


def _document() -> Any:
    from OCP.TCollection import TCollection_ExtendedString
    from OCP.TDocStd import TDocStd_Document

    return TDocStd_Document(TCollection_ExtendedString("XmlOcaf"))


def _name(label: Any, name: str) -> None:
    from OCP.TCollection import TCollection_ExtendedString
    from OCP.TDataStd import TDataStd_Name

    TDataStd_Name.Set_s(label, TCollection_ExtendedString(name))


def _part(document: Any, solid: Any, name: str) -> Any:
    """The label of a new part in the document."""
    from OCP.XCAFDoc import XCAFDoc_DocumentTool

    label = XCAFDoc_DocumentTool.ShapeTool_s(document.Main()).AddShape(solid.wrapped, False)
    _name(label, name)
    return label


def _location(frame: "Frame") -> Any:
    from OCP.gp import gp_Ax3, gp_Dir, gp_Pnt, gp_Trsf
    from OCP.TopLoc import TopLoc_Location

    move = gp_Trsf()
    move.SetTransformation(gp_Ax3(gp_Pnt(*frame.origin), gp_Dir(*frame.z), gp_Dir(*frame.x)), gp_Ax3())
    return TopLoc_Location(move)


def _written(document: Any) -> str:
    """What the kernel writes, with names, without colours."""
    from OCP.IFSelect import IFSelect_RetDone
    from OCP.Interface import Interface_Static
    from OCP.Message import Message, Message_Gravity
    from OCP.STEPCAFControl import STEPCAFControl_Writer
    from OCP.STEPControl import STEPControl_AsIs

    for printer in Message.DefaultMessenger_s().Printers():
        printer.SetTraceLevel(Message_Gravity.Message_Fail)  # the kernel talks on stdout, where data go
    writer = STEPCAFControl_Writer()
    Interface_Static.SetCVal_s("write.step.schema", "AP214IS")
    Interface_Static.SetCVal_s("write.step.unit", "MM")
    Interface_Static.SetIVal_s("write.surfacecurve.mode", 0)
    writer.SetNameMode(True)
    writer.SetColorMode(False)
    out = io.BytesIO()
    if not (writer.Transfer(document, STEPControl_AsIs) and writer.WriteStream(out) == IFSelect_RetDone):
        raise ProgramError("the kernel could not write a STEP file")
    return out.getvalue().decode("latin-1")


def _text(written: str, name: str, colours: Sequence[Colour]) -> bytes:
    """The file without clock and counter, with the colours of the parts in their order.

    Raises:
        ProgramError: the file does not hold one solid per part.
    """
    header = "FILE_NAME('{}','',(''),(''),'fabgen','fabgen','');\n".format(name.replace("'", "''"))
    text = _HEADER.sub(lambda _: header, written, count=1)
    numbers = count(1)
    # The kernel breaks lines by length, so a longer counter would also move the break.
    text, counted = _OCCURRENCE.subn(
        lambda found: "NEXT_ASSEMBLY_USAGE_OCCURRENCE('{}','{}','',{},{},$);".format(
            next(numbers), found[1].replace("\n", ""), found[2], found[3]
        ),
        text,
    )
    if counted != text.count("NEXT_ASSEMBLY_USAGE_OCCURRENCE("):
        raise ProgramError(
            "a STEP file has occurrences that were not renumbered: its bytes would differ from run to run"
        )
    end = text.index("ENDSEC;", text.index("\nDATA;"))
    used = int(re.findall(r"\n#(\d+) = ", text)[-1])
    styles = "".join(f"{line}\n" for line in _styles(text, colours, used))
    return (text[:end] + styles + text[end:]).encode("latin-1")


def _styles(text: str, colours: Sequence[Colour], used: int) -> list[str]:
    """Entities that colour each solid: one style per colour, one item per solid in the context of its part.

    Args:
        text: the file.
        colours: one per part.
        used: highest entity number in the file.
    """
    solids = set(_SOLID.findall(text))
    places = [
        (solid, context)
        for members, context in _REPRESENTATION.findall(text)
        for solid in re.findall(r"#(\d+)", members)
        if solid in solids
    ]
    if len(places) != len(colours):
        raise ProgramError(f"a STEP file of {len(colours)} parts holds {len(places)} solids")
    lines: list[str] = []

    def entity(content: str) -> str:
        lines.append(f"#{used + len(lines) + 1} = {content};")
        return f"#{used + len(lines)}"

    styles: dict[Colour, str] = {}
    for colour in dict.fromkeys(colours):
        style = entity("COLOUR_RGB('',{:.6f},{:.6f},{:.6f})".format(*colour))
        for wrapper in _STYLE:
            style = entity(wrapper.format(style))
        styles[colour] = style
    for (solid, context), colour in zip(places, colours, strict=True):
        item = entity(f"STYLED_ITEM('color',({styles[colour]}),#{solid})")
        entity(f"MECHANICAL_DESIGN_GEOMETRIC_PRESENTATION_REPRESENTATION('',({item}),#{context})")
    return lines
