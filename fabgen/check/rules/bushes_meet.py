"""Do the two bushes of a rod meet inside the boom?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.tolerances import printed_accuracy_mm
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding, Severity


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F06: spigots that meet on the drawing fail, those that could meet as printed warn."""
    width_mm = arranged.design.boom.width_mm
    for element in arranged.design.elements:
        bush = element.mount.bush if element.mount else None
        if bush is None or bush.kind != "shoulder":
            continue
        between_mm = width_mm - 2 * bush.spigot_length_mm
        worst_mm = between_mm - 2 * printed_accuracy_mm()
        if worst_mm < 0:
            advice = (
                f"between the spigots: {between_mm:.3f} mm on the drawing, the figure is the worst case of two prints; "
                f"make spigot_length at most {width_mm / 2 - 0.5:g} mm, or use bush: {{kind: sleeve}}"
            )
            severity: Severity = "fail" if between_mm <= 1e-9 else "warn"
            yield finding("F06", severity, element.id, advice, measured=worst_mm, required=0.0, unit="mm")
