"""Are the limits kept: by the model, by 95 % of the builds, by the common error?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.electrical_case import ElectricalCase, no_case
from fabgen.design.findings import Finding
from fabgen.design.limits import Limits
from fabgen.design.package import Say
from fabgen.design.response import SHARE_INSIDE, Outcome, Response

NOT_JUDGED = "E01"
LEFT_SHIFT = 0.001
"""Of the frequency; with more than that left over, a change of rods counts as not made good: our own choice."""
LEFT_GAIN_DB = 0.1
LEFT_BACK_FRONT_RATIO = 0.03
FREE_SPACE = "modelled as thin rods in free space, without boom, mast, ground and feed line"


def electrical(
    arranged: Arranged,
    case: ElectricalCase | None,
    stored: Response | None,
    *,
    solve: bool = False,
    say: Say = lambda _: None,
) -> tuple[Response | None, tuple[Finding, ...]]:
    """The response of a design and what it says about its limits.

    Args:
        arranged: with general tolerances.
        case: what the response is computed from; None where the design cannot be modelled.
        stored: the response of an earlier run to the same case; the solver would find it again.
        solve: ask the solver where none is stored.
        say: takes progress.

    Returns:
        the response, None where there is none, and the findings.
    """
    if case is None:
        return None, tuple(_not_judged(arranged, no_case(arranged.design)))
    if stored is not None:
        return stored, tuple(judged(case, stored))
    if not solve:
        why = "no stored response fits this design: `fabgen check --response` or `fabgen build` judges them"
        return None, tuple(_not_judged(arranged, why))
    from fabgen.check.response.respond import respond

    say(f"{arranged.design.name}: array response")
    try:
        response = respond(case)
    except ValueError as error:
        return None, tuple(_not_judged(arranged, f"the solver refuses this array: {error}"))
    return response, tuple(judged(case, response))


def _not_judged(arranged: Arranged, why: str) -> Iterator[Finding]:
    if arranged.design.limits.stated:
        yield finding(NOT_JUDGED, "note", "limits", why)


def judged(case: ElectricalCase, response: Response) -> Iterator[Finding]:
    """E02 the model misses a limit, E03 builds, E04 the common error; E07 rods too thick, E09 a change leaves much."""
    if not response.absolute:
        advice = "front-to-back ratio, mismatch and absolute gain are not stated or judged; only differences are"
        yield finding("E07", "warn", "rods", advice, measured=response.thickest_wl, required=0.015, unit="wl")
    yield from _left_over(case, response)
    if not case.limits.stated:
        return
    as_designed = list(_missed(case.limits, response.modelled, response.absolute))
    for name, measured, required, unit in as_designed:
        advice = f"the modelled array itself misses it by {_by(measured, required, unit)}; {FREE_SPACE}"
        yield finding("E02", "fail", name, advice, measured=measured, required=required, unit=unit)
    yield from _builds(case, response, {name for name, *_ in as_designed})
    if response.common is not None:
        yield from _common(case, response, {name for name, *_ in as_designed})


def _builds(case: ElectricalCase, response: Response, told: set[str]) -> Iterator[Finding]:
    if response.allotment is None or response.allotment.feasible:
        return
    drawn = {name for name, *_ in _missed(case.limits, response.drawn, response.absolute)}
    missed = [miss for miss in _missed(case.limits, response.spread.at_95, response.absolute) if miss[0] not in told]
    for name, measured, required, unit in missed:
        why = "rounding to `cut_step` alone misses it" if name in drawn else "at the finest tolerances a shop can hold"
        advice = (
            f"{why}, 95 % of builds keep no better than {measured:.4g} {unit}".rstrip()
            + f": missed by {_by(measured, required, unit)}; relax this limit or take a finer cut_step"
        )
        yield finding("E03", "fail", name, advice, measured=measured, required=required, unit=unit)
    if not missed and not told:
        advice = "each limit alone is kept by 95 % of builds, all of them together are not; relax the tightest"
        inside = 100 * response.spread.inside_share
        yield finding("E03", "fail", "limits", advice, measured=inside, required=100 * SHARE_INSIDE, unit="%")


def _common(case: ElectricalCase, response: Response, told: set[str]) -> Iterator[Finding]:
    assert response.common is not None
    low_mm, high_mm = response.common.u_mm
    for name, measured, required, unit in _missed(case.limits, response.common.twice, response.absolute):
        if name in told:
            continue
        advice = (
            "an allowance wrong by 2u on all rods alike, the worst that it may do "
            + f"(u {low_mm:.3g} to {high_mm:.3g} mm), takes {measured:.4g} {unit}".rstrip()
            + ", more than any care with saw and drill saves; measure the mount on a coupon, or trim"
        )
        yield finding("E04", "warn", name, advice, measured=measured, required=required, unit=unit)


def _left_over(case: ElectricalCase, response: Response) -> Iterator[Finding]:
    left = response.left_over
    if left is None:
        return
    numbers = (
        ("shift", abs(left.outcome.shift_khz), 1000 * LEFT_SHIFT * case.frequency_mhz, "kHz"),
        ("gain", left.residual_gain_db, LEFT_GAIN_DB, "dB"),
        ("back/front field", left.residual_back_front_ratio, LEFT_BACK_FRONT_RATIO, ""),
    )
    for name, measured, required, unit in numbers:
        if measured > required:
            advice = "the lengths make good for no more of it; take rods nearer to the modelled diameter"
            yield finding("E09", "warn", f"rods, {name}", advice, measured=measured, required=required, unit=unit)


def _missed(limits: Limits, outcome: Outcome, absolute: bool) -> Iterator[tuple[str, float, float, str]]:
    """The limits that an outcome misses: name, measured, required, unit."""
    shift_khz = abs(outcome.shift_khz)
    if limits.shift_khz is not None and shift_khz > limits.shift_khz:
        yield "shift", shift_khz, limits.shift_khz, "kHz"
    if limits.gain_loss_db is not None and outcome.gain_loss_db > limits.gain_loss_db:
        yield "gain_loss", outcome.gain_loss_db, limits.gain_loss_db, "dB"
    if not absolute:
        return
    if limits.front_to_back_db is not None and outcome.front_to_back_db < limits.front_to_back_db:
        yield "front_to_back", outcome.front_to_back_db, limits.front_to_back_db, "dB"
    if limits.mismatch is not None and outcome.mismatch > limits.mismatch:
        yield "mismatch", outcome.mismatch, limits.mismatch, ""


def _by(measured: float, required: float, unit: str) -> str:
    return f"{abs(measured - required):.3g} {unit}".rstrip()
