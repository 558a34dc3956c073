"""`fabgen check`: judge designs without writing anything."""

from pathlib import Path

import click

from fabgen.cli import report
from fabgen.cli.call import Call
from fabgen.errors import InputError
from fabgen.pipeline import check as judge_file

DESIGNS = click.argument("designs", nargs=-1, required=True, type=click.Path(path_type=Path, readable=False))
"""Whether a file can be read is found when it is read, one design at a time."""


@click.command()
@DESIGNS
@click.option("--show", is_flag=True, help="Print every value in force and where it came from; a valid design itself.")
@click.option("--response", is_flag=True, help="Ask the array solver whether limits are kept.")
@click.option("--json", "as_json", is_flag=True, help="Print one JSON document.")
def check(designs: tuple[Path, ...], show: bool, response: bool, as_json: bool) -> int:
    """Judge one or more design files: read, correct, arrange, check. Nothing is written."""
    if show and (as_json or len(designs) > 1):
        raise InputError("--show prints one design as YAML", "name one design, without --json")
    call = Call(designs, as_json=as_json)
    names: dict[int, str] = {}
    for number, path in enumerate(designs):
        with call.telling(number) as record:
            judged = judge_file(path, solve=response, say=report.say)
            names[number] = judged.name
            call.judged(judged.clear)
            record.update(report.judged_record(path, judged))
            if show:
                from fabgen.read.show import show as shown

                click.echo(shown(judged.reading), nl=False)
            elif not as_json:
                report.print_judged(judged)
    call.has_twins(names)
    return call.end()
