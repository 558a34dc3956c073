"""Boom to mast: a metal plate against the boom, U-bolts round the mast, and what keeps a thin tube from being crushed.

With horizontal rods the mast is upright and the plate stands on the boom's −y side; with vertical rods mast and
rods are parallel and the plate lies under the boom. A boom with flat walls is bolted through, a crush sleeve round
each bolt inside the tube; a round boom is held by U-bolts of its own, a sleeve inside it.
"""

import math

from fabgen.arrange.drilling import Opening
from fabgen.arrange.fasteners import bought_material, nut, screw, washer
from fabgen.arrange.layout import Layout
from fabgen.design.arranged import Axis, Cylinder, Frame, Vector
from fabgen.design.design import Clamp, Design
from fabgen.design.part_fasteners import fastener, sold_length_mm
from fabgen.frozen import frozen
from fabgen.stock import tables

PLATE = "clamp plate"
BOLT = "M6"
U_BOLT_MM = 6.0
EDGE_MM = 12.0
"""Hole axis to the plate's edge: 2 d of M6 (EN 1993-1-8 asks for 1.2 d at least)."""
ROOM_MM = 2.0
"""Between a washer and whatever stands beside it."""
SLEEVE_OUTSIDE_MM, SLEEVE_BORE_MM = 10.0, 6.4
SLEEVE_MATERIAL = "EN AW-6060 T66"
SLEEVE_PLAY_MM = 0.2
"""Diametral play of what is pushed into the boom from its end. Source: common practice."""
TUBE_SLEEVE_WALL_MM = 2.0


@frozen
class ClampSize:
    """The clamp's plate and holes; local x along the boom, y across it, z away from the boom.

    Attributes:
        width_mm: along the boom.
        height_mm: across it.
        bolt_x_mm: ±x of the boom's bolts, or of its U-bolts.
        bolt_t_mm: ±y of the boom's U-bolt legs; 0 with through bolts.
        leg_x_mm: ±x of the mast's U-bolt legs.
        leg_t_mm: ±y of the mast's U-bolts.
    """

    width_mm: float
    height_mm: float
    plate_mm: float
    bolt_x_mm: float
    bolt_t_mm: float
    leg_x_mm: float
    leg_t_mm: float

    @property
    def holes(self) -> tuple[tuple[float, float, float], ...]:
        """x, y, diameter of every hole."""
        hole_mm = fastener(BOLT).clearance_mm
        bolts = [(x, t) for x in (-self.bolt_x_mm, self.bolt_x_mm) for t in sorted({-self.bolt_t_mm, self.bolt_t_mm})]
        legs = [(x, t) for x in (-self.leg_x_mm, self.leg_x_mm) for t in (-self.leg_t_mm, self.leg_t_mm)]
        return tuple((x, t + 0.0, hole_mm) for x, t in bolts + legs)


def clamp_size(design: Design, clamp: Clamp) -> ClampSize:
    """Plate and holes for a boom and a mast."""
    _, across_mm = _extents(design)
    half_mm = tables.washer(BOLT).outside_mm / 2
    leg_x_mm = (clamp.mast_mm + U_BOLT_MM) / 2
    if design.boom.section == "round":
        bolt_t_mm = (across_mm + U_BOLT_MM) / 2
        bolt_x_mm = math.ceil(leg_x_mm + 2 * half_mm + ROOM_MM)
    else:
        bolt_t_mm = 0.0
        bolt_x_mm = math.ceil(clamp.mast_mm / 2 + half_mm + ROOM_MM)
    leg_t_mm = math.ceil(across_mm / 2 + half_mm + ROOM_MM)
    return ClampSize(
        width_mm=2.0 * (max(bolt_x_mm, leg_x_mm) + EDGE_MM),
        height_mm=2.0 * (max(bolt_t_mm, leg_t_mm) + EDGE_MM),
        plate_mm=clamp.plate_mm,
        bolt_x_mm=float(bolt_x_mm),
        bolt_t_mm=bolt_t_mm,
        leg_x_mm=leg_x_mm,
        leg_t_mm=float(leg_t_mm),
    )


def lay_out(design: Design, clamp: Clamp, station_mm: float) -> tuple[Layout, Cylinder]:
    """Plate, U-bolts, bolts, sleeves and holes at a station, and the mast for clearances."""
    size = clamp_size(design, clamp)
    layout = Layout()
    depth_mm, across_mm = _extents(design)
    away = _away(design)
    face_mm = depth_mm / 2
    layout.put(
        "clamp_plate",
        PLATE,
        {
            "width_mm": size.width_mm,
            "height_mm": size.height_mm,
            "thickness_mm": size.plate_mm,
            "holes": size.holes,
        },
        owner="clamp",
        label=f"clamp plate {size.width_mm:g} x {size.height_mm:g} x {size.plate_mm:g}",
        material=clamp.material,
        frame=Frame(_at(station_mm, away, face_mm), z=away),
    )
    layout.meet(PLATE, "boom", "plate on boom", 0.0)
    mast_mm = face_mm + size.plate_mm + clamp.mast_mm / 2
    _mast_bolts(layout, clamp, size, station_mm, away, mast_mm)
    if design.boom.section == "round":
        _boom_u_bolts(layout, design, size, station_mm, away)
    else:
        _through_bolts(layout, design, size, station_mm, away)
    along: Axis = "z" if design.polarisation == "horizontal" else "y"
    return layout, Cylinder(along, _at(station_mm, away, mast_mm), clamp.mast_mm, 20 * across_mm + 400.0)


def _mast_bolts(layout: Layout, clamp: Clamp, size: ClampSize, station_mm: float, away: Vector, mast_mm: float) -> None:
    """Two U-bolts round the mast, nuts on the boom's side of the plate."""
    face_mm = mast_mm - clamp.mast_mm / 2 - size.plate_mm
    nut_mm = tables.nut(BOLT).height_mm
    leg_mm = math.ceil(clamp.mast_mm / 2 + size.plate_mm + 2 * nut_mm)
    for count, across_mm in enumerate((-size.leg_t_mm, size.leg_t_mm), start=1):
        _u_bolt(
            layout,
            f"mast U-bolt {count}",
            clamp.mast_mm,
            leg_mm,
            Frame(_at(station_mm, away, mast_mm, across_mm), z=away),
            legs=[(side * size.leg_x_mm, across_mm) for side in (-1, 1)],
            station_mm=station_mm,
            away=away,
            face_mm=face_mm,
            up=_minus(away),
        )


def _boom_u_bolts(layout: Layout, design: Design, size: ClampSize, station_mm: float, away: Vector) -> None:
    """Two U-bolts round a round boom, nuts on the mast's side of the plate, and a sleeve inside a tube."""
    boom = design.boom
    face_mm = boom.width_mm / 2 + size.plate_mm
    leg_mm = math.ceil(face_mm + 2 * tables.nut(BOLT).height_mm)
    turned = _turned(away)
    for count, x_mm in enumerate((-size.bolt_x_mm, size.bolt_x_mm), start=1):
        frame = Frame((station_mm + x_mm, 0.0, 0.0), z=_minus(away), x=turned)
        _u_bolt(
            layout,
            f"boom U-bolt {count}",
            boom.width_mm,
            leg_mm,
            frame,
            legs=[(x_mm, side * size.bolt_t_mm) for side in (-1, 1)],
            station_mm=station_mm,
            away=away,
            face_mm=face_mm,
            up=away,
        )
        layout.meet(f"boom U-bolt {count}", "boom", "bow on boom", 0.0)
    if boom.hollow:
        outside_mm = boom.inside_width_mm - SLEEVE_PLAY_MM
        frame = Frame((station_mm - size.width_mm / 2, 0.0, 0.0), z=(1.0, 0.0, 0.0), x=(0.0, 1.0, 0.0))
        bore_mm = outside_mm - 2 * TUBE_SLEEVE_WALL_MM
        _sleeve(layout, "clamp tube sleeve", frame, size.width_mm, bore_mm, outside_mm)
        layout.meet("clamp tube sleeve", "boom", "sleeve in tube", SLEEVE_PLAY_MM / 2, SLEEVE_PLAY_MM)


def _u_bolt(
    layout: Layout,
    name: str,
    inside_mm: float,
    leg_mm: float,
    frame: Frame,
    *,
    legs: list[tuple[float, float]],
    station_mm: float,
    away: Vector,
    face_mm: float,
    up: Vector,
) -> None:
    """One U-bolt with washers and nuts on a face of the plate."""
    layout.put(
        "u_bolt",
        name,
        {
            "inside_mm": inside_mm,
            "rod_diameter_mm": U_BOLT_MM,
            "leg_mm": float(leg_mm),
        },
        owner="clamp",
        label=f"U-bolt {BOLT} for {inside_mm:g}",
        material=bought_material(),
        frame=frame,
    )
    play_mm = fastener(BOLT).clearance_mm - U_BOLT_MM
    layout.meet(name, PLATE, "leg in plate", play_mm / 2, play_mm)
    for count, (x_mm, across_mm) in enumerate(legs, start=1):
        seat = _at(station_mm + x_mm, away, face_mm, across_mm)
        _washer_and_nut(layout, f"{name} {count}", seat, up, name)


def _washer_and_nut(layout: Layout, name: str, seat: Vector, up: Vector, bolt: str) -> None:
    """A washer on the plate and a nut on it."""
    ring, hexagon = f"{name} washer", f"{name} nut"
    washer(layout, ring, BOLT, owner="clamp", seat=seat, up=up)
    thickness_mm = tables.washer(BOLT).thickness_mm
    top = (seat[0] + thickness_mm * up[0], seat[1] + thickness_mm * up[1], seat[2] + thickness_mm * up[2])
    nut(layout, hexagon, BOLT, owner="clamp", seat=top, up=up)
    layout.meet(ring, PLATE, "washer on plate", 0.0)
    layout.meet(hexagon, ring, "nut on washer", 0.0)
    layout.meet(hexagon, bolt, "thread in nut", 0.0, 0.0)
    play_mm = tables.washer(BOLT).bore_mm - U_BOLT_MM
    layout.meet(ring, bolt, "bolt in washer", play_mm / 2, play_mm)


def _through_bolts(layout: Layout, design: Design, size: ClampSize, station_mm: float, away: Vector) -> None:
    """Two bolts through boom and plate, a crush sleeve round each inside a tube."""
    boom = design.boom
    depth_mm, across_mm = _extents(design)
    bore_mm = across_mm - 2 * boom.wall_mm
    if boom.hollow and bore_mm < SLEEVE_OUTSIDE_MM + SLEEVE_PLAY_MM:
        raise ValueError(
            f"a crush sleeve of {SLEEVE_OUTSIDE_MM:g} mm does not go into a boom of {bore_mm:g} mm inside; take a "
            f"larger boom, a solid one, or leave the clamp out"
        )
    hole_mm = fastener(BOLT).clearance_mm
    horizontal = design.polarisation == "horizontal"
    thickness_mm, nut_mm = tables.washer(BOLT).thickness_mm, tables.nut(BOLT).height_mm
    length_mm = sold_length_mm(depth_mm + size.plate_mm + 2 * thickness_mm + nut_mm + 2.0)
    for count, offset_mm in enumerate((-size.bolt_x_mm, size.bolt_x_mm), start=1):
        x_mm = station_mm + offset_mm
        layout.openings.append(
            Opening("clamp", x_mm, ("+y", "-y") if horizontal else ("+z", "-z"), 0.0, hole_mm, "clamp bolt")
        )
        name = f"clamp bolt {count}"
        under = f"{name} head washer"
        washer(layout, under, BOLT, owner="clamp", seat=_at(x_mm, away, -depth_mm / 2), up=_minus(away))
        seat = _at(x_mm, away, -depth_mm / 2 - thickness_mm)
        screw(layout, name, BOLT, length_mm, owner="clamp", seat=seat, up=_minus(away), head="hex")
        layout.meet(under, "boom", "washer on boom", 0.0)
        layout.meet(name, under, "head on washer", 0.0, tables.washer(BOLT).bore_mm - U_BOLT_MM)
        layout.meet(name, "boom", "bolt in hole", (hole_mm - U_BOLT_MM) / 2, hole_mm - U_BOLT_MM)
        layout.meet(name, PLATE, "bolt in plate", (hole_mm - U_BOLT_MM) / 2, hole_mm - U_BOLT_MM)
        face_mm = depth_mm / 2 + size.plate_mm
        _washer_and_nut(layout, name, _at(x_mm, away, face_mm), away, name)
        if boom.hollow:
            inside_mm = depth_mm - 2 * boom.wall_mm
            sleeve = f"{name} crush sleeve"
            frame = Frame(_at(x_mm, away, -inside_mm / 2), z=away)
            _sleeve(layout, sleeve, frame, inside_mm, SLEEVE_BORE_MM, SLEEVE_OUTSIDE_MM)
            layout.meet(sleeve, "boom", "sleeve between walls", 0.0)
            layout.meet(name, sleeve, "bolt in sleeve", (SLEEVE_BORE_MM - U_BOLT_MM) / 2, SLEEVE_BORE_MM - U_BOLT_MM)


def _sleeve(layout: Layout, name: str, frame: Frame, length_mm: float, bore_mm: float, outside_mm: float) -> None:
    """What takes the bolts' grip so that the tube does not."""
    layout.put(
        "crush_sleeve",
        name,
        {
            "length_mm": length_mm,
            "bore_mm": bore_mm,
            "outside_mm": outside_mm,
        },
        owner="clamp",
        label=f"crush sleeve {outside_mm:g} x {bore_mm:g} x {length_mm:g}",
        material=bought_material(SLEEVE_MATERIAL),
        frame=frame,
        exact=True,
    )


def _extents(design: Design) -> tuple[float, float]:
    """Boom from plate face to far face, and across."""
    boom = design.boom
    if design.polarisation == "horizontal":
        return boom.width_mm, boom.height_mm
    return boom.height_mm, boom.width_mm


def _away(design: Design) -> Vector:
    """From the boom to the plate."""
    return (0.0, -1.0, 0.0) if design.polarisation == "horizontal" else (0.0, 0.0, -1.0)


def _turned(away: Vector) -> Vector:
    """Across the boom in the plate: the plate's local y."""
    return Frame((0.0, 0.0, 0.0), z=away).y


def _at(x_mm: float, away: Vector, distance_mm: float, across_mm: float = 0.0) -> Vector:
    turned = _turned(away)
    return (x_mm, distance_mm * away[1] + across_mm * turned[1], distance_mm * away[2] + across_mm * turned[2])


def _minus(vector: Vector) -> Vector:
    return (0.0 - vector[0], 0.0 - vector[1], 0.0 - vector[2])
