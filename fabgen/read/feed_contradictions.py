"""The feed against the driven rod, the clamp against the boom."""

from fabgen.read.grammar import ElementKeys, FeedKeys, FileKeys
from fabgen.read.mount_contradictions import check_allowance
from fabgen.read.places import key_place, value_place
from fabgen.read.resolve import resolve_rod
from fabgen.read.source import Problems
from fabgen.read.yaml_tree import Map

Row = tuple[ElementKeys, Map]


def check_feed(keys: FileKeys, rows: list[Row], tree: Map, problems: Problems) -> None:
    """Report a feed that is missing, says too much, or does not suit its rod."""
    driven = [(row, node) for row, node in rows if row.role == "driven"]
    feed = keys.feed
    if feed is None:
        if driven and "feed" not in tree:
            row, node = driven[0]
            message = f"`feed` is missing: the driven rod {row.id} hangs on it"
            problems.add("D21", message, value_place(node, "role"), "add feed: {kind: straight-dipole}")
        return
    _check_kind(feed, tree, problems)
    if feed.allowance is not None:
        check_allowance(feed.allowance, ("feed", "allowance"), tree, problems)
    for row, _ in driven:
        if feed.rod_mm is not None and row.diameter_mm is not None and feed.rod_mm != row.diameter_mm:
            message = f"rod: {feed.rod_mm:g} mm here, {row.diameter_mm:g} mm in the row of {row.id}"
            problems.add("D19", message, value_place(tree, "feed", "rod"), "state it once")
        gap_mm = feed.gap_mm or 0.0
        if gap_mm >= row.length_mm / 2:
            message = f"gap: {gap_mm:g} mm is half of the rod {row.id} or more"
            problems.add("D19", message, value_place(tree, "feed", "gap"), "for example 10 mm")
        rod = resolve_rod(row, keys.rods, feed)
        rod_mm = rod.diameter_mm if rod is not None else 0.0
        if feed.height_mm is not None and feed.height_mm < rod_mm / 2:
            fix = f"more than {rod_mm / 2:g} mm, or leave it out"
            message = f"height: at {feed.height_mm:g} mm the {rod_mm:g} mm rod {row.id} sinks into the boom"
            problems.add("D19", message, value_place(tree, "feed", "height"), fix)
        if feed.spacing_mm is not None and feed.spacing_mm <= rod_mm:
            message = f"spacing: two limbs of {rod_mm:g} mm do not fit into {feed.spacing_mm:g} mm centre to centre"
            problems.add("D19", message, value_place(tree, "feed", "spacing"), "for example 30 mm")
        if feed.spacing_mm is not None and feed.spacing_mm >= row.length_mm / 2:
            message = f"spacing: {feed.spacing_mm:g} mm is half of the rod {row.id} or more"
            problems.add("D19", message, value_place(tree, "feed", "spacing"), "for example 30 mm")


def _check_kind(feed: FeedKeys, tree: Map, problems: Problems) -> None:
    if feed.kind == "folded-dipole" and feed.spacing_mm is None:
        message = "`spacing` is missing: centre to centre of the folded dipole's limbs"
        problems.add("D07", message, key_place(tree, "feed"), "add spacing: 30 mm")
    if feed.kind == "straight-dipole" and feed.spacing_mm is not None:
        place = key_place(tree, "feed", "spacing")
        problems.add("D19", "`spacing` has no meaning on a straight dipole", place, "delete it, or kind: folded-dipole")


def check_clamp(keys: FileKeys, rows: list[Row], tree: Map, problems: Problems) -> None:
    """Report a clamp that does not stand on the boom."""
    clamp, boom = keys.clamp, keys.boom
    if clamp is None or boom is None or not isinstance(clamp.at, float):
        return
    if keys.elements is None or not rows or len(rows) != len(keys.elements):
        return
    at_mm = [row.at_mm for row, _ in rows]
    length_mm = boom.length_mm if boom.length_mm is not None else boom.overhang.length_mm
    if length_mm is None:
        length_mm = boom.overhang.rear_mm + max(at_mm) - min(at_mm) + (boom.overhang.front_mm or 0.0)
    if clamp.at > length_mm:
        message = f"at: station {clamp.at:g} mm is past the boom's end at {length_mm:g} mm"
        problems.add("D12", message, value_place(tree, "clamp", "at"), "counted from the datum face; or at: balance")
