"""Conductivity of rod materials, and the classes of tolerance that a shop can hold."""

from fabgen.frozen import frozen
from fabgen.stock.read_csv import index, rows


@frozen
class ToleranceClass:
    """A tolerance that a shop can hold by a known way of working.

    Attributes:
        name: its name.
        tolerance_mm: ± on a length or a station.
        holes: whether a hole may be placed so, and not only a rod be sawn.
        how: what it takes.
        source: where it comes from.
    """

    name: str
    tolerance_mm: float
    holes: bool
    how: str
    source: str


def conductivity_s_per_m(material: str) -> float | None:
    """Conductivity in S/m, None for a material that the table does not hold.

    Args:
        material: name as on the drawing.
    """
    found = index("conductivity").get(material)
    return float(found["conductivity_s_per_m"]) if found else None


def tolerance_classes() -> tuple[ToleranceClass, ...]:
    """All classes, the finest first."""
    return tuple(
        ToleranceClass(row["class"], float(row["tolerance_mm"]), row["holes"] == "yes", row["how"], row["source"])
        for row in rows("tolerance_classes")
    )
