"""What is wrong with an input: path, value, rule and cure, as data; and the two exceptions that carry it.

`SillheadError` is the root; `ScenarioError` carries every problem of a scenario at once.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass


@dataclass(frozen=True, kw_only=True)
class Problem:
    """One thing wrong with one value.

    Attributes
    ----------
    path
        Where, in the file's own words, for example ``panel[P1].sediment[0].friction_angle``.
    value
        What was typed, shortened; empty when something is missing.
    rule
        What must hold and how to put it right.
    """

    path: str
    value: str
    rule: str

    def __str__(self) -> str:
        """Return the sentence a person reads."""
        where = self.path or "the scenario"
        if not self.value:
            return f"{where} {self.rule}"
        return f"{where} is {self.value}; {self.rule}"


class SillheadError(Exception):
    """Root of everything that this program raises on purpose."""


class ScenarioError(SillheadError):
    """A scenario that cannot be computed, with all its problems."""

    def __init__(self, problems: Sequence[Problem]) -> None:
        self.problems = tuple(problems)
        super().__init__("\n".join(str(problem) for problem in self.problems))
