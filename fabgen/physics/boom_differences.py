"""What differs between the mount of a record and the drawn one, item by item, and how much u grows for it.

Source: own study 2026, computed, unpublished.
"""

import math
from dataclasses import replace
from enum import Enum

from fabgen.frozen import frozen
from fabgen.physics.boom_closed_form import bush_term_mm, relative_allowance
from fabgen.physics.boom_coupon import reactance_factor_from_allowance
from fabgen.physics.boom_mount import BoomMount, Section, Style, wavelength_mm

_LARGEST_GROWTH = 0.10
_LARGEST_CHANGE = 0.25
"""What makes another mount: relative change of g, and of a size or the frequency; judgements."""


def nearest_closed_form_mm(mount: BoomMount, rod_length_mm: float, frequency_mhz: float) -> float:
    """Allowance of the nearest closed form, whatever its range: to start a solver and to compare, never to cut by.

    Args:
        mount: the mount.
        rod_length_mm: modelled (free) rod length.
        frequency_mhz: design frequency.

    Returns:
        A rough allowance in mm; a rectangular boom counts as the mean of the two square ones of its sides, a
        solid square bar as a round one of its side.
    """
    if mount.section is Section.RECTANGULAR:
        squares = (
            replace(mount, section=Section.SQUARE, outside_mm=side_mm, height_mm=0.0)
            for side_mm in (mount.outside_mm, mount.height_mm)
        )
        return sum(nearest_closed_form_mm(square, rod_length_mm, frequency_mhz) for square in squares) / 2
    if mount.style is Style.INSULATED_THROUGH and mount.solid:
        mount = replace(mount, section=Section.ROUND)
    return relative_allowance(mount, rod_length_mm, frequency_mhz) * mount.outside_mm


class Item(Enum):
    """What may differ between a record and the drawn mount; the value is the word to print."""

    STYLE = "style"
    SECTION = "section"
    SOLID = "solid or tube"
    FILM = "film insulation"
    ROD = "rod diameter"
    BOOM = "boom"
    BOOM_HEIGHT = "boom height"
    WALL = "wall"
    HOLE = "hole"
    HEIGHT = "height above the boom"
    BUSH_PERMITTIVITY = "bush permittivity"
    BUSH_LENGTH = "bush length"
    FREQUENCY = "frequency"


@frozen
class Difference:
    """One item in which the drawn mount differs from the record.

    Attributes:
        item: what differs.
        recorded: the record's value, as text.
        drawn: the drawn value, as text.
        u_relative: how much the allowance's u grows: the change of g that theory gives for this item alone.
        refused: True if this makes it another mount.
    """

    item: Item
    recorded: str
    drawn: str
    u_relative: float
    refused: bool


def differences(recorded: BoomMount, recorded_mhz: float, drawn: BoomMount, drawn_mhz: float) -> tuple[Difference, ...]:
    """Items in which a drawn mount differs from a record's, and how much u grows for each.

    Args:
        recorded: the record's mount.
        recorded_mhz: the record's frequency.
        drawn: the drawn mount.
        drawn_mhz: the design frequency.

    Returns:
        The differing items. Another style or section, tube against solid bar, film against bush, an item that moves
        g by more than 10 %, or a size or frequency that differs by more than a quarter is another mount.
    """
    kinds: tuple[tuple[Item, str | bool, str | bool], ...] = (
        (Item.STYLE, recorded.style.value, drawn.style.value),
        (Item.SECTION, recorded.section.value, drawn.section.value),
        (Item.SOLID, recorded.solid, drawn.solid),
        (Item.FILM, recorded.film_insulation, drawn.film_insulation),
    )
    found = [Difference(item, str(old), str(new), 0.0, True) for item, old, new in kinds if old != new]
    if found:
        return tuple(found)
    fields = {
        Item.ROD: "rod_diameter_mm",
        Item.BOOM: "outside_mm",
        Item.BOOM_HEIGHT: "height_mm",
        Item.WALL: "wall_mm",
        Item.HOLE: "hole_mm",
        Item.HEIGHT: "axis_height_mm",
        Item.BUSH_PERMITTIVITY: "bush_permittivity",
        Item.BUSH_LENGTH: "bush_length_mm",
    }
    start = _reactance_factor(recorded, recorded_mhz)
    for item, field in fields.items():
        old, new = getattr(recorded, field), getattr(drawn, field)
        if math.isclose(old, new, rel_tol=1e-9, abs_tol=1e-9):
            continue
        try:
            growth = abs(_reactance_factor(replace(recorded, **{field: new}), recorded_mhz) / start - 1)
        except ValueError:
            growth = math.inf
        sized = item not in (Item.BUSH_PERMITTIVITY, Item.BUSH_LENGTH)
        other = growth > _LARGEST_GROWTH or (sized and abs(new - old) > _LARGEST_CHANGE * old)
        found.append(Difference(item, f"{old:g}", f"{new:g}", growth, other))
    if not math.isclose(recorded_mhz, drawn_mhz, rel_tol=1e-9):
        growth = abs(_reactance_factor(recorded, drawn_mhz) / start - 1)
        other = growth > _LARGEST_GROWTH or abs(drawn_mhz - recorded_mhz) > _LARGEST_CHANGE * recorded_mhz
        old_text, new_text = f"{recorded_mhz:g} MHz", f"{drawn_mhz:g} MHz"
        found.append(Difference(Item.FREQUENCY, old_text, new_text, growth, other))
    return tuple(found)


def _reactance_factor(mount: BoomMount, frequency_mhz: float) -> float:
    """The factor g of theory for a rod of 0.45 wavelengths, bush included."""
    length_mm = 0.45 * wavelength_mm(frequency_mhz)
    allowance_mm = nearest_closed_form_mm(mount, length_mm, frequency_mhz)
    if mount.style is Style.INSULATED_THROUGH:
        allowance_mm += bush_term_mm(mount, length_mm, frequency_mhz)
    return reactance_factor_from_allowance(
        allowance_mm,
        boom_mm=mount.outside_mm,
        rod_diameter_mm=mount.rod_diameter_mm,
        rod_length_mm=length_mm,
        frequency_mhz=frequency_mhz,
    )
