"""The JSON Schema of design files, from the same models that read them; editors complete and check with it."""

import inspect
from typing import Annotated, Any, get_args, get_origin

from fabgen.read.compound import MaterialKeys
from fabgen.read.grammar import ORIGINS, FileKeys, MountKeys
from fabgen.read.keys import Keys, one_of
from fabgen.read.kind import Kind
from fabgen.read.mount_contradictions import STYLE_KEYS

DIALECT = "https://json-schema.org/draft/2020-12/schema"


def schema() -> dict[str, Any]:
    """JSON Schema (draft 2020-12) of a design file."""
    definitions: dict[str, Any] = {"Material": _section(MaterialKeys, {})}
    whole = _section(FileKeys, definitions)
    definitions["MountKeys"]["allOf"] = [_style_rule(style, keys) for style, keys in STYLE_KEYS.items()]
    definitions["AllowanceKeys"] = {"anyOf": [{"enum": list(ORIGINS)}, definitions["AllowanceKeys"]]}
    properties = whole["properties"]
    properties["elements"] = {"anyOf": [properties["elements"], _table()]}
    return {
        "$schema": DIALECT,
        **whole,
        "title": "fabgen design file",
        "description": "One array: what was modelled, how it is mounted, what the shop can do.",
        "$defs": dict(sorted(definitions.items())),
    }


def _section(model: type[Keys], definitions: dict[str, Any]) -> dict[str, Any]:
    """A section's keys; sections inside it go to the definitions."""
    fields = model.model_fields.values()
    return {
        "additionalProperties": False,
        "description": inspect.cleandoc(model.__doc__ or ""),
        "properties": {info.alias: _value(info.annotation, info.metadata, definitions) for info in fields},
        "required": [info.alias for info in fields if info.needed],
        "type": "object",
    }


def _value(annotation: Any, metadata: tuple[Any, ...], definitions: dict[str, Any]) -> dict[str, Any]:
    """What may be written for one key."""
    kind = next((each for each in metadata if isinstance(each, Kind)), None)
    if kind is not None:
        return _with_material(kind.schema())
    annotation = one_of(annotation)
    origin, parts = get_origin(annotation), get_args(annotation)
    if origin is Annotated:
        return _value(parts[0], parts[1:], definitions)
    if origin is list:
        return {"items": _value(parts[0], (), definitions), "type": "array"}
    if origin is dict:
        name, value = (_value(part, (), definitions) for part in parts)
        return {"additionalProperties": False, "patternProperties": {name["pattern"]: value}, "type": "object"}
    if annotation.__name__ not in definitions:
        definitions[annotation.__name__] = {}
        definitions[annotation.__name__] = _section(annotation, definitions)
    return {"$ref": f"#/$defs/{annotation.__name__}"}


def _with_material(part: dict[str, Any]) -> dict[str, Any]:
    """The same with the mapping of a material where its place is kept."""
    options = part.get("anyOf", [])
    kept = [{"$ref": "#/$defs/Material"} if o.get("$comment") == "Material" else o for o in options]
    return part | {"anyOf": kept} if options else part


def _style_rule(style: str, keys: tuple[str, ...]) -> dict[str, Any]:
    """Keys that have no meaning for a style are not offered for it."""
    every = [info.alias for info in MountKeys.model_fields.values()]
    useless = [key for key in every if key not in (*keys, "style", "allowance")]
    return {
        "if": {"properties": {"style": {"const": style}}},
        "then": {"properties": dict.fromkeys(useless, False)},
    }


def _table() -> dict[str, Any]:
    said = "a CSV file beside the design file, its header the keys of a row"
    return {
        "type": "object",
        "additionalProperties": False,
        "required": ["table"],
        "properties": {"table": {"type": "string", "description": said, "examples": ["elements.csv"]}},
    }
