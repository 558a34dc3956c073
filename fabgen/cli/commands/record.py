"""`fabgen record`: fit the readings of a coupon and keep what they say."""

from pathlib import Path

import click


@click.command()
@click.argument("design", type=click.Path(path_type=Path))
@click.argument("readings", type=click.Path(path_type=Path))
@click.option("--mount", required=True, metavar="NAME", help="The mount that was measured.")
@click.option("--date", required=True, metavar="YYYY-MM-DD", help="The day of the measurement.")
def record(design: Path, readings: Path, mount: str, date: str) -> int:
    """Fit both trim series of READINGS, a filled-in sheet of `fabgen coupon`, and keep the allowance of DESIGN's mount.

    Writes a record and a picture of the fit to records/ beside DESIGN; older records stay as they are. Readings that do
    not settle the allowance are refused with the reason, and nothing is written.
    """
    from fabgen.correct.coupon_record import record_coupon
    from fabgen.draw.coupon_fit import fit_sheet
    from fabgen.export.records import record_bytes, write_new
    from fabgen.export.svg import svg
    from fabgen.read.reader import read_design
    from fabgen.read.readings import read_readings
    from fabgen.read.records import records_folder

    found = record_coupon(read_design(design).design, mount, read_readings(readings), date)
    fit = found.fit
    says = ("What a coupon measured; written once, never changed.",)
    files = {".yaml": record_bytes(found.content, says), ".svg": svg(fit_sheet(fit, mount, date))}
    paths = write_new(files, folder=records_folder(design), stem=f"measured-{mount}-{date}")
    click.echo(f"{mount}: A = {fit.allowance_mm:.3f} mm for a rod of {fit.modelled_mm:.1f} mm modelled")
    click.echo(f"  u = {fit.u_mm:.3f} mm (k = 1); ±{2 * fit.u_mm:.3f} mm (95 %); {fit.u_mm / fit.allowance_mm:.1%}")
    click.echo(f"  residuals are {fit.residual_relative:.2f} times the stated noise")
    click.echo(f"  the piece's two ends may make it read {found.boom_end_relative:.1%} low; that is in u of the rods")
    for path in paths:
        click.echo(path.relative_to(design.parent).as_posix())
    return 0
