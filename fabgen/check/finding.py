"""Short forms in which the rules write their findings."""

from fabgen import registry
from fabgen.design.findings import Finding, Severity, decimals
from fabgen.design.ledger import Remark

_ROUNDING_MM = 1e-9


def finding(
    code: str,
    severity: Severity,
    where: str,
    advice: str,
    *,
    measured: float | None = None,
    required: float | None = None,
    unit: str = "",
) -> Finding:
    """One finding, titled by its code's page; numbers rounded to a thousandth, wavelengths to a hundredth of that.

    Args:
        code: a code with a page in `fabgen/codes`.
        severity: fail, warn or note.
        where: element, hole, part or pair.
        advice: the cheapest way out.
        measured: what the design has.
        required: the limit.
        unit: of both.
    """
    numbers = [None if value is None else round(value, decimals(unit)) + 0.0 for value in (measured, required)]
    return Finding(code, severity, where, numbers[0], numbers[1], unit, advice, registry.code_title(code))


def remarked(remark: Remark, severity: Severity, where: str, way_out: str = "") -> Finding:
    """What an earlier stage remarked, as a finding.

    Args:
        remark: code, words and numbers.
        severity: fail, warn or note.
        where: element or part.
        way_out: what to do, where the words do not say it.
    """
    advice = f"{remark.text}; {way_out}" if way_out else remark.text
    return finding(
        remark.code,
        severity,
        where,
        advice,
        measured=remark.measured,
        required=remark.required,
        unit=remark.unit,
    )


def too_small(value_mm: float, *, fail_mm: float, warn_mm: float) -> tuple[Severity, float] | None:
    """How bad it is that a distance is small, with the limit that it misses; None when it is large enough.

    Args:
        value_mm: the distance.
        fail_mm: below it the design fails.
        warn_mm: below it the design is warned about.
    """
    if value_mm < fail_mm - _ROUNDING_MM:
        return "fail", fail_mm
    if value_mm < warn_mm - _ROUNDING_MM:
        return "warn", warn_mm
    return None
