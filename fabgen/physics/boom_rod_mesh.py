"""Surface meshes of a rod: polygon of equal conformal radius, graded along its axis, flat end.

Frame and unit as in `boom_mesh`: rod axis along y, wavelengths.
"""

import math

import numpy as np

from fabgen.physics.boom_integrals import Floats
from fabgen.physics.boom_mesh import grid


def circumradius(radius: float, corners: int) -> float:
    """Circumradius of the regular polygon whose conformal radius is that of a circle.

    Args:
        radius: radius of the circle.
        corners: number of corners.

    Returns:
        The circumradius, in the unit of the radius.

    Source: G. Pólya, G. Szegő, Isoperimetric Inequalities in Mathematical Physics (1951), transfinite diameter of
    a regular polygon; from memory, checked against the square's 0.5902 of the side.
    """
    n = corners
    side_over_radius = 2 ** (1 + 2 / n) * math.sqrt(math.pi) * math.gamma(0.5 + 1 / n) / math.gamma(1 / n)
    return radius * side_over_radius / (2 * math.sin(math.pi / n))


def outline(diameter: float, segments: int, *, height: float | None = None) -> Floats:
    """Corners of the rod's polygon in the x-z plane.

    Args:
        diameter: rod diameter.
        segments: polygon sides per quarter turn.
        height: of a rod off the boom's axis the height of its axis, half a turn is then returned, bottom to top;
            left out: a quarter turn round the origin from +x to +z.

    Returns:
        (K, 2) x and z.
    """
    radius = circumradius(diameter / 2, 4 * segments)
    if height is None:
        angle = np.linspace(0.0, np.pi / 2, segments + 1)
        points = radius * np.stack([np.cos(angle), np.sin(angle)], axis=1)
        points[-1, 0] = points[0, 1] = 0.0
        return np.asarray(points)
    angle = np.linspace(-np.pi / 2, np.pi / 2, 2 * segments + 1)
    points = np.stack([radius * np.cos(angle), height + radius * np.sin(angle)], axis=1)
    points[0, 0] = points[-1, 0] = 0.0
    return np.asarray(points)


def graded(length: float, first: float, last: float, growth: float, largest: float) -> Floats:
    """Positions from 0 to 1 whose steps grow from both ends towards the middle.

    Args:
        length: the length to divide.
        first: step wanted at 0.
        last: step wanted at 1.
        growth: ratio of neighbouring steps.
        largest: largest step.

    Returns:
        Increasing positions, 0 and 1 included.
    """
    x = np.linspace(0.0, length, 4001)
    size = np.minimum(first + (growth - 1) * x, last + (growth - 1) * (length - x))
    density = 1 / np.minimum(size, largest)
    counted = np.concatenate([[0.0], np.cumsum(0.5 * (density[1:] + density[:-1]) * np.diff(x))])
    steps = max(1, round(counted[-1]))
    positions = np.interp(np.linspace(0.0, counted[-1], steps + 1), counted, x / length)
    positions[0], positions[-1] = 0.0, 1.0
    return np.asarray(positions)


def rod_surface(section: Floats, base: Floats, end: float, positions: Floats) -> list[Floats]:
    """Side and flat end of a rod.

    Args:
        section: (K, 2) x and z of the polygon's corners.
        base: (K,) y at which each corner's line starts.
        end: y of the flat end.
        positions: graded positions from 0 to 1 between base and end.

    Returns:
        Pieces of surface.
    """
    y = base[:, None] + (end - base[:, None]) * positions[None]
    nodes = np.empty((*y.shape, 3))
    nodes[..., 0], nodes[..., 2] = section[:, 0, None], section[:, 1, None]
    nodes[..., 1] = y
    rim = nodes[:, -1]
    middle = np.array([0.0, end, _axis_height(section)])
    cap = np.stack([rim[:-1], rim[1:], np.broadcast_to(middle, rim[1:].shape)], axis=1)
    return [grid(nodes), cap]


def _axis_height(section: Floats) -> float:
    """A quarter turn starts on the axis' level; a half turn has its middle there."""
    quarter = section[-1, 0] == 0.0 and section[0, 0] > 0.0
    return float(section[0, 1] if quarter else 0.5 * (section[0, 1] + section[-1, 1]))
