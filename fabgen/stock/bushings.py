"""Hardened drill bushings for pressing in."""

from fabgen.frozen import frozen
from fabgen.stock.read_csv import UnknownStockError, rows


@frozen
class DrillBushing:
    """A press-fit drill bushing without a head (DIN 179), short series: bore F7, outside n6."""

    bore_mm: float
    outside_mm: float
    length_mm: float
    source: str


def drill_bushing(bore_mm: float) -> DrillBushing:
    """The bushing for a drill of this diameter.

    Raises:
        UnknownStockError: the drill is larger than the largest bushing of the table.
    """
    for found in rows("din179_bushings"):
        if bore_mm <= float(found["din179_bore_to_mm"]):
            outside_mm, length_mm = float(found["din179_outside_mm"]), float(found["din179_short_length_mm"])
            return DrillBushing(bore_mm, outside_mm, length_mm, found["source"])
    known = (f"up to {found['din179_bore_to_mm']} mm" for found in rows("din179_bushings"))
    raise UnknownStockError("drill bushing", f"{bore_mm:g} mm", known)
