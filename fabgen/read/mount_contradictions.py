"""Mounts against their own style and against the boom; allowances against their origin."""

from fabgen.design.design import Style
from fabgen.read.grammar import AllowanceKeys, FileKeys, MountKeys
from fabgen.read.places import key_place, value_place
from fabgen.read.source import Problems
from fabgen.read.yaml_tree import Map

STYLE_KEYS: dict[Style, tuple[str, ...]] = {
    "bonded-through": ("hole", "bond"),
    "insulated-through": ("hole", "bush", "keeper", "hold"),
    "on-top": ("saddle", "keeper", "hold"),
    "through-nonmetal": ("hole", "keeper", "hold"),
}
"""What may be said about a mount beside `style` and `allowance`."""

ORIGIN_KEYS = {"published": ("model", "square_as"), "stated": ("value", "uncertainty", "source")}
"""What may be said about an allowance beside `origin`."""

_WHY = {
    "bond": "only a bonded rod is joined to the boom; write style: bonded-through for that",
    "bush": "bushes belong to insulated-through",
    "saddle": "saddles belong to on-top",
    "keeper": "the joint itself holds a bonded rod",
    "hold": "the joint itself holds a bonded rod, and a screw through its middle bonds nothing",
    "hole": "nothing is drilled through for a rod on top",
}

_OUT_OF_CONDUCTING = (
    "write style: on-top, or style: through-nonmetal with what was measured on this boom, for example "
    "allowance: {origin: stated, value: 4.6 mm, uncertainty: 0.4 mm, source: own readings 2026-03}"
)


def check_mounts(keys: FileKeys, tree: Map, problems: Problems) -> None:
    """Report mounts that cannot be made and allowances that say too little or too much."""
    seen: dict[str, str] = {}
    for name, mount in (keys.mounts or {}).items():
        path = ("mounts", name)
        if (first := seen.setdefault(name.lower(), name)) != name:
            message = f"the mounts `{first}` and `{name}` differ in capitals only"
            problems.add("D18", message, key_place(tree, *path), "give one of them another name")
        if mount is None:
            continue
        _check_style(mount, path, tree, problems)
        _check_boom(mount, keys, path, tree, problems)
        if mount.allowance is not None:
            check_allowance(mount.allowance, (*path, "allowance"), tree, problems)


def check_allowance(allowance: AllowanceKeys, path: tuple[str, ...], tree: Map, problems: Problems) -> None:
    """Report what an allowance of that origin needs and does not need."""
    wanted = ORIGIN_KEYS.get(allowance.origin, ())
    given = {
        "model": allowance.model,
        "square_as": allowance.square_as,
        "value": allowance.value_mm,
        "uncertainty": allowance.uncertainty_mm,
        "source": allowance.source,
    }
    for key, value in given.items():
        if value is not None and key not in wanted:
            owner = next(origin for origin, keys in ORIGIN_KEYS.items() if key in keys)
            message = f"`{key}` has no meaning with origin {allowance.origin}"
            problems.add("D19", message, key_place(tree, *path, key), f"delete it, or write origin: {owner}")
        if value is None and allowance.origin == "stated" and key in wanted:
            example = {"value": "4.6 mm", "uncertainty": "0.4 mm", "source": "own readings 2026-03"}[key]
            message = f"`{key}` is missing: a stated allowance has a value, an uncertainty and a source"
            problems.add("D07", message, key_place(tree, *path), f"add {key}: {example}")


def _check_style(mount: MountKeys, path: tuple[str, ...], tree: Map, problems: Problems) -> None:
    given = {
        "hole": mount.hole_mm,
        "bush": mount.bush,
        "keeper": mount.keeper,
        "saddle": mount.saddle,
        "hold": mount.hold,
        "bond": mount.bond,
    }
    for key, value in given.items():
        if value is not None and key not in STYLE_KEYS[mount.style]:
            message = f"`{key}` has no meaning on a mount of style {mount.style}"
            problems.add("D19", message, key_place(tree, *path, key), f"delete it: {_WHY[key]}")
    if mount.style == "bonded-through" and mount.bond is None:
        message = "`bond` is missing: a bonded rod is welded, pressed or screwed to both walls"
        problems.add("D07", message, key_place(tree, *path), "add bond: wall-screws, weld or press")
    if mount.hold == "middle-screw":
        if mount.style in ("on-top", "through-nonmetal"):
            message = f"hold: a screw through the middle of the rod is not made for {mount.style}"
            problems.add("D19", message, value_place(tree, *path, "hold"), "delete it: keepers hold the rod")
        elif mount.keeper is not None:
            message = "`keeper` has no meaning when a screw through the middle holds the rod"
            problems.add("D19", message, key_place(tree, *path, "keeper"), "delete `keeper` or `hold`")


def _check_boom(mount: MountKeys, keys: FileKeys, path: tuple[str, ...], tree: Map, problems: Problems) -> None:
    boom = keys.boom
    if boom is None:
        return
    place = value_place(tree, *path, "style")
    metal, conducts = boom.material.kind == "metal", boom.material.conductive
    if not metal and mount.style in ("bonded-through", "insulated-through"):
        message = f"style: {mount.style} needs a metal boom, and {boom.material.name} is none"
        problems.add("D20", message, place, _OUT_OF_CONDUCTING if conducts else "write style: through-nonmetal")
    if metal and mount.style == "through-nonmetal":
        message = f"style: through-nonmetal needs a boom of wood or plastic, and {boom.material.name} is a metal"
        problems.add("D20", message, place, "write style: insulated-through or bonded-through")
    elif conducts and mount.style == "through-nonmetal" and not _lengths_known(mount, keys):
        message = f"style: through-nonmetal adds no length, and a boom of {boom.material.name} conducts: it takes some"
        problems.add("D20", message, place, _OUT_OF_CONDUCTING)
    if mount.bond == "wall-screws" and boom.section == "round":
        message = "bond: wall-screws need a flat wall, and the boom is round"
        problems.add("D20", message, value_place(tree, *path, "bond"), "write bond: weld or bond: press")


def _lengths_known(mount: MountKeys, keys: FileKeys) -> bool:
    """Whether the user says what a boom takes from its rods, or gives lengths that hold it already."""
    stated = mount.allowance is not None and mount.allowance.origin == "stated"
    return stated or keys.lengths_are == "as-cut"
