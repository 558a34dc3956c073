"""Law: what `check --show` prints is a design file, and reading it gives the same design."""

import json
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from fabgen.design.design import Design
from fabgen.read.reader import Reading, read_design
from fabgen.read.show import mm, show, word
from fabgen.read.source import Problems, as_source
from fabgen.read.starter import starter
from fabgen.read.yaml_tree import parse
from fabgen.units import mm_to_in, parse_length_mm

DESIGNS = sorted((Path(__file__).resolve().parents[2] / "designs").glob("*.yaml"))

METAL_STYLES = ["bonded-through", "insulated-through", "on-top"]
NUMBERS = st.decimals("1", "9", places=3).map(float)


def lengths(low: float, high: float) -> st.SearchStrategy[str]:
    """A length written in one of the ways a shop writes it."""
    sixteenths = st.integers(int(mm_to_in(low) * 16) + 1, int(mm_to_in(high) * 16)).map(lambda n: f"{n}/16 in")
    written = st.decimals(str(low), str(high), places=2).map(lambda number: f"{number} mm")
    return st.one_of(written, sixteenths) if high - low > 4 else written


@st.composite
def allowances(draw: st.DrawFn) -> Any:
    origin = draw(st.sampled_from(["auto", "none", "computed", "measured", "published", "stated"]))
    if origin == "published":
        return {"origin": origin, "model": draw(st.sampled_from(["dl6wu", "lawson"]))}
    if origin == "stated":
        return {"origin": origin, "value": draw(lengths(1, 9)), "uncertainty": "0.4 mm", "source": 'own, 2026: "a"'}
    return draw(st.sampled_from([origin, {"origin": origin}]))


@st.composite
def mounts(draw: st.DrawFn, metal: bool, flat: bool) -> dict[str, Any]:
    style = draw(st.sampled_from(METAL_STYLES if metal else ["on-top", "through-nonmetal"]))
    mount: dict[str, Any] = {"style": style}
    if style == "bonded-through":
        mount["bond"] = draw(st.sampled_from(["weld", "press", *(["wall-screws"] if flat else [])]))
    elif style == "insulated-through" and draw(st.booleans()):
        mount["hold"] = "middle-screw"
    elif draw(st.booleans()):
        mount["keeper"] = {"kind": draw(st.sampled_from(["push-ring", "snap"]))}
    if style == "insulated-through" and draw(st.booleans()):
        mount["bush"] = {
            "kind": draw(st.sampled_from(["shoulder", "sleeve"])),
            "material": "POM-C",
            "flange_height": "2 mm",
        }
    if style == "on-top" and draw(st.booleans()):
        mount["saddle"] = {"height": draw(lengths(8, 40)), "screw": "M4"}
    if style != "on-top" and draw(st.booleans()):
        mount["hole"] = draw(lengths(9, 20))
    if draw(st.booleans()):
        mount["allowance"] = draw(allowances())
    return mount


@st.composite
def designs(draw: st.DrawFn) -> dict[str, Any]:
    """A sound design with a random choice of everything optional."""
    metal = draw(st.booleans())
    section = draw(st.sampled_from(["round", "square", "rectangular"]))
    stated = {"name": "my, own: tube", "kind": "metal", "density": 2710, "yield": 200.5, "anodic_index": -0.9}
    boom: dict[str, Any] = {
        "section": section,
        "outside": draw(lengths(15, 40))
        if section != "rectangular"
        else [draw(lengths(15, 40)), draw(lengths(15, 40))],
        "material": draw(st.sampled_from(["EN AW-6060 T66", "stainless 1.4301", stated] if metal else ["oak", "GRP"])),
        "overhang": {"rear": draw(lengths(20, 90))},
    }
    if draw(st.booleans()):
        boom["wall"] = draw(lengths(1, 4))
    if section != "round" and draw(st.booleans()):
        boom["corner_radius"] = draw(lengths(0.5, 4))
    boom["overhang"].update(draw(st.sampled_from([{"front": "33.3 mm"}, {"length": "4.2 m"}])))
    names = draw(st.lists(st.sampled_from(["line", "a", "null", "m-2"]), min_size=1, max_size=3, unique=True))
    count = draw(st.integers(2, 6))
    gaps = draw(st.lists(st.decimals("20", "300", places=1), min_size=count, max_size=count))
    at, rows = draw(st.decimals("-500", "500", places=2)), []
    for number in range(count):
        at += gaps[number]
        row = {"id": f"E{number}", "role": "director", "at": f"{at} mm", "length": draw(lengths(200, 400))}
        row["role"] = "driven" if number == 1 else draw(st.sampled_from(["director", "reflector"]))
        if row["role"] != "driven" and (len(names) > 1 or draw(st.booleans())):
            row["mount"] = draw(st.sampled_from(names))
        if number != 1 and draw(st.booleans()):
            row["diameter"] = draw(lengths(2, 8))
        if draw(st.booleans()):
            row |= {"finish": "anodised", "material": draw(st.sampled_from(["brass CW614N", stated]))}
        rows.append(row)
    design: dict[str, Any] = {
        "fabgen": 1,
        "title": draw(st.text(st.characters(categories=["L", "N", "P", "S", "Zs"]), min_size=1).filter(str.strip)),
        "number": draw(st.from_regex(r"[A-Za-z0-9][A-Za-z0-9._-]{0,39}", fullmatch=True)),
        "frequency": f"{draw(st.decimals('400', '470', places=4))} MHz",
        "boom": boom,
        "mounts": {name: draw(mounts(metal, section != "round")) for name in names},
        "rods": {"diameter": draw(lengths(2, 8)), "material": "EN AW-6060 T66"},
        "elements": draw(st.permutations(rows)),
        "feed": draw(
            st.sampled_from(
                [
                    {"kind": "straight-dipole"},
                    {"kind": "folded-dipole", "spacing": "1-1/4 in", "rod": "3/16 in", "material": "PETG"},
                    {"kind": "straight-dipole", "gap": "8 mm", "reference": 75, "allowance": "none"},
                ]
            )
        ),
    }
    extra = {
        "revision": "B.2",
        "units": "in",
        "polarisation": "vertical",
        "sheet": {"owner": "a: b", "date": "2026-03-01", "creator": None},
        "lengths_are": "as-cut",
        "clamp": {"mast": "1-1/2 in", "at": "50 mm"},
        "clearance": {"tip": "30 mm"},
        "shop": {"tolerance": "0.3 mm", "drills": "both", "paper": "Letter", "stock": {"rod": "6 ft"}},
        "printer": {"bed": ["180 mm", "180 mm", "180 mm"], "hole_growth": 0},
    }
    for key in draw(st.sets(st.sampled_from(sorted(extra)))):
        design[key] = extra[key]
    if "units" not in design and "printer" in design:
        design["printer"] = {"nozzle": "0.6 mm"}
    return design


def same(reading: Reading) -> Design:
    """The design without what belongs to its file."""
    return replace(reading.design, stem="", sha256="")


def without_comments(text: str) -> list[str]:
    return [line.split("  # ")[0].rstrip() for line in text.splitlines() if not line.strip().startswith("#")]


def read_back(folder: Path, reading: Reading) -> Reading:
    path = folder / "shown.yaml"
    path.write_text(show(reading), encoding="utf-8")
    return read_design(path)


@settings(
    max_examples=40, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture, HealthCheck.too_slow]
)
@given(design=designs())
def test_read_show_read_is_read(tmp_path: Path, design: dict[str, Any]) -> None:
    """JSON is YAML, so a design made of plain data needs no writer of its own."""
    path = tmp_path / "d.yaml"
    path.write_text(json.dumps(design, ensure_ascii=False), encoding="utf-8")
    reading = read_design(path)
    again = read_back(tmp_path, reading)
    assert same(again) == same(reading)
    assert without_comments(show(again)) == without_comments(show(reading))


@pytest.mark.parametrize("path", DESIGNS, ids=lambda path: path.stem)
def test_the_demo_designs_read_back(tmp_path: Path, path: Path) -> None:
    reading = read_design(path)
    assert same(read_back(tmp_path, reading)) == same(reading)


def test_every_line_says_where_its_value_came_from(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    path.write_text(starter("trial"), encoding="utf-8")
    lines = show(read_design(path)).splitlines()
    sections = [line for line in lines if line.rstrip().endswith(":")]
    values = [line for line in lines if line not in sections]
    assert all("# " in line for line in values)
    assert "  outside: 20 mm                                      # line 6" in lines
    assert any(line.split("# ")[1] == "computed, rod + 0.2 mm" for line in lines if "bore: 4.2 mm" in line)
    assert any(line.split("# ")[1] == "default, common practice" for line in lines if "saw_kerf" in line)
    assert any("line 11; station 70 mm; mount: the only one; diameter: line 9" in line for line in lines)


def test_sizes_that_differ_by_rod_are_listed(tmp_path: Path) -> None:
    path = tmp_path / "d.yaml"
    text = starter("trial").replace("length: 296", "length: 296, diameter: 5").replace(", hole: 8", "")
    path.write_text(text, encoding="utf-8")
    reading = read_design(path)
    shown = show(reading)
    assert "# bore: 4.2 mm, 5.2 mm, by rod: computed, rod + 0.2 mm" in shown
    assert "# hole: 6.6 mm, 7.6 mm, by rod: computed, smallest metric drill from rod + 2.6 mm" in shown
    assert same(read_back(tmp_path, reading)) == same(reading)


@given(st.floats(-1e5, 1e5).filter(lambda length_mm: length_mm == 0 or abs(length_mm) > 1e-9))
def test_a_shown_length_is_the_same_number(length_mm: float) -> None:
    assert parse_length_mm(mm(length_mm)) == length_mm


@given(st.text(st.characters(categories=["L", "N", "P", "S"]), min_size=1))
def test_a_shown_word_is_the_same_text(text: str) -> None:
    source = as_source(f"a: {{b: {word(text)}}}\n".encode(), "d.yaml")
    inner = parse(source, Problems("d.yaml"))["a"]
    assert isinstance(inner, dict)
    assert inner["b"] == text


def read(folder: Path, text: str) -> Reading:
    path = folder / "d.yaml"
    path.write_text(text, encoding="utf-8")
    return read_design(path)


@pytest.mark.parametrize("keeper", ["push-ring", "snap"])
@pytest.mark.parametrize(("rod", "boom"), [("0.1", "20, wall: 1.5"), ("39.4", "80, wall: 2"), ("8", "600")])
def test_defaults_of_extreme_sizes_are_allowed_values(tmp_path: Path, rod: str, boom: str, keeper: str) -> None:
    text = starter("trial").replace("diameter: 4", f"diameter: {rod}").replace("20, wall: 1.5", boom)
    text = text.replace("hole: 8", f"keeper: {{kind: {keeper}}}, hole: {float(rod) + 4}")
    first = read(tmp_path, text)
    assert replace(read(tmp_path, show(first)).design, sha256=first.design.sha256) == first.design


@pytest.mark.parametrize(("rod", "height_mm"), [("4", 18.0), ("20", 18.0), ("30", 23.0)])
def test_a_thick_driven_rod_stands_clear_of_the_boom_by_default(tmp_path: Path, rod: str, height_mm: float) -> None:
    text = starter("trial").replace("role: driven,", f"role: driven, diameter: {rod},")
    assert read(tmp_path, text).design.feeds[0].height_mm == height_mm
