"""`fabgen solve`: solve the drawn mounts in full and keep the result."""

import sys
from pathlib import Path

import click


@click.command()
@click.argument("design", type=click.Path(path_type=Path))
@click.option("--mount", default="", metavar="NAME", help="Solve this mount only.")
def solve(design: Path, mount: str) -> int:
    """Compute what the boom takes from the rods by the full solver, and keep it in records/ beside DESIGN.

    Each distinct mount is solved at two mesh sizes, which takes up to a minute; `check` and `build` then use the stored
    result as long as the mount stays as it is. What is stored already is not solved again.
    """
    from fabgen.correct.solving import solve as solve_mount
    from fabgen.correct.solving import solve_tasks
    from fabgen.export.records import record_bytes, write_new
    from fabgen.read.reader import read_design
    from fabgen.read.records import records_folder

    tasks = solve_tasks(read_design(design).design, mount)
    for task in tasks:
        rods = f"{task.mount}, rod {task.geometry.rod_diameter_mm:g} mm"
        if task.stored:
            click.echo(f"{rods}: solved before, {task.stored}")
            continue
        content = solve_mount(task, lambda what, part, rods=rods: _tell(rods, what, part))  # type: ignore[misc]
        says = ("What `fabgen solve` found for one mount; written once, never changed.",)
        files = {".yaml": record_bytes(content, says)}
        (path,) = write_new(files, folder=records_folder(design), stem=f"solved-{task.mount}")
        click.echo(f"{rods}: solved, {path.relative_to(design.parent).as_posix()}")
        for rod in content["rods"]:
            click.echo(f"  rod of {rod['modelled_mm']:g} mm: {rod['allowance_mm']:.3f} mm to add, bush not counted")
        click.echo(f"  a finer mesh moves it by {content['mesh_difference_relative']:+.2%}; theory, unmeasured")
    return 0


def _tell(rods: str, what: str, part: float) -> None:
    """One line of progress; on a terminal it is written over the last one."""
    ending = "\r" if sys.stderr.isatty() and part < 1 else "\n"
    click.echo(f"{rods}: {part:4.0%} {what:<40}" + ending, err=True, nl=False)
