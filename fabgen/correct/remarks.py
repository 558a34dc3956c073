"""What the physics has to say about an allowance, as remarks of the ledger."""

from fabgen.design.ledger import Remark
from fabgen.physics.boom_closed_form import BoomAllowance
from fabgen.physics.boom_mount import Section
from fabgen.physics.boom_range import Advice, touching_allowance_ratios

_COMMANDS = {
    Advice.SOLVE: "`fabgen solve`",
    Advice.SOLVE_THIS_LENGTH: "`fabgen solve`",
    Advice.MEASURE: "`fabgen coupon` writes what that takes",
}
"""The command that does what an advice asks for."""


def advice_remarks(result: BoomAllowance) -> tuple[Remark, ...]:
    """L05: what the builder should do or know; of a clamp near a rod a rule of its own speaks, L18.

    Args:
        result: an allowance, or why there is none.
    """
    return tuple(
        Remark("L05", f"{advice.value}: {_COMMANDS[advice]}" if advice in _COMMANDS else advice.value)
        for advice in result.advice
        if advice is not Advice.MOVE_SPLICE
    )


def missing_remarks(result: BoomAllowance) -> tuple[Remark, ...]:
    """L04: why there is no number.

    Args:
        result: an allowance without one.
    """
    return tuple(
        Remark("L04", miss.reason.value, miss.measured, miss.required, miss.unit)
        if miss.required
        else Remark("L04", miss.reason.value)
        for miss in result.misses
    )


def touching_remarks(section: Section) -> tuple[Remark, ...]:
    """L05: what is in print and what is computed for a rod that touches the boom's top, and that neither is to be used.

    Args:
        section: the boom's.
    """
    ratios = touching_allowance_ratios(section)
    if ratios is None:
        return ()
    size = "diameter" if section is Section.ROUND else "side"
    return (
        Remark(
            "L05",
            f"a rod that touches the boom's top takes 0.06 of its {size} in print, {ratios[0]:g} to {ratios[1]:g} by "
            f"computation for a long boom: raise the rod, or measure; {_COMMANDS[Advice.MEASURE]}",
        ),
    )
