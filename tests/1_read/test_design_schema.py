"""The JSON Schema says what the reader says, as far as a schema can."""

import json
import re
from pathlib import Path
from typing import Any

import pytest
import yaml

from fabgen.errors import DesignErrors
from fabgen.read.reader import read_design
from fabgen.read.schema import DIALECT, schema
from fabgen.read.starter import starter

SCHEMA = schema()
DESIGNS = sorted((Path(__file__).resolve().parents[2] / "designs").glob("*.yaml"))
TYPES = {"string": str, "number": (int, float), "object": dict, "array": list, "null": type(None), "boolean": bool}


def accepts(rule: Any, value: Any) -> bool:
    """Whether a value meets a schema; the keywords that ours uses, after JSON Schema 2020-12."""
    if isinstance(rule, bool):
        return rule
    if "$ref" in rule:
        return accepts(SCHEMA["$defs"][rule["$ref"].rpartition("/")[2]], value)
    types = rule.get("type", list(TYPES))
    kinds = tuple(TYPES[name] for name in ([types] if isinstance(types, str) else types))
    checks = [
        isinstance(value, kinds) and not (isinstance(value, bool) and "boolean" not in types),
        "enum" not in rule or value in rule["enum"],
        "const" not in rule or value == rule["const"],
        "anyOf" not in rule or any(accepts(option, value) for option in rule["anyOf"]),
        all(accepts(part, value) for part in rule.get("allOf", ())),
        "if" not in rule or not accepts(rule["if"], value) or accepts(rule["then"], value),
    ]
    if isinstance(value, str):
        checks.append(bool(re.search(rule.get("pattern", ""), value)))
        checks.append(len(value) <= rule.get("maxLength", len(value)))
    if isinstance(value, (int, float)):
        checks.append(rule.get("minimum", value) <= value <= rule.get("maximum", value))
    if isinstance(value, list):
        checks.append(rule.get("minItems", 0) <= len(value) <= rule.get("maxItems", len(value)))
        checks += [accepts(rule.get("items", True), item) for item in value]
    if isinstance(value, dict):
        checks += [key in value for key in rule.get("required", ())]
        checks += [accepts_key(rule, key, item) for key, item in value.items()]
    return all(checks)


def accepts_key(rule: Any, key: str, value: Any) -> bool:
    if key in rule.get("properties", {}):
        return accepts(rule["properties"][key], value)
    for pattern, inner in rule.get("patternProperties", {}).items():
        if re.search(pattern, key):
            return accepts(inner, value)
    return accepts(rule.get("additionalProperties", True), value)


def plain(text: str) -> Any:
    """Plain data as an editor sees it; dates stay text, as in YAML 1.2."""
    loader = type("Loader", (yaml.SafeLoader,), {})
    loader.yaml_implicit_resolvers = {
        first: [(tag, pattern) for tag, pattern in resolvers if not tag.endswith("timestamp")]
        for first, resolvers in yaml.SafeLoader.yaml_implicit_resolvers.items()
    }
    return yaml.load(text, Loader=loader)


def test_it_is_plain_json_in_one_order() -> None:
    assert SCHEMA["$schema"] == DIALECT
    assert json.dumps(SCHEMA) == json.dumps(schema())
    assert json.loads(json.dumps(SCHEMA)) == SCHEMA


def test_every_reference_leads_somewhere() -> None:
    references = set(re.findall(r'"#/\$defs/(\w+)"', json.dumps(SCHEMA)))
    assert references == set(SCHEMA["$defs"])


@pytest.mark.parametrize("path", DESIGNS, ids=lambda path: path.stem)
def test_it_accepts_the_demo_designs(path: Path) -> None:
    assert accepts(SCHEMA, plain(path.read_text(encoding="utf-8")))


@pytest.mark.parametrize(
    ("old", "new"),
    [
        ("", ""),
        ("number: 'trial'", "number: 7\nrevision: 2"),
        ("clamp:", "sheet: {owner: , date: 2026-03-01}\nclamp:"),
        ("hole: 8", "hole: 8, allowance: auto"),
        ("hole: 8", "hole: 8, allowance: {origin: published, model: lawson}"),
        (
            "hole: 8",
            "hole: 8, keeper: {kind: snap, material: {name: x, kind: plastic, density: 1000, conductive: false}}",
        ),
        ("style: insulated-through, hole: 8", "style: on-top, saddle: {height: 12, screw: M4}"),
        ("outside: 20", "outside: [20, 30]"),
        ("kind: straight-dipole", "kind: straight-dipole, reference: 75"),
        ("kind: straight-dipole", "kind: straight-dipole, reference: 200 ohm"),
        ("kind: straight-dipole", "kind: straight-dipole, reference: 300Ω"),
        ("clamp:", "shop: {tolerance: 0.3 mm}\nprinter: {bed: [180, 180, 180]}\nclamp:"),
    ],
)
def test_what_is_read_is_accepted(tmp_path: Path, old: str, new: str) -> None:
    text = starter("trial").replace(old, new, 1)
    if "[20, 30]" in text:
        text = text.replace("square", "rectangular")
    (tmp_path / "d.yaml").write_text(text, encoding="utf-8")
    read_design(tmp_path / "d.yaml")
    assert accepts(SCHEMA, plain(text))


@pytest.mark.parametrize(
    ("old", "new"),
    [
        ("fabgen: 1", "fabgen: 2"),
        ("title:", "titel:"),
        ("title: 'trial'\n", ""),
        ("number: 'trial'", "number: 'a/b'"),
        ("section: square", "section: squar"),
        ("material: EN AW-6060 T66, over", "material: EN AW-6060 T6x, over"),
        ("hole: 8", "hole: 8, saddle: {height: 12}"),
        ("style: insulated-through, hole: 8", "style: on-top, hole: 8"),
        ("hole: 8", "hole: 8, allowance: guessed"),
        ("role: driven", "role: fed"),
        ("  line:", "  my line:"),
        ("length: 340", "length: 340, color: red"),
        ("clamp:", "printer: {bed: [180, 180]}\nclamp:"),
        ("mast: 38", "at: balance"),
        ("kind: straight-dipole", "kind: straight-dipole, reference: 0"),
        ("kind: straight-dipole", "kind: straight-dipole, reference: 200 kohm"),
    ],
)
def test_what_is_refused_is_refused(tmp_path: Path, old: str, new: str) -> None:
    text = starter("trial").replace(old, new, 1)
    assert text != starter("trial")
    (tmp_path / "d.yaml").write_text(text, encoding="utf-8")
    with pytest.raises(DesignErrors):
        read_design(tmp_path / "d.yaml")
    assert not accepts(SCHEMA, plain(text))
