"""Sizes of the fit gauge.

Frame: origin at the plate's lower left corner on its underside, x along the row of bores, z up. From the left: the
rod's size, the bores from the smallest, and, when there is a drilled hole to fit, a stepped plug that stands on the
plate. Under every bore stands the number of steps by which it is drawn larger than the rod.
"""

import itertools

from fabgen.design import glyphs
from fabgen.design.arranged import Box, Cylinder
from fabgen.design.bush_sizes import EDGE_MM
from fabgen.design.part_geometry import PI, bore_chamfer_mm3, disc_mm2
from fabgen.frozen import frozen

CELL_MM, RAISED_MM = 0.8, 0.6
"""Letters of two printed lines, raised by three layers."""
PLATE_MM = 5.0
"""As long a bore as a shoulder bush has."""
WALL_MM = 3.0
GAP_MM = 2.0
STEP_HEIGHT_MM = 3.0
"""Height of one step of the plug: more than a tube's wall."""
GROOVE_MM = 0.4
"""Depth of the V between two steps, so that they can be counted."""
TIP_MM = 0.5
CORNER_MM = 2.0


@frozen
class FitGaugeSize:
    """One fit gauge.

    Attributes:
        rod_diameter_mm: what goes through the bores.
        hole_diameter_mm: the drilled hole that the plug goes into; 0 for none.
        steps: number of steps beyond the first bore; the plug has as many beyond its base.
        step_mm: by how much neighbours differ in diameter.
        hole_growth_mm: added to the drawn bores.
    """

    rod_diameter_mm: float
    hole_diameter_mm: float
    steps: int
    step_mm: float
    hole_growth_mm: float

    @property
    def bores_mm(self) -> tuple[float, ...]:
        """Drawn diameters of the bores, from the left."""
        return tuple(self.rod_diameter_mm + i * self.step_mm + self.hole_growth_mm for i in range(self.steps + 1))

    @property
    def plug_mm(self) -> tuple[float, ...]:
        """Drawn diameters of the plug's steps from the plate to the tip; empty when there is none."""
        if not self.hole_diameter_mm:
            return ()
        return tuple(self.hole_diameter_mm - i * self.step_mm for i in range(self.steps + 1))

    @property
    def edge_mm(self) -> float:
        """45° chamfer on both ends of the bores."""
        return EDGE_MM

    @property
    def rod_text(self) -> str:
        """What the bores are for."""
        return f"R{self.rod_diameter_mm:.4g}"

    @property
    def hole_text(self) -> str:
        """What the plug is for."""
        return f"H{self.hole_diameter_mm:.4g}" if self.hole_diameter_mm else ""

    @property
    def label_y_mm(self) -> float:
        """Middle of the row of letters."""
        return GAP_MM + glyphs.HEIGHT_CELLS * CELL_MM / 2

    @property
    def row_y_mm(self) -> float:
        """Where the axes of bores and plug lie."""
        widest = max(self.bores_mm[-1] + 2 * self.edge_mm, *self.plug_mm[:1], 0.0)
        return self.label_y_mm + glyphs.HEIGHT_CELLS * CELL_MM / 2 + GAP_MM / 2 + widest / 2

    @property
    def width_mm(self) -> float:
        """Of the plate, along y."""
        return self.row_y_mm + max(self.bores_mm[-1], *self.plug_mm[:1], 0.0) / 2 + WALL_MM

    @property
    def pitch_mm(self) -> float:
        """From bore to bore."""
        return max(self.bores_mm[-1], 3 * CELL_MM) + WALL_MM

    @property
    def rod_text_x_mm(self) -> float:
        """Middle of the text that names the rod."""
        return GAP_MM + glyphs.width_cells(self.rod_text) * CELL_MM / 2

    @property
    def bore_x_mm(self) -> tuple[float, ...]:
        """Where the bores stand."""
        first = 2 * self.rod_text_x_mm + GAP_MM / 2 + self.pitch_mm / 2
        return tuple(first + i * self.pitch_mm for i in range(self.steps + 1))

    @property
    def plug_x_mm(self) -> float:
        """Where the plug stands."""
        text = glyphs.width_cells(self.hole_text) * CELL_MM if self.hole_text else 0.0
        return self.bore_x_mm[-1] + self.pitch_mm / 2 + max(text, self.hole_diameter_mm) / 2 + GAP_MM

    @property
    def length_mm(self) -> float:
        """Of the plate, along x."""
        if not self.hole_text:
            return self.bore_x_mm[-1] + self.pitch_mm / 2 + GAP_MM
        return 2 * self.plug_x_mm - self.bore_x_mm[-1] - self.pitch_mm / 2

    @property
    def height_mm(self) -> float:
        """To the plug's tip, or to the plate's face."""
        return PLATE_MM + STEP_HEIGHT_MM * len(self.plug_mm)

    @property
    def plug_profile_mm(self) -> tuple[tuple[float, float], ...]:
        """Outline (radius, z) of the plug from the plate to its tip.

        Below each step a V runs round the plug, its upper side at 45°.
        """
        corners: list[tuple[float, float]] = []
        radii = [diameter / 2 for diameter in self.plug_mm]
        for i, radius in enumerate(radii):
            low, high = PLATE_MM + i * STEP_HEIGHT_MM, PLATE_MM + (i + 1) * STEP_HEIGHT_MM
            if i:
                groove = radii[i - 1] - GROOVE_MM
                corners += [(groove, low), (radius, low + radius - groove)]
            else:
                corners.append((radius, low))
            if i + 1 < len(radii):
                corners.append((radius, high - GROOVE_MM))
            else:
                corners += [(radius, high - TIP_MM), (radius - TIP_MM, high)]
        return tuple(corners)

    @property
    def texts(self) -> tuple[tuple[str, float], ...]:
        """Raised texts: (text, x of its middle)."""
        numbers = tuple((str(i), x) for i, x in enumerate(self.bore_x_mm))
        hole = ((self.hole_text, self.plug_x_mm),) if self.hole_text else ()
        return ((self.rod_text, self.rod_text_x_mm), *numbers, *hole)

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        plate = self.length_mm * self.width_mm - 2 * CORNER_MM**2
        bores = sum(disc_mm2(bore) * PLATE_MM + 2 * bore_chamfer_mm3(bore, self.edge_mm) for bore in self.bores_mm)
        letters = sum(glyphs.area_cells(text) for text, _ in self.texts) * CELL_MM**2 * RAISED_MM
        profile = self.plug_profile_mm
        plug = sum(PI / 3 * (high - low) * (a**2 + a * b + b**2) for (a, low), (b, high) in itertools.pairwise(profile))
        return plate * PLATE_MM - bores + letters + plug

    @property
    def shapes(self) -> tuple[Box | Cylinder, ...]:
        """Plate with its letters, and the plug."""
        plate = Box((0.0, 0.0, 0.0), (self.length_mm, self.width_mm, PLATE_MM + RAISED_MM))
        if not self.plug_mm:
            return (plate,)
        high = self.height_mm - PLATE_MM
        middle = (self.plug_x_mm, self.row_y_mm, PLATE_MM + high / 2)
        return (plate, Cylinder("z", middle, self.plug_mm[0], high))


def fit_gauge_size(
    *,
    rod_diameter_mm: float = 4.0,
    hole_diameter_mm: float = 8.0,
    steps: int = 6,
    step_mm: float = 0.1,
    hole_growth_mm: float = 0.0,
) -> FitGaugeSize:
    """Sizes of a fit gauge.

    Raises:
        ValueError: numbers of steps without a digit, or a plug that comes to nothing.
    """
    size = FitGaugeSize(rod_diameter_mm, hole_diameter_mm, steps, step_mm, hole_growth_mm)
    if not 1 <= steps <= 9 or step_mm <= 0:
        raise ValueError(f"a fit gauge has 1 to 9 steps, each more than 0 mm, not {steps} of {step_mm:g} mm")
    if size.plug_mm and size.plug_mm[-1] < 2 * (TIP_MM + GROOVE_MM):
        raise ValueError(f"a hole of {hole_diameter_mm:.3f} mm leaves no plug of {steps} steps")
    return size
