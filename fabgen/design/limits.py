"""What a build may lose against the design: the limits that a design file states."""

from fabgen.frozen import frozen


@frozen
class Limits:
    """Limits on every build of an array; None where the file states none.

    Attributes:
        band_mhz: lower and upper end of the band they hold in; None for the design frequency alone.
        shift_khz: largest detuning, up or down.
        gain_loss_db: most forward gain lost against the design at any frequency of the band.
        front_to_back_db: smallest front-to-back ratio in the band.
        mismatch: largest standing wave ratio in the band, to the feed's reference.
    """

    band_mhz: tuple[float, float] | None = None
    shift_khz: float | None = None
    gain_loss_db: float | None = None
    front_to_back_db: float | None = None
    mismatch: float | None = None

    @property
    def stated(self) -> bool:
        """Whether anything is limited; a band alone limits nothing."""
        return any(
            limit is not None for limit in (self.shift_khz, self.gain_loss_db, self.front_to_back_db, self.mismatch)
        )


NO_LIMITS = Limits()
