"""Judgements about a readable design."""

from typing import Literal

from fabgen.frozen import frozen

Severity = Literal["fail", "warn", "note"]
_ORDER: dict[str, int] = {"fail": 0, "warn": 1, "note": 2}


@frozen
class Finding:
    """One judgement.

    Attributes:
        code: letter and two digits (D design file, L lengths, H holes, F fits, C collisions, A assembly order,
            P printing, S sheets, E electrical); its meaning never changes.
        where: element, hole, part or pair, in the words of the drawing.
        measured: what the design has; None when there is no number.
        required: the limit; None when there is no number.
        unit: of both numbers.
        advice: the cheapest way out, one or two sentences.
        title: what the code means, one line.
    """

    code: str
    severity: Severity
    where: str
    measured: float | None
    required: float | None
    unit: str
    advice: str
    title: str = ""

    def __str__(self) -> str:
        numbers = ""
        if self.measured is not None:
            digits = decimals(self.unit)
            numbers = f": {self.measured:.{digits}f}"
            if self.required is not None:
                numbers += f" against {self.required:.{digits}f}"
            numbers += f" {self.unit}" if self.unit else ""
        head = f"{self.code} {self.severity}: {self.where}: {self.title or 'finding'}{numbers}"
        return f"{head}\n    {self.advice}" if self.advice else head


def decimals(unit: str) -> int:
    """How many decimals a finding's numbers carry: three, of wavelengths five."""
    return 5 if unit == "wl" else 3


def in_order(findings: list[Finding]) -> tuple[Finding, ...]:
    """Worst first, then by code and place."""
    return tuple(sorted(findings, key=lambda f: (_ORDER[f.severity], f.code, f.where, f.advice)))


def clear(findings: tuple[Finding, ...]) -> bool:
    """Whether the verdict is `clear`: no finding fails."""
    return all(finding.severity != "fail" for finding in findings)
