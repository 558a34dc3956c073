"""The judge: every rule in turn, equal findings told once, fast; every code of the rules seen in these tests."""

import ast
import re
from dataclasses import replace
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from fabgen import registry
from fabgen.arrange.arrange import arrange
from fabgen.check.judge import judge
from fabgen.check.where import merged, names
from fabgen.correct.ledger import correct
from fabgen.design.findings import Finding, clear
from fabgen.read.reader import read_design

ROOT = Path(__file__).resolve().parents[2]
DESIGNS = sorted((ROOT / "designs").glob("*.yaml"))
CODE = re.compile(r"[LHFCAPSE]\d{2}")
MOST_FINDINGS = 8
PAIRS = "pair_"


def codes_in(path):
    """Codes that stand in a module as text of their own."""
    tree = ast.parse(path.read_text(encoding="utf-8"))
    return {
        node.value
        for node in ast.walk(tree)
        if isinstance(node, ast.Constant) and isinstance(node.value, str) and CODE.fullmatch(node.value)
    }


def test_every_code_of_the_rules_is_seen_in_these_tests():
    rules = [path for path in (ROOT / "fabgen/check").rglob("*.py") if not path.stem.startswith("pair")]
    printed = set().union(*map(codes_in, rules)) | codes_in(ROOT / "fabgen/arrange/arrange.py")
    tested = set().union(*map(codes_in, Path(__file__).parent.glob("test_*rules.py")))
    tested |= codes_in(Path(__file__).parent / "test_sheet_findings.py")
    of_the_ledger = {"L01", "L03", "L04", "L06", "L07", "L08"}  # remarks of stage `correct`, tested there
    assert printed - tested - of_the_ledger == set()


@pytest.mark.parametrize("rule", registry.entries("check/rules"), ids=lambda rule: rule.name)
def test_a_rule_is_a_question(rule):
    assert rule.summary.endswith("?")
    assert callable(rule.function("findings"))


def test_every_code_can_be_explained():
    for code in registry.codes():
        page = registry.code_page(code)
        assert page is not None
        assert "What to do:" in page, code


def test_the_sound_design_is_clear(made):
    found = list(judge(made()))
    assert [f.code for f in found if f.severity != "note"] == []
    assert clear(tuple(found))


@pytest.mark.parametrize("design", DESIGNS, ids=lambda path: path.stem)
def test_demo_designs_are_clear_with_few_findings(design):
    read = read_design(design).design
    found = list(judge(arrange(read, correct(read))))
    assert [f for f in found if f.severity == "fail"] == []
    assert len(found) <= MOST_FINDINGS


def test_findings_carry_title_unit_and_rounded_numbers(made):
    for found in judge(made({"boom.outside": 12, "mounts.line.bush.bore": 4.05})):
        assert found.title == registry.code_title(found.code)
        assert found.advice
        for number in (found.measured, found.required):
            assert number is None or number == round(number, 3)


def finding(where, measured=1.0):
    return Finding("H01", "fail", where, measured, 2.0, "mm", "advice")


def test_equal_findings_are_told_once():
    order = ["R", "DE", "D1", "D2", "D3", "D4"]
    found = merged(
        [finding("D3"), finding("R"), finding("D2"), finding("clamp"), finding("D1"), finding("D4", 3)], order
    )
    assert [(f.where, f.measured) for f in found] == [("R, D1…D3, clamp", 1.0), ("D4", 3)]


@pytest.mark.parametrize(
    ("chosen", "text"),
    [
        (["a", "b"], "a, b"),
        (["c", "b", "a"], "a…c"),
        (["a", "c", "d", "e"], "a, c…e"),
        (["x", "a", "x"], "a, x"),
        ([], ""),
    ],
)
def test_names_in_short(chosen, text):
    assert names(list("abcde"), chosen) == text


def test_where_a_part_stands_twice_is_told_once():
    same = [finding("D1 to D2"), finding("D1 to D2")]
    assert [f.where for f in merged(same, ["D1", "D2"])] == ["D1 to D2"]


def test_an_array_of_eighty_is_told_in_few_findings(made):
    """Eighty elements say the same thing once, not eighty times."""
    arranged = eighty(made)
    rules = [rule for rule in registry.entries("check/rules") if not rule.name.startswith(PAIRS)]
    found = [f for rule in rules for f in rule.function("findings")(arranged)]
    told = list(merged(found, [element.id for element in arranged.design.elements]))
    assert len(arranged.design.elements) == 80
    assert 0 < len(told) <= 2 * MOST_FINDINGS


def eighty(made):
    """R, DE and 78 directors, every one of them near the limits of the drill, so that most rules speak."""
    rows = [
        {"id": "R", "role": "reflector", "at": 0, "length": 338},
        {"id": "DE", "role": "driven", "at": 131, "length": 329},
        *({"id": f"D{i}", "role": "director", "at": 120 + 100 * i, "length": 311 - i / 10} for i in range(1, 79)),
    ]
    return made({"elements": rows, "shop.stock.boom": 12_000, "boom.wall": 0.8, "printer.hole_growth": 0})


STYLES = [
    {"style": "insulated-through", "hole": 8},
    {"style": "insulated-through", "hold": "middle-screw"},
    {"style": "insulated-through", "bush": {"kind": "sleeve"}, "keeper": {"kind": "snap"}},
    {"style": "bonded-through", "bond": "press"},
    {"style": "on-top"},
]
BOOMS = [
    {"boom.section": "square", "boom.outside": 20},
    {"boom.section": "square", "boom.outside": 8, "boom.wall": None},
    {"boom.section": "rectangular", "boom.outside": [30, 6]},
    {"boom.section": "round", "boom.outside": 25, "boom.corner_radius": None},
]

CLAMPS = [{}, {"clamp": None}, {"clamp.at": 5}, {"clamp.at": 150}, {"polarisation": "vertical"}]


@settings(max_examples=40, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(
    mount=st.sampled_from(STYLES),
    boom=st.sampled_from(BOOMS),
    rear_mm=st.sampled_from([1, 3, 12, 80]),
    next_mm=st.sampled_from([191, 200, 307]),
    clamp=st.sampled_from(CLAMPS),
)
def test_whatever_can_be_read_can_be_judged(made, mount, boom, rear_mm, next_mm, clamp):
    changes = {"mounts.line": mount, "boom.overhang.rear": rear_mm, "elements.D2.at": next_mm}
    for found in judge(made(changes | boom | clamp)):
        assert found.code in registry.codes()
        assert found.where


@settings(max_examples=15, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(front_mm=st.floats(1, 20), more_mm=st.floats(0, 20))
def test_a_longer_overhang_never_makes_the_end_worse(found, front_mm, more_mm):
    order = {"fail": 0, "warn": 1}
    short = found("hole_to_end", {"boom.overhang.front": front_mm})
    long = found("hole_to_end", {"boom.overhang.front": front_mm + more_mm})
    worst = [min((order[severity] for _, severity, *_ in each), default=2) for each in (short, long)]
    assert worst[0] <= worst[1]


def test_order_of_rules_does_not_depend_on_the_order_of_parts(made):
    arranged = made({"boom.overhang.front": 10, "printer.hole_growth": 0})
    turned = replace(arranged, placed=tuple(reversed(arranged.placed)))
    assert {f.code for f in judge(arranged)} == {f.code for f in judge(turned)}
