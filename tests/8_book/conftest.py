"""Books of the demo designs, and a browser without a window that is asked over a pipe what it did."""

import base64
import json
import os
import shutil
import signal
import time
from collections.abc import Callable, Iterator
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.arrange.bars import plan
from fabgen.arrange.fixtures import fixtures
from fabgen.book.book import Book
from fabgen.book.figures import Figure
from fabgen.check.judge import judge
from fabgen.correct.ledger import correct
from fabgen.correct.metal_mounts import metal_mounts
from fabgen.design.design import Design
from fabgen.design.findings import in_order
from fabgen.read.reader import read_design

SVG = (
    '<?xml version="1.0" encoding="UTF-8"?>\n<svg width="60mm" height="30mm" viewBox="0 0 60 30" version="1.1" '
    'xmlns="http://www.w3.org/2000/svg"><g id="outline"><path d="M 1 1 L 59 29" stroke="#000"/></g></svg>\n'
)
OPTIONS = [
    "--headless",
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
    "--remote-debugging-pipe",
]
PATIENCE_S = 60.0


@pytest.fixture(scope="session")
def book_of(root: Path) -> Callable[..., Book]:
    """The book of a demo design with plain figures; keywords replace fields of the design."""

    def made(stem: str, *, stamped: bool = False, **fields: Any) -> Book:
        design: Design = replace(read_design(root / "designs" / f"{stem}.yaml").design, **fields)
        arranged = arrange(design, correct(design))
        return Book(
            arranged,
            in_order(list(judge(arranged))),
            plan(arranged.cuts, design.shop),
            views=(Figure("array", "the array", SVG, 60.0, 30.0),),
            pictures=tuple(Figure(f"part {k}", f"part {k}", SVG, 60.0, 30.0) for k in range(5)),
            aids=tuple((aid, Figure(aid.label, aid.label, SVG, 60.0, 30.0)) for aid in fixtures(arranged)),
            mounts=metal_mounts(design),
            stamped=stamped,
        )

    return made


class Browser:
    """One page of a headless Chromium, spoken to over its debugging pipe."""

    def __init__(self, program: str, profile: Path) -> None:
        to_browser, self._write = os.pipe()
        self._read, from_browser = os.pipe()
        moves = [(os.POSIX_SPAWN_DUP2, to_browser, 3), (os.POSIX_SPAWN_DUP2, from_browser, 4)]
        quiet = [(os.POSIX_SPAWN_OPEN, 2, os.devnull, os.O_WRONLY, 0)]
        command = [program, *OPTIONS, f"--user-data-dir={profile}", "about:blank"]
        self.process = os.posix_spawn(program, command, os.environ, file_actions=[*quiet, *moves])
        os.close(to_browser)
        os.close(from_browser)
        self._rest, self._count, self._session = b"", 0, ""
        self.events: list[dict[str, Any]] = []
        target = self.call("Target.createTarget", url="about:blank")["targetId"]
        self._session = self.call("Target.attachToTarget", targetId=target, flatten=True)["sessionId"]
        for domain in ("Page", "Runtime", "Log", "Network"):
            self.call(f"{domain}.enable")

    def call(self, method: str, **parameters: Any) -> dict[str, Any]:
        """Send one command and wait for its answer; events that come meanwhile are kept."""
        self._count += 1
        message = {"id": self._count, "method": method, "params": parameters}
        if self._session:
            message["sessionId"] = self._session
        os.write(self._write, json.dumps(message).encode() + b"\0")
        while (answer := self._next()).get("id") != self._count:
            self.events.append(answer)
        assert "error" not in answer, answer
        return answer["result"]

    def open(self, page: Path) -> None:
        """Load a file and wait until it and its styles are there."""
        self.events.clear()
        self.call("Page.navigate", url=page.as_uri())
        while not any(event.get("method") == "Page.loadEventFired" for event in self.events):
            self.events.append(self._next())

    def pdf(self) -> bytes:
        """The page as printed, on the paper that its own styles ask for."""
        printed = self.call("Page.printToPDF", preferCSSPageSize=True, printBackground=False)
        return base64.b64decode(printed["data"])

    def value(self, expression: str) -> Any:
        """What an expression gives on the page."""
        return self.call("Runtime.evaluate", expression=expression, returnByValue=True)["result"]["value"]

    def requests(self) -> list[str]:
        """Addresses that were asked for since the page was opened."""
        return [e["params"]["request"]["url"] for e in self.events if e.get("method") == "Network.requestWillBeSent"]

    def blocked(self) -> list[str]:
        """Why requests were refused by the page's own policy, since the page was opened."""
        failed = [e["params"] for e in self.events if e.get("method") == "Network.loadingFailed"]
        return [why["blockedReason"] for why in failed if "blockedReason" in why]

    def complaints(self) -> list[dict[str, Any]]:
        """What stands in the console since the page was opened."""
        kinds = ("Log.entryAdded", "Runtime.consoleAPICalled", "Runtime.exceptionThrown")
        return [event for event in self.events if event.get("method") in kinds]

    def close(self) -> None:
        """End the browser."""
        os.close(self._write)
        end = time.monotonic() + 5
        while time.monotonic() < end:
            if os.waitpid(self.process, os.WNOHANG) != (0, 0):
                break
            time.sleep(0.05)
        else:
            os.kill(self.process, signal.SIGKILL)
            os.waitpid(self.process, 0)
        os.close(self._read)

    def _next(self) -> dict[str, Any]:
        end = time.monotonic() + PATIENCE_S
        os.set_blocking(self._read, False)
        while b"\0" not in self._rest:
            assert time.monotonic() < end, "the browser does not answer"
            try:
                data = os.read(self._read, 1 << 20)
            except BlockingIOError:
                time.sleep(0.01)
                continue
            assert data, "the browser has ended"
            self._rest += data
        message, _, self._rest = self._rest.partition(b"\0")
        return json.loads(message)


@pytest.fixture(scope="session")
def browser(tmp_path_factory: pytest.TempPathFactory) -> Iterator[Browser]:
    """A headless Chromium with a profile of its own."""
    program = shutil.which("chromium") or shutil.which("chromium-browser") or shutil.which("google-chrome")
    if program is None:
        pytest.skip("no Chromium on this machine")
    found = Browser(program, tmp_path_factory.mktemp("profile"))
    yield found
    found.close()
