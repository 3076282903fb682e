"""SHEF text to messages .A, .B and .E with their continuation lines, comments taken out."""

from __future__ import annotations

import re
from dataclasses import dataclass, field

from loads.series.refusals import refusal

_START = re.compile(r"\.([ABE])(R?)(\d*)\s+(.*)", re.ASCII)


@dataclass(kw_only=True)
class Message:
    """One message with its continuation lines, and for .B the lines of its body."""

    form: str
    revised: bool
    line: int
    text: str
    body: list[tuple[int, str]] = field(default_factory=list)


def is_shef(line: str) -> bool:
    """Tell whether a line starts a SHEF message."""
    return _START.match(line) is not None


def _uncommented(line: str) -> str:
    return "".join(line.split(":")[::2])


class Splitter:
    """Lines to messages."""

    def __init__(self) -> None:
        self.messages: list[Message] = []
        self.open: Message | None = None
        self.texts = 0

    def line(self, number: int, raw: str) -> None:
        """Take the next line.

        Raises
        ------
        ScenarioError
            It can stand neither here nor outside a message.
        """
        text = _uncommented(raw).strip()
        match = _START.fullmatch(text)
        if self.open is not None:
            self._body(number, text, match)
        elif match is None:
            if text.startswith("."):
                raise refusal(f"line {number}", "is not a SHEF message .A, .B or .E that can be read", text)
            self.texts += bool(text)
        elif match[3]:
            self._continue(number, match)
        else:
            message = Message(form=match[1], revised=bool(match[2]), line=number, text=match[4])
            self.messages.append(message)
            self.open = message if match[1] == "B" else None

    def _body(self, number: int, text: str, match: re.Match[str] | None) -> None:
        assert self.open is not None
        if text.upper().startswith(".END"):
            self.open = None
        elif match and match[1] == "B" and match[3] and not self.open.body:
            self._continue(number, match)
        elif text.startswith("."):
            raise refusal(f"line {number}", "stands inside a .B message that has no .END before it", text)
        elif text:
            self.open.body.append((number, text))

    def _continue(self, number: int, match: re.Match[str]) -> None:
        if not self.messages or self.messages[-1].form != match[1]:
            raise refusal(f"line {number}", f"continues a .{match[1]} message that is not there")
        last = self.messages[-1]
        last.text = f"{last.text.removesuffix('/').rstrip()}/{match[4].removeprefix('/').lstrip()}"
