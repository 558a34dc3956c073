"""`fabgen build`: write the packages of one or more designs."""

from pathlib import Path

import click

from fabgen.cli import report
from fabgen.cli.call import Call
from fabgen.cli.commands.check import DESIGNS
from fabgen.contents import GROUPS
from fabgen.errors import MachineError
from fabgen.pipeline import Judged
from fabgen.pipeline import build as build_package
from fabgen.pipeline import check as judge_file
from fabgen.pipeline import drawn as draw_sheets


@click.command()
@DESIGNS
@click.option("--output", type=click.Path(path_type=Path), default=Path("output"), show_default=True, help="Folder.")
@click.option("--only", multiple=True, type=click.Choice(GROUPS), help="Write only this part of the package.")
@click.option("--stamped", is_flag=True, help="Write a design that is not clear, every sheet stamped.")
@click.option("--json", "as_json", is_flag=True, help="Print one JSON document.")
def build(designs: tuple[Path, ...], output: Path, only: tuple[str, ...], stamped: bool, as_json: bool) -> int:
    """Judge designs and write a fabrication package for each one that is clear."""
    call = Call(designs, as_json=as_json)
    judged: dict[int, Judged] = {}
    for number, path in enumerate(designs):
        with call.telling(number) as record:
            one = judge_file(path, solve=True, say=report.say)
            record.update(report.judged_record(path, one))
            _keep(path, one)
            judged[number] = one
    if call.has_twins({number: one.name for number, one in judged.items()}):
        return call.end()
    for number, one in judged.items():
        with call.telling(number) as record:
            seen = draw_sheets(one)
            record.update(report.judged_record(designs[number], seen))
            call.judged(seen.clear)
            if not as_json:
                report.print_judged(seen)
            if not seen.clear and not stamped:
                _tell_kept(output / seen.name)
                continue
            folder = build_package(seen, output=output, stamped=not seen.clear, only=sorted(set(only)), say=report.say)
            record["package"] = str(folder)
            if not as_json:
                click.echo(str(folder))
    return call.end()


def _keep(path: Path, judged: Judged) -> None:
    """Store the response for the next check; where that fails, nothing of the package depends on it."""
    from fabgen.check.finding import finding
    from fabgen.export.records import write_response
    from fabgen.read.records import records_folder

    if judged.response is None:
        return
    try:
        write_response(judged.response, folder=records_folder(path))
    except MachineError as error:
        report.say(str(finding("E08", "note", "records", error.message)))


def _tell_kept(folder: Path) -> None:
    report.say("not clear: nothing was written")
    if folder.exists():
        report.say(f"  an older package is in {folder}; it was left alone")
    report.say("  --stamped writes it with every sheet marked")
