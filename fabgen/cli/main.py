"""The command line: data on stdout, talk on stderr, one exit code for each kind of ending."""

import difflib
import os
import sys
from typing import Any, cast

import click

from fabgen import __version__, registry
from fabgen.errors import FabgenError

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
        result: Any = group.main(args=arguments, prog_name="fabgen", standalone_mode=False)
        code = result if isinstance(result, int) else 0
        sys.stdout.flush()
    except click.ClickException as error:
        error.show()
        code = error.exit_code
    except (click.Abort, KeyboardInterrupt):
        click.echo("fabgen: stopped; nothing was changed", err=True)
        code = 3
    except FabgenError as error:
        from fabgen.cli.report import tell

        tell(error)
        code = error.exit_code
    except BrokenPipeError:
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        code = 3
    except Exception as error:
        click.echo(f"fabgen: a bug: {type(error).__name__}: {error}", err=True)
        click.echo("  set FABGEN_DEBUG=1 to see where; nothing was changed in the output folder", err=True)
        if os.environ.get("FABGEN_DEBUG"):
            raise
        code = 3
    sys.exit(code)
