"""Metric coarse threads, their holes, screw heads, nuts and washers."""

import functools
from typing import Literal

from fabgen.frozen import frozen
from fabgen.stock.read_csv import UnknownStockError, row

HeadKind = Literal["socket", "hex", "button", "pan"]


@frozen
class Thread:
    """A metric coarse thread (ISO 261) and its tap drill."""

    name: str
    diameter_mm: float
    pitch_mm: float
    tap_drill_mm: float


@functools.cache
def thread(name: str) -> Thread:
    """A thread by its name, for example `M3`.

    Raises:
        UnknownStockError: the table has no such thread.
    """
    found = row("iso261_threads", name, "thread")
    return Thread(
        name=name,
        diameter_mm=float(found["iso261_diameter_mm"]),
        pitch_mm=float(found["iso261_coarse_pitch_mm"]),
        tap_drill_mm=float(found["tap_drill_mm"]),
    )


def tap_drill_mm(name: str) -> float:
    """Drill for a cut thread: diameter less pitch, rounded to a drill (common practice)."""
    return thread(name).tap_drill_mm


def clearance_hole_mm(name: str, fit: Literal["fine", "medium", "coarse"] = "medium") -> float:
    """Clearance hole of a bolt or screw (ISO 273)."""
    found = row("iso273_clearance", name, "thread")
    if f"iso273_{fit}_mm" not in found:
        raise UnknownStockError("clearance fit", fit, ("fine", "medium", "coarse"))
    return float(found[f"iso273_{fit}_mm"])


@frozen
class ScrewHead:
    """The head of a screw, at its largest.

    Attributes:
        thread: for example `M3`.
        kind: `socket` ISO 4762, `hex` ISO 4017, `button` ISO 7380-1, `pan` ISO 7045.
        diameter_mm: largest head diameter (socket: knurled); of a hexagon the smallest width across corners.
        height_mm: largest head height; of a hexagon the nominal one.
        across_flats_mm: of the head's hexagon or of the key; 0 for a cross recess.
        source: standard and provenance.
    """

    thread: str
    kind: HeadKind
    diameter_mm: float
    height_mm: float
    across_flats_mm: float
    source: str


_HEADS = {
    "socket": ("iso4762_socket", "iso4762_dk_knurled_max_mm", "iso4762_k_max_mm", "iso4762_s_mm"),
    "hex": ("iso4017_hexagon", "iso4017_e_min_mm", "iso4017_k_nominal_mm", "iso4017_s_mm"),
    "button": ("iso7380_1_button", "iso7380_1_dk_max_mm", "iso7380_1_k_max_mm", "iso7380_1_s_mm"),
    "pan": ("iso7045_pan", "iso7045_dk_max_mm", "iso7045_k_max_mm", ""),
}


@functools.cache
def screw_head(name: str, kind: HeadKind = "socket") -> ScrewHead:
    """The head of a screw of thread `name`.

    Raises:
        UnknownStockError: the standard has no such thread, or there is no such kind of head.
    """
    if kind not in _HEADS:
        raise UnknownStockError("screw head", kind, _HEADS)
    table, diameter, height, flats = _HEADS[kind]
    found = row(table, name, f"{kind} head screw")
    return ScrewHead(
        name, kind, float(found[diameter]), float(found[height]), float(found.get(flats, 0)), found["source"]
    )


@frozen
class Nut:
    """A hexagon nut (ISO 4032): largest height, smallest width across corners."""

    thread: str
    across_flats_mm: float
    across_corners_mm: float
    height_mm: float
    source: str


@functools.cache
def nut(name: str) -> Nut:
    """The hexagon nut of a thread.

    Raises:
        UnknownStockError: the table has no such thread.
    """
    found = row("iso4032_nuts", name, "nut")
    return Nut(
        thread=name,
        across_flats_mm=float(found["iso4032_s_mm"]),
        across_corners_mm=float(found["iso4032_e_min_mm"]),
        height_mm=float(found["iso4032_m_max_mm"]),
        source=found["source"],
    )


@frozen
class Washer:
    """A plain washer: `normal` ISO 7089 with nominal thickness, `large` ISO 7093-1 with the largest thickness."""

    thread: str
    series: Literal["normal", "large"]
    bore_mm: float
    outside_mm: float
    thickness_mm: float
    source: str


@functools.cache
def washer(name: str, series: Literal["normal", "large"] = "normal") -> Washer:
    """The plain washer of a thread.

    Raises:
        UnknownStockError: the table has no such thread or series.
    """
    normal = row("iso7089_washers", name, "washer")
    bore_mm = float(normal["iso7089_d1_mm"])
    if series == "normal":
        outside_mm, thickness_mm = float(normal["iso7089_d2_mm"]), float(normal["iso7089_h_nominal_mm"])
        return Washer(name, series, bore_mm, outside_mm, thickness_mm, normal["source"])
    if series != "large":
        raise UnknownStockError("washer series", series, ("normal", "large"))
    large = row("iso7093_1_washers", name, "large washer")
    outside_mm, thickness_mm = float(large["iso7093_1_d2_mm"]), float(large["iso7093_1_h_max_mm"])
    return Washer(name, series, bore_mm, outside_mm, thickness_mm, large["source"])
