"""The boom against itself and against the outermost rods."""

from fabgen.read.grammar import BoomKeys, ElementKeys, FileKeys
from fabgen.read.places import key_place, value_place
from fabgen.read.source import Problems
from fabgen.read.yaml_tree import Map

LONGEST_SPAN_MM = 25_000
SHORTEST_FRONT_MM = 1


def check_boom(keys: FileKeys, rows: list[tuple[ElementKeys, Map]], tree: Map, problems: Problems) -> None:
    """Report a section, wall, radius or length that cannot be."""
    boom = keys.boom
    if boom is None:
        return
    _check_section(boom, tree, problems)
    _check_length(boom, keys, rows, tree, problems)


def _check_section(boom: BoomKeys, tree: Map, problems: Problems) -> None:
    sides = len(boom.outside_mm)
    if boom.section == "rectangular" and sides == 1:
        place = value_place(tree, "boom", "outside")
        problems.add("D19", "outside: a rectangular boom has a width and a height", place, "outside: [30 mm, 20 mm]")
    if boom.section != "rectangular" and sides == 2:
        what = "one diameter" if boom.section == "round" else "one side"
        place = key_place(tree, "boom", "outside")
        problems.add(
            "D19", f"outside: a {boom.section} boom has {what}", place, "outside: 20 mm, or section: rectangular"
        )
    smallest_mm = min(boom.outside_mm)
    if boom.wall_mm is not None and 2 * boom.wall_mm >= smallest_mm:
        message = f"wall: two walls of {boom.wall_mm:g} mm leave no bore in {smallest_mm:g} mm"
        fix = "leave `wall` out for a solid bar, or write a thinner one, for example 1.5 mm"
        problems.add("D19", message, value_place(tree, "boom", "wall"), fix)
    if boom.corner_radius_mm is None:
        return
    if boom.section == "round" and boom.corner_radius_mm > 0:
        place = key_place(tree, "boom", "corner_radius")
        problems.add("D19", "corner_radius: a round boom has no corners", place, "delete it, or change `section`")
    elif boom.section != "round" and 2 * boom.corner_radius_mm >= smallest_mm:
        message = f"corner_radius: two corners of {boom.corner_radius_mm:g} mm leave no flat in {smallest_mm:g} mm"
        place = value_place(tree, "boom", "corner_radius")
        problems.add("D19", message, place, f"less than {smallest_mm / 2:g} mm, for example 1 mm")


def _check_length(
    boom: BoomKeys, keys: FileKeys, rows: list[tuple[ElementKeys, Map]], tree: Map, problems: Problems
) -> None:
    ends = {
        ("overhang", "front"): boom.overhang.front_mm,
        ("overhang", "length"): boom.overhang.length_mm,
        ("length",): boom.length_mm,
    }
    given = [path for path, length_mm in ends.items() if length_mm is not None]
    if not given:
        place = key_place(tree, "boom", "overhang")
        problems.add("D07", "`front` is missing in overhang", place, "add front: 30 mm, or length: 1.2 m in its place")
        return
    if len(given) > 1:
        names = " and ".join(f"`{'.'.join(path)}`" for path in given)
        place = key_place(tree, "boom", *given[-1])
        problems.add("D19", f"{names} both say where the boom ends", place, "keep one of them")
        return
    if keys.elements is None or len(rows) != len(keys.elements) or not rows:
        return
    (rear, _), (front, front_node) = (pick(rows, key=lambda pair: pair[0].at_mm) for pick in (min, max))
    span_mm = front.at_mm - rear.at_mm
    if span_mm > LONGEST_SPAN_MM:
        message = f"at: {front.id} stands {span_mm:g} mm before {rear.id}"
        problems.add("D12", message, value_place(front_node, "at"), f"at most {LONGEST_SPAN_MM:g} mm from end to end")
    length_mm = boom.length_mm if boom.length_mm is not None else boom.overhang.length_mm
    needed_mm = boom.overhang.rear_mm + span_mm + SHORTEST_FRONT_MM
    if length_mm is not None and length_mm < needed_mm:
        message = f"length: {length_mm:g} mm is too short for the rear overhang and the rods"
        place = value_place(tree, "boom", *given[0])
        problems.add("D19", message, place, f"at least {needed_mm:g} mm, or state `front` in place of `length`")
