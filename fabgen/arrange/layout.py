"""What one mount, feed or clamp adds to the array, and how a part gets to its place."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal

from fabgen.arrange.drilling import Opening
from fabgen.arrange.part_list import PARTS, size_of
from fabgen.design.arranged import Axis, Box, Cylinder, Frame, Interface, Parameters, Placed, Shape, Vector
from fabgen.design.design import Material
from fabgen.design.ledger import Remark

Side = Literal[1, -1]
"""+1 is the left side (+y), −1 the right side."""

SIDES: tuple[Side, Side] = (1, -1)
Value = float | str | tuple[tuple[float, ...], ...]


@dataclass(slots=True)
class Layout:
    """Holes, parts, interfaces and remarks while an array is being put together."""

    openings: list[Opening] = field(default_factory=list)
    placed: list[Placed] = field(default_factory=list)
    interfaces: list[Interface] = field(default_factory=list)
    remarks: list[tuple[str, Remark]] = field(default_factory=list)

    def add(self, other: "Layout") -> None:
        """Take over everything of another layout."""
        self.openings += other.openings
        self.placed += other.placed
        self.interfaces += other.interfaces
        self.remarks += other.remarks

    def put(
        self,
        part: str,
        name: str,
        parameters: Mapping[str, Value],
        *,
        owner: str,
        label: str,
        material: Material,
        frame: Frame,
        exact: bool = False,
    ) -> Placed:
        """Put one part at its place.

        Args:
            part: file in `model/parts`.
            name: occurrence name, unique in the array.
            parameters: the part's keyword arguments.
            owner: element id, `boom` or `clamp`.
            label: what to call the part on the parts list.
            material: for mass and rules.
            frame: where the part's local frame stands; axes parallel to the array's.
            exact: whether its simple shapes are the part itself.

        Raises:
            ValueError: no such part can be made with these numbers.
        """
        frozen = sorted_parameters(parameters)
        volume_mm3, shapes = size_of(part, frozen)
        placed = Placed(
            name=name,
            owner=owner,
            part=part,
            parameters=frozen,
            frame=frame,
            shapes=tuple(moved(shape, frame) for shape in shapes),
            exact=exact,
            source=PARTS[part][1],
            material=material.name,
            metal=material.conductive,
            mass_g=volume_mm3 * material.density_kg_m3 / 1e6,
            size=label,
        )
        self.placed.append(placed)
        return placed

    def meet(self, first: str, second: str, kind: str, gap_mm: float, fit_mm: float | None = None) -> None:
        """Declare that two parts meet on purpose; see `Interface`."""
        self.interfaces.append(Interface(first, second, kind, gap_mm, fit_mm))


def sorted_parameters(parameters: Mapping[str, Value]) -> Parameters:
    """Keyword arguments in order of name, lengths rounded to a nanometre so that equal parts are equal."""
    return tuple(
        (name, round(value, 6) if isinstance(value, float) else value) for name, value in sorted(parameters.items())
    )


def moved(shape: Shape, frame: Frame) -> Shape:
    """A shape of a part's local frame in the array's frame."""
    if isinstance(shape, Box):
        first, second = frame.point(shape.low), frame.point(shape.high)
        low, high = tuple(map(min, first, second)), tuple(map(max, first, second))
        return Box((low[0], low[1], low[2]), (high[0], high[1], high[2]))
    local: dict[Axis, Vector] = {"x": frame.x, "y": frame.y, "z": frame.z}
    return Cylinder(
        _axis_of(local[shape.axis]), frame.point(shape.centre), shape.diameter_mm, shape.length_mm, shape.bore_mm
    )


def _axis_of(direction: Vector) -> Axis:
    axes: tuple[Axis, ...] = ("x", "y", "z")
    return max(zip(axes, map(abs, direction), strict=True), key=lambda pair: pair[1])[0]


def outward(side: Side) -> Vector:
    """Unit vector from the boom to the left (+1) or right (−1) tip."""
    return (0.0, float(side), 0.0)


def side_name(side: Side) -> str:
    """`left` or `right`, looking forward."""
    return "left" if side > 0 else "right"
