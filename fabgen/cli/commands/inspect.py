"""`fabgen inspect`: hold what was measured on a built array against its drawing and its model."""

from dataclasses import asdict
from pathlib import Path

import click

from fabgen.cli.report import error_record, print_json, say
from fabgen.design.as_built import AsBuilt, State
from fabgen.errors import FabgenError, InputError
from fabgen.pipeline import check as judge_file


@click.command()
@click.argument("design", type=click.Path(path_type=Path))
@click.argument("measured", type=click.Path(path_type=Path))
@click.option("--json", "as_json", is_flag=True, help="Print one JSON document.")
def inspect(design: Path, measured: Path, as_json: bool) -> int:
    """Compare MEASURED, a CSV table of element, length and station, with DESIGN; say what to trim.

    Ends with 0 when everything is within tolerance and limits, with 1 when not.
    """
    try:
        name, found = _inspected(design, measured)
    except FabgenError as error:
        if not as_json:
            raise
        print_json(error_record(design, error))
        return error.exit_code
    if as_json:
        print_json({"name": name, "good": found.good, **asdict(found)})
    else:
        _print(name, found)
    return 0 if found.good else 1


def _inspected(design: Path, measured: Path) -> tuple[str, AsBuilt]:
    """The design's name, and what was built against it."""
    from fabgen.check.response.as_built import as_built
    from fabgen.design.electrical_case import electrical_case, no_case
    from fabgen.read.measured_csv import read_measured

    judged = judge_file(design)
    tree = judged.reading.tree
    unit = str(tree["units"]) if "units" in tree else None
    rows = read_measured(measured, judged.arranged, unit)
    if judged.response is None:
        judged = judge_file(design, solve=True, say=say)
    case = electrical_case(judged.arranged)
    if case is None:
        raise InputError(f"{design}: {no_case(judged.arranged.design)}", "inspect needs an array that can be modelled")
    try:
        return judged.name, as_built(case, judged.arranged, rows)
    except ValueError as error:
        raise InputError(f"{measured}: the solver refuses this array: {error}", "check the stations") from error


def _print(name: str, found: AsBuilt) -> None:
    click.echo(f"{name} as built, mm; off = measured less drawn; ! = outside its tolerance")
    click.echo(f"{'element':10}{'length':>10}{'off':>9}{'±':>7}  {'station':>10}{'off':>9}{'±':>7}  {'off centre':>10}")
    for each in found.deviations:
        station = f"{each.station_tolerance_mm:7.3g}" if each.station_tolerance_mm else f"{'–':>7}"
        centre = f"{each.off_centre_mm:+10.3f}" if each.off_centre_mm is not None else f"{'–':>10}"
        click.echo(
            f"{each.element:10}{each.length_mm:10.3f}{each.length_off_mm:+9.3f}{each.length_tolerance_mm:7.3g}"
            f"{'!' if each.length_out else ' '} {each.station_mm:10.3f}{each.station_off_mm:+9.3f}{station}"
            f"{'!' if each.station_out else ' '} {centre}"
        )
    out = [each.element for each in found.deviations if each.length_out or each.station_out]
    click.echo(f"out of tolerance: {', '.join(out) or 'none'}")
    click.echo("")
    click.echo(f"{'response':34}{'designed':>12}{'as built':>12}{'trimmed':>12}")
    states = (found.designed, found.built, *([found.trimmed] if found.trims else []))
    for title, cells in _rows(states, found.absolute):
        click.echo(f"{title:34}" + "".join(f"{cell:>12}" for cell in cells))
    click.echo(f"limits missed as built: {', '.join(found.missed) or 'none'}")
    click.echo("")
    if not found.trims:
        click.echo("trim: nothing; shortening does not bring it nearer to the design")
    for trim in found.trims:
        click.echo(f"trim: {trim.element} by {trim.off_mm:g} mm to {trim.length_mm:.3f} mm, half of it at each end")
    if found.trims:
        click.echo(f"limits missed after trimming: {', '.join(found.missed_trimmed) or 'none'}")
    click.echo(
        "Modelled as thin rods in free space, without boom, mast, ground and feed line; allowances as in the ledger. "
        "An absolute frequency means ±0.3 %."
    )


def _rows(states: tuple[State, ...], absolute: bool) -> list[tuple[str, list[str]]]:
    rows = [
        ("shift, kHz", [f"{state.outcome.shift_khz:+.0f}" for state in states]),
        ("residual, 1 = 0.05 dB and 0.01", [f"{state.residual_ratio:.2f}" for state in states]),
        ("largest loss of gain in band, dB", [f"{state.outcome.gain_loss_db:.3f}" for state in states]),
    ]
    if not absolute:
        return rows
    return [
        *rows,
        ("gain, dBi", [f"{state.gain_dbi:.3f}" for state in states]),
        ("front to back, dB", [f"{state.front_to_back_db:.2f}" for state in states]),
        ("least front to back in band, dB", [f"{state.outcome.front_to_back_db:.2f}" for state in states]),
        ("feed impedance, ohm", [f"{state.r_ohm:.1f}{state.x_ohm:+.1f}j" for state in states]),
        ("mismatch, SWR", [f"{state.mismatch:.3f}" for state in states]),
        ("largest mismatch in band, SWR", [f"{state.outcome.mismatch:.3f}" for state in states]),
    ]
