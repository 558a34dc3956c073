"""Surface meshes of a rod: polygon of equal conformal radius, graded along its axis, flat end.

Frame and unit as in `boom_mesh`: rod axis along y, wavelengths.
"""

import math

import numpy as np

from fabgen.physics.boom_integrals import Floats
from fabgen.physics.boom_mesh import grid


def circumradius(radius_wl: float, corners: int) -> float:
    """Circumradius of the regular polygon whose conformal radius is that of a circle.

    Args:
        radius_wl: radius of the circle.
        corners: number of corners.

    Returns:
        The circumradius, in the unit of the radius.

    Source: G. Pólya, G. Szegő, Isoperimetric Inequalities in Mathematical Physics (1951), transfinite diameter of
    a regular polygon; from memory, checked against the square's 0.5902 of the side.
    """
    n = corners
    side_over_radius = 2 ** (1 + 2 / n) * math.sqrt(math.pi) * math.gamma(0.5 + 1 / n) / math.gamma(1 / n)
    return radius_wl * side_over_radius / (2 * math.sin(math.pi / n))


def outline(diameter_wl: float, segments: int, *, height_wl: float | None = None) -> Floats:
    """Corners of the rod's polygon in the x-z plane.

    Args:
        diameter_wl: rod diameter.
        segments: polygon sides per quarter turn.
        height_wl: of a rod off the boom's axis the height of its axis, half a turn is then returned, bottom to top;
            left out: a quarter turn round the origin from +x to +z.

    Returns:
        (K, 2) x and z.
    """
    radius_wl = circumradius(diameter_wl / 2, 4 * segments)
    if height_wl is None:
        angle = np.linspace(0.0, np.pi / 2, segments + 1)
        points = radius_wl * np.stack([np.cos(angle), np.sin(angle)], axis=1)
        points[-1, 0] = points[0, 1] = 0.0
        return np.asarray(points)
    angle = np.linspace(-np.pi / 2, np.pi / 2, 2 * segments + 1)
    points = np.stack([radius_wl * np.cos(angle), height_wl + radius_wl * np.sin(angle)], axis=1)
    points[0, 0] = points[-1, 0] = 0.0
    return np.asarray(points)


def graded(length_wl: float, first_wl: float, last_wl: float, growth: float, largest_wl: float) -> Floats:
    """Positions from 0 to 1 whose steps grow from both ends towards the middle.

    Args:
        length_wl: the length to divide.
        first_wl: step wanted at 0.
        last_wl: step wanted at 1.
        growth: ratio of neighbouring steps.
        largest_wl: largest step.

    Returns:
        Increasing positions, 0 and 1 included.
    """
    x = np.linspace(0.0, length_wl, 4001)
    size = np.minimum(first_wl + (growth - 1) * x, last_wl + (growth - 1) * (length_wl - x))
    density = 1 / np.minimum(size, largest_wl)
    counted = np.concatenate([[0.0], np.cumsum(0.5 * (density[1:] + density[:-1]) * np.diff(x))])
    steps = max(1, round(counted[-1]))
    positions = np.interp(np.linspace(0.0, counted[-1], steps + 1), counted, x / length_wl)
    positions[0], positions[-1] = 0.0, 1.0
    return np.asarray(positions)


def rod_surface(section: Floats, base: Floats, end_wl: float, positions: Floats) -> list[Floats]:
    """Side and flat end of a rod.

    Args:
        section: (K, 2) x and z of the polygon's corners.
        base: (K,) y at which each corner's line starts.
        end_wl: y of the flat end.
        positions: graded positions from 0 to 1 between base and end.

    Returns:
        Pieces of surface.
    """
    y = base[:, None] + (end_wl - base[:, None]) * positions[None]
    nodes = np.empty((*y.shape, 3))
    nodes[..., 0], nodes[..., 2] = section[:, 0, None], section[:, 1, None]
    nodes[..., 1] = y
    rim = nodes[:, -1]
    middle = np.array([0.0, end_wl, _axis_height(section)])
    cap = np.stack([rim[:-1], rim[1:], np.broadcast_to(middle, rim[1:].shape)], axis=1)
    return [grid(nodes), cap]


def _axis_height(section: Floats) -> float:
    """A quarter turn starts on the axis' level; a half turn has its middle there."""
    quarter = section[-1, 0] == 0.0 and section[0, 0] > 0.0
    return float(section[0, 1] if quarter else 0.5 * (section[0, 1] + section[-1, 1]))
