"""The rods of a case as arrays for the solver: as modelled, as changed for the shop's rods, as drawn.

A folded driven rod is modelled as one straight rod of its tip-to-tip length and of diameter sqrt(2 d s), d the rod and
s the spacing of the limbs, its impedance four times as high. The line between the limbs, shorted at the bends, lies
across that: about a half wave long, it takes 6 kilohm or more and is not modelled. Against bent rods in a general
moment-method library, 21 segments: single rods of 0.43-0.48 wavelengths, spacing 0.015-0.05, within 9 % of the size of
the impedance; driving 17 rods of 0.0085 wavelengths, within 9 % and 0.15 dB of gain. Its finer meshes move by as much.
"""

import math
from dataclasses import replace

import numpy as np

from fabgen.design.electrical_case import ElectricalCase
from fabgen.physics.array import RELATIVE_ONLY_WL, RodArray
from fabgen.physics.folded_dipole import step_up_ratio
from fabgen.physics.thin_rod_kernel import ComplexArray
from fabgen.units import wavelength_mm


def modelled_array(case: ElectricalCase) -> RodArray:
    """The rods that the model used."""
    return RodArray(
        station_mm=case.station_mm,
        length_mm=case.modelled_mm,
        diameter_mm=_diameters_mm(case, case.modelled_diameter_mm),
        fed_index=case.fed,
        conductivity_s_per_m=case.conductivity_s_per_m or math.inf,
    )


def unchanged_array(case: ElectricalCase) -> RodArray:
    """The shop's rods at the modelled lengths."""
    return replace(modelled_array(case), diameter_mm=_diameters_mm(case, case.diameter_mm))


def changed_array(case: ElectricalCase) -> RodArray:
    """The shop's rods at the lengths that make good for their diameter."""
    lengths_mm = tuple(sum(pair) for pair in zip(case.modelled_mm, case.rod_change_mm, strict=True))
    return replace(unchanged_array(case), length_mm=lengths_mm)


def drawn_array(case: ElectricalCase) -> RodArray:
    """The shop's rods as drawn: changed, and rounded to the shop's step; free lengths, mounts left out."""
    changed = changed_array(case)
    lengths_mm = tuple(sum(pair) for pair in zip(changed.length_mm, case.rounding_mm, strict=True))
    return replace(changed, length_mm=lengths_mm)


def at_terminals(case: ElectricalCase, impedance_ohm: ComplexArray) -> ComplexArray:
    """Impedance where the cable meets the feed.

    Args:
        case: for the kind of driven rod.
        impedance_ohm: at the centre of the modelled rod.
    """
    return np.asarray(step_up(case) * impedance_ohm, dtype=np.complex128)


def step_up(case: ElectricalCase) -> float:
    """Impedance of the driven rod over that of a straight one."""
    if not case.spacing_mm:
        return 1.0
    limb_mm = case.diameter_mm[case.fed]
    return step_up_ratio(fed_diameter_mm=limb_mm, other_diameter_mm=limb_mm, spacing_mm=case.spacing_mm)


def thickest_wl(case: ElectricalCase) -> float:
    """The thickest straight rod in wavelengths, of the model or of the shop."""
    return max(case.diameter_mm + case.modelled_diameter_mm) / wavelength_mm(case.frequency_mhz)


def absolute_values_hold(case: ElectricalCase) -> bool:
    """Whether more than differences may be stated."""
    return thickest_wl(case) <= RELATIVE_ONLY_WL


def _diameters_mm(case: ElectricalCase, rods_mm: tuple[float, ...]) -> tuple[float, ...]:
    if not case.spacing_mm:
        return rods_mm
    equivalent_mm = math.sqrt(2 * rods_mm[case.fed] * case.spacing_mm)
    return tuple(equivalent_mm if index == case.fed else rod_mm for index, rod_mm in enumerate(rods_mm))
