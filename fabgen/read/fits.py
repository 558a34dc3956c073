"""Sizes that follow from rod, hole and wall when the design file leaves them out. Diametral, common practice.

Source: table of printing practice in `stock`, common practice.
"""

from typing import Literal

from fabgen.design.design import AllowanceChoice, Boom, Bush, Keeper, Material, Mount, Saddle, Style
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
        bush = _bush(f"{path}.bush", keys.bush or BushKeys.model_construct(), rod_mm, hole_mm, boom, reasons)
    keeper = None
    if hold == "keepers":
        keeper = _keeper(f"{path}.keeper", keys.keeper or KeeperKeys.model_construct(), rod_mm, bush, hole_mm, reasons)
    saddle = None
    if keys.style == "on-top":
        saddle = _saddle(f"{path}.saddle", keys.saddle or SaddleKeys.model_construct(), rod_mm, reasons)
    origin: Literal["auto", "none"] = "none" if keys.style == "through-nonmetal" else "auto"
    return Mount(
        name=name,
        style=keys.style,
        hole_mm=hole_mm,
        allowance=allowance_choice(f"{path}.allowance", keys.allowance, origin, reasons),
        bush=bush,
        keeper=keeper,
        saddle=saddle,
        hold=hold,
        bond=keys.bond,
    )


def allowance_choice(
    path: str, keys: AllowanceKeys | None, origin: Literal["auto", "none"], reasons: Reasons
) -> AllowanceChoice:
    """The allowance's origin as stated, else the default one."""
    if keys is None:
        why = "measured, else solved, else closed form" if origin == "auto" else "nothing takes length away here"
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
        length_mm, why = boom.wall_mm + beyond, f"computed, wall + {beyond:g} mm"
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


def _keeper(path: str, keys: KeeperKeys, rod_mm: float, bush: Bush | None, hole_mm: float, reasons: Reasons) -> Keeper:
    grip = tables.print_practice("split_keeper_grip_mm")
    stop_mm = bush.flange_mm - 1 if bush is not None else max(hole_mm, rod_mm) + 6
    return Keeper(
        kind=reasons.pick(f"{path}.kind", keys.kind, "push-ring"),
        material=printed_material(f"{path}.material", keys.material, reasons),
        bore_mm=reasons.pick(f"{path}.bore", keys.bore_mm, _tidy(rod_mm - grip), f"computed, rod − {grip:g} mm"),
        outside_mm=reasons.pick(f"{path}.outside", keys.outside_mm, _tidy(stop_mm), "computed"),
        length_mm=reasons.pick(f"{path}.length", keys.length_mm, 5.0),
    )


def _saddle(path: str, keys: SaddleKeys, rod_mm: float, reasons: Reasons) -> Saddle:
    clearance = tables.print_practice("saddle_bore_clearance_mm")
    height_mm = max(10.0, _tidy(rod_mm / 2 + 6))
    return Saddle(
        height_mm=reasons.pick(f"{path}.height", keys.height_mm, height_mm, "computed, rod/2 + 6 mm, at least 10 mm"),
        bore_mm=reasons.pick(
            f"{path}.bore", keys.bore_mm, _tidy(rod_mm + clearance), f"computed, rod + {clearance:g} mm"
        ),
        screw=reasons.pick(f"{path}.screw", keys.screw, "M3"),
        material=printed_material(f"{path}.material", keys.material, reasons),
    )


def _tidy(length_mm: float) -> float:
    """A computed size without the dust of binary sums: rounded to 0.0001 mm."""
    return round(length_mm, 4)
