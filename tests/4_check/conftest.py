"""A small sound design that each test spoils in one place, and the findings of one rule about it."""

import copy
import json
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest

from fabgen import registry
from fabgen.arrange.arrange import arrange
from fabgen.check.where import merged
from fabgen.correct.ledger import correct
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.read.reader import read_design

ALUMINIUM = "EN AW-6060 T66"
SOUND: dict[str, Any] = {
    "fabgen": 1,
    "title": "Rule trial",
    "number": "RT-1",
    "frequency": "434 MHz",
    "units": "mm",
    "boom": {
        "section": "square",
        "outside": 20,
        "wall": 1.5,
        "corner_radius": 1,
        "material": ALUMINIUM,
        "overhang": {"rear": 80, "front": 80},
    },
    "mounts": {"line": {"style": "insulated-through", "hole": 8, "allowance": {"origin": "computed"}}},
    "rods": {"diameter": 4, "material": ALUMINIUM},
    "elements": [
        {"id": "R", "role": "reflector", "at": 0, "length": 338},
        {"id": "DE", "role": "driven", "at": 131, "length": 329},
        {"id": "D1", "role": "director", "at": 190, "length": 311},
        {"id": "D2", "role": "director", "at": 307, "length": 304},
    ],
    "feed": {"kind": "straight-dipole", "gap": 10, "height": 18, "cable": 5},
    "clamp": {"at": "balance", "mast": 38},
    "printer": {"hole_growth": 0.2},
}
ON_TOP = {"style": "on-top", "allowance": {"origin": "none"}}

Short = tuple[str, str, str, float | None, float | None]
Made = Callable[..., Arranged]
Found = Callable[..., list[Short]]


@pytest.fixture
def made(tmp_path: Path) -> Made:
    """Arrange the sound design with changes: `{"boom.outside": 15, "elements.D2.at": 205, "clamp": None}`."""

    def _made(changes: dict[str, Any] | None = None) -> Arranged:
        design = copy.deepcopy(SOUND)
        for path, value in (changes or {}).items():
            change(design, path.split("."), value)
        file = tmp_path / "trial.yaml"
        file.write_text(json.dumps(design), encoding="utf-8")
        read = read_design(file).design
        return arrange(read, correct(read))

    return _made


def change(design: dict[str, Any], path: list[str], value: object) -> None:
    """Set one value by its path; None deletes it. Elements go by id."""
    place: Any = design
    for key in path[:-1]:
        place = next(row for row in place if row["id"] == key) if isinstance(place, list) else place.setdefault(key, {})
    if value is None:
        place.pop(path[-1], None)
    else:
        place[path[-1]] = value


def judged(rule: str, arranged: Arranged) -> list[Finding]:
    """What one rule says about an arranged design, equal findings told once."""
    found = registry.entry("check/rules", rule).function("findings")(arranged)
    return merged(found, [element.id for element in arranged.design.elements])


@pytest.fixture
def found(made: Made) -> Found:
    """Code, severity, place and numbers of what a rule finds in the changed design."""

    def _found(rule: str, changes: dict[str, Any] | None = None) -> list[Short]:
        return [(f.code, f.severity, f.where, f.measured, f.required) for f in judged(rule, made(changes))]

    return _found


@pytest.fixture
def advice(made: Made) -> Callable[..., str]:
    """The advice of a rule's only finding."""

    def _advice(rule: str, changes: dict[str, Any] | None = None) -> str:
        (only,) = judged(rule, made(changes))
        return only.advice

    return _advice


@pytest.fixture
def on_top() -> dict[str, Any]:
    """A mount on top of the boom."""
    return copy.deepcopy(ON_TOP)


@pytest.fixture
def rule() -> Found:
    """Code, severity, place and numbers of what a rule finds in an arranged design."""

    def _rule(name: str, arranged: Arranged) -> list[Short]:
        return [(f.code, f.severity, f.where, f.measured, f.required) for f in judged(name, arranged)]

    return _rule
