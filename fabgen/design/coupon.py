"""What a coupon consists of, in numbers: test array on timber, piece of the real boom, what the feed should read."""

from fabgen.design.arranged import Parameters
from fabgen.design.readings import Setup
from fabgen.frozen import frozen


@frozen
class Expected:
    """What the feed should read at one step.

    Attributes:
        setup: director free or mounted.
        step: counted from 1, the longest rod.
        length_mm: of the director.
        frequency_mhz: at which frequency.
        reflection: into 50 ohm.
    """

    setup: Setup
    step: int
    length_mm: float
    frequency_mhz: float
    reflection: complex

    @property
    def swr(self) -> float:
        """Standing wave ratio."""
        return (1 + abs(self.reflection)) / (1 - abs(self.reflection))


@frozen
class CouponPlan:
    """A coupon.

    Attributes:
        mount: the user's name for the mount.
        mount_key: stands for the mount as drawn; the sheet of readings carries it.
        style: how the rod meets the boom.
        number: of the design.
        revision: of the design.
        title: of the design.
        frequency_mhz: design frequency.
        wavelength_mm: free-space wavelength.
        rod_diameter_mm: reflector and director.
        driven_diameter_mm: driven rod.
        material: of the rods.
        at_mm: reflector, driven rod and director along the array.
        reflector_mm: length.
        driven_mm: length, tip to tip.
        free_mm: director lengths, longest first, director free.
        mounted_mm: the same in the mount.
        allowance_mm: what theory expects the mount to take.
        piece_mm: length of the piece of boom, its rod in the middle.
        height_mm: rods over the timber's top.
        timber_mm: side of the timber.
        holder: keyword arguments of the coupon holder.
        expected: what the feed should read, both set-ups, by step and frequency.
    """

    mount: str
    mount_key: str
    style: str
    number: str
    revision: str
    title: str
    frequency_mhz: float
    wavelength_mm: float
    rod_diameter_mm: float
    driven_diameter_mm: float
    material: str
    at_mm: tuple[float, float, float]
    reflector_mm: float
    driven_mm: float
    free_mm: tuple[float, ...]
    mounted_mm: tuple[float, ...]
    allowance_mm: float
    piece_mm: float
    height_mm: float
    timber_mm: float
    holder: Parameters
    expected: tuple[Expected, ...]

    @property
    def frequencies_mhz(self) -> tuple[float, ...]:
        """At which to read, rising."""
        return tuple(sorted({step.frequency_mhz for step in self.expected}))

    @property
    def front_mm(self) -> float:
        """Timber beyond the director: the piece of boom lies on it."""
        return self.piece_mm / 2 + 40.0

    @property
    def timber_length_mm(self) -> float:
        """Length of the timber."""
        return REAR_MM + self.at_mm[2] - self.at_mm[0] + self.front_mm


REAR_MM = 60.0
"""Timber behind the reflector."""
