"""Will a pressed or screwed joint stay as it is, in contact or apart, and what is lost when it does not?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.where import names
from fabgen.design.arranged import Arranged
from fabgen.design.design import Design, Element
from fabgen.design.findings import Finding
from fabgen.design.mount_geometry import film_insulated
from fabgen.physics.boom_closed_form import closed_form_allowance
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.physics.half_wave import shift_khz

LEAST_HOLE_PLAY_MM = 0.05
"""A pressed rod that has lost its contact counts as standing in a hole this much larger."""

PRESSED = "a pressed contact of metal on metal drifts as it corrodes"
SCREWED = "a screwed contact of metal on metal drifts as it corrodes"
FILMED = "an anodic film or paint parts a pressed rod from the boom until it wears through, at one wall or at both"


def findings(arranged: Arranged) -> Iterator[Finding]:
    """L16: pressed joints, those with a film between, then screwed ones, each told once with the largest drift."""
    joints: dict[str, list[Element]] = {PRESSED: [], FILMED: [], SCREWED: []}
    for element in arranged.design.elements:
        mount = element.mount
        if mount is not None and mount.bond == "press":
            joints[FILMED if film_insulated(element, mount) else PRESSED].append(element)
        elif mount is not None and mount.bond == "wall-screws":
            joints[SCREWED].append(element)
    for said, rods in joints.items():
        if rods:
            yield _joint(arranged.design, rods, said)


def _joint(design: Design, rods: list[Element], said: str) -> Finding:
    where = names([element.id for element in design.elements], [element.id for element in rods])
    advice = f"{said}; weld it, or insulate the rods with bushes"
    drifts = [(drift_mm(design, element), element) for element in rods]
    known = [(mm, element.length_mm) for mm, element in drifts if mm is not None]
    if not known:
        return finding("L16", "warn", where, f"{advice}; how far is outside what can be computed here")
    mm, length_mm = max(known)
    khz = abs(shift_khz(frequency_mhz=design.frequency_mhz, length_mm=length_mm, change_mm=mm))
    lost = (
        "the rod acts {} shorter with contact than without"
        if said == FILMED
        else "without contact the rod acts {} too long"
    )
    advice += f"; {lost.format(f'{mm:.1f} mm')}, {khz:.0f} kHz (computed by closed form, unmeasured)"
    return finding("L16", "warn", where, advice, measured=mm, unit="mm")


def drift_mm(design: Design, element: Element) -> float | None:
    """The allowance of a bonded rod less that of the same rod without contact; None outside the closed forms."""
    bonded = _allowance_mm(design, element, Style.BONDED_THROUGH)
    loose = _allowance_mm(design, element, Style.INSULATED_THROUGH)
    return None if bonded is None or loose is None else bonded - loose


def _allowance_mm(design: Design, element: Element, style: Style) -> float | None:
    boom, rod_mm = design.boom, element.rod.diameter_mm
    hole_mm = element.mount.hole_mm if element.mount else 0.0
    mount = BoomMount(
        style=style,
        section=Section(boom.section),
        outside_mm=boom.width_mm,
        rod_diameter_mm=rod_mm,
        wall_mm=boom.wall_mm,
        height_mm=boom.height_mm if boom.section == "rectangular" else 0.0,
        hole_mm=max(hole_mm, rod_mm + LEAST_HOLE_PLAY_MM),
    )
    return closed_form_allowance(mount, element.length_mm, design.frequency_mhz).allowance_mm
