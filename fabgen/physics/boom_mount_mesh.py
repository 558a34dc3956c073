"""Meshes of a free rod and of a rod in its mount on a boom.

Frame and unit as in `boom_mesh`; the boom is cut on each side of the rod, its ends open.
"""

import numpy as np

from fabgen.frozen import frozen
from fabgen.physics.boom_integrals import Floats
from fabgen.physics.boom_mesh import Mesh, weld
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.physics.boom_rod_mesh import graded, outline, rod_surface
from fabgen.physics.boom_skin_mesh import (
    FlatSkin,
    RoundSkin,
    Skin,
    SkinCells,
    hole_on,
    hole_wall,
    skin_with_hole,
    whole_skin,
)

LONG_BOOM_HALF_WL = 0.3
"""Where a long boom is cut: what lies beyond moves an allowance by a few tenths of a per cent, 2 % at B .055."""
_INSIDE_LENGTHS = 1.5


@frozen
class Fineness:
    """How finely rod and boom are divided.

    Attributes:
        up: cells from the boom's side line to its fold, a quarter circumference of a round boom.
        along: further cells of the patch round a hole; up + along sides make a quarter of the rod's polygon.
        over: cells from a flat boom's corner to its top line.
        on_top_segments: sides per quarter of a rod above the boom.
        growth: ratio of neighbouring steps.
        rod_step_wl: largest step along the rod.
        boom_step_wl: largest step along the boom.
        tip_ratio: step at the rod's tip, in rod radii.
        near_ratio: steps under a rod above the boom, against the default.
    """

    up: int = 4
    along: int = 3
    over: int = 4
    on_top_segments: int = 4
    growth: float = 1.5
    rod_step_wl: float = 0.03
    boom_step_wl: float = 0.04
    tip_ratio: float = 0.5
    near_ratio: float = 1.0


DEFAULT = Fineness()
FINE = Fineness(
    up=5, along=4, over=5, on_top_segments=5, growth=1.4, rod_step_wl=0.025, boom_step_wl=0.03, near_ratio=0.7
)


def rod_segments(style: Style, fineness: Fineness) -> int:
    """Sides per quarter turn of the rod's polygon; free and mounted rods share it.

    Args:
        style: how the rod meets the boom.
        fineness: mesh fineness.

    Returns:
        The number of sides.
    """
    return fineness.on_top_segments if style is Style.ON_TOP else fineness.up + fineness.along


def free_rod_mesh(diameter_wl: float, length_wl: float, segments: int, fineness: Fineness) -> Mesh:
    """One eighth of a rod in free space.

    Args:
        diameter_wl: rod diameter.
        length_wl: rod length.
        segments: sides per quarter turn.
        fineness: mesh fineness.

    Returns:
        The mesh.
    """
    section = outline(diameter_wl, segments)
    tip = fineness.tip_ratio * diameter_wl / 2
    steps = graded(length_wl / 2, fineness.rod_step_wl, tip, fineness.growth, fineness.rod_step_wl)
    return weld(rod_surface(section, np.zeros(len(section)), length_wl / 2, steps), mirror_z=True)


def mounted_rod_mesh(
    mount: BoomMount,
    wl_mm: float,
    length_wl: float,
    fineness: Fineness,
    boom_half_wl: float = LONG_BOOM_HALF_WL,
) -> Mesh:
    """One eighth (on top: one quarter) of a rod in its mount on a boom.

    Args:
        mount: the mount; bush and film are left out.
        wl_mm: wavelength.
        length_wl: length of the mounted rod, tip to tip.
        fineness: mesh fineness.
        boom_half_wl: boom on each side of the rod.

    Returns:
        The mesh.
    """
    if mount.style is Style.BONDED_THROUGH:
        return _bonded(mount, wl_mm, length_wl, fineness, boom_half_wl)
    if mount.style is Style.INSULATED_THROUGH:
        return _insulated(mount, wl_mm, length_wl, fineness, boom_half_wl)
    return _on_top(mount, wl_mm, length_wl, fineness, boom_half_wl)


def _skin(mount: BoomMount, wl_mm: float, fineness: Fineness, *, inset_mm: float = 0.0, more_cells: int = 0) -> Skin:
    width = (mount.outside_mm - 2 * inset_mm) / wl_mm
    if mount.section is Section.ROUND:
        return RoundSkin(width, fineness.up + more_cells)
    height_mm = mount.height_mm or mount.outside_mm
    return FlatSkin(width, (height_mm - 2 * inset_mm) / wl_mm)


def _cells(mount: BoomMount, fineness: Fineness, largest: float) -> SkinCells:
    over = 0 if mount.section is Section.ROUND else fineness.over
    return SkinCells(fineness.up, fineness.along, over, fineness.growth, largest)


def _bonded(mount: BoomMount, wl_mm: float, length_wl: float, fineness: Fineness, boom_half_wl: float) -> Mesh:
    diameter = mount.rod_diameter_mm / wl_mm
    section = outline(diameter, fineness.up + fineness.along)
    skin = _skin(mount, wl_mm, fineness)
    cells = _cells(mount, fineness, fineness.boom_step_wl)
    free = (length_wl - mount.outside_mm / wl_mm) / 2
    tip = fineness.tip_ratio * diameter / 2
    steps = graded(free, diameter / 2, tip, fineness.growth, fineness.rod_step_wl)
    rod = rod_surface(section, hole_on(skin, section)[:, 1], length_wl / 2, steps)
    return weld(rod + skin_with_hole(skin, section, boom_half_wl, cells), mirror_z=True)


def _insulated(mount: BoomMount, wl_mm: float, length_wl: float, fineness: Fineness, boom_half_wl: float) -> Mesh:
    diameter, wall = mount.rod_diameter_mm / wl_mm, mount.wall_mm / wl_mm
    half = mount.outside_mm / wl_mm / 2
    gap = (mount.hole_mm - mount.rod_diameter_mm) / 2 / wl_mm
    growth = fineness.growth
    hole = outline(mount.hole_mm / wl_mm, fineness.up + fineness.along)
    skin = _skin(mount, wl_mm, fineness)
    outer = hole_on(skin, hole)
    pieces = skin_with_hole(skin, hole, boom_half_wl, _cells(mount, fineness, fineness.boom_step_wl))
    tip = fineness.tip_ratio * diameter / 2
    outside = graded(length_wl / 2 - half, gap, tip, growth, fineness.rod_step_wl)
    if mount.solid:
        buried = graded(half, gap, gap, growth, half / 3)
        pieces.append(hole_wall(outer * np.array([1.0, 0.0, 1.0]), outer, buried))
        steps = _joined((half, buried), (length_wl / 2 - half, outside))
    else:
        inside = _skin(mount, wl_mm, fineness, inset_mm=mount.wall_mm)
        bore = 2 * (half - wall)
        pieces += skin_with_hole(
            inside, hole, min(_INSIDE_LENGTHS * 2 * half, boom_half_wl), _cells(mount, fineness, bore / 3)
        )
        through = np.linspace(0.0, 1.0, max(2, round(wall / gap / 2)) + 1)
        pieces.append(hole_wall(hole_on(inside, hole), outer, through))
        buried = graded(bore / 2, bore / 8, gap, growth, bore / 8)
        steps = _joined((bore / 2, buried), (wall, through), (length_wl / 2 - half, outside))
    section = outline(diameter, fineness.up + fineness.along)
    return weld(rod_surface(section, np.zeros(len(section)), length_wl / 2, steps) + pieces, mirror_z=True)


def _on_top(mount: BoomMount, wl_mm: float, length_wl: float, fineness: Fineness, boom_half_wl: float) -> Mesh:
    diameter, gap = mount.rod_diameter_mm / wl_mm, mount.gap_mm / wl_mm
    growth, near = fineness.growth, fineness.near_ratio
    skin = _skin(mount, wl_mm, fineness, more_cells=2)
    top = skin.radius_wl if isinstance(skin, RoundSkin) else skin.height_wl / 2
    section = outline(diameter, fineness.on_top_segments, height_wl=top + mount.axis_height_mm / wl_mm)
    first = near * min(gap + diameter / 4, skin.quarter_wl / 4)
    along = graded(boom_half_wl, first, boom_half_wl, growth, fineness.boom_step_wl)
    around = _around(skin, near * (gap + diameter / 2), fineness)
    tip = fineness.tip_ratio * diameter / 2
    steps = graded(length_wl / 2, near * (gap + diameter / 2), tip, growth, fineness.rod_step_wl)
    rod = rod_surface(section, np.zeros(len(section)), length_wl / 2, steps)
    return weld(rod + whole_skin(skin, boom_half_wl * along, around), mirror_z=False)


def _around(skin: Skin, first: float, fineness: Fineness) -> Floats:
    """Unrolled nodes from the top line to the bottom line, fine below the rod and at corners."""
    growth, cells = fineness.growth, fineness.up
    if isinstance(skin, RoundSkin):
        turn = 2 * skin.quarter_wl
        return np.asarray(
            skin.quarter_wl - turn * graded(turn, first, turn, growth, skin.quarter_wl / skin.quarter_cells)
        )
    half, side = skin.width_wl / 2, skin.height_wl
    top = graded(half, first, half / (1.5 * cells), growth, half / (cells - 1))
    flank = graded(side, side / (3 * cells), side / (2 * cells), growth, side / (cells - 1))
    below = graded(half, half / cells, half, growth, half / (cells / 2))
    return np.concatenate(
        [skin.quarter_wl - half * top, skin.fold_wl - side * flank[1:], -skin.fold_wl - half * below[1:]]
    )


def _joined(*parts: tuple[float, Floats]) -> Floats:
    """Positions from 0 to 1 over stretches that each have their own."""
    positions, start = [np.zeros(1)], 0.0
    for length, steps in parts:
        positions.append(start + length * steps[1:])
        start += length
    return np.concatenate(positions) / start
