"""Values of a design file that are more than one scalar: a material, sizes with two or three numbers."""

import functools
import re
from typing import Annotated, Any, cast

from fabgen.design.design import Material
from fabgen.read.keys import Field, Keys, ValidationInfo
from fabgen.read.kind import Context, Kind, refuse, scalar_of
from fabgen.read.nearest import suggestion
from fabgen.read.quantities import Length, Number
from fabgen.read.words import Text, Word
from fabgen.read.yaml_tree import Map, Scalar, Seq
from fabgen.stock import tables

_TIMES = re.compile(r"[0-9 ](mm|in|\")? ?[x×*] ?[0-9]")


class Lengths(Kind):
    """A fixed number of lengths; with `single`, one length stands for itself.

    Args:
        each: what every length may be.
        count: how many lengths a list has.
        single: whether one length without brackets is allowed.
        example: as a user would write it.
    """

    def __init__(self, each: Length, count: int, *, single: bool, example: str) -> None:
        self.each, self.count, self.single, self.example = each, count, single, example

    def read(self, value: Any, info: ValidationInfo) -> tuple[float, ...]:
        """The lengths in mm."""
        if isinstance(value, Scalar) and self.single:
            if _TIMES.search(value):
                refuse("D08", f"'{value}' is more than one length", f"for example {self._list()}")
            return (self.each.read(value, info),)
        if not isinstance(value, Seq):
            scalar_of(value, self.example)
            refuse("D08", f"takes a list of {self.count} lengths", f"for example {self._list()}")
        if len(value) != self.count:
            fix = "the decimal mark is a point, a comma separates; for example " + self._list()
            refuse("D08", f"takes {self.count} lengths, not {len(value)}", fix)
        return tuple(self.each.read(item, info) for item in value)

    def _list(self) -> str:
        return self.example if self.example.startswith("[") else "[30 mm, 20 mm]"

    def schema(self) -> dict[str, Any]:
        """A list of lengths, or one."""
        items = {"type": "array", "items": self.each.schema(), "minItems": self.count, "maxItems": self.count}
        return {"anyOf": [self.each.schema(), items]} if self.single else items


class MaterialKeys(Keys):
    """A material with its properties, for what the table does not hold."""

    name: Annotated[str, Text(60, "EN AW-6082 T6")]
    kind: Annotated[str, Word("metal", "plastic", "wood", "grp")]
    density_kg_m3: Annotated[float, Number(100, 25000, "2700", "density in kg/m³")] = Field(alias="density")
    youngs_modulus_gpa: Annotated[float | None, Number(0.01, 1000, "70", "modulus of elasticity in GPa")] = Field(
        default=None, alias="youngs_modulus"
    )
    yield_mpa: Annotated[float | None, Number(1, 5000, "160", "yield or 0.2 % proof stress in MPa")] = Field(
        default=None, alias="yield"
    )
    expansion_per_k: Annotated[float | None, Number(0, 1e-3, "23.4e-6", "linear expansion in 1/K")] = Field(
        default=None, alias="expansion"
    )
    anodic_index_v: Annotated[float | None, Number(-2.5, 0.5, "-0.90", "anodic index in V")] = Field(
        default=None, alias="anodic_index"
    )
    permittivity: Annotated[float | None, Number(1, 100, "2.8", "relative permittivity")] = None
    conductive: Annotated[str | None, Word("true", "false")] = None


class MaterialValue(Kind):
    """A material: a name of the table, or a mapping with its properties."""

    def __init__(self, example: str = "EN AW-6060 T66") -> None:
        self.example = example

    def read(self, value: Any, info: ValidationInfo) -> Material:
        """The material in force."""
        if isinstance(value, Map):
            return _stated(MaterialKeys.validate(value, cast(Context, info.context)))
        name = scalar_of(value, self.example)
        try:
            return table_material(str(name))
        except tables.UnknownStockError:
            fix = suggestion(name, tables.material_names())
            other = "or state its properties: {name: …, kind: …, density: …}"
            refuse("D15", f"'{name}' is not in the material table", f"{fix} {other}")

    def schema(self) -> dict[str, Any]:
        """A name of the table or the mapping."""
        return {"anyOf": [{"enum": list(tables.material_names())}, {"type": "object", "$comment": "Material"}]}


def _stated(keys: MaterialKeys) -> Material:
    metal = keys.kind == "metal"
    index = keys.anodic_index_v
    return Material(
        name=keys.name,
        kind=keys.kind,  # type: ignore[arg-type]  # Word allows exactly these
        density_kg_m3=keys.density_kg_m3,
        youngs_modulus_gpa=keys.youngs_modulus_gpa,
        yield_mpa=keys.yield_mpa,
        expansion_per_k=keys.expansion_per_k,
        anodic_index_cv=None if index is None else round(index * 100),
        permittivity=keys.permittivity,
        conductive=metal if keys.conductive is None else keys.conductive == "true",
    )


@functools.cache
def table_material(name: str) -> Material:
    """A material of the table, as the design carries it.

    Raises:
        UnknownStockError: the table has no such material.
    """
    found = tables.material(name)
    return Material(
        name=found.name,
        kind=found.kind,
        density_kg_m3=found.density_kg_m3,
        youngs_modulus_gpa=found.youngs_modulus_gpa,
        yield_mpa=found.yield_mpa,
        expansion_per_k=found.expansion_per_k,
        anodic_index_cv=found.anodic_index_cv,
        permittivity=found.permittivity,
        conductive=found.conductive,
        source=found.source,
    )
