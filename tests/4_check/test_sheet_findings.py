"""S: lettering on a sheet."""

import pytest

from fabgen.check.sheets import sheet_findings
from fabgen.design.drawing import Circle, Sheet, Text


def sheet(*items):
    return Sheet("boom", "template", 200, 100, items)


def letters(x, y, text="H01"):
    return Text("text", x, y, text, 3.0)


@pytest.mark.parametrize(
    ("items", "code"),
    [
        ((letters(198, 50, "outside"),), "S01"),
        ((Circle("drill", 50, 50, 4), letters(50, 50)), "S02"),
        ((letters(50, 50), letters(51, 50.5)), "S03"),
    ],
)
def test_bad_lettering(items, code):
    (only,) = sheet_findings([sheet(*items)])
    assert (only.code, only.severity, only.where, only.measured, only.required) == (code, "fail", "boom", 1, 0)


def test_good_lettering():
    assert list(sheet_findings([sheet(letters(20, 20), Circle("drill", 50, 50, 4), letters(60, 50))])) == []


def test_equal_kinds_are_counted():
    (only,) = sheet_findings([sheet(letters(198, 50, "one"), letters(198, 80, "two"))])
    assert only.measured == 2


def test_a_margin_counts():
    at_edge = sheet(letters(2, 50))
    assert list(sheet_findings([at_edge])) == []
    assert [each.code for each in sheet_findings([at_edge], margin_mm=5)] == ["S01"]
