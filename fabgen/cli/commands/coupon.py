"""`fabgen coupon`: everything that measuring one mount needs."""

from pathlib import Path

import click

from fabgen.cli.report import say


@click.command()
@click.argument("design", type=click.Path(path_type=Path))
@click.option("--mount", required=True, metavar="NAME", help="The mount to measure.")
@click.option("--output", type=click.Path(path_type=Path), default=Path("output"), show_default=True, help="Folder.")
def coupon(design: Path, mount: str, output: Path) -> int:
    """Write a coupon package for one of DESIGN's mounts: test array, piece of boom, holder, sheet and procedure.

    With it the mount is measured on the bench; `fabgen record` then reads the filled-in sheet.
    """
    from fabgen.contents import versions
    from fabgen.coupon import coupon_files, other_rods_mm
    from fabgen.export import package
    from fabgen.read.reader import read_design

    read = read_design(design).design
    plan, files = coupon_files(read, mount, say)
    manifest = package.manifest(
        files,
        number=read.number,
        revision=read.revision,
        design_sha256=read.sha256,
        verdict="clear",
        versions=versions(),
    )
    folder = package.write([*files, manifest], output=output, name=f"{read.name}_coupon-{mount}", say=say)
    click.echo(f"mount {mount}: expected allowance {plan.allowance_mm:.2f} mm (theory, unmeasured)")
    for rod_mm in other_rods_mm(read, mount):
        click.echo(
            f"  rods of {rod_mm:g} mm in this mount need a coupon of their own: give them a mount of their own name"
        )
    click.echo(str(folder))
    return 0
