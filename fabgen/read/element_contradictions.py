"""Rows against each other, against the mounts they name and against the rods they are cut from."""

from itertools import pairwise

from fabgen.read.fits import HOLE_OVER_ROD_MM, default_hole_mm
from fabgen.read.grammar import ElementKeys, FileKeys, MountKeys
from fabgen.read.nearest import suggestion
from fabgen.read.places import key_place, value_place
from fabgen.read.resolve import resolve_rod
from fabgen.read.source import Problems
from fabgen.read.yaml_tree import Map

Row = tuple[ElementKeys, Map]

MOST_ROWS = 1000
SAME_STATION_MM = 1e-6


def check_elements(keys: FileKeys, rows: list[Row], tree: Map, problems: Problems) -> None:
    """Report rows that cannot stand together."""
    if len(rows) > MOST_ROWS:
        message = f"`elements` has {len(rows)} rows"
        problems.add("D12", message, rows[MOST_ROWS][1].place, f"at most {MOST_ROWS}: check that it is one array")
    if keys.elements is not None and not keys.elements:
        problems.add("D07", "`elements` has no rows", key_place(tree, "elements"), "add one row per rod")
    _check_ids(rows, problems)
    _check_stations(rows, problems)
    for row, node in rows:
        _check_mount(row, node, keys, tree, problems)
    bare = [(row, node) for row, node in rows if resolve_rod(row, keys.rods, keys.feed) is None]
    if bare and "rods" not in tree:
        names = ", ".join(row.id for row, _ in bare[:4]) + (f" and {len(bare) - 4} more" if len(bare) > 4 else "")
        message = f"`rods` is missing: nothing says what {names} are cut from"
        fix = "add rods: {diameter: 4 mm, material: EN AW-6060 T66}"
        problems.add("D07", message, bare[0][1].place, fix)


def _check_ids(rows: list[Row], problems: Problems) -> None:
    seen: dict[str, tuple[ElementKeys, Map]] = {}
    for row, node in rows:
        first, first_node = seen.setdefault(row.id.lower(), (row, node))
        if first is not row:
            same = "stands twice" if first.id == row.id else f"differs from {first.id} in capitals only"
            message = f"id: {row.id} {same}, first in line {value_place(first_node, 'id').line}"
            problems.add("D18", message, value_place(node, "id"), "give it another id")
    halves = {
        f"{row.id}-{side}".lower(): row.id for row, _ in rows if row.role == "driven" for side in ("left", "right")
    }
    for row, node in rows:
        if owner := halves.get(row.id.lower()):
            message = f"id: {row.id} is the name of one half of the driven rod {owner}"
            problems.add("D18", message, value_place(node, "id"), "give it another id")


def _check_stations(rows: list[Row], problems: Problems) -> None:
    ordered = sorted(rows, key=lambda pair: pair[0].at_mm)
    for (rear, rear_node), (front, front_node) in pairwise(ordered):
        if front.at_mm - rear.at_mm <= SAME_STATION_MM:
            message = f"at: {front.id} stands where {rear.id} stands, line {value_place(rear_node, 'at').line}"
            problems.add("D17", message, value_place(front_node, "at"), "give every rod a place of its own")


def _check_mount(row: ElementKeys, node: Map, keys: FileKeys, tree: Map, problems: Problems) -> None:
    names = list(keys.mounts or {})
    if row.role == "driven":
        if row.mount not in (None, "feed"):
            message = f"mount: the feed carries the driven rod {row.id}, not a mount"
            problems.add("D21", message, value_place(node, "mount"), "write mount: feed, or leave it out")
        return
    if row.mount == "feed":
        message = f"mount: the feed carries a driven rod only, and {row.id} is a {row.role}"
        fix = f"write mount: {names[0]}" if names else "name one of `mounts`"
        problems.add("D21", message, value_place(node, "mount"), fix)
        return
    if "mounts" in tree and keys.mounts is None:
        return
    if row.mount is None and len(names) != 1:
        known = f"one of {', '.join(names)}" if names else "add mounts: {line: {style: insulated-through}}"
        message = f"`mount` is missing: {row.id} needs one" if names else "`mounts` is missing: a rod needs one"
        problems.add("D07", message, node.place if names else tree.place, known)
        return
    name = row.mount if row.mount is not None else names[0]
    if name not in names:
        problems.add("D16", f"mount: there is no mount `{name}`", value_place(node, "mount"), suggestion(name, names))
        return
    mount = (keys.mounts or {})[name]
    rod = resolve_rod(row, keys.rods, keys.feed)
    if mount is not None and rod is not None:
        _check_room(name, mount, rod.diameter_mm, keys, tree, problems)


def _check_room(name: str, mount: MountKeys, rod_mm: float, keys: FileKeys, tree: Map, problems: Problems) -> None:
    """A hole that the rod passes, a saddle that lifts it off the boom."""
    if mount.saddle is not None and mount.saddle.height_mm is not None and mount.saddle.height_mm < rod_mm / 2:
        message = f"height: at {mount.saddle.height_mm:g} mm a {rod_mm:g} mm rod sinks into the boom"
        place = value_place(tree, "mounts", name, "saddle", "height")
        problems.add("D19", message, place, f"more than {rod_mm / 2:g} mm, for example 12 mm")
    if mount.style == "on-top":
        return
    room_mm = HOLE_OVER_ROD_MM[mount.style]
    if mount.hole_mm is not None:
        bushed = mount.style == "insulated-through"
        if mount.hole_mm < rod_mm or (bushed and mount.hole_mm == rod_mm):
            message = (
                f"hole: a {rod_mm:g} mm rod{' and its bush do' if bushed else ' does'} not pass {mount.hole_mm:g} mm"
            )
            fix = f"for example {rod_mm + room_mm:g} mm, or leave it out for the smallest drill that fits"
            problems.add("D19", message, value_place(tree, "mounts", name, "hole"), fix)
        return
    if keys.shop is None and "shop" in tree:
        return
    drills = keys.shop.drills if keys.shop is not None and keys.shop.drills is not None else "metric"
    if default_hole_mm(mount.style, rod_mm, drills) is None:
        message = f"`hole` is missing: no {drills} drill is large enough for a {rod_mm:g} mm rod"
        fix = f"add hole: {rod_mm + room_mm:g} mm, or the size that you can make"
        problems.add("D07", message, key_place(tree, "mounts", name), fix)
