"""Are rods and boom thin against the wavelength?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding

LARGEST_ROD_WL = 0.01
"""Thin-rod models are usual up to here; common practice."""

LARGEST_BOOM_WL = 0.055
"""Where DL6WU's curve and the closed forms end."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """L14 rod diameter, L15 boom, in wavelengths."""
    design = arranged.design
    for element in design.elements:
        rod_wl = element.rod.diameter_mm / design.wavelength_mm
        if rod_wl > LARGEST_ROD_WL:
            advice = f"use a rod up to {LARGEST_ROD_WL * design.wavelength_mm:.3g} mm, or a model that knows thick rods"
            yield finding("L14", "warn", element.id, advice, measured=rod_wl, required=LARGEST_ROD_WL, unit="wl")
    boom_wl = max(design.boom.width_mm, design.boom.height_mm) / design.wavelength_mm
    if design.boom.material.conductive and boom_wl > LARGEST_BOOM_WL:
        advice = (
            f"no published or fitted allowance holds for this boom; use one up to "
            f"{LARGEST_BOOM_WL * design.wavelength_mm:.3g} mm, a boom that conducts nothing, or measure the mount"
        )
        yield finding("L15", "warn", "boom", advice, measured=boom_wl, required=LARGEST_BOOM_WL, unit="wl")
