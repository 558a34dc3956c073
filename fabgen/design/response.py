"""What the array solver found about a design, as plain numbers: no library is needed to read it.

The model: thin straight rods in free space; no boom, mount, mast, ground or feed line. Random errors count as
rectangular distributions between their tolerances. Losses and shifts are counted against the modelled array.
"""

import hashlib
import json
from typing import Any, Literal

from fabgen.frozen import frozen

Quantity = Literal["length", "station"]

STORED_NAME = "response.json"
"""Of the file in a design's records folder."""

SHARE_INSIDE = 0.95
"""Of all builds: what a tolerance is allotted for, and what `at 95 %` means."""


@frozen
class BandPoint:
    """The modelled array at one frequency.

    Attributes:
        frequency_mhz: frequency.
        gain_dbi: forward gain, rod loss counted, mismatch not.
        front_to_back_db: forward over backward gain.
        r_ohm: resistance at the feed.
        x_ohm: reactance at the feed.
        mismatch: standing wave ratio to the feed's reference.
    """

    frequency_mhz: float
    gain_dbi: float
    front_to_back_db: float
    r_ohm: float
    x_ohm: float
    mismatch: float


@frozen
class FanPoint:
    """Between which values 95 % of builds lie at one frequency, within the tolerances in force."""

    frequency_mhz: float
    gain_dbi: tuple[float, float]
    front_to_back_db: tuple[float, float]
    mismatch: tuple[float, float]


@frozen
class Outcome:
    """What limits are held against; the worst in the band.

    Attributes:
        shift_khz: detuning at the design frequency; negative is low. Without a sign where it stands for many builds.
        gain_loss_db: most gain lost against the modelled array at one frequency.
        front_to_back_db: smallest.
        mismatch: largest.
    """

    shift_khz: float
    gain_loss_db: float
    front_to_back_db: float
    mismatch: float


@frozen
class Sensitivity:
    """What one more millimetre of one quantity of one element changes.

    Attributes:
        shift_khz_per_mm: of the whole response.
        gain_db_per_mm: of the gain at the design frequency.
        back_front_per_mm: size of the change of the complex back/front field ratio at the design frequency.
        r_ohm_per_mm: of the feed resistance at the design frequency.
        x_ohm_per_mm: of the feed reactance.
        signal_db_per_mm: of the power that a receiver of the reference impedance gets from ahead.
        loss_db_per_mm: size of the change of gain at the worst frequency of the band.
    """

    element: str
    quantity: Quantity
    shift_khz_per_mm: float
    gain_db_per_mm: float
    back_front_per_mm: float
    r_ohm_per_mm: float
    x_ohm_per_mm: float
    signal_db_per_mm: float
    loss_db_per_mm: float


@frozen
class Tolerances:
    """± on the length and on the station of one element."""

    element: str
    length_mm: float
    station_mm: float


@frozen
class Spread:
    """What random errors within tolerances do to builds.

    Attributes:
        samples: builds tried, each one solved.
        at_95: the value that 95 % of builds keep, each quantity by itself.
        inside_share: share of builds inside every stated limit; 1 where none is stated.
    """

    samples: int
    at_95: Outcome
    inside_share: float


@frozen
class Allotment:
    """Tolerances that follow from limits.

    Attributes:
        rows: one per element, in order of station.
        feasible: at least 95 % of builds within them are inside all limits.
    """

    rows: tuple[Tolerances, ...]
    feasible: bool


@frozen
class CommonError:
    """The mount's allowance wrong on all rods at once, by its own uncertainty.

    Attributes:
        u_mm: smallest and largest u of an allowance in the ledger.
        certain: all rods off by twice the part of u that is common to them for certain.
        once: all rods off by one u, the worse of both directions: what one formula for one mount may do at worst.
        twice: all rods off by two u (95 %).
    """

    u_mm: tuple[float, float]
    certain: Outcome
    once: Outcome
    twice: Outcome


@frozen
class LeftOver:
    """What rods of another diameter leave after their lengths were changed, before rounding.

    Attributes:
        uncorrected_khz: the shift that the new rods alone would have made.
        uncorrected_cut: whether that lies at the end of the range searched: the shift is larger than said.
        outcome: of the changed array.
        shift_cut: the same of the outcome's shift.
        residual_gain_db: root mean square of gain that no shift explains.
        residual_back_front_ratio: the same of the back/front field ratio.
        outside: elements whose length or diameter lies outside the range of the method.
    """

    uncorrected_khz: float
    uncorrected_cut: bool
    outcome: Outcome
    shift_cut: bool
    residual_gain_db: float
    residual_back_front_ratio: float
    outside: tuple[str, ...]


@frozen
class Pattern:
    """Gain round one plane at the design frequency.

    Attributes:
        angle_deg: from forward.
        gain_dbi: at these angles.
        half_power_deg: width of the forward lobe; None where it does not end.
    """

    angle_deg: tuple[float, ...]
    gain_dbi: tuple[float, ...]
    half_power_deg: float | None


@frozen
class Response:
    """Everything the solver found about one design.

    Attributes:
        case_sha256: of what it was computed from.
        thickest_wl: the thickest straight rod in wavelengths.
        absolute: whether absolute values may be stated; else only differences.
        points: the band, widened by 1.5 % each way; empty where nothing absolute may be stated.
        fan: likewise at fewer frequencies.
        sensitivities: length then station of each element.
        modelled: the modelled array itself.
        drawn: the array as drawn: rods changed and lengths rounded, without any error.
        allotment: None without limits: the shop's general tolerances are in force then.
        spread: builds within the tolerances in force.
        common: None where no rod has an allowance with an uncertainty.
        left_over: None where the rods are the modelled ones.
        h_plane: across the rods.
        e_plane: along the rods.
    """

    case_sha256: str
    thickest_wl: float
    absolute: bool
    points: tuple[BandPoint, ...]
    fan: tuple[FanPoint, ...]
    sensitivities: tuple[Sensitivity, ...]
    modelled: Outcome
    drawn: Outcome
    allotment: Allotment | None
    spread: Spread
    common: CommonError | None
    left_over: LeftOver | None
    h_plane: Pattern
    e_plane: Pattern


def digest(content: dict[str, Any]) -> str:
    """What a stored response carries so that a changed file never answers.

    Args:
        content: the response as plain values, without the digest.
    """
    return hashlib.sha256(json.dumps(content, sort_keys=True).encode("utf-8")).hexdigest()
