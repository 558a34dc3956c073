"""Rods that differ from the modelled ones, against the rest of the file."""

from fabgen.read.grammar import ElementKeys, FileKeys
from fabgen.read.places import value_place
from fabgen.read.resolve import resolve_rod
from fabgen.read.source import Problems
from fabgen.read.yaml_tree import Map


def check_other_rods(keys: FileKeys, rows: list[tuple[ElementKeys, Map]], tree: Map, problems: Problems) -> None:
    """Report a modelled diameter where lengths are already as cut: nothing is left to convert."""
    if keys.lengths_are != "as-cut":
        return
    for row, node in rows:
        rod = resolve_rod(row, keys.rods, keys.feed)
        if rod is not None and rod.replaces_mm != rod.diameter_mm:
            in_row = "modelled_diameter" in node
            place = value_place(node, "modelled_diameter") if in_row else value_place(tree, "rods", "modelled_diameter")
            message = f"modelled_diameter: {row.id} is cut as written, so its length cannot follow another rod"
            problems.add("D19", message, place, "delete it, or write lengths_are: free-space")
            return
