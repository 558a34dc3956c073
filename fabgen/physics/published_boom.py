"""What printed models say a metal boom takes from a rod, and how far they disagree.

Every function returns the length to add to the rod, tip to tip. The models leave out the rod's diameter, its own
length and the hole; for one bonded rod they differ by up to four times. None of them is taken as true: the spread
over one case, divided by √12 (a rectangular distribution, JCGM 100), is the uncertainty of each.

Printed points that are no rule, kept here for the reader: P. P. Viezbicke, Yagi Antenna Design, NBS Technical
Note 688, 1976, Fig. 10: 0.005 λ at a boom of 0.0085 λ (graph reading ±0.001 λ; 0.587 D, from memory); D. Dobricic,
Boom Influence on Yagi Antenna, antenneX, 2010, bonded 0.25 to 0.45 D in arrays for 144 MHz (secondary source).
"""

import math
from typing import Literal

from fabgen.frozen import frozen

Style = Literal["bonded-through", "insulated-through", "on-top", "through-nonmetal"]
Model = Literal["dl6wu", "lawson", "fishenden-wiblin"]

DL6WU_LIMIT_WL = 0.055
"""The curve ends here: boom diameter in wavelengths."""

FISHENDEN_WIBLIN_LIMIT_WL = 0.05
"""Our reading of "small against the element": a tenth of a half wave."""

LIMITS_WL: dict[Model, float] = {"dl6wu": DL6WU_LIMIT_WL, "fishenden-wiblin": FISHENDEN_WIBLIN_LIMIT_WL}
"""Models whose range is a size of boom, and its end; what ends Lawson's is no size."""

LO_SQUARE = 2 * math.gamma(0.25) ** 2 / (4 * math.pi**1.5)
"""Diameter of the round conductor equivalent to a square of side 1, 1.1803: Y. T. Lo, A Note on the Cylindrical
Antenna of Noncircular Cross Section, J. Appl. Phys. 24 (1953) 1338; secondary source, recomputed."""

_DL6WU = (
    "DL6WU's curve (G. Hoch, Yagi Antennas, VHF Communications 3/1977), closed form after I. White (ed.), "
    "The VHF/UHF DX Book, ch. 7; secondary source"
)
_DL6WU_HALF = "half of DL6WU's curve for insulated rods: I. White (ed.), The VHF/UHF DX Book, ch. 7; from memory"
_DL6WU_UNDER_HALF = "less than half of DL6WU's curve above the boom: I. White, list message; secondary source"
_LAWSON = "J. L. Lawson, Yagi Antenna Design, ARRL 1986, p. 7-11; secondary source"
_LAWSON_TOP = "J. L. Lawson, Yagi Antenna Design, ARRL 1986, p. 7-12; secondary source"
_FISHENDEN = (
    "R. M. Fishenden, E. R. Wiblin, Design of Yagi Aerials, Proc. IEE Pt III 96 (1949), no. 39; secondary source"
)
_DOBRICIC = (
    "D. Dobricic, Insulated Elements Boom Correction, antenneX, 2010, arrays for 144 MHz; "
    "secondary source that quotes the range"
)


@frozen
class PrintedValue:
    """What one printed statement says for one case.

    Attributes:
        model: `dl6wu`, `lawson`, `fishenden-wiblin`, or the name of a statement that only bounds the value.
        value_mm: length it adds to the rod.
        valid: whether the case lies inside the range that the statement itself sets.
        is_bound: True for an end of a printed range or a limit: it widens the spread and cannot be chosen.
        range_text: that range in words.
        source: citation and provenance.
    """

    model: str
    value_mm: float
    valid: bool
    is_bound: bool
    range_text: str
    source: str


def dl6wu_fraction(boom_wl: float) -> float:
    """DL6WU's curve for a rod bonded through a round boom, as a fraction of the boom's diameter.

    733 B (0.055 − B) − 504 B (0.03 − B), which is 25.195 B − 229 B².

    Args:
        boom_wl: boom diameter B in wavelengths, above 0 and below 0.055.

    Raises:
        ValueError: B lies outside that range.

    Source: G. Hoch, VHF Communications 3/1977 and 3/1982; closed form after I. White (secondary source).
    """
    if not 0 < boom_wl < DL6WU_LIMIT_WL:
        raise ValueError(f"DL6WU's curve holds for booms above 0 and below 0.055 λ, not for {boom_wl:.4g} λ")
    return 733 * boom_wl * (0.055 - boom_wl) - 504 * boom_wl * (0.03 - boom_wl)


def lawson_bonded_mm(boom_mm: float) -> float:
    """Lawson's 0.7 D for a rod through the boom, his reading of the NBS measurements; he sets no range.

    Source: J. L. Lawson, Yagi Antenna Design, ARRL 1986, p. 7-11 (secondary source).
    """
    return 0.7 * boom_mm


def lawson_touching_mm(boom_mm: float) -> float:
    """Lawson's 0.06 D for a rod that touches the boom from above; vanishes quickly with spacing.

    Full-wave computation finds several times that value for a long boom, see `touching_allowance_ratios`: measure it.

    Source: J. L. Lawson, Yagi Antenna Design, ARRL 1986, p. 7-12 (secondary source).
    """
    return 0.06 * boom_mm


def fishenden_wiblin_bonded_mm(boom_mm: float) -> float:
    """Fishenden and Wiblin's 0.75 D for a bonded rod, while D is small against the element.

    Source: R. M. Fishenden, E. R. Wiblin, Proc. IEE Pt III 96 (1949), no. 39 (secondary source).
    """
    return 0.75 * boom_mm


def equivalent_round_mm(side_mm: float, square_as: Literal["side", "lo"]) -> float:
    """The round boom that stands in for a square one in these models; either way is a convention.

    Args:
        side_mm: side of the square in mm.
        square_as: `side` takes the side as the diameter, as the closed form's own worked example does; `lo` takes
            Lo's electrostatic equivalent, 1.180 × side.

    Returns:
        Diameter in mm.
    """
    return side_mm if square_as == "side" else LO_SQUARE * side_mm


def published_values(
    style: Style, *, boom_mm: float, wavelength_mm: float, gap_mm: float = 0.0
) -> tuple[PrintedValue, ...]:
    """Everything in print for one case, rules first, then the bounds that only widen the spread.

    Bonded: DL6WU, Lawson, Fishenden and Wiblin. Insulated: half of DL6WU is the only printed rule; the other bonded
    rules are not halved, since nobody printed that; the printed range 0.15 to 0.25 D bounds it. On top: 0.06 D for a
    rod that touches, bounded by "less than half" of DL6WU. Nonmetal: nothing to add, an empty tuple.
    Beyond its range DL6WU's curve is held at its end, 0.693 D, and marked as not valid.

    Args:
        style: how the rod meets the boom.
        boom_mm: boom diameter, or that of the equivalent round boom, in mm.
        wavelength_mm: wavelength in mm.
        gap_mm: clear distance between rod and boom, on top only.

    Returns:
        The statements, each with its own validity.

    Raises:
        ValueError: a size is not above zero.
    """
    if boom_mm <= 0 or wavelength_mm <= 0:
        raise ValueError("boom and wavelength must be above zero")
    boom_wl = boom_mm / wavelength_mm
    inside = boom_wl < DL6WU_LIMIT_WL
    curve_mm = dl6wu_fraction(boom_wl if inside else math.nextafter(DL6WU_LIMIT_WL, 0)) * boom_mm
    curve_range = "boom below 0.055 λ"
    if style == "bonded-through":
        small = boom_wl <= FISHENDEN_WIBLIN_LIMIT_WL
        return (
            PrintedValue("dl6wu", curve_mm, inside, False, curve_range, _DL6WU),
            PrintedValue("lawson", lawson_bonded_mm(boom_mm), True, False, "none stated", _LAWSON),
            PrintedValue(
                "fishenden-wiblin",
                fishenden_wiblin_bonded_mm(boom_mm),
                small,
                False,
                "boom small against the element, read as up to 0.05 λ",
                _FISHENDEN,
            ),
        )
    if style == "insulated-through":
        return (
            PrintedValue("dl6wu", curve_mm / 2, inside, False, curve_range, _DL6WU_HALF),
            PrintedValue("dobricic-low", 0.15 * boom_mm, True, True, "arrays for 144 MHz", _DOBRICIC),
            PrintedValue("dobricic-high", 0.25 * boom_mm, True, True, "arrays for 144 MHz", _DOBRICIC),
        )
    if style == "on-top":
        touching = gap_mm <= 0
        return (
            PrintedValue("lawson", lawson_touching_mm(boom_mm), touching, False, "rod touches the boom", _LAWSON_TOP),
            PrintedValue("dl6wu-under-half", curve_mm / 2, inside, True, curve_range, _DL6WU_UNDER_HALF),
        )
    return ()


def published_models(style: Style) -> tuple[Model, ...]:
    """The models that have a rule for this mount and can be chosen by name."""
    rules: dict[Style, tuple[Model, ...]] = {
        "bonded-through": ("dl6wu", "lawson", "fishenden-wiblin"),
        "insulated-through": ("dl6wu",),
        "on-top": ("lawson",),
    }
    return rules.get(style, ())
