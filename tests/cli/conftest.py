"""The program as a call: what it prints and how it ends."""

from collections.abc import Callable

import pytest

from fabgen.cli.main import main

Ran = Callable[..., tuple[int, str, str]]


@pytest.fixture
def ran(capsys: pytest.CaptureFixture[str]) -> Ran:
    """Runs the program: exit code, stdout, stderr."""

    def run(*arguments: str) -> tuple[int, str, str]:
        with pytest.raises(SystemExit) as stopped:
            main(list(arguments))
        told = capsys.readouterr()
        return int(stopped.value.code or 0), told.out, told.err

    return run
