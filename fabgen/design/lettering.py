"""How much room lettering takes, without loading a font.

All sheets are lettered in DejaVu Sans. The advance widths below are the font's own, in units of 1/2048 em, so drawing
code can keep text clear of holes and of other text; writers switch kerning and ligatures off where they can.
"""

import math

from fabgen.design.drawing import Box, Point, Text, box_of

CAP_EM = 1493 / 2048
"""Height of DejaVu Sans capitals per em; lettering of height h is set at a font size of h / CAP_EM."""

_EM = 2048
_UNKNOWN = 2048
_ASCII = (
    651, 821, 942, 1716, 1303, 1946, 1597, 563, 799, 799, 1024, 1716, 651, 739, 651, 690, 1303, 1303, 1303, 1303,
    1303, 1303, 1303, 1303, 1303, 1303, 690, 690, 1716, 1716, 1716, 1087, 2048, 1401, 1405, 1430, 1577, 1294, 1178,
    1587, 1540, 604, 604, 1343, 1141, 1767, 1532, 1612, 1235, 1612, 1423, 1300, 1251, 1499, 1401, 2025, 1403, 1251,
    1403, 799, 690, 799, 1716, 1024, 1024, 1255, 1300, 1126, 1300, 1260, 721, 1300, 1298, 569, 569, 1186, 569, 1995,
    1298, 1253, 1300, 1300, 842, 1067, 803, 1298, 1212, 1675, 1212, 1212, 1075, 1303, 690, 1303, 1716,
)  # fmt: skip
_LATIN_1 = (
    651, 821, 1303, 1303, 1303, 1303, 690, 1024, 1024, 2048, 965, 1253, 1716, 739, 2048, 1024, 1024, 1716, 821, 821,
    1024, 1303, 1303, 651, 1024, 821, 965, 1253, 1985, 1985, 1985, 1087, 1401, 1401, 1401, 1401, 1401, 1401, 1995,
    1430, 1294, 1294, 1294, 1294, 604, 604, 604, 604, 1587, 1532, 1612, 1612, 1612, 1612, 1612, 1716, 1612, 1499,
    1499, 1499, 1499, 1251, 1239, 1290, 1255, 1255, 1255, 1255, 1255, 1255, 2011, 1126, 1260, 1260, 1260, 1260, 569,
    569, 569, 569, 1253, 1298, 1253, 1253, 1253, 1253, 1253, 1716, 1253, 1298, 1298, 1298, 1298, 1212, 1300, 1212,
)  # fmt: skip
_OTHERS = {
    "λ": 1212, "Ω": 1565, "μ": 1303, "π": 1233, "φ": 1351, "α": 1350, "Δ": 1401, "–": 1024, "—": 2048, "−": 1716,
    "←": 1716, "↑": 1716, "→": 1716, "↓": 1716, "…": 2048, "″": 765, "′": 465, "“": 1061, "”": 1061, "‘": 651,
    "’": 651, "≤": 1716, "≥": 1716, "√": 1305, "∅": 1784, "⌀": 1233, "•": 1208, "✓": 1716, "≈": 1716,
}  # fmt: skip
_ADVANCE = {
    **{chr(32 + i): width for i, width in enumerate(_ASCII)},
    **{chr(160 + i): width for i, width in enumerate(_LATIN_1)},
    **_OTHERS,
}
_LEVEL = frozenset(" !\"#%&'*+-.0123456789:<=>?ABCDEFGHIKLMNOPRSTUVWXYZ^abcdefhiklmnorstuvwxz~°±²³×–—−←↑→↓…″′≤≥≈λπΩΔ")
"""Characters that stay, within a twentieth of a capital's height, between baseline and a capital's top."""
_DEEP = frozenset("$(),/;@JQ[]\\_gjpqy{|}")
"""Characters of usual height that reach below the baseline."""
_DEEP_H, _TALL_H, _LEVEL_H, _ROUND_H = 0.35, 1.31, 1.06, 0.05


def text_width_mm(text: str, height_mm: float) -> float:
    """Length of a line of lettering along its baseline.

    Args:
        text: one line.
        height_mm: height of capitals.

    Returns:
        Sum of the advance widths in mm; a character outside the table counts one em, which no ordinary letter exceeds.

    Source: advance widths of DejaVu Sans 2.37, read from the font's hmtx table.
    """
    return sum(_ADVANCE.get(c, _UNKNOWN) for c in text) / _EM / CAP_EM * height_mm


def text_corners(text: Text) -> tuple[Point, Point, Point, Point]:
    """Corners of the lettering's own box, which turns with the text, counter-clockwise from its lower left.

    Args:
        text: lettering anywhere on a sheet.
    """
    width = text_width_mm(text.text, text.height_mm)
    left = {"start": 0.0, "middle": -width / 2, "end": -width}[text.anchor]
    low = -text.height_mm * (_ROUND_H if _LEVEL.issuperset(text.text) else _DEEP_H)
    high = text.height_mm * (_LEVEL_H if (_LEVEL | _DEEP).issuperset(text.text) else _TALL_H)
    angle = math.radians(text.angle_deg)
    c, s = math.cos(angle), math.sin(angle)

    def place(u: float, v: float) -> Point:
        return (text.x_mm + u * c - v * s, text.y_mm + u * s + v * c)

    return (place(left, low), place(left + width, low), place(left + width, high), place(left, high))


def text_box(text: Text) -> Box:
    """The smallest upright box that holds a text.

    Args:
        text: lettering at any angle.

    Returns:
        Left, bottom, right, top in mm.
    """
    return box_of(text_corners(text))


def shortened(text: str, height_mm: float, width_mm: float) -> str:
    """A text that fits a width, its end replaced by an ellipsis when it must be.

    Args:
        text: one line.
        height_mm: height of capitals.
        width_mm: room along the baseline.
    """
    if text_width_mm(text, height_mm) <= width_mm:
        return text
    room = width_mm - text_width_mm("…", height_mm)
    kept = ""
    for character in text:
        room -= text_width_mm(character, height_mm)
        if room < 0:
            break
        kept += character
    return kept.rstrip() + "…"
