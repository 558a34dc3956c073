"""The keys of a design file, section by section. Keys carry no units; the fields behind them do.

Everything optional is None here: defaults and fits are filled in by `resolve`, in one place, with their reasons.
"""

from typing import Annotated, Any, Literal

from fabgen.design.design import Finish, Material, Polarisation, Role, Style
from fabgen.read.compound import Lengths, MaterialValue
from fabgen.read.keys import Field, Keys, Section
from fabgen.read.limits import LimitsKeys
from fabgen.read.quantities import Frequency, Length, Number, WordOrLength
from fabgen.read.words import Date, Name, Text, Word
from fabgen.read.yaml_tree import Scalar

ROLES = ("reflector", "driven", "director")
STYLES = ("bonded-through", "insulated-through", "on-top", "through-nonmetal")
ORIGINS = ("auto", "measured", "computed", "published", "stated", "none")
PART_NAMES = ("boom", "feed", "clamp", "mast")

_ELEMENT_ID = Name("[A-Za-z][A-Za-z0-9_-]{0,15}", "a letter, then at most 15 of A-Z a-z 0-9 _ -", "D1", PART_NAMES)
_MOUNT = Name("[A-Za-z][A-Za-z0-9_-]{0,31}", "a letter, then at most 31 of A-Z a-z 0-9 _ -", "line")
_MOUNT_NAME = Name(_MOUNT.pattern, _MOUNT.said, _MOUNT.example, ("feed",))
_REVISION = Name(
    r"(?!.*NOT-CLEARED)[A-Za-z0-9][A-Za-z0-9._-]{0,39}", "a letter or digit, then at most 39 of A-Z a-z 0-9 . _ -", "A"
)
_NUMBER = Name(
    "[A-Za-z0-9][A-Za-z0-9._-]{0,39}", "a letter or digit, then at most 39 of A-Z a-z 0-9 . _ -", "RGL-434-06"
)
_ROD = Length(0.1, 60, "4 mm", (1, 26))
_BORE = Length(0.05, 80, "4.2 mm", (1, 40))
_HOLE = Length(0.2, 120, "8 mm", (1, 60))
_WALL = Length(0.2, 30, "1.5 mm", (0.5, 8))
_SMALL = Length(0.1, 200, "3 mm")
_HEIGHT = Length(1, 500, "18 mm", (2, 150))


class SheetKeys(Keys):
    """Title block."""

    owner: Annotated[str, Text(80, "River Board workshop", blank=True)] = ""
    creator: Annotated[str, Text(80, "drawing office", blank=True)] = ""
    approved: Annotated[str, Text(80, "workshop lead", blank=True)] = ""
    date: Annotated[str, Date()] = ""


class OverhangKeys(Keys):
    """How far the boom reaches past its outermost rods; `length` may stand in place of `front`."""

    rear_mm: Annotated[float, Length(1, 5000, "70 mm", (3, 1500))] = Field(alias="rear")
    front_mm: Annotated[float | None, Length(1, 5000, "70 mm", (3, 1500))] = Field(default=None, alias="front")
    length_mm: Annotated[float | None, Length(20, 30_000, "1.2 m")] = Field(default=None, alias="length")


class BoomKeys(Keys):
    """The boom as bought and sawn; solid when `wall` is left out."""

    section: Annotated[Literal["round", "square", "rectangular"], Word("round", "square", "rectangular")]
    outside_mm: Annotated[
        tuple[float, ...],
        Lengths(Length(3, 600, "20 mm", (8, 160)), 2, single=True, example="20 mm"),
    ] = Field(alias="outside")
    wall_mm: Annotated[float | None, _WALL] = Field(default=None, alias="wall")
    corner_radius_mm: Annotated[float | None, Length(0, 50, "1 mm")] = Field(default=None, alias="corner_radius")
    material: Annotated[Material, MaterialValue()]
    overhang: OverhangKeys
    length_mm: Annotated[float | None, Length(20, 30_000, "1.2 m")] = Field(default=None, alias="length")


class AllowanceKeys(Keys):
    """Where a mount's allowance comes from; `allowance: auto` is short for `allowance: {origin: auto}`."""

    origin: Annotated[
        Literal["auto", "measured", "computed", "published", "stated", "none"],
        Word(*ORIGINS),
    ]
    model: Annotated[
        Literal["dl6wu", "lawson", "fishenden-wiblin"] | None, Word("dl6wu", "lawson", "fishenden-wiblin")
    ] = None
    square_as: Annotated[Literal["side", "lo"] | None, Word("side", "lo")] = None
    value_mm: Annotated[float | None, Length(-100, 200, "4.6 mm")] = Field(default=None, alias="value")
    uncertainty_mm: Annotated[float | None, Length(0, 50, "0.4 mm")] = Field(default=None, alias="uncertainty")
    source: Annotated[str | None, Text(200, "own readings 2026-03")] = None

    @classmethod
    def before(cls, value: Any) -> Any:
        """A single word is the origin."""
        return {"origin": value} if isinstance(value, Scalar) and not value.empty else value


class BushKeys(Keys):
    """An insulating bush; sizes left out follow from rod, hole and wall."""

    kind: Annotated[Literal["shoulder", "sleeve"] | None, Word("shoulder", "sleeve")] = None
    material: Annotated[Material | None, MaterialValue("ASA")] = None
    bore_mm: Annotated[float | None, _BORE] = Field(default=None, alias="bore")
    spigot_mm: Annotated[float | None, _HOLE] = Field(default=None, alias="spigot")
    spigot_length_mm: Annotated[float | None, Length(0.1, 300, "3 mm")] = Field(default=None, alias="spigot_length")
    flange_mm: Annotated[float | None, _HOLE] = Field(default=None, alias="flange")
    flange_height_mm: Annotated[float | None, _SMALL] = Field(default=None, alias="flange_height")


class KeeperKeys(Keys):
    """What stops a rod sliding; sizes left out follow from the rod."""

    kind: Annotated[Literal["push-ring", "snap"] | None, Word("push-ring", "snap")] = None
    material: Annotated[Material | None, MaterialValue("ASA")] = None
    bore_mm: Annotated[float | None, _BORE] = Field(default=None, alias="bore")
    outside_mm: Annotated[float | None, _HOLE] = Field(default=None, alias="outside")
    length_mm: Annotated[float | None, _SMALL] = Field(default=None, alias="length")


SCREWS = ("M2", "M2.5", "M3", "M4", "M5", "M6")


class SaddleKeys(Keys):
    """The block that carries a rod above the boom."""

    height_mm: Annotated[float | None, _HEIGHT] = Field(default=None, alias="height")
    bore_mm: Annotated[float | None, _BORE] = Field(default=None, alias="bore")
    screw: Annotated[str | None, Word(*SCREWS)] = None
    material: Annotated[Material | None, MaterialValue("ASA")] = None


class MountKeys(Keys):
    """How rods meet the boom; which other keys have a meaning depends on the style."""

    style: Annotated[Style, Word(*STYLES)]
    hole_mm: Annotated[float | None, _HOLE] = Field(default=None, alias="hole")
    bush: BushKeys | None = None
    keeper: KeeperKeys | None = None
    saddle: SaddleKeys | None = None
    hold: Annotated[Literal["keepers", "middle-screw"] | None, Word("keepers", "middle-screw")] = None
    bond: Annotated[Literal["weld", "press", "wall-screws"] | None, Word("weld", "press", "wall-screws")] = None
    allowance: AllowanceKeys | None = None


class RodKeys(Keys):
    """What elements are cut from, unless they say otherwise."""

    diameter_mm: Annotated[float, _ROD] = Field(alias="diameter")
    modelled_diameter_mm: Annotated[float | None, _ROD] = Field(default=None, alias="modelled_diameter")
    material: Annotated[Material, MaterialValue()]
    finish: Annotated[Finish | None, Word("bare", "anodised", "painted")] = None


class ElementKeys(Keys):
    """One row of the model's table; the rod's keys override `rods`."""

    id: Annotated[str, _ELEMENT_ID]
    role: Annotated[Role, Word(*ROLES)]
    at_mm: Annotated[float, Length(-100_000, 100_000, "138 mm")] = Field(alias="at")
    length_mm: Annotated[float, Length(5, 12_000, "322 mm", (20, 5500))] = Field(alias="length")
    mount: Annotated[str | None, _MOUNT] = None
    diameter_mm: Annotated[float | None, _ROD] = Field(default=None, alias="diameter")
    modelled_diameter_mm: Annotated[float | None, _ROD] = Field(default=None, alias="modelled_diameter")
    material: Annotated[Material | None, MaterialValue()] = None
    finish: Annotated[Finish | None, Word("bare", "anodised", "painted")] = None


class FeedKeys(Keys):
    """The driven element's hardware; `spacing` belongs to a folded dipole."""

    kind: Annotated[Literal["straight-dipole", "folded-dipole"], Word("straight-dipole", "folded-dipole")]
    gap_mm: Annotated[float | None, Length(1, 100, "10 mm", (2, 40))] = Field(default=None, alias="gap")
    height_mm: Annotated[float | None, _HEIGHT] = Field(default=None, alias="height")
    cable_mm: Annotated[float | None, Length(0.8, 30, "5 mm", (1.5, 16))] = Field(default=None, alias="cable")
    spacing_mm: Annotated[float | None, Length(3, 500, "30 mm", (6, 150))] = Field(default=None, alias="spacing")
    rod_mm: Annotated[float | None, _ROD] = Field(default=None, alias="rod")
    material: Annotated[Material | None, MaterialValue("ASA")] = None
    allowance: AllowanceKeys | None = None
    reference_ohm: Annotated[
        float | None, Number(1, 1000, "200 ohm", "reference impedance in ohm", ("ohm", "ohms", "Ω", "\u2126"))
    ] = Field(default=None, alias="reference")


class ClampKeys(Keys):
    """Boom to mast."""

    at: Annotated[Literal["balance"] | float | None, WordOrLength(("balance",), Length(0, 30_000, "300 mm"))] = None
    mast_mm: Annotated[float, Length(8, 300, "38 mm", (16, 120))] = Field(alias="mast")
    plate_mm: Annotated[float | None, Length(1, 40, "5 mm", (2, 15))] = Field(default=None, alias="plate")
    material: Annotated[Material | None, MaterialValue("EN AW-6061 T6")] = None


class ClearanceKeys(Keys):
    """Distances to keep."""

    tip_mm: Annotated[float | None, Length(0, 500, "25 mm", (3, 200))] = Field(default=None, alias="tip")


class StockKeys(Keys):
    """Lengths the shop buys."""

    rod_mm: Annotated[float | None, Length(50, 12_500, "2 m", (300, 7000))] = Field(default=None, alias="rod")
    boom_mm: Annotated[float | None, Length(50, 12_500, "6 m", (300, 7000))] = Field(default=None, alias="boom")


class ShopKeys(Keys):
    """What the shop can hold, saw and buy."""

    tolerance: Annotated[
        Literal["f", "m", "c", "v"] | float | None,
        WordOrLength(("f", "m", "c", "v"), Length(0.01, 10, "0.5 mm")),
    ] = None
    cut_step_mm: Annotated[float | None, Length(0.01, 10, "0.5 mm", (0.05, 2))] = Field(default=None, alias="cut_step")
    saw_kerf_mm: Annotated[float | None, Length(0, 10, "1.5 mm", (0.3, 5))] = Field(default=None, alias="saw_kerf")
    end_trim_mm: Annotated[float | None, Length(0, 200, "5 mm")] = Field(default=None, alias="end_trim")
    stock: StockKeys | None = None
    drills: Annotated[Literal["metric", "inch", "both"] | None, Word("metric", "inch", "both")] = None
    paper: Annotated[Literal["A4", "Letter"] | None, Word("A4", "Letter")] = None
    paper_thickness_mm: Annotated[float | None, Length(0, 1, "0.1 mm")] = Field(default=None, alias="paper_thickness")


class PrinterKeys(Keys):
    """The printer in the shop."""

    bed_mm: Annotated[
        tuple[float, ...] | None,
        Lengths(Length(40, 2000, "220 mm", (90, 1200)), 3, single=False, example="[220 mm, 220 mm, 250 mm]"),
    ] = Field(default=None, alias="bed")
    nozzle_mm: Annotated[float | None, Length(0.1, 2, "0.4 mm", (0.15, 1.2))] = Field(default=None, alias="nozzle")
    hole_growth_mm: Annotated[float | None, Length(0, 2, "0.2 mm")] = Field(default=None, alias="hole_growth")


class FileKeys(Keys):
    """The whole file. What does not validate is None here, and its reasons are in the context."""

    fabgen: Annotated[str | None, Word("1"), Section()]
    title: Annotated[str | None, Text(500, "River gauge link"), Section()]
    number: Annotated[str | None, _NUMBER, Section()]
    revision: Annotated[str | None, _REVISION, Section()] = None
    frequency_mhz: Annotated[float | None, Frequency(20, 6000, "434.2 MHz"), Section()] = Field(alias="frequency")
    units: Annotated[Literal["mm", "in"] | None, Word("mm", "in"), Section()] = None
    polarisation: Annotated[Polarisation | None, Word("horizontal", "vertical"), Section()] = None
    sheet: Annotated[SheetKeys | None, Section()] = None
    boom: Annotated[BoomKeys | None, Section()]
    mounts: Annotated[dict[Annotated[str, _MOUNT_NAME], Annotated[MountKeys | None, Section()]] | None, Section()] = (
        None
    )
    rods: Annotated[RodKeys | None, Section()] = None
    elements: Annotated[list[Annotated[ElementKeys | None, Section()]] | None, Section()]
    lengths_are: Annotated[Literal["free-space", "as-cut"] | None, Word("free-space", "as-cut"), Section()] = None
    feed: Annotated[FeedKeys | None, Section()] = None
    clamp: Annotated[ClampKeys | None, Section()] = None
    clearance: Annotated[ClearanceKeys | None, Section()] = None
    limits: Annotated[LimitsKeys | None, Section()] = None
    shop: Annotated[ShopKeys | None, Section()] = None
    printer: Annotated[PrinterKeys | None, Section()] = None
