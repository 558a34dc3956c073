"""The program on one screen: read → correct → arrange → check → draw → model → export → book."""

from collections.abc import Sequence
from dataclasses import replace
from pathlib import Path

from fabgen.arrange.arrange import arrange
from fabgen.check.judge import judge
from fabgen.check.limits import electrical
from fabgen.check.mount_shift import mount_shift
from fabgen.correct.ledger import correct
from fabgen.design.allotted import with_tolerances
from fabgen.design.arranged import Arranged
from fabgen.design.design import Design
from fabgen.design.electrical_case import electrical_case
from fabgen.design.findings import Finding, clear, in_order
from fabgen.design.package import Say
from fabgen.design.response import Response
from fabgen.frozen import frozen
from fabgen.read.reader import Reading, read_design
from fabgen.read.stored_response import stored_response


@frozen
class Judged:
    """One design, judged by numbers alone; `response` is None where the array solver was not asked."""

    reading: Reading
    arranged: Arranged
    findings: tuple[Finding, ...]
    response: Response | None = None

    @property
    def name(self) -> str:
        """`<number>_<revision>`."""
        return self.arranged.design.name

    @property
    def clear(self) -> bool:
        """Whether nothing fails."""
        return clear(self.findings)

    @property
    def verdict(self) -> str:
        """`clear` or `not clear`."""
        return "clear" if self.clear else "not clear"


def check(path: Path, *, solve: bool = False, say: Say = lambda _: None) -> Judged:
    """Read one design file and judge it; no CAD kernel, nothing written.

    Args:
        path: the design file.
        solve: ask the array solver about its limits where no stored response fits.
        say: takes progress.

    Raises:
        DesignErrors: the file is no valid design.
    """
    reading = read_design(path)
    general = _arranged(reading.design)
    case = electrical_case(general)
    stored = stored_response(path, case.sha256) if case else None
    response, electric = electrical(general, case, stored, solve=solve, say=say)
    arranged = with_tolerances(general, response)
    judged = [*reading.notes, *judge(arranged), *electric, *mount_shift(arranged, response)]
    return Judged(reading, arranged, in_order(judged), response)


def _arranged(design: Design) -> Arranged:
    """Lengths and arrangement; a clamp beside a rod makes its length less certain, so lengths are asked twice."""
    ledger = correct(design)
    found = arrange(design, ledger)
    if found.clamp_mm is None or design.clamp is None:
        return found
    half_mm = found.clamp_width_mm / 2
    placed = replace(design.clamp, span_mm=(found.clamp_mm - half_mm, found.clamp_mm + half_mm))
    settled = correct(replace(design, clamp=placed))
    return found if settled == ledger else arrange(design, settled)


def drawn(judged: Judged) -> Judged:
    """The same with its sheets judged too: nothing lettered outside its frame, on a hole or on other lettering."""
    from fabgen.arrange.bars import plan
    from fabgen.check.sheets import sheet_findings
    from fabgen.draw.sheet_list import PLACES, sheets_of

    arranged, cut_plan = judged.arranged, plan(judged.arranged.cuts, judged.arranged.design.shop)
    sheets = [sheet for place in PLACES for sheet in sheets_of(place, arranged, cut_plan)]
    return replace(judged, findings=in_order([*judged.findings, *sheet_findings(sheets)]))


def build(judged: Judged, *, output: Path, stamped: bool = False, only: Sequence[str] = (), say: Say = print) -> Path:
    """Write the package of a judged design, complete or not at all.

    Args:
        judged: what `check` returned.
        output: the output folder.
        stamped: mark every sheet as not cleared and write beside the real package's name.
        only: parts of the package to write; empty for all of it.
        say: takes progress, one line at a time.

    Returns:
        The package folder.

    Raises:
        MachineError: the disk or a missing library is in the way; nothing has changed then.
    """
    from fabgen.contents import package_files, versions
    from fabgen.export import package

    arranged, design = judged.arranged, judged.arranged.design
    files = package_files(arranged, judged.findings, response=judged.response, stamped=stamped, only=only, say=say)
    name = "_".join([design.name, *(["NOT-CLEARED"] if stamped else []), *(["only", *only] if only else [])])
    contents = package.manifest(
        files, number=design.number, revision=design.revision, design_sha256=design.sha256,
        verdict=judged.verdict, versions=versions(),
    )  # fmt: skip
    return package.write([*files, contents], output=output, name=name, say=say)
