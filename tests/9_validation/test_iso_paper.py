"""Sheets, frames and the title block."""

import math

import pytest

from fabgen.stock.tables import UnknownStockError, paper, paper_size_mm, title_fields
from fabgen.units import in_to_mm


@pytest.mark.parametrize(
    ("name", "size_mm", "drawing_area_mm"),
    [
        ("A4", (210, 297), (180, 277)),
        ("A3", (297, 420), (390, 277)),
        ("A2", (420, 594), (564, 400)),
        ("A1", (594, 841), (811, 574)),
        ("A0", (841, 1189), (1159, 821)),
    ],
)
def test_iso_216_sheets_and_iso_5457_frames(name, size_mm, drawing_area_mm):
    """ISO 216, secondary source; ISO 5457:1999 frame from memory: 20 mm binding edge, 10 mm elsewhere, A4 upright.

    An older edition has 20 mm all round on A0 and A1 and is not mixed in.
    """
    assert paper_size_mm(name) == size_mm
    sheet = paper(name)
    wide, tall = size_mm if name == "A4" else size_mm[::-1]
    area = (wide - sheet.binding_margin_mm - sheet.other_margin_mm, tall - 2 * sheet.other_margin_mm)
    assert area == drawing_area_mm


def test_a_sizes_halve():
    """ISO 216: A0 is a square metre in the ratio √2, each size half the one before, rounded down to the millimetre."""
    long, short = math.sqrt(math.sqrt(2)) * 1000, 1000 / math.sqrt(math.sqrt(2))
    for name in ("A0", "A1", "A2", "A3", "A4"):
        assert paper_size_mm(name) == pytest.approx((short, long), abs=1)
        long, short = short, long / 2


def test_letter_is_eight_and_a_half_by_eleven_inches():
    """ANSI/ASME Y14.1, from memory."""
    assert paper_size_mm("Letter") == pytest.approx((in_to_mm(8.5), in_to_mm(11)), abs=1e-9)


def test_iso_7200_title_block():
    """ISO 7200:2004, fields and recommended characters, secondary source."""
    fields = {field.name: field for field in title_fields()}
    mandatory = {name: field.max_characters for name, field in fields.items() if field.mandatory}
    assert mandatory == {
        "legal owner": None,
        "identification number": 16,
        "date of issue": 10,
        "segment/sheet number": 4,
        "title": 25,
        "approval person": 20,
        "creator": 20,
        "document type": 30,
    }
    optional = {name: field.max_characters for name, field in fields.items() if not field.mandatory}
    assert optional["revision index"] == 2
    assert optional["number of segments/sheets"] == 4
    assert optional["language code"] == 4
    assert optional["supplementary title"] == 25
    assert optional["responsible department"] == 10
    assert optional["technical reference"] == 20
    assert {"classification/keywords", "document status", "page number", "paper size"} <= set(optional)


def test_an_unknown_sheet_is_refused():
    with pytest.raises(UnknownStockError, match="nearest is 'Letter'"):
        paper("letter ")
