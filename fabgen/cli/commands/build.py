"""`fabgen build`: write the packages of one or more designs."""

from pathlib import Path

import click

from fabgen.cli import report
from fabgen.cli.commands.check import DESIGNS
from fabgen.contents import GROUPS
from fabgen.errors import InputError, MachineError
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
    judged, records, code = _judge_all(designs, quiet=as_json)
    for path, one in judged:
        record: dict[str, object] = {}
        records.append(record)
        try:
            seen = draw_sheets(one)
            record |= report.judged_record(path, seen)
            if not as_json:
                report.print_judged(seen)
            code = max(code, 0 if seen.clear else 1)
            if not seen.clear and not stamped:
                _tell_kept(output / seen.name)
                continue
            folder = build_package(seen, output=output, stamped=not seen.clear, only=sorted(set(only)), say=_say)
            record["package"] = str(folder)
            if not as_json:
                click.echo(str(folder))
        except Exception as caught:  # noqa: BLE001 - told; the other designs are built all the same
            error = report.expected(caught)
            code = max(code, error.exit_code)
            record |= report.error_record(path, error)
            if not as_json:
                report.tell(error)
    if as_json:
        report.print_json({"designs": records})
    return code


def _judge_all(
    designs: tuple[Path, ...], *, quiet: bool
) -> tuple[list[tuple[Path, Judged]], list[dict[str, object]], int]:
    """Judge every design before the first is written; two of one name stop the whole call."""
    judged: list[tuple[Path, Judged]] = []
    records: list[dict[str, object]] = []
    code = 0
    owners: dict[str, Path] = {}
    for path in designs:
        try:
            one = judge_file(path, solve=True, say=_say)
            _keep(path, one)
        except Exception as caught:  # noqa: BLE001 - told; the other designs are judged all the same
            error = report.expected(caught)
            code = max(code, error.exit_code)
            records.append(report.error_record(path, error))
            if not quiet:
                report.tell(error)
            continue
        key = one.name.casefold()
        if key in owners:
            raise InputError(
                f"{owners[key]} and {path} both are {one.name}", "give one of them another number or revision"
            )
        owners[key] = path
        judged.append((path, one))
    return judged, records, code


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
        _say(str(finding("E08", "note", "records", error.message)))


def _say(line: str) -> None:
    click.echo(line, err=True)


def _tell_kept(folder: Path) -> None:
    _say("not clear: nothing was written")
    if folder.exists():
        _say(f"  an older package is in {folder}; it was left alone")
    _say("  --stamped writes it with every sheet marked")
