"""The account from each modelled length to its cut length."""

import math

from fabgen.design.design import Origin, Role
from fabgen.frozen import frozen


@frozen
class PublishedValue:
    """What one published model says for this case.

    Attributes:
        model: its name, as a user would write it or as it is known.
        value_mm: the length it adds.
        valid: whether the case lies inside the range the model itself states.
        is_bound: the end of a printed range: it widens the spread and cannot be chosen.
        range_text: that range in words.
        source: citation.
    """

    model: str
    value_mm: float
    valid: bool
    is_bound: bool
    range_text: str
    source: str


@frozen
class Remark:
    """Something to be said about a length: why there is no number, or what to keep in mind.

    Attributes:
        code: the finding's code it will be reported under.
        text: one sentence.
        measured: the case's figure; None where it is no number.
        required: the limit it is held against.
        unit: of both.
    """

    code: str
    text: str
    measured: float | None = None
    required: float | None = None
    unit: str = ""


@frozen
class Allowance:
    """A length added because of the mount, with its reason.

    Attributes:
        value_mm: added to the tip-to-tip length.
        origin: what kind of knowledge it is.
        u_mm: standard uncertainty (k = 1), all parts together.
        correlated_u_mm: the part of it that is common to all rods at once.
        source: one line: which formula, record or statement.
        published: the published models for the same case, for comparison.
        needed: False where no metal boom takes anything from the rod.
        missing: the chosen origin gives no number here; `value_mm` is 0 and a rule fails the design.
        remarks: what has to be said about it.
    """

    value_mm: float
    origin: Origin
    u_mm: float = 0.0
    correlated_u_mm: float = 0.0
    source: str = ""
    published: tuple[PublishedValue, ...] = ()
    needed: bool = True
    missing: bool = False
    remarks: tuple[Remark, ...] = ()

    @property
    def spread_mm(self) -> float:
        """Largest less smallest published value for this case; 0 with fewer than two."""
        values = [published.value_mm for published in self.published]
        return max(values) - min(values) if len(values) > 1 else 0.0


@frozen
class LedgerLine:
    """One element, from modelled to cut; the columns add up as printed (three decimals).

    Attributes:
        rounding_mm: what rounding to the shop's step added.
        tolerance_mm: ± on the cut length.
        trim_mm: extra to leave for someone who will measure and shorten; not contained in `cut_mm`.
        shift_khz: what one u does to a half-wave rod of this length; positive.
        rod_change_remarks: what has to be said about a rod of another diameter than the modelled one.
    """

    element: str
    role: Role
    station_mm: float
    rod_mm: float
    modelled_mm: float
    allowance: Allowance
    rod_change_mm: float
    rod_change_u_mm: float
    rounding_mm: float
    cut_mm: float
    tolerance_mm: float
    trim_mm: float
    shift_khz: float
    rod_change_remarks: tuple[Remark, ...] = ()

    @property
    def u_mm(self) -> float:
        """Standard uncertainty of the cut length against the ideal one (JCGM 100: in quadrature).

        The tolerance counts as a rectangular distribution, the rounding is known and does not count.
        """
        return math.hypot(self.allowance.u_mm, self.rod_change_u_mm, self.tolerance_mm / math.sqrt(3))


@frozen
class Ledger:
    """All lines, in order of station."""

    lines: tuple[LedgerLine, ...]

    def line(self, element: str) -> LedgerLine:
        """The line of one element.

        Raises:
            KeyError: no such element.
        """
        for line in self.lines:
            if line.element == element:
                return line
        raise KeyError(element)

    @property
    def status(self) -> str:
        """The weakest origin in the table, as printed on every sheet."""
        order = ("none", "stated", "published", "computed", "measured")
        found = {line.allowance.origin for line in self.lines if line.allowance.needed}
        weakest = next((origin for origin in order if origin in found), "none needed")
        return f"allowances: {weakest}"
