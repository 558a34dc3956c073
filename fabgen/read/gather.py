"""The validator's reasons become problems with a place, the nearest valid name and an example."""

from typing import Any

from pydantic_core import ValidationError

from fabgen.errors import Place
from fabgen.read.compound import MaterialKeys, MaterialValue
from fabgen.read.grammar import ElementKeys, FileKeys
from fabgen.read.keys import FieldInfo, Keys, keys_in
from fabgen.read.kind import Broken, Kind
from fabgen.read.nearest import nearest, suggestion
from fabgen.read.source import Problems
from fabgen.read.yaml_tree import Map, Node, Scalar, Seq

_EXAMPLES = {
    "boom": "{section: square, outside: 20 mm, wall: 1.5 mm, material: EN AW-6060 T66, "
    "overhang: {rear: 70 mm, front: 70 mm}}",
    "overhang": "{rear: 70 mm, front: 70 mm}",
    "mounts": "{line: {style: insulated-through}}",
    "elements": "and one row per rod, - {id: R, role: reflector, at: 0 mm, length: 340 mm}",
}
"""What a whole section could look like."""

Loc = tuple[int | str, ...]


def gather(broken: Broken, root: Map, problems: Problems) -> None:
    """Report everything that kept one section, row or value from validating.

    Args:
        broken: the node and its reasons.
        root: the whole file, where the node's key stands.
        problems: takes the reports.
    """
    info = FileKeys.model_fields[broken.field]
    key, name = _called(broken.node, root, info.alias)
    model = keys_in(info.annotation)
    for reason in _reasons(broken.error, model):
        _report(broken.node, key, name, model, reason, problems)


def gather_root(error: ValidationError, root: Map, problems: Problems) -> None:
    """Report unknown and missing keys of the top level."""
    for reason in _reasons(error, FileKeys):
        _report(root, None, "the file", FileKeys, reason, problems)


def _reasons(error: ValidationError, model: type[Keys] | None) -> list[Any]:
    """The validator's reasons, without the missing keys that an unknown neighbour was meant to be."""
    reasons = error.errors(include_url=False, include_input=False)
    meant = set()
    for reason in reasons:
        *above, written = reason["loc"] or ("",)
        if reason["type"] == "extra_forbidden" and (keys := _model_at(model, tuple(above))) is not None:
            meant.add((*above, nearest(str(written), aliases(keys))))
    return [reason for reason in reasons if reason["type"] != "missing" or reason["loc"] not in meant]


def _called(node: Node, root: Map, section: str) -> tuple[Scalar | None, str]:
    """The key before a section, a row of `elements` or one of `mounts`, and what messages call it."""
    id_ = node.get("id") if isinstance(node, Map) else None
    if section == "elements" and isinstance(id_, Scalar):
        return root.key(section), f"row {id_}"
    mounts = root.get("mounts")
    names = [name for name, mount in mounts.items() if mount is node] if isinstance(mounts, Map) else []
    if isinstance(mounts, Map) and names:
        return mounts.key(names[0]), f"mount {names[0]}"
    return root.key(section), section


def _report(
    node: Node, key: Scalar | None, name: str, model: type[Keys] | None, reason: Any, problems: Problems
) -> None:
    """Turn one reason into one problem, unless its value was reported already."""
    loc: Loc = reason["loc"]
    kind = reason["type"]
    if loc and loc[-1] == "[key]":
        loc = loc[:-1]
        bad = node.key(str(loc[-1])) if isinstance(node, Map) else None
        place = bad.place if bad is not None else node.place
        problems.add(
            reason["ctx"]["code"], f"a name in {name}: {reason['ctx']['message']}", place, reason["ctx"]["fix"]
        )
        return
    for depth, part in enumerate(loc):
        if isinstance(node, Map) and isinstance(part, str) and part in node:
            key, node, name = node.key(part), node[part], part
        elif isinstance(node, Seq) and isinstance(part, int):
            node = node[part]
        elif kind == "missing" and depth == len(loc) - 1:
            _report_missing(node, key, name, str(part), _model_at(model, loc[:-1]), problems)
            return
    if isinstance(node, Scalar) and node.broken:
        return
    if kind == "extra_forbidden":
        known = aliases(_model_at(model, loc[:-1]) or FileKeys)
        place = key.place if key is not None else node.place
        home = _homes(name) if len(loc) == 1 else []
        fix = f"it belongs in {' or '.join(home)}" if 0 < len(home) <= 2 else suggestion(name, known)
        problems.add("D06", f"`{name}` is not a key here", place, fix)
    elif kind == "fabgen":
        context = reason["ctx"]
        problems.add(context["code"], f"{name}: {context['message']}", _value_place(node, key), context["fix"])
    else:
        _report_shape(node, key, name, kind, _model_at(model, loc), problems)


def _value_place(node: Node, key: Scalar | None) -> Place:
    """The value's place; the key's when nothing stands there."""
    return key.place if isinstance(node, Scalar) and not node.width and key is not None else node.place


def _report_missing(
    node: Node, key: Scalar | None, name: str, missing: str, model: type[Keys] | None, problems: Problems
) -> None:
    example = _example(model, missing)
    flow_row = isinstance(node, Map) and node.flow
    place = node.place if key is None or flow_row else key.place
    fix = f"add {missing}: {example}" if example else f"add {missing}"
    problems.add("D07", f"`{missing}` is missing in {name}", place, fix)


def _report_shape(
    node: Node, key: Scalar | None, name: str, kind: str, model: type[Keys] | None, problems: Problems
) -> None:
    """A list, mapping or scalar where another is needed."""
    place = _value_place(node, key)
    if kind == "list_type":
        wanted, fix = "a list of rows", "begin every row with `- `, or write table: file.csv"
    elif kind == "dict_type":
        wanted, fix = "a name for each mount", f"for example {name}: {_EXAMPLES[name]}"
    else:
        wanted = "keys and values"
        fix = f"write {{key: value}} with the keys {', '.join(aliases(model))}" if model else "write key: value"
        name = "a row" if model is ElementKeys else name
    if isinstance(node, Scalar) and node.empty:
        problems.add("D07", f"`{name}` has no value", place, fix)
    else:
        problems.add("D08", f"{name} takes {wanted}", place, fix)


def aliases(model: type[Keys]) -> list[str]:
    """The keys of a section, in the order of the grammar."""
    return [info.alias for info in model.model_fields.values()]


def _homes(alias: str) -> list[str]:
    """The sections of the file that have a key of that name."""
    sections = {info.alias: keys_in(info.annotation) for info in FileKeys.model_fields.values()}
    return [name for name, model in sections.items() if model is not None and _field(model, alias) is not None]


def required(model: type[Keys]) -> list[str]:
    """The keys that a section must have."""
    return [info.alias for info in model.model_fields.values() if info.needed]


def _field(model: type[Keys], alias: str) -> FieldInfo | None:
    return next((info for info in model.model_fields.values() if info.alias == alias), None)


def _model_at(model: type[Keys] | None, loc: Loc) -> type[Keys] | None:
    """The model that reads what stands at a path below another model."""
    for part in loc:
        if model is None:
            return None
        info = _field(model, str(part))
        if info is None:
            return None
        model = MaterialKeys if any(isinstance(m, MaterialValue) for m in info.metadata) else keys_in(info.annotation)
    return model


def _example(model: type[Keys] | None, alias: str) -> str:
    """What a user might write for a key."""
    if alias in _EXAMPLES:
        return _EXAMPLES[alias]
    info = _field(model, alias) if model is not None else None
    for metadata in info.metadata if info is not None else ():
        if isinstance(metadata, Kind):
            return metadata.example
    return ""
