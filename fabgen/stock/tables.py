"""All look-ups in one place: materials, drills, fasteners, tolerances, paper and shop practice.

Each table is a CSV file in `data/`, read when it is first asked for; the last column of every row is its source.
`SOURCES.md` lists the standards and the traps in copies of them.
"""

from fabgen.stock.drills import Drill, DrillSeries, drills, nearest_drill, smallest_drill_at_least
from fabgen.stock.fasteners import (
    HeadKind,
    Nut,
    ScrewHead,
    Thread,
    Washer,
    clearance_hole_mm,
    nut,
    screw_head,
    tap_drill_mm,
    thread,
    washer,
)
from fabgen.stock.materials import Material, galvanic_limit_cv, material, material_names
from fabgen.stock.practice import (
    Paper,
    TitleField,
    edge_distance_factor,
    paper,
    paper_size_mm,
    print_practice,
    process_range,
    title_fields,
)
from fabgen.stock.read_csv import UnknownStockError
from fabgen.stock.tolerances import (
    NoToleranceError,
    ToleranceClass,
    drilled_over_mm,
    it_grade_mm,
    linear_tolerance_mm,
)

__all__ = [
    "Drill",
    "DrillSeries",
    "HeadKind",
    "Material",
    "NoToleranceError",
    "Nut",
    "Paper",
    "ScrewHead",
    "Thread",
    "TitleField",
    "ToleranceClass",
    "UnknownStockError",
    "Washer",
    "clearance_hole_mm",
    "drilled_over_mm",
    "drills",
    "edge_distance_factor",
    "galvanic_limit_cv",
    "it_grade_mm",
    "linear_tolerance_mm",
    "material",
    "material_names",
    "nearest_drill",
    "nut",
    "paper",
    "paper_size_mm",
    "print_practice",
    "process_range",
    "screw_head",
    "smallest_drill_at_least",
    "tap_drill_mm",
    "thread",
    "title_fields",
    "washer",
]
