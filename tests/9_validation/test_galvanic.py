"""Couples of metals against the anodic index."""

import pytest

from fabgen.stock.tables import galvanic_limit_cv, material

AL = "EN AW-6060 T66"


def difference_cv(first, second):
    return abs(material(first).anodic_index_cv - material(second).anodic_index_cv)


@pytest.mark.parametrize(
    ("name", "index_cv"),
    [
        ("silver plated copper", -15),
        ("nickel plated brass", -30),
        ("copper Cu-DHP", -35),
        ("brass CW614N", -40),
        ("stainless 1.4301", -50),
        ("tin plated copper", -60),
        ("steel S235", -85),
        (AL, -90),
        ("EN AW-5754 H111", -90),
        ("cast aluminium", -95),
        ("cadmium plated steel", -95),
        ("hot-dip galvanised steel", -120),
        ("zinc plated steel", -125),
    ],
)
def test_anodic_index(name, index_cv):
    """Anodic index table in volts (secondary source), here in centivolts so that limits compare as integers."""
    assert material(name).anodic_index_cv == index_cv


@pytest.mark.parametrize(
    ("first", "second", "expected_cv", "passes_outdoors"),
    [
        (AL, "copper Cu-DHP", 55, False),
        (AL, "brass CW614N", 50, False),
        (AL, "stainless 1.4301", 40, False),
        (AL, "zinc plated steel", 35, False),
        (AL, "tin plated copper", 30, False),
        ("copper Cu-DHP", "brass CW614N", 5, True),
        ("brass CW614N", "stainless 1.4301", 10, True),
        (AL, "cadmium plated steel", 5, True),
        (AL, AL, 0, True),
    ],
)
def test_couples(first, second, expected_cv, passes_outdoors):
    """Differences of the same table; rule of grouping after MIL-DTL-14072F, 3.13 and Table VI (secondary source)."""
    assert difference_cv(first, second) == expected_cv
    assert (expected_cv <= galvanic_limit_cv()) == passes_outdoors


def test_limits():
    """0.15 V outdoors, 0.25 V indoors, 0.50 V controlled; the limit itself is allowed (secondary source)."""
    assert galvanic_limit_cv("outdoor") == 15
    assert galvanic_limit_cv("indoor") == 25
    assert galvanic_limit_cv("controlled") == 50
    assert difference_cv("silver plated copper", "nickel plated brass") == galvanic_limit_cv("outdoor")


def test_plastics_take_no_part():
    assert material("ASA").anodic_index_cv is None
