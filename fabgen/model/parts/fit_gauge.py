"""Fit gauge: a row of bores and a stepped plug that show by how much this printer's bores come out too small.

Push the rod through the bores from the smallest: the number at the first that lets it through by hand, times the step,
is the printer's `hole_growth`. Push the plug into a hole drilled in an offcut: the number of steps that stay out, times
the step, is what a spigot has to be drawn smaller than its hole.

Frame: origin at the plate's lower left corner on its underside, x along the row, z up. Printed as it stands.
"""

from fabgen.design.fit_gauge_sizes import CELL_MM, CORNER_MM, PLATE_MM, RAISED_MM, FitGaugeSize, fit_gauge_size
from fabgen.model.kernel import cq, cut, fused, on_bed, part_of
from fabgen.model.marks import lettering
from fabgen.model.shapes import X, Y, Z, prism, revolved

SOURCE = "printed"


def fit_gauge(
    *,
    rod_diameter_mm: float = 4.0,
    hole_diameter_mm: float = 8.0,
    steps: int = 6,
    step_mm: float = 0.1,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A fit gauge.

    Args:
        rod_diameter_mm: what goes through the bores.
        hole_diameter_mm: the drilled hole that a bush's spigot goes into; 0 for a gauge without a plug.
        steps: number of steps beyond the first bore.
        step_mm: by how much neighbours differ in diameter.
        hole_growth_mm: added to the drawn bores; 0 for a gauge that is to find it.

    Returns:
        One solid.
    """
    size = fit_gauge_size(
        rod_diameter_mm=rod_diameter_mm,
        hole_diameter_mm=hole_diameter_mm,
        steps=steps,
        step_mm=step_mm,
        hole_growth_mm=hole_growth_mm,
    )
    x, y, c = size.length_mm, size.width_mm, CORNER_MM
    outline = [(c, 0), (x - c, 0), (x, c), (x, y - c), (x - c, y), (c, y), (0, y - c), (0, c)]
    plate = prism(outline, (0.0, 0.0, 0.0), Z, Y, PLATE_MM)
    bores = [_bore(size, bore, at) for bore, at in zip(size.bores_mm, size.bore_x_mm, strict=True)]
    raised: list[cq.Shape] = []
    for text, middle in size.texts:
        raised += lettering(text, (middle, size.label_y_mm, PLATE_MM), X, Y, CELL_MM, RAISED_MM)
    if size.plug_mm:
        profile = size.plug_profile_mm
        turned = revolved([(0.0, PLATE_MM), *profile, (0.0, profile[-1][1])])
        raised.append(turned.translate(cq.Vector(size.plug_x_mm, size.row_y_mm, 0.0)))
    return part_of(fused(cut(plate, *bores), *raised))


def _bore(size: FitGaugeSize, diameter_mm: float, x_mm: float) -> cq.Shape:
    """Tool for one bore, both ends chamfered."""
    radius, edge = diameter_mm / 2, size.edge_mm
    profile = [
        (0.0, -edge),
        (radius + 2 * edge, -edge),
        (radius, edge),
        (radius, PLATE_MM - edge),
        (radius + 2 * edge, PLATE_MM + edge),
        (0.0, PLATE_MM + edge),
    ]
    return revolved(profile).translate(cq.Vector(x_mm, size.row_y_mm, 0.0))


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it lies on the bed."""
    return on_bed(part)
