"""The shift that u means: of a single rod, or of the array with random and common parts apart."""

import math
from collections.abc import Callable
from pathlib import Path
from types import SimpleNamespace

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.check.mount_shift import mount_shift, shifts_khz
from fabgen.correct.ledger import correct
from fabgen.design.arranged import Arranged
from fabgen.design.design import Design
from fabgen.pipeline import check

Variant = Callable[..., Design]


@pytest.fixture
def arranged(variant: Variant) -> Arranged:
    design = variant()
    return arrange(design, correct(design))


def response(slopes_khz: dict[str, float]) -> SimpleNamespace:
    """An answer of the array solver, as far as this finding reads it."""
    rows = [
        SimpleNamespace(element=element, quantity=quantity, shift_khz_per_mm=slope * factor)
        for element, slope in slopes_khz.items()
        for quantity, factor in (("length", 1.0), ("station", 9.0))
    ]
    return SimpleNamespace(sensitivities=rows)


def test_without_a_response_a_single_rod_is_told(arranged: Arranged) -> None:
    (found,) = mount_shift(arranged, None)
    lines = [line for line in arranged.ledger.lines if line.allowance.u_mm > 0]
    worst = max(lines, key=lambda line: line.allowance.u_mm / line.modelled_mm)
    assert (found.code, found.severity, found.where) == ("L19", "note", "R, D1…D10")
    assert found.measured == pytest.approx(2 * 1000 * 434 * worst.allowance.u_mm / worst.modelled_mm, rel=1e-4)
    assert f"single half-wave rod ({worst.element})" in found.advice


def test_random_parts_add_in_quadrature_and_the_common_part_as_it_is(arranged: Arranged) -> None:
    lines = [line for line in arranged.ledger.lines if line.element in ("D2", "D3")]
    random_khz, common_khz = shifts_khz(lines, response({"D2": -300.0, "D3": -100.0, "D4": -700.0}))
    parts = [(line.allowance.u_mm, line.allowance.correlated_u_mm) for line in lines]
    assert all(0 < common < u for u, common in parts)
    assert common_khz == pytest.approx(300 * parts[0][1] + 100 * parts[1][1])
    alone = [math.sqrt(u**2 - common**2) for u, common in parts]
    assert random_khz == pytest.approx(math.hypot(300 * alone[0], 100 * alone[1]))


def test_with_a_response_both_parts_are_told(arranged: Arranged) -> None:
    slopes = {line.element: -100.0 for line in arranged.ledger.lines}
    (found,) = mount_shift(arranged, response(slopes))
    lines = [line for line in arranged.ledger.lines if line.allowance.u_mm > 0]
    random_khz, common_khz = shifts_khz(lines, response(slopes))
    assert f"±{2 * common_khz:.0f} kHz in common to all rods and ±{2 * random_khz:.0f} kHz at random" in found.advice
    assert found.measured == pytest.approx(2 * math.hypot(random_khz, common_khz), abs=1e-3)


def test_nothing_uncertain_nothing_told(variant: Variant, root: Path) -> None:
    design = variant(("lengths_are: free-space", "lengths_are: as-cut"))
    assert list(mount_shift(arrange(design, correct(design)), None)) == []
    told = check(root / "designs/river-gauge-434.yaml").findings
    assert sum(finding.code == "L19" for finding in told) == 1
