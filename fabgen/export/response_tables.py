"""Response and sensitivities as CSV."""

from fabgen.design.package import PackageFile
from fabgen.design.response import Response
from fabgen.export.csv_table import csv_bytes

RESPONSE = ("f_mhz", "gain_dbi", "front_to_back_db", "r_ohm", "x_ohm", "mismatch")
SENSITIVITY = (
    "element", "quantity", "per_mm_shift_khz", "per_mm_gain_db", "per_mm_back_front", "per_mm_r_ohm", "per_mm_x_ohm",
)  # fmt: skip


def files(response: Response) -> tuple[PackageFile, ...]:
    """Both tables; without the response where rods are too thick for absolute values.

    Args:
        response: what the solver found.
    """
    sensitivity = PackageFile("tables/sensitivity.csv", sensitivity_csv(response), "what a millimetre changes")
    if not response.absolute:
        return (sensitivity,)
    return (
        PackageFile("tables/response.csv", response_csv(response), "the modelled array in free space over its band"),
        sensitivity,
    )


def response_csv(response: Response) -> bytes:
    """The modelled array in free space, one row per frequency."""
    return csv_bytes(
        RESPONSE,
        (
            (
                f"{point.frequency_mhz:.4f}", f"{point.gain_dbi:.3f}", f"{point.front_to_back_db:.3f}",
                f"{point.r_ohm:.3f}", f"{point.x_ohm:.3f}", f"{point.mismatch:.3f}",
            )
            for point in response.points
        ),
    )  # fmt: skip


def sensitivity_csv(response: Response) -> bytes:
    """What one more millimetre changes, two rows per element."""
    return csv_bytes(
        SENSITIVITY,
        (
            (
                row.element, row.quantity, f"{row.shift_khz_per_mm:.2f}", f"{row.gain_db_per_mm:.5f}",
                f"{row.back_front_per_mm:.6f}", f"{row.r_ohm_per_mm:.4f}", f"{row.x_ohm_per_mm:.4f}",
            )
            for row in response.sensitivities
        ),
    )  # fmt: skip
