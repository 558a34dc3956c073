"""An array as it was built: measurements, deviations from the drawing, the response, and what to trim."""

from fabgen.design.response import Outcome
from fabgen.frozen import frozen


@frozen
class Measured:
    """One measured element.

    Attributes:
        length_mm: tip to tip.
        station_mm: from the datum face to the rod's axis.
        left_mm: what stands out on the left (+y) side; None where it was not measured.
        right_mm: on the right side.
    """

    element: str
    length_mm: float
    station_mm: float
    left_mm: float | None = None
    right_mm: float | None = None


@frozen
class Deviation:
    """One element against the drawing, as built less as drawn.

    Attributes:
        length_mm: measured length.
        length_off_mm: less the cut length.
        length_tolerance_mm: ± on it.
        station_mm: measured station.
        station_off_mm: less the drawn station.
        station_tolerance_mm: ± on it; 0 where no hole sets it.
        off_centre_mm: how far the rod's middle stands to the left; None where the projections were not measured.
    """

    element: str
    length_mm: float
    length_off_mm: float
    length_tolerance_mm: float
    station_mm: float
    station_off_mm: float
    station_tolerance_mm: float
    off_centre_mm: float | None

    @property
    def length_out(self) -> bool:
        """Whether the length is outside its tolerance."""
        return abs(self.length_off_mm) > self.length_tolerance_mm + 1e-6

    @property
    def station_out(self) -> bool:
        """Whether the station is outside its tolerance."""
        return self.station_tolerance_mm > 0 and abs(self.station_off_mm) > self.station_tolerance_mm + 1e-6


@frozen
class State:
    """The response of one state of the array, in free space.

    Attributes:
        outcome: shift, and the worst in the band.
        gain_dbi: at the design frequency.
        front_to_back_db: at the design frequency.
        r_ohm: at the design frequency.
        x_ohm: at the design frequency.
        mismatch: at the design frequency.
        residual_ratio: what no shift explains; 1 is a typical miss of 0.05 dB of gain together with 0.01 of field.
    """

    outcome: Outcome
    gain_dbi: float
    front_to_back_db: float
    r_ohm: float
    x_ohm: float
    mismatch: float
    residual_ratio: float


@frozen
class Trim:
    """What to take off one element.

    Attributes:
        off_mm: from the tip-to-tip length, half at each end.
        length_mm: what is left.
    """

    element: str
    off_mm: float
    length_mm: float


@frozen
class AsBuilt:
    """What the measurements say.

    Attributes:
        deviations: one per element in order of station.
        designed: the modelled array.
        built: the array as measured.
        trims: empty where shortening does not help.
        trimmed: the array after them.
        absolute: whether absolute values may be stated.
        missed: names of stated limits that the array misses as built.
        missed_trimmed: after the trims.
    """

    deviations: tuple[Deviation, ...]
    designed: State
    built: State
    trims: tuple[Trim, ...]
    trimmed: State
    absolute: bool
    missed: tuple[str, ...]
    missed_trimmed: tuple[str, ...]

    @property
    def good(self) -> bool:
        """Whether everything is within tolerance and limits as it stands."""
        return not self.missed and not any(each.length_out or each.station_out for each in self.deviations)
