"""One record of a solved or measured mount: its keys, and the record made of them."""

from typing import Annotated, Any, Literal

import yaml
from pydantic import BaseModel, ConfigDict, Field, ValidationError

from fabgen.design.records import MeasuredRecord, MountGeometry, Record, SolvedRecord, SolvedRod
from fabgen.errors import DesignErrors, Place, Problem
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.read.source import Source

_LOADER: Any = getattr(yaml, "CSafeLoader", yaml.SafeLoader)

Size = Annotated[float, Field(ge=0, le=100_000, allow_inf_nan=False)]
AboveZero = Annotated[float, Field(gt=0, le=100_000, allow_inf_nan=False)]
Part = Annotated[float, Field(ge=-1, le=1, allow_inf_nan=False)]


class _Keys(BaseModel):
    """What a record says to later runs; it also holds readings and remarks, which are for people."""

    model_config = ConfigDict(extra="ignore", frozen=True, defer_build=True)


class _Geometry(_Keys):
    style: Literal["bonded-through", "insulated-through", "on-top"]
    section: Literal["round", "square", "rectangular"]
    outside_mm: AboveZero
    height_mm: Size
    wall_mm: Size
    rod_diameter_mm: AboveZero
    hole_mm: Size
    axis_height_mm: Size
    bush_material: str
    bush_permittivity: Annotated[float, Field(ge=1, le=100)]
    bush_length_mm: Size
    keeper: str
    film_insulation: bool
    frequency_mhz: AboveZero


class _Rod(_Keys):
    modelled_mm: AboveZero
    allowance_mm: AboveZero
    reactance_factor: AboveZero


class _Solved(_Keys):
    record: Literal["solved"]
    mount: str
    geometry: _Geometry
    rods: Annotated[list[_Rod], Field(min_length=1, max_length=9)]
    mesh_difference_relative: Part


class _Fit(_Keys):
    modelled_mm: AboveZero
    allowance_mm: AboveZero
    u_mm: AboveZero
    reactance_factor: AboveZero
    boom_end_relative: Part


class _Measured(_Keys):
    record: Literal["measured"]
    mount: str
    date: str
    geometry: _Geometry
    fit: _Fit


def record(source: Source) -> Record:
    """Read one record.

    Raises:
        DesignErrors: the file is no record.
    """
    try:
        content = yaml.load(source.text, Loader=_LOADER)  # noqa: S506 # a safe loader
    except yaml.YAMLError as error:
        mark = getattr(error, "problem_mark", None)
        raise _refused(source, "is no YAML", mark.line + 1 if mark else 1) from None
    kind = content.get("record") if isinstance(content, dict) else None
    try:
        if kind == "solved":
            return _as_solved(source, _Solved.model_validate(content))
        if kind == "measured":
            return _as_measured(source, _Measured.model_validate(content))
    except ValidationError as error:
        reason = error.errors(include_url=False, include_input=False)[0]
        key = ".".join(map(str, reason["loc"])) or "the record"
        raise _refused(source, f"{key}: {reason['msg'].lower()}") from None
    except ValueError as error:
        raise _refused(source, str(error)) from None
    raise _refused(source, "record: solved or measured is expected")


def _refused(source: Source, message: str, line: int = 1) -> DesignErrors:
    place: Place = source.place(line, 1)
    fix = "records are written by `fabgen solve` and `fabgen record`; move this file out of the folder"
    return DesignErrors((Problem("D40", message, place, fix),))


def _as_solved(source: Source, keys: _Solved) -> SolvedRecord:
    rods = [SolvedRod(rod.modelled_mm, rod.allowance_mm, rod.reactance_factor) for rod in keys.rods]
    rods.sort(key=lambda rod: rod.modelled_mm)
    if len({rod.modelled_mm for rod in rods}) < len(rods):
        raise ValueError("rods: two of one length")
    geometry = _geometry(keys.geometry)
    return SolvedRecord(source.shown_as, keys.mount, geometry, tuple(rods), keys.mesh_difference_relative)


def _as_measured(source: Source, keys: _Measured) -> MeasuredRecord:
    fit = keys.fit
    return MeasuredRecord(
        file=source.shown_as,
        mount=keys.mount,
        date=keys.date,
        geometry=_geometry(keys.geometry),
        modelled_mm=fit.modelled_mm,
        allowance_mm=fit.allowance_mm,
        u_mm=fit.u_mm,
        reactance_factor=fit.reactance_factor,
        boom_end_relative=fit.boom_end_relative,
    )


def _geometry(keys: _Geometry) -> MountGeometry:
    """The geometry, refused where it is no mount.

    Raises:
        ValueError: the numbers contradict each other.
    """
    values = keys.model_dump()
    numbers = {name: value for name, value in values.items() if name in BoomMount.__dataclass_fields__}
    numbers |= {"style": Style(keys.style), "section": Section(keys.section)}
    BoomMount(**numbers)
    return MountGeometry(**values)
