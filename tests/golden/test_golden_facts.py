"""The facts of every demo design, as text that is read when it changes.

`pytest tests/golden --accept-goldens` writes them anew; the difference is reviewed before it is committed.
"""

import shutil
import tempfile
from pathlib import Path

import pytest

from fabgen import pipeline
from fabgen.arrange.bars import plan
from fabgen.export import tables

HERE = Path(__file__).parent
DESIGNS = sorted(path.stem for path in (HERE.parents[1] / "designs").glob("*.yaml"))


def compared(name: str, facts: str, *, accept: bool, folder: Path = HERE) -> None:
    """Hold facts against the golden of that name, or write it.

    Raises:
        AssertionError: they differ; the first differing line is shown.
    """
    path = folder / name
    if accept:
        path.write_text(facts, encoding="utf-8", newline="\n")
        return
    golden = path.read_text(encoding="utf-8") if path.exists() else ""
    found, wanted = facts.splitlines(), golden.splitlines()
    for number, (left, right) in enumerate(zip(found, wanted, strict=False), start=1):
        assert left == right, f"{name}:{number}"
    assert len(found) == len(wanted), f"{name}: {len(found)} lines, the golden has {len(wanted)}"


def judged_alone(design: str, *, solve: bool = False) -> pipeline.Judged:
    """A demo design judged in a folder of its own, without the records that a build may have left beside it."""
    with tempfile.TemporaryDirectory() as folder:
        for path in (HERE.parents[1] / "designs").glob(f"{design}.*"):
            shutil.copy(path, folder)
        return pipeline.check(Path(folder) / f"{design}.yaml", solve=solve)


def numbers(design: str) -> str:
    """Verdict, findings, ledger, holes, pieces, parts and masses of a design; limits judged where it states some."""
    judged = judged_alone(design)
    if judged.arranged.design.limits.stated:
        judged = judged_alone(design, solve=True)
    arranged = judged.arranged
    cut_plan = plan(arranged.cuts, arranged.design.shop)
    lines = [
        f"{judged.name}: {judged.verdict}; {arranged.ledger.status}",
        *(f"{f.code} {f.severity} {f.where} {f.measured} {f.required} {f.unit}" for f in judged.findings),
        f"mass {arranged.mass_g:.1f} g, balance {arranged.balance_mm:.1f} mm, clamp {arranged.clamp_mm} mm",
        f"turning radius {arranged.turning_radius_mm:.1f} mm, bars {len(cut_plan.bars)}, proven {cut_plan.proven}",
    ]
    written = [tables.lengths_csv(arranged.ledger), tables.drilling_csv(arranged)]
    written += [tables.cut_list_csv(arranged, cut_plan), tables.parts_csv(arranged)]
    return "\n".join(lines) + "\n\n" + "\n".join(table.decode("utf-8") for table in written)


def solids(design: str) -> str:
    """Volume and box of every distinct part, measured by the kernel, a tenth of a millimetre and 0.1 mm³."""
    from fabgen.model.kernel import bounds_mm, volume_mm3
    from fabgen.registry import entry

    arranged = judged_alone(design).arranged
    lines = []
    for part, parameters in sorted({placed.key for placed in arranged.placed}, key=str):
        solid = entry("model/parts", part).function()(**dict(parameters))
        low, high = bounds_mm(solid)
        box = " x ".join(f"{b - a:.1f}" for a, b in zip(low, high, strict=True))
        lines.append(f"{part}: {volume_mm3(solid):.1f} mm3, {box} mm")
    return "\n".join(lines) + "\n"


@pytest.mark.parametrize("design", DESIGNS)
def test_numbers(design: str, accept_goldens: bool) -> None:
    compared(f"{design}.numbers.txt", numbers(design), accept=accept_goldens)


@pytest.mark.slow
@pytest.mark.parametrize("design", DESIGNS)
def test_solids(design: str, accept_goldens: bool) -> None:
    compared(f"{design}.solids.txt", solids(design), accept=accept_goldens)


@pytest.mark.parametrize("design", DESIGNS)
def test_every_demo_design_is_clear(design: str) -> None:
    assert judged_alone(design).clear


def test_the_comparison_can_fail(tmp_path: Path) -> None:
    compared("x.txt", "one\ntwo\n", accept=True, folder=tmp_path)
    compared("x.txt", "one\ntwo\n", accept=False, folder=tmp_path)
    with pytest.raises(AssertionError, match=r"x\.txt:2"):
        compared("x.txt", "one\n2\n", accept=False, folder=tmp_path)
    with pytest.raises(AssertionError, match="3 lines, the golden has 2"):
        compared("x.txt", "one\ntwo\nthree\n", accept=False, folder=tmp_path)
    with pytest.raises(AssertionError):
        compared("missing.txt", "one\n", accept=False, folder=tmp_path)
