"""Arranged designs of every shape of boom, made from one demo design by replacing text, and paper folded back."""

import math
import re
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.arrange.bars import plan
from fabgen.correct.ledger import correct
from fabgen.design.arranged import Arranged, CutPlan
from fabgen.design.drawing import Polyline, Sheet, Text
from fabgen.read.reader import read_design

BUSHES = "    bush: {kind: shoulder, material: ASA}\n"
KEEPERS = "    keeper: {kind: push-ring, material: ASA}\n"
BONDED = (
    ("style: insulated-through", "style: bonded-through"),
    (BUSHES, ""),
    (KEEPERS, ""),
    ("    hole: 8 mm\n", "    hole: 4 mm\n    bond: wall-screws\n"),
)
ROUND = (("section: square", "section: round"), ("  corner_radius: 1 mm\n", ""))
SOLID = (("  wall: 1.5 mm\n", ""),)
CHANGES = {
    "square": (),
    "letter": (("paper: A4", "paper: Letter"),),
    "rectangular": (
        ("section: square", "section: rectangular"),
        ("outside: 20 mm", "outside: [20 mm, 40 mm]"),
        ("corner_radius: 1 mm", "corner_radius: 1.5 mm"),
    ),
    "upright": (("polarisation: horizontal", "polarisation: vertical"), ("rear: 60 mm", "rear: 160 mm")),
    "round": ROUND,
    "bonded": BONDED,
    "solid": (*SOLID, *BONDED),
    "round-solid": (
        *ROUND,
        *SOLID,
        ("style: insulated-through", "style: through-nonmetal"),
        ("material: EN AW-6060 T66\n  overhang", "material: oak\n  overhang"),
        (BUSHES, ""),
        ("    hole: 8 mm\n", ""),
        ("    allowance: {origin: computed}\n", ""),
    ),
    "small": (("outside: 20 mm", "outside: 10 mm"), ("hole: 8 mm", "hole: 6 mm"), ("diameter: 4 mm", "diameter: 2 mm")),
    "long-title": (("title: River gauge link", f"title: {'<b>' + 'Längste ' * 60}"),),
    "deep-and-tall": (
        ("number: RGL-434-06", "number: JQ_g.7_"),
        ("revision: A", "revision: Q"),
        ("title: River gauge link", "title: Größe Ägyptens"),
    ),
    "sleeve": (("kind: shoulder", "kind: sleeve"),),
    "blank": (("sheet: {owner: Weir and sluice workshop, creator: K. M., date: 2026-11-20}\n", ""),),
}
ALL = (*CHANGES, "dense")
QUICK = ("square", "rectangular", "round", "solid", "small")


def dense(text: str) -> str:
    """Eighty elements at 1296 MHz with the longest ids; the first stand closer than their lettering is long."""
    rows = [
        "elements:",
        "  - {id: REFLECTOR-LONG-1, role: reflector, at: 0, length: 112}",
        "  - {id: DRIVEN-RYGJQ-01, role: driven, at: 42, length: 108, mount: feed}",
    ]
    at_mm = 70.0
    for k in range(1, 79):
        rows.append(f"  - {{id: DIRECTOR-LONG-{k:02d}, role: director, at: {at_mm:.2f}, length: {100 - 0.1 * k:.1f}}}")
        at_mm += 22.3 if k < 40 else 62.71
    text = text[: text.index("elements:")] + "\n".join(rows) + "\n" + text[text.index("lengths_are") :]
    text = re.sub(r"(?m)^limits:.*\n", "", text)  # of another band
    changes = (
        ("434 MHz", "1296 MHz"),
        ("outside: 20 mm", "outside: 15 mm"),
        ("hole: 8 mm", "hole: 6 mm"),
        ("diameter: 4 mm", "diameter: 3 mm"),
        ("origin: computed", "origin: published"),
    )
    return changed(text, changes)


def changed(text: str, changes: tuple[tuple[str, str], ...]) -> str:
    for old, new in changes:
        assert old in text, old
        text = text.replace(old, new)
    return text


@pytest.fixture(scope="session")
def arranged_as(root: Path, tmp_path_factory: pytest.TempPathFactory) -> Callable[[str], tuple[Arranged, CutPlan]]:
    """Reads, corrects and arranges a variant by its name, once."""
    base = (root / "designs/river-gauge-434.yaml").read_text(encoding="utf-8")
    known: dict[str, tuple[Arranged, CutPlan]] = {}

    def of(name: str) -> tuple[Arranged, CutPlan]:
        if name not in known:
            text = dense(base) if name == "dense" else changed(base, CHANGES[name])
            path = tmp_path_factory.mktemp("designs") / f"{name}.yaml"
            path.write_text(text, encoding="utf-8")
            design = read_design(path).design
            arranged = arrange(design, correct(design))
            known[name] = (arranged, plan(arranged.cuts, design.shop))
        return known[name]

    return of


@dataclass(frozen=True)
class Folded:
    """A point of the printed paper on the boom, at the paper's mid-thickness, and the outward normal there."""

    point: tuple[float, float, float]
    normal: tuple[float, float]


class Paper:
    """Paper wrapped round a boom by hand: written for the tests, from the contract's words and not from the program.

    Seen from outside with the datum end on the left, x runs forward and up on the paper is normal × x. A tube's paper
    starts at the right wall's lower edge and goes up it, over the top, down the left and back along the bottom.
    """

    def __init__(self, sheet: Sheet, arranged: Arranged) -> None:
        self.boom, self.half = arranged.design.boom, arranged.design.shop.paper_thickness_mm / 2
        assert sheet.station_at_x0_mm is not None
        self.station = sheet.station_at_x0_mm
        edges = [item for item in sheet.on("outline") if isinstance(item, Polyline) and item.closed]
        self.strips = [(min(y for _, y in edge.points_mm), max(y for _, y in edge.points_mm)) for edge in edges]
        self.names = {t.y_mm: t.text for t in sheet.on("text") if isinstance(t, Text) and t.text in NORMALS}
        self.low = min(low for low, _ in self.strips)

    def fold(self, x: float, y: float) -> Folded:
        """Where a point of the sheet comes to lie."""
        if self.boom.section == "round":
            radius = self.boom.width_mm / 2 + self.half
            turn = (y - self.low) / radius - math.pi
            normal = (math.sin(turn), math.cos(turn))
            return Folded((x + self.station, radius * normal[0], radius * normal[1]), normal)
        return self._tube(x, y) if self.boom.hollow else self._strip(x, y)

    def _tube(self, x: float, y: float) -> Folded:
        corner, w, h = self.boom.corner_radius_mm, self.boom.width_mm / 2, self.boom.height_mm / 2
        path, bend = y - self.low, math.pi / 2 * (corner + self.half)
        ends = ((-w, -h + corner), (-w + corner, h), (w, h - corner), (w - corner, -h))
        flats = (2 * h - 2 * corner, 2 * w - 2 * corner) * 2
        turn = -math.pi / 2
        for (py, pz), flat in zip(ends, flats, strict=True):
            normal = (round(math.sin(turn), 12), round(math.cos(turn), 12))
            if path <= flat + 1e-9:
                along = (normal[1], -normal[0])
                return Folded(
                    (
                        x + self.station,
                        py + along[0] * path + self.half * normal[0],
                        pz + along[1] * path + self.half * normal[1],
                    ),
                    normal,
                )
            path -= flat + bend
            assert path > -1e-9, "a point on a corner strip"
            turn += math.pi / 2
        raise AssertionError("beyond the paper")

    def _strip(self, x: float, y: float) -> Folded:
        low, high = next(strip for strip in self.strips if strip[0] <= y <= strip[1])
        (name,) = {name for at, name in self.names.items() if low < at < high}
        ny, nz = NORMALS[name]
        out = abs(ny) * self.boom.width_mm / 2 + abs(nz) * self.boom.height_mm / 2 + self.half
        up = y - (low + high) / 2
        return Folded((x + self.station, ny * out + nz * up, nz * out - ny * up), (ny, nz))


NORMALS = {"TOP": (0.0, 1.0), "LEFT": (1.0, 0.0), "RIGHT": (-1.0, 0.0), "BOTTOM": (0.0, -1.0)}


@pytest.fixture(scope="session")
def paper() -> type[Paper]:
    """Folds the sheet of a boom piece round its boom."""
    return Paper


@pytest.fixture(scope="session")
def normals() -> dict[str, tuple[float, float]]:
    """Outward normal (y, z) of each wall by its name on the paper."""
    return NORMALS


@pytest.fixture(params=[name if name in QUICK else pytest.param(name, marks=pytest.mark.slow) for name in ALL])
def shape(request: pytest.FixtureRequest, arranged_as) -> tuple[Arranged, CutPlan]:
    """Every shape of boom, one after the other; the first of each kind in the quick suite."""
    return arranged_as(request.param)
