"""Readings of a coupon: two trim series of one director, free and in its mount."""

from typing import Literal

from fabgen.frozen import frozen

Setup = Literal["free", "mounted"]
Kind = Literal["reflection", "swr"]

REFLECTION_NOISE, SWR_NOISE = 0.005, 0.02
"""Standard deviation of one reading, where nobody states another: of each part of the reflection, of SWR; common
practice with hand-held instruments."""

COLUMNS = ("setup", "step", "length_mm", "frequency_mhz", "re", "im", "magnitude", "phase_deg", "swr")
"""Of the sheet of readings; a row holds `re` and `im`, or `magnitude` and `phase_deg`, or `swr`."""


@frozen
class Reading:
    """One reading.

    Attributes:
        setup: the director free in the holder, or in its mount on the piece of boom.
        length_mm: its length, tip to tip.
        frequency_mhz: at which it was read.
        kind: what was read.
        reflection: the complex reflection at the feed; of an SWR its magnitude, known without phase.
    """

    setup: Setup
    length_mm: float
    frequency_mhz: float
    kind: Kind
    reflection: complex


@frozen
class ReadingSheet:
    """A sheet as it came back from the bench.

    Attributes:
        readings: in the order of the sheet.
        mount_key: which mount the sheet was written for; empty where it does not say.
        piece_mm: length of the piece of boom; None where the sheet does not say.
        reflection_noise_ratio: standard deviation of each part of a reflection.
        swr_noise_ratio: standard deviation of an SWR.
        sha256: of the file.
    """

    readings: tuple[Reading, ...]
    mount_key: str
    piece_mm: float | None
    reflection_noise_ratio: float
    swr_noise_ratio: float
    sha256: str
