"""Where a key or value stands, for messages about values that contradict each other."""

from fabgen.errors import Place
from fabgen.read.yaml_tree import Map, Node, Scalar


def node_at(tree: Map, *path: str) -> Node | None:
    """The node at a path of keys, or None."""
    node: Node = tree
    for part in path:
        if not isinstance(node, Map) or part not in node:
            return None
        node = node[part]
    return node


def key_place(tree: Map, *path: str) -> Place:
    """The place of the last key of a path that stands in the file; the file's first line when none does."""
    place, node = tree.place, tree
    for part in path:
        key = node.key(part)
        if key is None:
            break
        place, inner = key.place, node[part]
        if not isinstance(inner, Map):
            break
        node = inner
    return place


def value_place(tree: Map, *path: str) -> Place:
    """The place of the value at a path, else of the nearest key above it."""
    node = node_at(tree, *path)
    return node.place if isinstance(node, Scalar) and node.width else key_place(tree, *path)
