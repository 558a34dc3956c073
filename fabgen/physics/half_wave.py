"""What a millimetre does to a half-wave rod."""


def shift_khz(*, frequency_mhz: float, length_mm: float, change_mm: float) -> float:
    """Shift of a half-wave rod's resonance when its length changes: −f ΔL/L, first order in ΔL/L.

    Args:
        frequency_mhz: its frequency in MHz.
        length_mm: the rod's own length in mm, tip to tip, above zero.
        change_mm: change of that length in mm; longer is positive.

    Returns:
        Shift in kHz; negative when the rod grew.

    Raises:
        ValueError: the length is not above zero.

    Source: resonance is inversely proportional to length at constant thickness ratio (elementary).
    """
    if length_mm <= 0:
        raise ValueError("the rod's length must be above zero")
    return -1000 * frequency_mhz * change_mm / length_mm
