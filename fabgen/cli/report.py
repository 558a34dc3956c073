"""Findings and verdicts as text and as JSON."""

import json
import os
from pathlib import Path
from typing import Any

import click

from fabgen.design.findings import Finding
from fabgen.errors import DesignErrors, FabgenError, MachineError, ProgramError
from fabgen.pipeline import Judged

_COLOURS = {"fail": "red", "warn": "yellow", "note": "cyan"}


def finding_record(finding: Finding) -> dict[str, Any]:
    """A finding as the package's `findings.json` has it."""
    return {
        "code": finding.code,
        "severity": finding.severity,
        "where": finding.where,
        "measured": finding.measured,
        "required": finding.required,
        "unit": finding.unit,
        "advice": finding.advice,
    }


def judged_record(path: Path, judged: Judged) -> dict[str, Any]:
    """One judged design for `--json`."""
    design = judged.arranged.design
    return {
        "file": str(path),
        "number": design.number,
        "revision": design.revision,
        "verdict": judged.verdict,
        "status": judged.arranged.ledger.status,
        "limits": _limits(judged),
        "findings": [finding_record(finding) for finding in judged.findings],
    }


def error_record(path: Path, error: FabgenError) -> dict[str, Any]:
    """One design that could not be judged, for `--json`."""
    problems = error.problems if isinstance(error, DesignErrors) else ()
    return {
        "file": str(path),
        "error": error.message if not problems else "the design file is wrong",
        "fix": error.fix,
        "exit": error.exit_code,
        "problems": [
            {
                "code": problem.code,
                "file": problem.place.file,
                "line": problem.place.line,
                "column": problem.place.column,
                "message": problem.message,
                "fix": problem.fix,
            }
            for problem in problems
        ],
    }


def print_json(record: Any) -> None:
    """Print one JSON document on stdout."""
    click.echo(json.dumps(record, indent=2, ensure_ascii=False))


def print_judged(judged: Judged) -> None:
    """Print findings, worst first, and the verdict line on stdout."""
    for finding in judged.findings:
        click.secho(str(finding), fg=_COLOURS[finding.severity], color=None if _colour() else False)
    counts = {severity: sum(f.severity == severity for f in judged.findings) for severity in _COLOURS}
    tally = ", ".join(f"{count} {severity}" for severity, count in counts.items() if count) or "no findings"
    limits = "; limits not judged" if _limits(judged) == "not judged" else ""
    click.echo(f"{judged.name}: {judged.verdict} ({tally}); {judged.arranged.ledger.status}{limits}")


def _limits(judged: Judged) -> str:
    """Whether the limits of a design were judged."""
    if not judged.arranged.design.limits.stated:
        return "none stated"
    return "not judged" if any(finding.code == "E01" for finding in judged.findings) else "judged"


def _colour() -> bool:
    return not os.environ.get("NO_COLOR")


def expected(error: Exception) -> FabgenError:
    """What stopped a command, as a failure with an exit code; with FABGEN_DEBUG set, a bug is raised as it is.

    Args:
        error: any; a broken pipe is raised again, for it ends the process.
    """
    if isinstance(error, FabgenError):
        return error
    if isinstance(error, BrokenPipeError):
        raise error
    if isinstance(error, OSError):
        reason = error.strerror or type(error).__name__
        return MachineError(f"{error.filename or 'the output'}: {reason}; no file is half written")
    if os.environ.get("FABGEN_DEBUG"):
        raise error
    fix = "set FABGEN_DEBUG=1 to see where; no file is half written"
    return ProgramError(f"a bug: {type(error).__name__}: {error}", fix)


def say(line: str) -> None:
    """One line of progress, kept apart from what was asked for."""
    click.echo(line, err=True)


def tell(error: FabgenError) -> None:
    """Print a failure on stderr: problems of a file as they are, everything else after the program's name."""
    click.echo(error.message if isinstance(error, DesignErrors) else f"fabgen: {error.message}", err=True)
    if error.fix:
        click.echo(f"  {error.fix}", err=True)
