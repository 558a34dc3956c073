"""Arrays of thin rods in a general moment-method library: run as a script it writes `data/array_reference.csv`.

Needs the extra `reference`. Wires are cut into `SEGMENTS` equal segments, extended thin-wire kernel, one source on the
middle segment of the fed rod.
"""

import csv
import sys
from importlib.metadata import version
from pathlib import Path

import numpy as np

SEGMENTS = 21
KERNEL = "extended"
LIGHT_MM_MHZ = 299_792.458
CENTRE_MHZ = LIGHT_MM_MHZ / 1000
FACTORS = np.exp(np.linspace(np.log(0.985), np.log(1.015), 13))
"""Frequencies over the centre: the band +-1.5 %."""
DATA = Path(__file__).parent / "data"
HEADER = [
    *("case", "elements", "frequency_mhz", "gain_dbi", "back_front_re", "back_front_im", "r_ohm", "x_ohm"),
    *("library", "version", "segments", "kernel"),
]


def read_rods() -> dict[str, list[dict[str, float]]]:
    """Rods of every case from `array_reference_rods.csv`."""
    cases: dict[str, list[dict[str, float]]] = {}
    with (DATA / "array_reference_rods.csv").open(encoding="utf-8") as file:
        for row in csv.DictReader(file):
            case = row.pop("case")
            cases.setdefault(case, []).append({key: float(value) for key, value in row.items()})
    return cases


def library_response(rods: list[dict[str, float]], frequency_mhz: float) -> tuple[float, complex, complex]:
    """Response of an array in the library.

    Args:
        rods: rows with station_mm, length_mm, diameter_mm, fed.
        frequency_mhz: frequency.

    Returns:
        forward gain in dBi, complex back/front ratio with the phase of the fed rod, feed impedance in ohm.
    """
    import PyNEC

    context = PyNEC.nec_context()
    context.set_extended_thin_wire_kernel(True)
    geometry = context.get_geometry()
    fed = next(index for index, rod in enumerate(rods) if rod["fed"])
    for tag, rod in enumerate(rods, start=1):
        x = (rod["station_mm"] - rods[fed]["station_mm"]) / 1000
        half, radius = rod["length_mm"] / 2000, rod["diameter_mm"] / 2000
        geometry.wire(tag, SEGMENTS, x, 0, -half, x, 0, half, radius, 1.0, 1.0)
    context.geometry_complete(0)
    context.gn_card(-1, 0, 0, 0, 0, 0, 0, 0)
    context.ex_card(0, fed + 1, SEGMENTS // 2 + 1, 0, 1.0, 0, 0, 0, 0, 0)
    context.fr_card(0, 1, frequency_mhz, 0)
    context.rp_card(0, 1, 2, 0, 5, 0, 0, 90, 0, 0, 180, 0, 0)
    inputs = context.get_input_parameters(0)
    pattern = context.get_radiation_pattern(0)
    front, back = np.asarray(pattern.get_e_theta()).ravel()[:2]
    gain_dbi = float(np.asarray(pattern.get_gain()).ravel()[0])
    return gain_dbi, complex(back / front), complex(np.asarray(inputs.get_impedance()).ravel()[0])


def main() -> None:
    """Write the reference values of all cases."""
    with (DATA / "array_reference.csv").open("w", encoding="utf-8", newline="") as file:
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(HEADER)
        for case, rods in read_rods().items():
            for factor in FACTORS:
                frequency_mhz = round(float(CENTRE_MHZ * factor), 6)
                gain_dbi, ratio, impedance_ohm = library_response(rods, frequency_mhz)
                numbers = (gain_dbi, ratio.real, ratio.imag, impedance_ohm.real, impedance_ohm.imag)
                text = [f"{value:.6f}" for value in numbers]
                writer.writerow(
                    [case, len(rods), f"{frequency_mhz:.6f}", *text, "PyNEC", version("PyNEC"), SEGMENTS, KERNEL]
                )
            sys.stderr.write(f"{case}\n")


if __name__ == "__main__":
    main()
