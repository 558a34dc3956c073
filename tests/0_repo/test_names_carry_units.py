"""A quantity's name ends in its unit; what has no unit is listed here with the reason."""

import ast
import io
import tokenize
from collections.abc import Iterator
from pathlib import Path

import pytest

pytestmark = pytest.mark.house

LENGTHS = {"mm", "mm2", "mm3", "mm4", "m", "wl", "wl2", "deg", "rad"}
MASSES_AND_LOADS = {"g", "kg", "g_mm", "kg_m3", "n", "n_mm", "mpa", "gpa", "pa"}
ELECTRICAL = {"hz", "khz", "mhz", "ohm", "siemens", "s_m", "db", "dbi", "v", "pf", "nh", "w", "w_m2"}
OTHER = {"m_s", "c", "s", "percent"}
UNITS = LENGTHS | MASSES_AND_LOADS | ELECTRICAL | OTHER
# Names without a unit suffix, and why they need none.
DIMENSIONLESS = {
    "ratio": "one quantity over another of the same unit",
    "fraction": "a part of a whole, 0 to 1",
    "factor": "multiplies a quantity without changing its unit",
    "share": "a part of a whole, 0 to 1",
    "strain": "length over length",
    "permittivity": "relative to vacuum",
    "poisson": "strain over strain",
    "swr": "voltage over voltage",
    "mismatch": "SWR, voltage over voltage",
    "slope": "length over length",
    "reflection": "wave over wave",
    "gain": "power over power; in decibels it is gain_dbi",
    "correlation": "between -1 and 1",
    "probability": "0 to 1",
    "confidence": "0 to 1",
    "quantity": "a count",
    "count": "a count",
    "cosine": "length over length",
    "sine": "length over length",
    "efficiency": "power over power",
    "tangent": "length over length",
    "relative": "a part of the value it qualifies",
    "measured": "a finding's own field `unit` says it",
    "required": "a finding's own field `unit` says it",
    "holes": "x, y and diameter in mm, three numbers for each hole",
    "growth": "one mesh step over its neighbour",
    "node": "a part of a rod's half length, 0 to 1",
    "low": "a bound of an integral, in the integrand's unit",
    "high": "a bound of an integral, in the integrand's unit",
}


def is_float(annotation: ast.expr | None) -> bool:
    """Whether an annotation holds real numbers: float, or float inside an option, tuple, list or mapping value."""
    if annotation is None:
        return False
    match annotation:
        case ast.Name(id="float"):
            return True
        case ast.BinOp(left=left, right=right):
            kinds = [side for side in (left, right) if not isinstance(side, ast.Constant)]
            return all(is_float(kind) for kind in kinds)
        case ast.Subscript(value=ast.Name(id="Callable")):
            return False
        case ast.Subscript(value=ast.Name(id=("dict" | "Mapping")), slice=ast.Tuple(elts=[_, value])):
            return is_float(value)
        case ast.Subscript(slice=ast.Tuple(elts=elements)):
            kinds = [element for element in elements if not isinstance(element, ast.Constant)]
            return bool(kinds) and all(is_float(kind) for kind in kinds)
        case ast.Subscript(slice=inner):
            return is_float(inner)
        case _:
            return False


def has_unit(name: str) -> bool:
    words = name.lower().rstrip("_").split("_")
    return (
        "_".join(words[-1:]) in UNITS
        or "_".join(words[-2:]) in UNITS
        or words[-1] in DIMENSIONLESS
        or words[-1].rstrip("s") in DIMENSIONLESS
        or "per" in words[1:-1]
    )


def quantities(tree: ast.Module) -> Iterator[tuple[int, str]]:
    """Line and name of every real-valued public field, parameter and property of a module."""
    yield from _in(tree.body, inside_class=False)


def _in(body: list[ast.stmt], *, inside_class: bool) -> Iterator[tuple[int, str]]:
    for node in body:
        match node:
            case ast.ClassDef(name=name) if not name.startswith("_"):
                yield from _in(node.body, inside_class=True)
            case ast.AnnAssign(target=ast.Name(id=name), annotation=annotation) if is_float(annotation):
                if not name.startswith("_"):
                    yield node.lineno, name
            case ast.FunctionDef(name=name, args=given) if not name.startswith("_"):
                for argument in (*given.posonlyargs, *given.args, *given.kwonlyargs):
                    if is_float(argument.annotation):
                        yield argument.lineno, argument.arg
                decorators = {ast.unparse(decorator) for decorator in node.decorator_list}
                if inside_class and is_float(node.returns) and decorators & {"property", "cached_property"}:
                    yield node.lineno, name


def inches_written_out(text: str) -> list[int]:
    """Lines on which a number, written as such or as text, converts inches by hand."""
    tokens = tokenize.generate_tokens(io.StringIO(text).readline)
    return [
        token.start[0]
        for token in tokens
        if token.type in (tokenize.NUMBER, tokenize.STRING)
        and token.string.strip("'\"").rstrip("0") in {"25.4", "0.0254", ".0254"}
    ]


def test_quantities_carry_their_unit(modules: dict[str, ast.Module]) -> None:
    wrong = [
        f"fabgen/{path}:{line} {name}"
        for path, tree in modules.items()
        for line, name in quantities(tree)
        if not has_unit(name) and not (path == "units.py" and name.endswith("_in"))
    ]
    assert not wrong, "\n".join(wrong)


def test_there_are_quantities_to_judge(modules: dict[str, ast.Module]) -> None:
    assert sum(len(list(quantities(tree))) for tree in modules.values()) > 200


def test_inches_are_converted_in_one_place(root: Path) -> None:
    package = root / "fabgen"
    places = {
        path.relative_to(package).as_posix()
        for path in package.rglob("*.py")
        if inches_written_out(path.read_text(encoding="utf-8"))
    }
    assert places == {"units.py"}


@pytest.mark.parametrize("name", ["length_mm", "x_mm", "density_kg_m3", "gap_wl", "shift_per_mm", "width_ratio"])
def test_a_name_with_its_unit_passes(name: str) -> None:
    assert has_unit(name)


@pytest.mark.parametrize("name", ["length", "x", "diameter", "mm_width", "gap_in", "comm"])
def test_a_name_without_unit_is_noticed(name: str) -> None:
    assert not has_unit(name)


def test_what_counts_as_a_quantity() -> None:
    tree = ast.parse(
        "class Hole:\n"
        "    station: float\n"
        "    spread: tuple[float, float] | None = None\n"
        "    element: str = ''\n"
        "    _cache: float = 0\n"
        "    @property\n"
        "    def depth(self) -> float: ...\n"
        "    def row(self, wall: float, *, angles: dict[str, float]) -> float: ...\n"
        "def _inner(x: float): ...\n"
    )
    assert [name for _, name in quantities(tree)] == ["station", "spread", "depth", "wall", "angles"]


def test_a_hand_made_inch_is_noticed() -> None:
    text = "a = 1\nb = 3 * 25.4  # 25.4 in a comment is text\nc = Fraction('25.40')\n"
    assert inches_written_out(text) == [2, 3]
