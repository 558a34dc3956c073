"""What is wrong between values that are each right: each check takes the sections that validated."""

from collections.abc import Iterator

from fabgen.read.boom_contradictions import check_boom
from fabgen.read.element_contradictions import check_elements
from fabgen.read.feed_contradictions import check_clamp, check_feed
from fabgen.read.grammar import ElementKeys, FileKeys
from fabgen.read.limits import check_limits
from fabgen.read.mount_contradictions import check_mounts
from fabgen.read.other_rod import check_other_rods
from fabgen.read.source import Problems
from fabgen.read.yaml_tree import Map, Seq


def find_contradictions(keys: FileKeys, tree: Map, problems: Problems) -> None:
    """Report everything that contradicts something else in the file.

    Args:
        keys: the validated sections; those that did not validate are None.
        tree: the file with its places.
        problems: takes the reports.
    """
    rows = list(_rows(keys, tree))
    check_boom(keys, rows, tree, problems)
    check_mounts(keys, tree, problems)
    check_elements(keys, rows, tree, problems)
    check_feed(keys, rows, tree, problems)
    check_clamp(keys, rows, tree, problems)
    check_other_rods(keys, rows, tree, problems)
    check_limits(keys.limits, keys.frequency_mhz, tree, problems)


def _rows(keys: FileKeys, tree: Map) -> Iterator[tuple[ElementKeys, Map]]:
    """The rows that validated, each with its place."""
    nodes = tree.get("elements")
    if isinstance(nodes, Seq) and keys.elements is not None:
        for row, node in zip(keys.elements, nodes, strict=True):
            if row is not None and isinstance(node, Map):
                yield row, node
