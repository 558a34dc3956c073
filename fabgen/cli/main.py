"""The command line: data on stdout, talk on stderr, one exit code for each kind of ending."""

import os
import sys
from typing import Any

import click

from fabgen import __version__
from fabgen.cli import report
from fabgen.cli.build import build
from fabgen.cli.check import check
from fabgen.cli.explain import explain
from fabgen.cli.new import new
from fabgen.cli.schema import schema
from fabgen.errors import FabgenError


@click.group(context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 100})
@click.version_option(__version__, prog_name="fabgen")
def group() -> None:
    """Construction models and fabrication drawings for Yagi-type arrays.

    Exit codes: 0 clear, 1 findings that fail, 2 the design file or the command line is wrong,
    3 a bug or the machine.
    """


for command in (check, build, schema, new, explain):
    group.add_command(command)


def main(arguments: list[str] | None = None) -> None:
    """Run the command line and end the process.

    Args:
        arguments: words after the program's name; the process's own by default.
    """
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
        report.tell(error)
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
