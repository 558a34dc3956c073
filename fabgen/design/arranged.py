"""The arranged design: where everything is, as numbers and simple shapes.

Frame: x along the boom from the datum face forward, y along the rods (+y left looking forward), z up; the boom's axis
is the x axis. All coordinates in mm.
"""

import math
from typing import Literal

from fabgen.design.design import Design
from fabgen.design.ledger import Ledger, Remark
from fabgen.frozen import frozen

Vector = tuple[float, float, float]
Axis = Literal["x", "y", "z"]
Wall = Literal["+y", "-y", "+z", "-z", "round"]
Source = Literal["printed", "bought", "made"]


@frozen
class Hole:
    """One opening in one wall; a through hole is two of them with one number.

    Attributes:
        piece: boom piece it is drilled in.
        number: hole number on drawings, `H01`, `H02` … in order of station.
        element: the element (or `feed`, `clamp`) it serves.
        wall: the flat wall, or `round`.
        angle_deg: direction of the outward hole axis, from +z towards +y.
        across_mm: from the wall's centre line, growing to +z on ±y walls and to +y on ±z walls; when round, beside the
            radial direction of `angle_deg`.
        pilot_mm: pilot drill; equal to `diameter_mm` where no pilot is needed.
        tolerance_mm: ± on the station.
        drill: the drill's name.
        purpose: `rod`, `bush`, `saddle screw`, `bond screw`, `middle screw`, `feed screw` or `clamp bolt`.
    """

    piece: str
    number: str
    element: str
    station_mm: float
    wall: Wall
    angle_deg: float
    across_mm: float
    diameter_mm: float
    pilot_mm: float
    tolerance_mm: float
    drill: str
    purpose: str

    @property
    def axis(self) -> Vector:
        """Unit vector of the outward hole axis."""
        angle = math.radians(self.angle_deg)
        return (0.0, round(math.sin(angle), 12), round(math.cos(angle), 12))


@frozen
class Frame:
    """Where a part's local frame stands: origin, and where its z and x axes point (unit vectors)."""

    origin: Vector = (0.0, 0.0, 0.0)
    z: Vector = (0.0, 0.0, 1.0)
    x: Vector = (1.0, 0.0, 0.0)

    @property
    def y(self) -> Vector:
        """Where the local y axis points: z × x."""
        (zx, zy, zz), (xx, xy, xz) = self.z, self.x
        return (zy * xz - zz * xy, zz * xx - zx * xz, zx * xy - zy * xx)

    def point(self, local: Vector) -> Vector:
        """A local point in the array's frame."""
        (a, b, c), (u, v, w), o = local, (self.x, self.y, self.z), self.origin
        return (
            o[0] + a * u[0] + b * v[0] + c * w[0],
            o[1] + a * u[1] + b * v[1] + c * w[1],
            o[2] + a * u[2] + b * v[2] + c * w[2],
        )

    def local(self, point: Vector) -> Vector:
        """A point of the array's frame seen from this one."""
        (a, b, c), (u, v, w), o = point, (self.x, self.y, self.z), self.origin
        a, b, c = a - o[0], b - o[1], c - o[2]
        return (
            a * u[0] + b * u[1] + c * u[2],
            a * v[0] + b * v[1] + c * v[2],
            a * w[0] + b * w[1] + c * w[2],
        )


@frozen
class Box:
    """An axis-parallel box between two corners."""

    low: Vector
    high: Vector


@frozen
class Cylinder:
    """A cylinder or ring parallel to an axis; `bore_mm` is 0 when solid."""

    axis: Axis
    centre: Vector
    diameter_mm: float
    length_mm: float
    bore_mm: float = 0.0

    @property
    def box(self) -> Box:
        """The smallest box round it."""
        radius, half = self.diameter_mm / 2, self.length_mm / 2
        x, y, z = self.centre
        a = half if self.axis == "x" else radius
        b = half if self.axis == "y" else radius
        c = half if self.axis == "z" else radius
        return Box((x - a, y - b, z - c), (x + a, y + b, z + c))


Shape = Box | Cylinder
Parameters = tuple[tuple[str, float | str | tuple[tuple[float, ...], ...]], ...]


@frozen
class Placed:
    """One part at one place.

    Attributes:
        name: occurrence name, ASCII, unique, for example `D1 bush left`.
        owner: the element id, `boom`, `feed` or `clamp`.
        part: file in `model/parts`.
        parameters: its keyword arguments, sorted by name; part and parameters together are a distinct part.
        frame: where its local frame stands.
        shapes: simple shapes in the array's frame that together hold the part.
        exact: whether the shapes are the part itself and not an envelope round it.
        source: printed, bought or made in the shop.
        material: name of its material.
        metal: whether it is conductive.
        mass_g: mass of one.
        size: what to call this distinct part on a parts list, ASCII.
    """

    name: str
    owner: str
    part: str
    parameters: Parameters
    frame: Frame
    shapes: tuple[Shape, ...]
    exact: bool
    source: Source
    material: str
    metal: bool
    mass_g: float
    size: str

    @property
    def key(self) -> tuple[str, Parameters]:
        """Equal for equal parts."""
        return (self.part, self.parameters)


@frozen
class Interface:
    """Two placed parts that meet on purpose.

    Attributes:
        first, second: occurrence names.
        kind: for example `bore on rod`, `spigot in hole`, `saddle on boom`, `thread in wall`.
        gap_mm: the smallest nominal distance between the two solids; 0 where they touch.
        fit_mm: diametral clearance, negative for a grip; None where the interface is a face.
    """

    first: str
    second: str
    kind: str
    gap_mm: float
    fit_mm: float | None = None


@frozen
class Piece:
    """One sawn piece of boom; stations of its ends from the datum face."""

    name: str
    start_mm: float
    end_mm: float


@frozen
class Cut:
    """One piece to saw from bar.

    Attributes:
        piece: name on the cut list, for example `D1`, `DE-left`, `boom`.
        element: the element it belongs to, or `boom`.
        stock: what it is sawn from: `rod` or `boom`.
        rod_mm: diameter; for the boom its width.
        cut_mm: sawn length (folded rods: developed length).
        half_mm: half of it, where the centre mark goes; 0 where there is none.
        projection_mm: how far the rod stands out beyond the sides of the boom or a split rod's block; 0 for the boom.
        note: what else is done to the piece, for example a hole across it; empty for most.
    """

    piece: str
    element: str
    stock: Literal["rod", "boom"]
    rod_mm: float
    material: str
    cut_mm: float
    trim_mm: float
    half_mm: float
    projection_mm: float
    tolerance_mm: float
    note: str = ""


@frozen
class Bar:
    """One bar of stock and what is sawn from it, in sawing order.

    Attributes:
        name: for example `rod 4 EN AW-6060 T66 #1`.
        length_mm: as bought.
        pieces: (piece, sawn length with its trim) in order from the trimmed end.
        left_mm: what remains.
    """

    name: str
    length_mm: float
    pieces: tuple[tuple[str, float], ...]
    left_mm: float


@frozen
class CutPlan:
    """Bars with their pieces; `proven` when no plan with fewer bars exists."""

    bars: tuple[Bar, ...]
    proven: bool

    def bar_of(self, piece: str) -> str:
        """Name of the bar a piece is sawn from; empty when it fits no bar."""
        for bar in self.bars:
            if any(name == piece for name, _ in bar.pieces):
                return bar.name
        return ""


@frozen
class Arranged:
    """Design and lengths with everything in its place.

    Attributes:
        remarks: what could not be arranged, with where; rules turn them into findings.
        mast: the mast as a cylinder, for clearances; it is no part of the array.
        mass_g: of the whole array without cable and mast.
        balance_mm: station of the centre of mass, clamp not counted.
        clamp_mm: station of the clamp's middle; None without a clamp or where no place is free.
        clamp_width_mm: along the boom.
        turning_radius_mm: from the mast's axis (or the balance point) to the farthest point of boom and rods.
    """

    design: Design
    ledger: Ledger
    pieces: tuple[Piece, ...]
    holes: tuple[Hole, ...]
    placed: tuple[Placed, ...]
    interfaces: tuple[Interface, ...]
    cuts: tuple[Cut, ...]
    remarks: tuple[tuple[str, Remark], ...]
    mast: Cylinder | None
    mass_g: float
    balance_mm: float
    clamp_mm: float | None
    clamp_width_mm: float
    turning_radius_mm: float

    def part(self, name: str) -> Placed:
        """The placed part of that occurrence name.

        Raises:
            KeyError: there is none.
        """
        for placed in self.placed:
            if placed.name == name:
                return placed
        raise KeyError(name)
