"""The running server and the watched browser, as the tests see them."""

import re
from dataclasses import dataclass, field
from pathlib import Path
from urllib.parse import urlsplit

from playwright.sync_api import BrowserContext

import webapp

ROOT = Path(webapp.__file__).parents[1]


@dataclass(frozen=True)
class Server:
    """A running server: its address, and what it printed."""

    url: str
    process_id: int
    log: Path


@dataclass
class Watch:
    """What the pages of one test did that nobody looks at on the screen.

    A test that provokes an error of the console names it in `expected_errors` (regular expressions).
    """

    host: str
    console_errors: list[str] = field(default_factory=list)
    outside_requests: list[str] = field(default_factory=list)
    expected_errors: list[str] = field(default_factory=list)

    def follow(self, context: BrowserContext) -> None:
        context.on("console", lambda told: self._note_error(told.text) if told.type == "error" else None)
        context.on("weberror", lambda error: self._note_error(str(error.error)))
        context.on("request", lambda request: self._note_address(request.url))
        context.on("page", lambda page: page.on("websocket", lambda socket: self._note_address(socket.url)))

    def _note_error(self, text: str) -> None:
        self.console_errors.append(text)

    def _note_address(self, url: str) -> None:
        parts = urlsplit(url)
        if parts.scheme not in {"data", "blob"} and parts.netloc != self.host:
            self.outside_requests.append(url)

    def conclude(self) -> None:
        unexpected = [
            error
            for error in self.console_errors
            if not any(re.search(e, error) for e in self.expected_errors)
        ]
        assert self.outside_requests == []
        assert unexpected == []
