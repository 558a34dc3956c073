"""Wire-cage booms in a general moment-method library: run as a script it writes the `data/boom_cage_*.csv` tables.

Needs the extra `reference`. A cage has wires along the boom and rings; wire circumferences add up to the boom's
surface, so that the cage has the conformal radius of the boom. Rods are bonded to it at joints of a ring, cells are
wider than a rod, the rod's segments at the foot are at most half a boom wide.
"""

import csv
import itertools
import math
from collections.abc import Sequence
from importlib.metadata import version
from pathlib import Path

import numpy as np

from fabgen.physics.boom_closed_form import closed_form_allowance
from fabgen.physics.boom_mount import BoomMount, Section, Style

MHZ = 299.792458
DATA = Path(__file__).parent / "data"
HALF_ROD_SEGMENTS = 17
SINGLE_CASES = (
    (0.0115, 0.0015, 0.45),
    (0.02, 0.003, 0.45),
    (0.03, 0.004, 0.45),
    (0.03, 0.006, 0.42),
    (0.03, 0.006, 0.48),
    (0.04, 0.003, 0.45),
    (0.055, 0.006, 0.45),
)
STATIONS = (0.0, 0.2, 0.4, 0.6, 0.8)
FED = 1
ARRAYS = {
    "B .03 d .006 a": (0.03, 0.006, (0.484, 0.45, 0.434, 0.430, 0.434)),
    "B .03 d .006 b": (0.03, 0.006, (0.490, 0.45, 0.425, 0.420, 0.420)),
    "B .012 d .002 a": (0.012, 0.002, (0.490, 0.45, 0.445, 0.441, 0.445)),
    "B .012 d .002 b": (0.012, 0.002, (0.495, 0.45, 0.435, 0.430, 0.430)),
}
"""Boom, rod and free lengths from the reflector on, in wavelengths; the second rod is fed, above the boom."""


class Wires:
    """A wire model at a wavelength of 1 m."""

    def __init__(self) -> None:
        import PyNEC

        self.context = PyNEC.nec_context()
        self.geometry = self.context.get_geometry()
        self.count = self.segments = 0

    def add(self, start: Sequence[float], end: Sequence[float], segments: int, radius: float) -> int:
        """One straight wire; returns its number."""
        self.count += 1
        self.segments += segments
        numbers = [float(v) for v in (*start, *end, radius)]
        self.geometry.wire(self.count, segments, *numbers, 1.0, 1.0)
        return self.count

    def add_cage(self, boom: float, wires: int, start: float, end: float, joints: Sequence[float]) -> None:
        """A cage along x with a ring at every joint."""
        cell = math.pi * boom / wires
        rings = ring_stations(start, end, joints, cell)
        angles = [2 * math.pi * k / wires for k in range(wires)]
        nodes = [[(x, boom / 2 * math.cos(a), boom / 2 * math.sin(a)) for a in angles] for x in rings]
        radius = cell / (2 * math.pi)
        for ring in nodes:
            for k in range(wires):
                self.add(ring[k], ring[(k + 1) % wires], 1, radius)
        for ring, following in itertools.pairwise(nodes):
            for k in range(wires):
                self.add(ring[k], following[k], 1, radius)

    def add_bonded_rod(self, x: float, boom: float, length: float, diameter: float, segments: int) -> None:
        """A rod in two halves from the cage outwards, two short segments at each foot."""
        foot = boom / 2 + 0.9 * boom
        for side in (1, -1):
            self.add((x, side * boom / 2, 0), (x, side * foot, 0), 2, diameter / 2)
            self.add((x, side * foot, 0), (x, side * length / 2, 0), segments, diameter / 2)

    def _complete(self) -> None:
        self.context.geometry_complete(0)
        self.context.gn_card(-1, 0, 0, 0, 0, 0, 0, 0)
        self.context.fr_card(0, 1, MHZ, 0)

    def eigenvalue(self) -> float:
        """X/R of the half-wave mode from the phase of the field scattered forward and back, added."""
        self._complete()
        self.context.ex_card(1, 1, 1, 0, 0, 0.0, 0.0, 90.0, 0, 0, 0)
        self.context.rp_card(0, 2, 1, 0, 5, 0, 0, 0.0, 0.0, 180.0, 0, 0, 0)
        field = complex(np.asarray(self.context.get_radiation_pattern(0).get_e_phi()).sum())
        return -math.tan(math.atan2(field.imag, field.real) + math.pi / 2)

    def gain(self, fed: int, segment: int) -> tuple[float, float]:
        """Forward gain in dBi and front/back in dB."""
        self._complete()
        self.context.ex_card(0, fed, segment, 0, 0, 1.0, 0, 0, 0, 0, 0)
        self.context.rp_card(0, 1, 2, 0, 5, 0, 0, 90.0, 0.0, 0, 180.0, 0, 0)
        front, back = np.asarray(self.context.get_radiation_pattern(0).get_gain()).ravel()
        return float(front), float(front - back)


def ring_stations(start: float, end: float, joints: Sequence[float], cell: float) -> list[float]:
    """Stations of rings: square cells at the joints, growing away from them to .035 wavelengths."""
    marks = [start, *joints, end]
    stations = [start]
    for i, (low, high) in enumerate(itertools.pairwise(marks)):
        x = np.linspace(0.0, high - low, 2001)
        from_low = cell + 0.35 * x if i > 0 else np.full(x.shape, np.inf)
        from_high = cell + 0.35 * (high - low - x) if i < len(marks) - 2 else np.full(x.shape, np.inf)
        density = 1 / np.minimum(np.minimum(from_low, from_high), 0.035)
        counted = np.concatenate([[0.0], np.cumsum(0.5 * (density[1:] + density[:-1]) * np.diff(x))])
        steps = max(1, round(counted[-1]))
        stations += list(low + np.interp(np.linspace(0, counted[-1], steps + 1)[1:], counted, x))
    return stations


def free_length(eigenvalue: float, diameter: float, near: float) -> float:
    """Length of the free rod with that eigenvalue, by three rods."""
    lengths = [near - 0.015, near, near + 0.015]
    values = []
    for length in lengths:
        wires = Wires()
        wires.add((0, -length / 2, 0), (0, length / 2, 0), 2 * HALF_ROD_SEGMENTS + 5, diameter / 2)
        values.append(wires.eigenvalue())
    return float(np.polyval(np.polyfit(values, lengths, 2), eigenvalue))


def closed_form_wl(boom: float, diameter: float, length: float) -> float:
    """Allowance of a bonded rod in wavelengths."""
    mount = BoomMount(Style.BONDED_THROUGH, Section.ROUND, 1000 * boom, 1000 * diameter)
    allowance = closed_form_allowance(mount, 1000 * length, MHZ).allowance_wl
    assert allowance is not None
    return allowance


def single_rod(boom: float, diameter: float, length: float, wires_round: int) -> tuple[float, int]:
    """Allowance over boom of one rod on a cage, and the number of segments."""
    mounted = length + closed_form_wl(boom, diameter, length)
    for _ in range(3):
        wires = Wires()
        wires.add_cage(boom, wires_round, -0.3, 0.3, [0.0])
        wires.add_bonded_rod(0.0, boom, mounted, diameter, HALF_ROD_SEGMENTS)
        free = free_length(wires.eigenvalue(), diameter, length)
        if abs(free - length) < 2e-4:
            break
        mounted += length - free
    return (mounted - free) / boom, wires.segments


def whole_array(boom: float, diameter: float, lengths: Sequence[float], wires_round: int) -> tuple[float, float, int]:
    """Gain, front/back and segments of an array; without a cage for 0 wires round."""
    wires = Wires()
    height = boom / 2 + 0.03
    half = lengths[FED] / 2
    fed = wires.add((STATIONS[FED], -half, height), (STATIONS[FED], half, height), 21, diameter / 2)
    bonded = [(x, length) for i, (x, length) in enumerate(zip(STATIONS, lengths, strict=True)) if i != FED]
    if wires_round:
        wires.add_cage(boom, wires_round, -0.1, STATIONS[-1] + 0.1, [x for x, _ in bonded])
    for x, length in bonded:
        if wires_round:
            wires.add_bonded_rod(x, boom, length, diameter, 13)
        else:
            wires.add((x, -length / 2, 0), (x, length / 2, 0), 29, diameter / 2)
    return (*wires.gain(fed, 11), wires.segments)


def write_single(library: list[str]) -> None:
    """Writes `boom_cage_single.csv`."""
    with (DATA / "boom_cage_single.csv").open("w", encoding="utf-8", newline="") as file:
        table = csv.writer(file, lineterminator="\n")
        table.writerow(
            ["boom_wl", "rod_wl", "length_wl", "wires_round", "allowance_over_boom", "library", "version", "segments"]
        )
        for case in SINGLE_CASES:
            for wires_round in (8, 12):
                value, segments = single_rod(*case, wires_round)
                table.writerow([*case, wires_round, f"{value:.4f}", *library, segments])


def write_arrays(library: list[str]) -> None:
    """Writes `boom_cage_array.csv`."""
    with (DATA / "boom_cage_array.csv").open("w", encoding="utf-8", newline="") as file:
        table = csv.writer(file, lineterminator="\n")
        names = [f"length_{i}_wl" for i in range(len(STATIONS))]
        head = ["case", "boom_wl", "rod_wl", "lengthened_by", *names, "wires_round"]
        table.writerow([*head, "gain_dbi", "front_back_db", "library", "version", "segments"])
        for case, (boom, diameter, free) in ARRAYS.items():
            curve = (25.195 * boom - 229 * boom**2) * boom
            own = [
                length + (0 if i == FED else closed_form_wl(boom, diameter, length)) for i, length in enumerate(free)
            ]
            common = [length + (0 if i == FED else curve) for i, length in enumerate(free)]
            rows = (("free space", free, 0), ("closed form", own, 8), ("DL6WU", common, 8), ("nothing", free, 8))
            for by, lengths, wires_round in rows:
                gain, ratio, segments = whole_array(boom, diameter, lengths, wires_round)
                shown = [f"{length:.6f}" for length in lengths]
                table.writerow(
                    [case, boom, diameter, by, *shown, wires_round, f"{gain:.4f}", f"{ratio:.3f}", *library, segments]
                )


if __name__ == "__main__":
    write_single(["PyNEC", version("pynec")])
    write_arrays(["PyNEC", version("pynec")])
