"""What of a part lies near another one.

A boom or a rod is the same all along, so its piece beside a bush is the same for every element; measured on that piece,
hundreds of placements become a handful.
"""

import itertools
from typing import Any, NamedTuple

from fabgen.design.arranged import Frame, Parameters, Placed, Vector
from fabgen.design.distances import bounding_box
from fabgen.model.kernel import cq
from fabgen.model.solids import solid_of, without_growth

_DECIMALS = 7
_BEYOND_MM = 1.0


class Body(NamedTuple):
    """A distinct part, or the piece of one, with its bores at the size they come out with."""

    part: str
    parameters: Parameters

    @property
    def solid(self) -> cq.Solid:
        """Its solid, built once."""
        return solid_of(self.part, self.parameters)


def neighbourhood(placed: Placed, other: Placed, distance_mm: float) -> tuple[Body, Frame]:
    """The part without what lies farther from the other part than their distance, and where that piece stands.

    Args:
        placed: the part.
        other: the part beside it.
        distance_mm: of the two, at most.
    """
    parameters = dict(without_growth(placed.parameters))
    frame, margin_mm = placed.frame, distance_mm + _BEYOND_MM
    if placed.part == "boom":
        frame = _boom_piece(parameters, frame, _span(other, frame.origin, frame.x, margin_mm))
    elif placed.part == "rod" and not parameters.get("cross_hole_mm"):
        frame = _rod_piece(parameters, frame, _span(other, frame.origin, frame.z, margin_mm))
    return Body(placed.part, tuple(sorted(parameters.items()))), frame


def relative(first: Frame, second: Frame) -> Frame:
    """Where the second frame stands in the first one, rounded so that equal placements are equal."""
    turned = Frame(z=first.z, x=first.x)
    return Frame(
        _rounded(first.local(second.origin)), _rounded(turned.local(second.z)), _rounded(turned.local(second.x))
    )


def _rounded(vector: Vector) -> Vector:
    x, y, z = (round(value, _DECIMALS) + 0.0 for value in vector)  # takes the sign from -0.0
    return (x, y, z)


def _span(other: Placed, origin: Vector, axis: Vector, margin_mm: float) -> tuple[float, float]:
    """From where to where the other part reaches along an axis, with a margin."""
    box = bounding_box(other.shapes)
    corners = itertools.product(*zip(box.low, box.high, strict=True))
    along = [sum((c - o) * a for c, o, a in zip(corner, origin, axis, strict=True)) for corner in corners]
    return round(min(along) - margin_mm, _DECIMALS), round(max(along) + margin_mm, _DECIMALS)


def _boom_piece(parameters: dict[str, Any], frame: Frame, span: tuple[float, float]) -> Frame:
    """Shorten a boom to the span, holes kept whole; return where the piece stands."""
    low, high = span
    holes = [(hole[0] - hole[3] / 2 - _BEYOND_MM, hole[0] + hole[3] / 2 + _BEYOND_MM) for hole in parameters["holes"]]
    while crossed := [(start, end) for start, end in holes if start < low < end or start < high < end]:
        low = min([low, *(start for start, end in crossed if start < low < end)])
        high = max([high, *(end for start, end in crossed if start < high < end)])
    low, high = max(low, 0.0), min(high, parameters["length_mm"])
    kept = [hole for hole in parameters["holes"] if low < hole[0] < high]
    parameters["holes"] = tuple((round(hole[0] - low, _DECIMALS), *hole[1:]) for hole in kept)
    parameters["length_mm"] = round(high - low, _DECIMALS)
    return Frame(frame.point((low, 0.0, 0.0)), frame.z, frame.x)


def _rod_piece(parameters: dict[str, Any], frame: Frame, span: tuple[float, float]) -> Frame:
    """Shorten a rod without a hole to the span; return where the piece stands."""
    half = parameters["length_mm"] / 2
    low, high = max(span[0], -half), min(span[1], half)
    parameters["length_mm"] = round(high - low, _DECIMALS)
    return Frame(frame.point((0.0, 0.0, (low + high) / 2)), frame.z, frame.x)
