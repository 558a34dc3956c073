"""The JSON Schema of design files, from the same models that read them; editors complete and check with it."""

from typing import Any

from fabgen.read.compound import MaterialKeys
from fabgen.read.grammar import ORIGINS, FileKeys, MountKeys
from fabgen.read.mount_contradictions import STYLE_KEYS

DIALECT = "https://json-schema.org/draft/2020-12/schema"


def schema() -> dict[str, Any]:
    """JSON Schema (draft 2020-12) of a design file."""
    whole = FileKeys.model_json_schema(by_alias=True)
    definitions = whole.pop("$defs")
    definitions["Material"] = MaterialKeys.model_json_schema(by_alias=True)
    definitions["MountKeys"]["allOf"] = [_style_rule(style, keys) for style, keys in STYLE_KEYS.items()]
    definitions["AllowanceKeys"] = {"anyOf": [{"enum": list(ORIGINS)}, definitions["AllowanceKeys"]]}
    properties = whole["properties"]
    properties["mounts"]["additionalProperties"] = False
    properties["elements"] = {"anyOf": [properties["elements"], _table()]}
    return {
        "$schema": DIALECT,
        **_tidy(whole),
        "title": "fabgen design file",
        "description": "One array: what was modelled, how it is mounted, what the shop can do.",
        "$defs": {name: _tidy(definition) for name, definition in sorted(definitions.items())},
    }


def _style_rule(style: str, keys: tuple[str, ...]) -> dict[str, Any]:
    """Keys that have no meaning for a style are not offered for it."""
    every = [info.alias or name for name, info in MountKeys.model_fields.items()]
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


def _tidy(part: Any) -> Any:
    """Without the titles that repeat key names, and without defaults that only say `left out`."""
    if isinstance(part, list):
        return [_tidy(item) for item in part]
    if not isinstance(part, dict):
        return part
    if part.get("$comment") == "Material":
        return {"$ref": "#/$defs/Material"}
    kept = {
        key: _tidy(value)
        for key, value in part.items()
        if not (key == "default" and value is None) and not (key == "title" and isinstance(value, str))
    }
    options = kept.get("anyOf")
    if options and {"type": "null"} in options:
        rest = [option for option in options if option != {"type": "null"}]
        kept = {**{key: value for key, value in kept.items() if key != "anyOf"}, **_one_of(rest)}
    return kept


def _one_of(options: list[Any]) -> dict[str, Any]:
    return options[0] if len(options) == 1 else {"anyOf": options}
