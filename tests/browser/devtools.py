"""A headless Chromium, spoken to over its own debugging pipe: no driver and no further package needed."""

from __future__ import annotations

import base64
import itertools
import json
import os
import shutil
import subprocess
import sys
import tempfile
from pathlib import Path
from types import TracebackType
from typing import Any

NAMES = ("chromium", "chromium-browser", "google-chrome", "chrome")
_FLAGS = (
    "--headless", "--disable-gpu", "--no-first-run", "--disable-background-networking", "--remote-debugging-pipe",
    "--no-sandbox",  # CI runs as root, where the sandbox refuses to start
)


def browser() -> str | None:
    """Where a Chromium is, if there is one."""
    return next((found for name in NAMES if (found := shutil.which(name))), None)


# The browser reads commands from descriptor 3 and answers on 4.
_LAUNCHER = """
import fcntl, os, sys
read, write = (fcntl.fcntl(int(number), fcntl.F_DUPFD, 10) for number in sys.argv[1:3])
os.dup2(read, 3), os.dup2(write, 4)
os.execvp(sys.argv[3], sys.argv[3:])
"""


class Tab:
    """One page: opens files, remembers what was asked of the network and what went wrong."""

    def __init__(self, program: str) -> None:
        self._profile = tempfile.TemporaryDirectory(prefix="tab-", ignore_cleanup_errors=True)
        read_here, write_there = os.pipe()
        read_there, write_here = os.pipe()
        self._process = subprocess.Popen(
            [sys.executable, "-c", _LAUNCHER, str(read_there), str(write_there), program, *_FLAGS,
             f"--user-data-dir={self._profile.name}"],
            pass_fds=(read_there, write_there), stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL,
        )
        os.close(read_there)
        os.close(write_there)
        self._in, self._out, self._rest = read_here, write_here, b""
        self._numbers = itertools.count(1)
        self._session: str | None = None
        self.events: list[dict[str, Any]] = []
        try:
            self._attach()
        except BaseException:
            self.close()
            raise

    def _attach(self) -> None:
        target = self.ask("Target.createTarget", url="about:blank")["targetId"]
        self._session = self.ask("Target.attachToTarget", targetId=target, flatten=True)["sessionId"]
        for domain in ("Page", "Runtime", "Network", "Log"):
            self.ask(f"{domain}.enable")

    def __enter__(self) -> Tab:
        return self

    def __exit__(
        self, kind: type[BaseException] | None, problem: BaseException | None, trace: TracebackType | None
    ) -> None:
        self.close()

    def close(self) -> None:
        """End the browser that this tab started."""
        self._process.terminate()
        self._process.wait(timeout=20)
        os.close(self._in)
        os.close(self._out)
        self._profile.cleanup()

    def ask(self, method: str, **parameters: object) -> Any:
        """Send a command and wait for its answer; events that come before it are kept."""
        number = next(self._numbers)
        message: dict[str, object] = {"id": number, "method": method, "params": parameters}
        if self._session is not None:
            message["sessionId"] = self._session
        os.write(self._out, json.dumps(message).encode() + b"\0")
        while True:
            answer = self._next()
            if answer.get("id") == number:
                assert "error" not in answer, answer
                return answer["result"]
            self.events.append(answer)

    def open(self, file: Path) -> None:
        """Open a file and wait until it is loaded."""
        self.events.clear()
        self.ask("Page.navigate", url=file.resolve().as_uri())
        while not any(event.get("method") == "Page.loadEventFired" for event in self.events):
            self.events.append(self._next())

    def evaluate(self, expression: str) -> Any:
        """The value of a JavaScript expression in the page."""
        answer = self.ask("Runtime.evaluate", expression=expression, returnByValue=True)
        assert "exceptionDetails" not in answer, answer
        return answer["result"].get("value")

    def requests(self) -> list[str]:
        """Every address that was asked for."""
        return [event["params"]["request"]["url"] for event in self.events
                if event.get("method") == "Network.requestWillBeSent"]

    def complaints(self) -> list[dict[str, Any]]:
        """What the console holds: errors, warnings, exceptions."""
        wanted = {"Log.entryAdded", "Runtime.exceptionThrown", "Runtime.consoleAPICalled"}
        return [event for event in self.events if event.get("method") in wanted]

    def pdf(self) -> bytes:
        """The page as it prints."""
        return base64.b64decode(self.ask("Page.printToPDF", preferCSSPageSize=True)["data"])

    def _next(self) -> dict[str, Any]:
        while b"\0" not in self._rest:
            data = os.read(self._in, 1 << 16)
            assert data, "the browser has gone"
            self._rest += data
        message, _, self._rest = self._rest.partition(b"\0")
        return json.loads(message)  # type: ignore[no-any-return]
