"""Materials, and which metals may touch outdoors."""

import functools
from typing import Literal, cast

from fabgen.frozen import frozen
from fabgen.stock.read_csv import index, number, row


@frozen
class Material:
    """One material; None where the table has no value.

    Attributes:
        name: trade name.
        kind: what it is, for the rules.
        density_kg_m3: density.
        youngs_modulus_gpa: modulus of elasticity at room temperature.
        yield_mpa: 0.2 % proof stress or yield; `basis` says minimum or typical.
        expansion_per_k: linear thermal expansion in 1/K.
        anodic_index_cv: anodic index of the surface in whole centivolts, None for non-metals.
        permittivity: relative permittivity of an insulator.
        loss_tangent: dielectric loss tangent of an insulator.
        conductive: metals, and plastics filled with carbon or metal.
        printable: whether it comes as a filament or powder for small printers.
        basis: what the numbers hold for.
        source: where they come from.
    """

    name: str
    kind: Literal["metal", "plastic", "wood", "grp"]
    density_kg_m3: float
    youngs_modulus_gpa: float | None
    yield_mpa: float | None
    expansion_per_k: float | None
    anodic_index_cv: int | None
    permittivity: float | None
    loss_tangent: float | None
    conductive: bool
    printable: bool
    basis: str
    source: str


@functools.cache
def material(name: str) -> Material:
    """A material by its exact name.

    Raises:
        UnknownStockError: the table has no such material; its `nearest` may help.
    """
    found = row("materials", name, "material")
    expansion, anodic = number(found["expansion_1e6_per_k"]), found["anodic_index_cv"]
    return Material(
        name=name,
        kind=cast(Literal["metal", "plastic", "wood", "grp"], found["kind"]),
        density_kg_m3=float(found["density_kg_m3"]),
        youngs_modulus_gpa=number(found["youngs_modulus_gpa"]),
        yield_mpa=number(found["yield_mpa"]),
        expansion_per_k=None if expansion is None else expansion / 1e6,
        anodic_index_cv=int(anodic) if anodic else None,
        permittivity=number(found["permittivity"]),
        loss_tangent=number(found["loss_tangent"]),
        conductive=found["conductive"] == "yes",
        printable=found["printable"] == "yes",
        basis=found["basis"],
        source=found["source"],
    )


def material_names() -> tuple[str, ...]:
    """All materials of the table, in its order."""
    return tuple(index("materials"))


def galvanic_limit_cv(environment: Literal["outdoor", "indoor", "controlled"] = "outdoor") -> int:
    """Largest allowed difference of anodic indices in whole centivolts; the limit itself is allowed."""
    return int(row("anodic_limits", environment, "environment")["limit_cv"])
