"""The validated design: every value in force, in mm, complete.

Stage `read` makes these records from the design file; defaults and fits are already filled in, so later stages never
meet a missing number. Frame: x along the boom from the datum face forward, y along the rods (+y left), z up.
"""

from dataclasses import dataclass
from functools import cached_property
from typing import Literal

from fabgen.design.limits import NO_LIMITS, Limits
from fabgen.design.records import Record
from fabgen.frozen import frozen

Section = Literal["round", "square", "rectangular"]
Style = Literal["bonded-through", "insulated-through", "on-top", "through-nonmetal"]
Role = Literal["reflector", "driven", "director"]
Finish = Literal["bare", "anodised", "painted"]
Origin = Literal["measured", "computed", "published", "stated", "none"]
Polarisation = Literal["horizontal", "vertical"]


@frozen
class Material:
    """A material in force, from the table or from the design file.

    Attributes:
        name: trade name, as on the drawing.
        kind: what it is, for the rules.
        density_kg_m3: density.
        youngs_modulus_gpa: None when the table has none.
        yield_mpa: 0.2 % proof stress or yield; None when the table has none.
        expansion_per_k: linear thermal expansion in 1/K; None when the table has none.
        anodic_index_cv: anodic index in whole centivolts (compared as integers); None for non-metals.
        permittivity: relative permittivity of an insulator; None for metals or when unknown.
        conductive: metals, and plastics filled with carbon or metal.
        source: where the numbers come from.
    """

    name: str
    kind: Literal["metal", "plastic", "wood", "grp"]
    density_kg_m3: float
    youngs_modulus_gpa: float | None = None
    yield_mpa: float | None = None
    expansion_per_k: float | None = None
    anodic_index_cv: int | None = None
    permittivity: float | None = None
    conductive: bool = False
    source: str = "stated in the design file"


@frozen
class SheetFields:
    """Title block fields (ISO 7200); an empty one is left blank for the pen."""

    owner: str = ""
    creator: str = ""
    approved: str = ""
    date: str = ""


@frozen
class Boom:
    """The boom as bought and sawn.

    Attributes:
        width_mm: outside along y; the diameter when round.
        height_mm: outside along z; the diameter when round.
        wall_mm: 0 for a solid bar.
        corner_radius_mm: outside corner radius; 0 when round.
        rear_mm: from the datum face to the rearmost rod.
        front_mm: from the foremost rod to the front face.
        length_mm: rear + span + front.
    """

    section: Section
    width_mm: float
    height_mm: float
    wall_mm: float
    corner_radius_mm: float
    material: Material
    rear_mm: float
    front_mm: float
    length_mm: float

    @property
    def hollow(self) -> bool:
        """Whether there is a bore."""
        return self.wall_mm > 0

    @property
    def inside_width_mm(self) -> float:
        """Bore along y; 0 for a solid bar."""
        return self.width_mm - 2 * self.wall_mm if self.hollow else 0.0

    @property
    def top_mm(self) -> float:
        """Height of the top face over the axis, of the crown when round."""
        return self.height_mm / 2

    @property
    def diameter_mm(self) -> float:
        """Outside diameter of a round boom, 0 for one with flat walls: the parts' `boom_diameter_mm`."""
        return self.width_mm if self.section == "round" else 0.0


@frozen
class Rod:
    """What an element is cut from.

    Attributes:
        modelled_diameter_mm: of the rod that the model used; None where it used this one.
    """

    diameter_mm: float
    material: Material
    finish: Finish
    modelled_diameter_mm: float | None = None

    @property
    def replaces_mm(self) -> float:
        """Diameter that the model knows this rod by."""
        return self.diameter_mm if self.modelled_diameter_mm is None else self.modelled_diameter_mm


@frozen
class AllowanceChoice:
    """Where a mount's allowance shall come from; numbers only when the user states them.

    Attributes:
        origin: `auto` takes measured, else solved, else the closed form.
        model: the published model, for `published`.
        square_as: how a published round-boom model reads a square boom: its side, or Lo's equivalent diameter.
        value_mm: the stated value.
        uncertainty_mm: the stated standard uncertainty.
        source: the stated source.
    """

    origin: Literal["auto", "measured", "computed", "published", "stated", "none"]
    model: Literal["dl6wu", "lawson", "fishenden-wiblin"] = "dl6wu"
    square_as: Literal["side", "lo"] = "side"
    value_mm: float = 0.0
    uncertainty_mm: float = 0.0
    source: str = ""


@frozen
class Bush:
    """An insulating sleeve in the boom wall, with its fits for one rod and hole."""

    kind: Literal["shoulder", "sleeve"]
    material: Material
    bore_mm: float
    spigot_mm: float
    spigot_length_mm: float
    flange_mm: float
    flange_height_mm: float


@frozen
class Keeper:
    """The part that stops rod and bushes sliding, for one rod."""

    kind: Literal["push-ring", "snap"]
    material: Material
    bore_mm: float
    outside_mm: float
    length_mm: float


@frozen
class Saddle:
    """The block that carries a rod above the boom; `height_mm` is from the boom's top to the rod's axis."""

    height_mm: float
    bore_mm: float
    screw: str
    material: Material


@frozen
class Mount:
    """How one rod meets the boom, with every fit in numbers.

    Attributes:
        name: the user's name for it.
        hole_mm: drilled diameter for the rod or its bush; 0 on top.
        hold: what stops the rod sliding.
        bond: how a bonded rod is joined; None for the other styles.
    """

    name: str
    style: Style
    hole_mm: float
    allowance: AllowanceChoice
    bush: Bush | None = None
    keeper: Keeper | None = None
    saddle: Saddle | None = None
    hold: Literal["keepers", "middle-screw", "bond"] = "keepers"
    bond: Literal["weld", "press", "wall-screws"] | None = None


@frozen
class Element:
    """A rod with a role, as modelled.

    Attributes:
        at_mm: position in the model's own origin.
        station_mm: distance from the datum face.
        length_mm: modelled length tip to tip (folded: over the outside of both bends).
        mount: None when the feed carries the rod.
    """

    id: str
    role: Role
    at_mm: float
    station_mm: float
    length_mm: float
    rod: Rod
    mount: Mount | None


@frozen
class Feed:
    """The hardware of one driven element.

    Attributes:
        element: id of the driven element.
        gap_mm: between the two fed ends.
        height_mm: from the boom's top (round: its crown) to the fed rod's axis.
        cable_mm: outside diameter of the feed cable.
        spacing_mm: centre to centre of a folded dipole's limbs; 0 when straight.
        material: of the printed block.
        reference_ohm: what mismatch is counted against.
    """

    kind: Literal["straight-dipole", "folded-dipole"]
    element: str
    gap_mm: float
    height_mm: float
    cable_mm: float
    spacing_mm: float
    material: Material
    allowance: AllowanceChoice
    reference_ohm: float = 50.0


@frozen
class Clamp:
    """Boom to mast.

    Attributes:
        at_mm: None for the free place nearest to the balance point.
        span_mm: from where to where along the boom it reaches, once it has its place.
    """

    at_mm: float | None
    mast_mm: float
    plate_mm: float
    material: Material
    span_mm: tuple[float, float] | None = None


@frozen
class Shop:
    """What the shop can hold, saw and buy.

    Attributes:
        tolerance: ISO 2768-1 class.
        stated_tolerance_mm: replaces the class when the user states one; 0 otherwise.
        end_trim_mm: sawn off the rough end of every bar.
    """

    tolerance: Literal["f", "m", "c", "v"]
    stated_tolerance_mm: float
    cut_step_mm: float
    saw_kerf_mm: float
    end_trim_mm: float
    rod_stock_mm: float
    boom_stock_mm: float
    drills: Literal["metric", "inch", "both"]
    paper: Literal["A4", "Letter"]
    paper_thickness_mm: float


@frozen
class Printer:
    """The printer; `hole_growth_mm` is what a printed bore comes out smaller by."""

    bed_mm: tuple[float, float, float]
    nozzle_mm: float
    hole_growth_mm: float


@dataclass(frozen=True)
class Design:
    """One array, complete. `elements` stand in order of station.

    Attributes:
        stem: the design file's name without its ending.
        sha256: of the design file, its tables and its records.
        lengths_are: `as-cut` lengths get no allowance.
        tip_clearance_mm: no metal nearer than this to a rod tip.
        limits: what builds may lose; nothing where the file states none.
        records: solved and measured mounts stored beside the design file, in order of file name.
    """

    stem: str
    sha256: str
    title: str
    number: str
    revision: str
    frequency_mhz: float
    polarisation: Polarisation
    sheet: SheetFields
    boom: Boom
    elements: tuple[Element, ...]
    lengths_are: Literal["free-space", "as-cut"]
    feeds: tuple[Feed, ...]
    clamp: Clamp | None
    tip_clearance_mm: float
    shop: Shop
    printer: Printer
    limits: Limits = NO_LIMITS
    records: tuple[Record, ...] = ()

    @cached_property
    def wavelength_mm(self) -> float:
        """Free-space wavelength at the design frequency."""
        return 299_792.458 / self.frequency_mhz

    @property
    def name(self) -> str:
        """`<number>_<revision>`, the package's folder name."""
        return f"{self.number}_{self.revision}"

    def element(self, id_: str) -> Element:
        """The element of that id.

        Raises:
            KeyError: there is none.
        """
        for element in self.elements:
            if element.id == id_:
                return element
        raise KeyError(id_)

    def feed_of(self, element: Element) -> Feed | None:
        """The feed that carries this element, if any."""
        return next((feed for feed in self.feeds if feed.element == element.id), None)
