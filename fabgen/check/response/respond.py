"""The whole answer to one case."""

from dataclasses import replace

import numpy as np

from fabgen.check.response.allot import allot, errors, spread, try_out
from fabgen.check.response.arrays import (
    absolute_values_hold,
    changed_array,
    drawn_array,
    modelled_array,
    thickest_wl,
)
from fabgen.check.response.band import band_points, fan, patterns
from fabgen.check.response.common import common_error, left_over
from fabgen.check.response.gauge import gauge
from fabgen.check.response.slopes import sensitivities, slopes
from fabgen.design.electrical_case import ElectricalCase
from fabgen.design.response import Response


def respond(case: ElectricalCase) -> Response:
    """Solve a case: response, sensitivities, tolerances, common error.

    Args:
        case: the array in plain numbers.

    Where rods are too thick for absolute values, limits on front-to-back ratio and mismatch are left out.

    Returns:
        the response; rounded, so that it does not depend on the machine's last digits.

    Raises:
        ValueError: rods that touch, or that are shorter than thick.
    """
    absolute, sha256 = absolute_values_hold(case), case.sha256
    if not absolute:
        case = replace(case, limits=replace(case.limits, front_to_back_db=None, mismatch=None))
    modelled, drawn = modelled_array(case), drawn_array(case)
    measure = gauge(case)
    found = slopes(measure, drawn)
    unit = errors(case)
    allotment = None
    if case.limits.stated:
        allotment, tried = allot(measure, drawn, found, unit)
    else:
        general = np.array(case.length_tolerance_mm + case.station_tolerance_mm)
        tried = try_out(measure, drawn, unit, general)
    h_plane, e_plane = patterns(modelled, case.frequency_mhz)
    return Response(
        case_sha256=sha256,
        thickest_wl=round(thickest_wl(case), 5),
        absolute=absolute,
        points=band_points(case, modelled) if absolute else (),
        fan=fan(tried.sampled) if absolute else (),
        sensitivities=sensitivities(found),
        modelled=measure.outcome(modelled),
        drawn=measure.outcome(drawn),
        allotment=allotment,
        spread=spread(measure, tried),
        common=common_error(measure, changed_array(case)),
        left_over=left_over(measure),
        h_plane=h_plane,
        e_plane=e_plane,
    )
