"""The stamp on every sheet of a design that is not clear.

Large pale lettering under all other ink, so that it cannot be overlooked and hides no hole; repeated along a strip so
that a piece cut from it still carries it.
"""

import math
from dataclasses import replace

from fabgen.design.drawing import Sheet, Text
from fabgen.design.lettering import text_width_mm

WORDS = "NOT CLEARED"
_LARGEST_MM = 28.0
_FILL = 0.85
_STRIP_RATIO = 2.5


def stamped(sheet: Sheet, words: str = WORDS) -> Sheet:
    """The same sheet with the stamp under its drawing.

    Args:
        sheet: any sheet; an older stamp on it is replaced.
        words: what the stamp says.

    Returns:
        A sheet whose layer `stamp` holds the words, once across the diagonal or repeated along a strip.
    """
    width_mm, height_mm = sheet.width_mm, sheet.height_mm
    per_height = text_width_mm(words, 1.0)
    if max(width_mm, height_mm) > _STRIP_RATIO * min(width_mm, height_mm):
        stamps = _along(width_mm, height_mm, words, per_height)
    else:
        angle = math.atan2(height_mm, width_mm)
        room_mm = _FILL * math.hypot(width_mm, height_mm)
        letters_mm = min(_LARGEST_MM, room_mm / (per_height + 1 / math.tan(angle) + math.tan(angle)))
        drop_mm = letters_mm / 2
        x, y = width_mm / 2 + drop_mm * math.sin(angle), height_mm / 2 - drop_mm * math.cos(angle)
        stamps = [Text("stamp", x, y, words, letters_mm, "middle", math.degrees(angle))]
    kept = tuple(item for item in sheet.items if item.layer != "stamp")
    return replace(sheet, items=(*stamps, *kept))


def _along(width_mm: float, height_mm: float, words: str, per_height: float) -> list[Text]:
    """Stamps in a row along the longer side of a strip."""
    length_mm, breadth_mm = max(width_mm, height_mm), min(width_mm, height_mm)
    letters_mm = min(_LARGEST_MM, 0.5 * breadth_mm, _FILL * length_mm / per_height)
    count = max(1, math.floor(length_mm / (1.35 * per_height * letters_mm)))
    stamps = []
    for k in range(count):
        along_mm = (k + 0.5) / count * length_mm
        if width_mm >= height_mm:
            stamps.append(Text("stamp", along_mm, height_mm / 2 - letters_mm / 2, words, letters_mm, "middle", 0.0))
        else:
            stamps.append(Text("stamp", width_mm / 2 + letters_mm / 2, along_mm, words, letters_mm, "middle", 90.0))
    return stamps
