"""Sizes that follow from rod, hole and wall when the design file leaves them out. Diametral, common practice.

Source: table of printing practice in `stock`, common practice.
"""

import math
from typing import Literal

from fabgen.design.design import AllowanceChoice, Boom, Bush, Keeper, Material, Mount, Saddle, Style
from fabgen.design.keeper_sizes import KEEPER_RIM_MM, snap_keeper_size
from fabgen.design.wall_depth import wall_depth_mm
from fabgen.physics.split_ring import largest_push_ring_outside_mm, push_ring_strain, snap_clip_strain
from fabgen.read.compound import table_material
from fabgen.read.grammar import AllowanceKeys, BushKeys, KeeperKeys, MountKeys, SaddleKeys
from fabgen.read.reasons import Reasons
from fabgen.stock import tables

HOLE_OVER_ROD_MM: dict[Style, float] = {
    "insulated-through": 2.6,
    "bonded-through": 0.05,
    "through-nonmetal": 0.1,
}
"""What the smallest hole is wider than its rod by; common practice."""

SNAP_GRIP_MM = 0.2
"""What a snap keeper's bore is below the rod; common practice."""

LESSER_SNAP_GRIPS_MM = (0.15, 0.1, 0.05)
"""Grips of a C-clip on rods too thin for the usual one."""

CLIP_OVER_ROD_MM = (1.2, 3.2)
"""What a C-clip is wider than its rod by, at least and at most; common practice."""

LESSER_GRIPS_MM = (0.25, 0.2, 0.15, 0.1)
"""Grips of a split ring on rods too thin for the usual one."""

THINNEST_RING_MM = 2.4
"""What a split ring is wider than its rod by: a wall of three printed lines each side; common practice."""

SADDLE_OVER_ROD_MM = 8
"""From the boom's top to the lowest line of a rod above it; common practice."""

PRINTED = "ASA"
"""What small outdoor parts are printed in by default: it keeps its strength in sunlight (common practice)."""


def default_hole_mm(style: Style, rod_mm: float, drills: tables.DrillSeries) -> float | None:
    """The smallest of the shop's drills that clears the rod as the style asks; 0 on top, None when no drill does."""
    if style == "on-top":
        return 0.0
    drill = tables.smallest_drill_at_least(rod_mm + HOLE_OVER_ROD_MM[style], drills)
    return None if drill is None else drill.diameter_mm


def mount_for_rod(
    name: str, keys: MountKeys, rod_mm: float, boom: Boom, drills: tables.DrillSeries, reasons: Reasons
) -> Mount:
    """A named mount with every fit in numbers for one rod.

    Args:
        name: the user's name for the mount.
        keys: what the file says about it.
        rod_mm: the rod's diameter.
        boom: the boom it goes through or on.
        drills: the shop's series.
        reasons: takes where each default came from.
    """
    path = f"mounts.{name}"
    hole_mm = keys.hole_mm if keys.hole_mm is not None else default_hole_mm(keys.style, rod_mm, drills)
    assert hole_mm is not None, "a rod without a drill was refused before"
    if keys.style != "on-top":
        over = HOLE_OVER_ROD_MM[keys.style]
        reasons.pick(f"{path}.hole", keys.hole_mm, hole_mm, f"computed, smallest {drills} drill from rod + {over:g} mm")
    hold: Literal["keepers", "middle-screw", "bond"] = (
        "bond" if keys.style == "bonded-through" else reasons.pick(f"{path}.hold", keys.hold, "keepers")
    )
    bush = None
    if keys.style == "insulated-through":
        bush = _bush(f"{path}.bush", keys.bush or BushKeys(), rod_mm, hole_mm, boom, reasons)
    keeper = None
    if hold == "keepers":
        rest_mm = _sleeve_rest_mm(hole_mm) if bush is not None and bush.kind == "sleeve" else 0.0
        keeper = _keeper(f"{path}.keeper", keys.keeper or KeeperKeys(), rod_mm, bush, rest_mm, reasons)
    saddle = None
    if keys.style == "on-top":
        saddle = _saddle(f"{path}.saddle", keys.saddle or SaddleKeys(), rod_mm, reasons)
    origin: Literal["auto", "none"] = "none" if keys.style == "through-nonmetal" else "auto"
    why = "no metal beside the rod" if origin == "none" else "measured, else solved, else closed form"
    return Mount(
        name=name,
        style=keys.style,
        hole_mm=hole_mm,
        allowance=allowance_choice(f"{path}.allowance", keys.allowance, origin, why, reasons),
        bush=bush,
        keeper=keeper,
        saddle=saddle,
        hold=hold,
        bond=keys.bond,
    )


def allowance_choice(
    path: str, keys: AllowanceKeys | None, origin: Literal["auto", "none"], why: str, reasons: Reasons
) -> AllowanceChoice:
    """The allowance's origin as stated, else the default one."""
    if keys is None:
        return AllowanceChoice(reasons.pick(f"{path}.origin", None, origin, f"default: {why}"))
    if keys.origin == "published":
        return AllowanceChoice(
            "published",
            model=reasons.pick(f"{path}.model", keys.model, "dl6wu"),
            square_as=reasons.pick(f"{path}.square_as", keys.square_as, "side"),
        )
    return AllowanceChoice(
        keys.origin,
        value_mm=keys.value_mm or 0.0,
        uncertainty_mm=keys.uncertainty_mm or 0.0,
        source=keys.source or "",
    )


def printed_material(path: str, stated: Material | None, reasons: Reasons) -> Material:
    """The stated material, else the usual one for printed parts outdoors."""
    return stated if stated is not None else reasons.pick(path, None, table_material(PRINTED))


def _bush(path: str, keys: BushKeys, rod_mm: float, hole_mm: float, boom: Boom, reasons: Reasons) -> Bush:
    bore, spigot, flange, beyond = (
        tables.print_practice(quantity)
        for quantity in (
            "bush_bore_clearance_mm",
            "spigot_clearance_mm",
            "flange_beyond_hole_mm",
            "spigot_beyond_wall_mm",
        )
    )
    if boom.hollow:
        through_mm = wall_depth_mm(boom, hole_mm)
        length_mm, why = through_mm + beyond, f"computed, wall + {beyond:g} mm"
        if through_mm > boom.wall_mm:
            length_mm, why = math.ceil(length_mm * 10 - 1e-6) / 10, f"computed, wall at the hole's side + {beyond:g} mm"
    else:
        length_mm, why = boom.width_mm / 2 - 0.5, "computed, half the solid bar − 0.5 mm"
    pick = reasons.pick
    return Bush(
        kind=pick(f"{path}.kind", keys.kind, "shoulder"),
        material=printed_material(f"{path}.material", keys.material, reasons),
        bore_mm=pick(f"{path}.bore", keys.bore_mm, _tidy(rod_mm + bore), f"computed, rod + {bore:g} mm"),
        spigot_mm=pick(f"{path}.spigot", keys.spigot_mm, _tidy(hole_mm - spigot), f"computed, hole − {spigot:g} mm"),
        spigot_length_mm=pick(f"{path}.spigot_length", keys.spigot_length_mm, _tidy(length_mm), why),
        flange_mm=pick(f"{path}.flange", keys.flange_mm, _tidy(hole_mm + flange), f"computed, hole + {flange:g} mm"),
        flange_height_mm=pick(f"{path}.flange_height", keys.flange_height_mm, 3.0),
    )


def _sleeve_rest_mm(hole_mm: float) -> float:
    """Least outside of a keeper that stops on the boom itself: a sleeve has its flange on the left only."""
    largest_mm = hole_mm + tables.drilled_over_mm(hole_mm)
    return math.ceil((largest_mm + 2 * KEEPER_RIM_MM) * 10 - 1e-6) / 10


def _keeper(path: str, keys: KeeperKeys, rod_mm: float, bush: Bush | None, rest_mm: float, reasons: Reasons) -> Keeper:
    pick = reasons.pick
    usual: Literal["push-ring", "snap"] = "push-ring"
    kind = pick(f"{path}.kind", keys.kind, usual)
    if kind == "snap":
        bore_mm, why_bore = default_snap_bore_mm(rod_mm)
        outside_mm, why_outside = default_snap_outside_mm(rod_mm, keys.bore_mm or bore_mm)
    else:
        least_mm = max(rest_mm, rod_mm + THINNEST_RING_MM)
        bore_mm, why_bore = default_ring_bore_mm(rod_mm, least_mm)
        largest_mm = bush.flange_mm - 1 if bush is not None else rod_mm + 6
        ring_bore_mm = keys.bore_mm if keys.bore_mm is not None else bore_mm
        outside_mm, why_outside = default_ring_outside_mm(rod_mm, ring_bore_mm, least_mm, largest_mm)
    return Keeper(
        kind=kind,
        material=printed_material(f"{path}.material", keys.material, reasons),
        bore_mm=pick(f"{path}.bore", keys.bore_mm, bore_mm, why_bore),
        outside_mm=pick(f"{path}.outside", keys.outside_mm, outside_mm, why_outside),
        length_mm=pick(f"{path}.length", keys.length_mm, 6.0 if kind == "snap" else 5.0),
    )


def default_snap_bore_mm(rod_mm: float) -> tuple[float, str]:
    """Bore of a C-clip and its reason: the usual grip, or less where it would not hold or would strain too far."""
    for grip in (SNAP_GRIP_MM, *LESSER_SNAP_GRIPS_MM):
        if _widest_clip_mm(rod_mm, rod_mm - grip) > 0:
            why = "" if grip == SNAP_GRIP_MM else f": {SNAP_GRIP_MM:g} mm would strain it over {_limit_percent():g} %"
            return _tidy(rod_mm - grip), f"computed, rod − {grip:g} mm{why}"
    return _tidy(rod_mm * 0.97), "computed, 0.97 × rod"


def default_snap_outside_mm(rod_mm: float, bore_mm: float) -> tuple[float, str]:
    """Outside of a C-clip and its reason: the thickest one that strain allows, up to rod + 3.2 mm."""
    widest_mm = _widest_clip_mm(rod_mm, bore_mm)
    if not widest_mm:
        return _tidy(rod_mm + CLIP_OVER_ROD_MM[0]), f"computed, rod + {CLIP_OVER_ROD_MM[0]:g} mm"
    return widest_mm, f"computed, the thickest clip up to {_limit_percent():g} % strain"


def _widest_clip_mm(rod_mm: float, bore_mm: float) -> float:
    """Outside of the thickest clip within the strain limit, in steps of 0.2 mm; 0 where none holds the rod."""
    thinnest, thickest = CLIP_OVER_ROD_MM
    over_mm = thickest
    while over_mm >= thinnest - 1e-9:
        try:
            clip = snap_keeper_size(
                rod_diameter_mm=rod_mm, bore_mm=bore_mm, outside_diameter_mm=_tidy(rod_mm + over_mm)
            )
        except ValueError:
            return 0.0
        passing = snap_clip_strain(rod_mm=rod_mm, bore_mm=bore_mm, outside_mm=clip.outside_mm, mouth_mm=clip.mouth_mm)
        sitting = push_ring_strain(rod_mm=rod_mm, bore_mm=bore_mm, outside_mm=clip.outside_mm)
        if 100 * max(passing, sitting) <= _limit_percent():
            return clip.outside_mm
        over_mm -= 0.2
    return 0.0


def default_ring_bore_mm(rod_mm: float, least_mm: float) -> tuple[float, str]:
    """Bore of a split ring and its reason: the usual grip, or less where that strains a ring this wide too far."""
    usual = tables.print_practice("split_keeper_grip_mm")
    for grip in (usual, *(less for less in LESSER_GRIPS_MM if less < usual)):
        bore_mm = rod_mm - grip
        if bore_mm > 0 and _widest_ring_mm(rod_mm, bore_mm) >= least_mm:
            why = "" if grip == usual else f": {usual:g} mm would strain it over {_limit_percent():g} %"
            return _tidy(bore_mm), f"computed, rod − {grip:g} mm{why}"
    bore_mm = max(rod_mm - LESSER_GRIPS_MM[-1], rod_mm / 2)
    return _tidy(bore_mm), f"computed, rod − {_tidy(rod_mm - bore_mm):g} mm"


def default_ring_outside_mm(rod_mm: float, bore_mm: float, least_mm: float, largest_mm: float) -> tuple[float, str]:
    """Outside of a split ring and its reason: as thick as strain and its seat allow, in steps of 0.5 mm."""
    if not 0 < bore_mm < rod_mm:
        return _tidy(max(least_mm, rod_mm + 3.2)), "computed, rod + 3.2 mm, or what its seat asks for"
    strained_mm = math.floor(min(_widest_ring_mm(rod_mm, bore_mm), 1000.0) * 2) / 2
    outside_mm = max(least_mm, min(strained_mm, largest_mm))
    return _tidy(outside_mm), f"computed, the thickest ring up to {_limit_percent():g} % strain that its seat covers"


def _widest_ring_mm(rod_mm: float, bore_mm: float) -> float:
    return largest_push_ring_outside_mm(rod_mm=rod_mm, bore_mm=bore_mm, limit_strain=_limit_percent() / 100)


def _limit_percent() -> float:
    return tables.print_practice("largest_keeper_strain_percent")


def _saddle(path: str, keys: SaddleKeys, rod_mm: float, reasons: Reasons) -> Saddle:
    clearance = tables.print_practice("saddle_bore_clearance_mm")
    height_mm = max(12.0, _tidy(rod_mm / 2 + SADDLE_OVER_ROD_MM))
    why = f"computed, rod/2 + {SADDLE_OVER_ROD_MM:g} mm, at least 12 mm"
    return Saddle(
        height_mm=reasons.pick(f"{path}.height", keys.height_mm, height_mm, why),
        bore_mm=reasons.pick(
            f"{path}.bore", keys.bore_mm, _tidy(rod_mm + clearance), f"computed, rod + {clearance:g} mm"
        ),
        screw=reasons.pick(f"{path}.screw", keys.screw, "M3"),
        material=printed_material(f"{path}.material", keys.material, reasons),
    )


def _tidy(length_mm: float) -> float:
    """A computed size without the dust of binary sums: rounded to 0.0001 mm."""
    return round(length_mm, 4)
