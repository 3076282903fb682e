"""How a reader of series says no: problems with the line or the element they stand in."""

from __future__ import annotations

from loads.problems import Problem, ScenarioError

THE_FILE = "the file"
MOST_PROBLEMS = 10
"""Problems gathered before a reader gives up on a file."""
_SHOWN = 40


def printable(text: str) -> str:
    """The text with a blank in the place of whatever cannot be printed."""
    return text if text.isprintable() else "".join(one if one.isprintable() else " " for one in text)


def shown(text: str) -> str:
    """What was read, in quotes, shortened and without control characters."""
    plain = printable(text[: _SHOWN + 1])
    return f'"{plain[:_SHOWN]}…"' if len(text) > _SHOWN else f'"{plain}"'


def refusal(path: str, rule: str, value: str | None = None) -> ScenarioError:
    """One problem, ready to raise."""
    return ScenarioError([_problem(path, rule, value)])


def _problem(path: str, rule: str, value: str | None) -> Problem:
    return Problem(path=printable(path), value="" if value is None else shown(value), rule=printable(rule))


class Faults:
    """Problems of single rows, told together."""

    def __init__(self) -> None:
        self._problems: list[Problem] = []

    def add(self, path: str, rule: str, value: str | None = None) -> None:
        """Keep one problem.

        Raises
        ------
        ScenarioError
            There are `MOST_PROBLEMS` of them.
        """
        self._problems.append(_problem(path, rule, value))
        if len(self._problems) >= MOST_PROBLEMS:
            raise ScenarioError(self._problems)

    def raise_any(self) -> None:
        """Raise what was gathered, if anything was.

        Raises
        ------
        ScenarioError
            With every problem.
        """
        if self._problems:
            raise ScenarioError(self._problems)
