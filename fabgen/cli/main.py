"""The command line: data on stdout, talk on stderr, one exit code for each kind of ending."""

import difflib
import os
import sys
from typing import Any, cast

import click

from fabgen import __version__, registry

_FOLDER = "cli/commands"


class Commands(click.Group):
    """The files of `cli/commands`; only the command that is called is loaded."""

    def list_commands(self, ctx: click.Context) -> list[str]:
        """Names of all commands."""
        del ctx
        return [entry.name for entry in registry.entries(_FOLDER)]

    def get_command(self, ctx: click.Context, cmd_name: str) -> click.Command | None:
        """The command of that name, None when there is none."""
        if cmd_name not in self.list_commands(ctx):
            return None
        return cast(click.Command, registry.entry(_FOLDER, cmd_name).function())

    def format_commands(self, ctx: click.Context, formatter: click.HelpFormatter) -> None:
        """One line per command: the first lines of their files, so that listing loads none."""
        del ctx
        rows = [(entry.name, entry.summary.partition(": ")[2]) for entry in registry.entries(_FOLDER)]
        with formatter.section("Commands"):
            formatter.write_dl(rows)

    def resolve_command(
        self, ctx: click.Context, args: list[str]
    ) -> tuple[str | None, click.Command | None, list[str]]:
        """The command that is meant; a misspelt one is answered with the nearest."""
        known = self.list_commands(ctx)
        if args and args[0] not in known and not args[0].startswith("-"):
            near = difflib.get_close_matches(args[0], known, n=1)
            hint = f" Did you mean {near[0]}?" if near else ""
            ctx.fail(f"No such command {args[0]!r}.{hint}")
        return super().resolve_command(ctx, args)


@click.group(cls=Commands, context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 100})
@click.version_option(__version__, prog_name="fabgen")
def group() -> None:
    """Construction models and fabrication drawings for Yagi-type arrays.

    Exit codes: 0 clear, 1 findings that fail, 2 the design file or the command line is wrong,
    3 a bug or the machine.
    """


def main(arguments: list[str] | None = None) -> None:
    """Run the command line and end the process.

    Args:
        arguments: words after the program's name; the process's own by default.
    """
    os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")  # small systems: a second thread only waits
    try:
        code = _run(arguments)
    except (BrokenPipeError, SystemExit) as end:  # nobody reads on; click then ends the process with a code of its own
        code = 0 if isinstance(end, SystemExit) and not end.code else 3
        _let_go()
    sys.exit(code)


def _run(arguments: list[str] | None) -> int:
    """Run one command, say how it ended, and return the exit code."""
    try:
        result: Any = group.main(args=arguments, prog_name="fabgen", standalone_mode=False)
        if sys.stdout is not None:  # None where the process was started without one
            sys.stdout.flush()
    except click.ClickException as error:
        error.show()
        return error.exit_code
    except BrokenPipeError:
        raise
    except (click.Abort, KeyboardInterrupt):
        click.echo("fabgen: stopped; no file is half written", err=True)
        return 3
    except Exception as caught:  # noqa: BLE001 - told, with its exit code
        from fabgen.cli.report import expected, tell

        failure = expected(caught)
        tell(failure)
        return failure.exit_code
    return result if isinstance(result, int) else 0


def _let_go() -> None:
    """Point stdout and stderr at nothing, so that the process does not fail on them again while it ends."""
    nothing = os.open(os.devnull, os.O_WRONLY)
    for descriptor in (1, 2):
        os.dup2(nothing, descriptor)
