"""From a sheet of readings to a record: the fit, and everything a later reader needs to judge it."""

import datetime as dt
import hashlib
import math
from collections import defaultdict
from collections.abc import Mapping, Sequence
from dataclasses import asdict
from typing import Any

from fabgen.correct.case import as_boom_mount
from fabgen.design.design import Design, Element
from fabgen.design.mount_geometry import beside_metal, mount_geometry
from fabgen.design.readings import Reading, ReadingSheet
from fabgen.design.records import MountGeometry
from fabgen.errors import FabgenError, InputError
from fabgen.frozen import frozen
from fabgen.physics.boom_coupon import (
    end_fall_factor,
    reactance_factor_from_allowance,
    shortest_coupon_boom_mm,
)
from fabgen.physics.coupon_fit import HANDLING_U_MM, Channel, CouponFit, CouponRefusedError, fit_trim_series

METHOD = (
    "two trim series of one director, free and mounted, fitted together: one quadratic of length per reading and "
    "frequency, shifted by the allowance; weighted least squares"
)


MISFIT_RATIO = 0.0015
"""What a quadratic misses of a reflection over a trim series of 5 % of the length; it counts with the noise."""


class ReadingsRefusedError(FabgenError):
    """The readings are in order and give no allowance."""

    exit_code = 1


@frozen
class CouponResult:
    """What a sheet of readings says about a mount.

    Attributes:
        mount: the user's name for it.
        date: of the measurement.
        geometry: what was measured.
        fit: the allowance and its curves.
        reactance_factor: g that the allowance stands for.
        boom_end_relative: how much too low the two ends of the piece may make it read.
        content: the record.
    """

    mount: str
    date: str
    geometry: MountGeometry
    fit: CouponFit
    reactance_factor: float
    boom_end_relative: float
    content: Mapping[str, Any]


def mounted_rods(design: Design, mount: str) -> tuple[tuple[Element, MountGeometry], ...]:
    """The rods that a mount on metal carries.

    Args:
        design: as read.
        mount: the user's name for it.

    Raises:
        InputError: there is none.
    """
    carried = [(element, element.mount) for element in design.elements if element.mount is not None]
    named = [(element, drawn) for element, drawn in carried if drawn.name == mount]
    found = tuple(
        (element, mount_geometry(design, element, drawn)) for element, drawn in named if beside_metal(design, drawn)
    )
    if found:
        return found
    known = sorted({drawn.name for _, drawn in carried})
    what = f"no rod is carried by a mount {mount}" if not named else "nothing is to be measured on a boom of no metal"
    raise InputError(what, f"the mounts are {', '.join(known)}")


def mount_key(geometry: MountGeometry) -> str:
    """Twelve characters that stand for a mount: a sheet of readings carries them.

    Args:
        geometry: the mount.
    """
    text = ",".join(f"{value:.4f}" if isinstance(value, float) else str(value) for value in asdict(geometry).values())
    return hashlib.sha256(text.encode("utf-8")).hexdigest()[:12]


def record_coupon(design: Design, mount: str, sheet: ReadingSheet, date: str) -> CouponResult:
    """Fit a sheet of readings.

    Args:
        design: as read.
        mount: which mount was measured.
        sheet: the readings; where it does not say how long the piece of boom is, the shortest that serves counts.
        date: when, YYYY-MM-DD.

    Raises:
        InputError: the date, the mount or the sheet do not belong together.
        ReadingsRefusedError: the readings do not settle the allowance; the message says why.
    """
    _judge_date(date)
    geometry = _geometry(design, mount, sheet)
    drawn, frequency_mhz = as_boom_mount(geometry), geometry.frequency_mhz
    boom_mm = max(drawn.outside_mm, drawn.height_mm)
    shortest_mm = shortest_coupon_boom_mm(boom_mm)
    piece_mm = shortest_mm if sheet.piece_mm is None else sheet.piece_mm
    if piece_mm < shortest_mm - 0.5:
        raise ReadingsRefusedError(
            f"the piece of boom is {piece_mm:g} mm long; under {shortest_mm:g} mm it reads 5 to 60 % low",
            "cut at least 4 boom widths on each side of the rod, better 0.15 wavelengths, and read again",
        )
    for reading in sheet.readings:
        if abs(reading.frequency_mhz / frequency_mhz - 1) > 0.1:
            raise InputError(
                f"a reading at {reading.frequency_mhz:g} MHz is more than 10 % off {frequency_mhz:g} MHz",
                "read at the design's frequency and within a few percent of it",
            )
    try:
        fit = fit_trim_series(channels_of(sheet))
    except CouponRefusedError as refused:
        raise ReadingsRefusedError(f"no allowance from these readings: {refused}", "nothing was recorded") from None
    factor = reactance_factor_from_allowance(
        fit.allowance_mm,
        boom_mm=drawn.outside_mm,
        rod_diameter_mm=drawn.rod_diameter_mm,
        rod_length_mm=fit.modelled_mm,
        frequency_mhz=frequency_mhz,
    )
    ends = 2 * end_fall_factor(boom_mm, piece_mm / 2) / factor
    content = _content(mount, date, geometry, sheet, fit, {"piece_mm": piece_mm, "factor": factor, "ends": ends})
    return CouponResult(mount, date, geometry, fit, factor, ends, content)


def channels_of(sheet: ReadingSheet) -> tuple[Channel, ...]:
    """The readings, one channel per real quantity and frequency.

    A reflection is two channels. An SWR is one, the square of the reflection's magnitude: that is smooth in length
    where SWR itself has an edge, at its minimum.

    Raises:
        ReadingsRefusedError: a frequency was read in one set-up only.
    """
    groups: dict[tuple[str, float], list[Reading]] = defaultdict(list)
    for reading in sheet.readings:
        groups[reading.kind, reading.frequency_mhz].append(reading)
    if not groups:
        raise ReadingsRefusedError("the sheet holds no reading", "fill in one row for every step in both set-ups")
    channels: list[Channel] = []
    for (kind, frequency_mhz), readings in sorted(groups.items()):
        if len({reading.setup for reading in readings}) < 2:
            raise ReadingsRefusedError(
                f"{kind} at {frequency_mhz:g} MHz was read {readings[0].setup} only",
                "read both set-ups, free and mounted, at the same frequencies",
            )
        if kind == "reflection":
            noise = [math.hypot(sheet.reflection_noise_ratio, MISFIT_RATIO)] * len(readings)
            channels.append(_channel("re", readings, [r.reflection.real for r in readings], noise))
            channels.append(_channel("im", readings, [r.reflection.imag for r in readings], noise))
        else:
            sizes = [reading.reflection.real for reading in readings]
            channels.append(_channel("swr", readings, [s * s for s in sizes], [_square_noise(s, sheet) for s in sizes]))
    return tuple(channels)


def _square_noise(size: float, sheet: ReadingSheet) -> float:
    """What an SWR's noise makes of the square of the reflection's magnitude."""
    noise = math.hypot(sheet.swr_noise_ratio * (1 - size) ** 2 / 2, MISFIT_RATIO)
    return math.hypot(2 * size * noise, noise**2)


def _channel(name: str, readings: Sequence[Reading], values: list[float], noise: list[float]) -> Channel:
    return Channel(
        name,
        readings[0].frequency_mhz,
        tuple(reading.length_mm for reading in readings),
        tuple(reading.setup == "mounted" for reading in readings),
        tuple(values),
        tuple(noise),
    )


def _judge_date(date: str) -> None:
    try:
        good = dt.date.fromisoformat(date).isoformat() == date
    except ValueError:
        good = False
    if not good:
        raise InputError(f"--date {date} is no date", "write the day of the measurement, for example 2026-03-01")


def _geometry(design: Design, mount: str, sheet: ReadingSheet) -> MountGeometry:
    """The mount that the sheet was written for; the first of that name where the sheet does not say."""
    rods = mounted_rods(design, mount)
    if not sheet.mount_key:
        return rods[0][1]
    for _, geometry in rods:
        if mount_key(geometry) == sheet.mount_key:
            return geometry
    raise InputError(
        f"the sheet of readings was written for another mount than {mount} as it is drawn now",
        "take the change back, or measure a coupon of the mount as drawn",
    )


def _content(
    mount: str, date: str, geometry: MountGeometry, sheet: ReadingSheet, fit: CouponFit, made: Mapping[str, float]
) -> dict[str, Any]:
    return {
        "record": "measured",
        "mount": mount,
        "date": date,
        "geometry": {key: _tidy(value) for key, value in asdict(geometry).items()},
        "coupon": {"boom_piece_mm": _tidy(made["piece_mm"]), "readings_sha256": sheet.sha256},
        "fit": {
            "modelled_mm": _tidy(fit.modelled_mm),
            "allowance_mm": _tidy(fit.allowance_mm),
            "u_mm": _tidy(fit.u_mm),
            "readings_u_mm": _tidy(fit.readings_u_mm),
            "handling_u_mm": HANDLING_U_MM,
            "reactance_factor": _tidy(made["factor"]),
            "boom_end_relative": _tidy(made["ends"]),
            "residual_relative": _tidy(fit.residual_relative),
            "next_root_mm": None if fit.next_root_mm is None else _tidy(fit.next_root_mm),
        },
        "noise": {"reflection": sheet.reflection_noise_ratio, "swr": sheet.swr_noise_ratio},
        "method": METHOD,
        "readings": [_row(reading) for reading in sheet.readings],
        "residuals": [
            {
                "reading": f"{curve.channel.name} at {curve.channel.frequency_mhz:g} MHz",
                "values": [_tidy(value) for value in curve.residual_ratio],
            }
            for curve in fit.curves
        ],
    }


def _row(reading: Reading) -> dict[str, Any]:
    row: dict[str, Any] = {
        "setup": reading.setup,
        "length_mm": reading.length_mm,
        "frequency_mhz": reading.frequency_mhz,
    }
    if reading.kind == "swr":
        size = reading.reflection.real
        return row | {"swr": _tidy((1 + size) / (1 - size))}
    return row | {"re": _tidy(reading.reflection.real), "im": _tidy(reading.reflection.imag)}


def _tidy(value: Any) -> Any:
    return round(value, 5) + 0.0 if isinstance(value, float) else value
