"""The page a reviewing engineer opens first: every published figure, and how far the program is from it.

`python -m pytest tests/literature --write-verification` writes tests/VERIFICATION.md. Whenever a run covers
all of tests/literature, the file is held against that run, and the run fails where they differ.
"""

from __future__ import annotations

import math
import re
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from pathlib import Path

import pytest

from loads.references import REFERENCES
from tests.agreement import Comparison

HERE = Path(__file__).parent
LITERATURE = HERE / "literature"
PAGE = HERE / "VERIFICATION.md"
KINDS = ("published", "common practice, no source", "from memory, to be confirmed")
COMMAND = "python -m pytest tests/literature --write-verification"
COMPARISONS = pytest.StashKey[list[Comparison]]()

_HEADER = ("place", "test", "quantity", "expected", "found", "tolerance", "relative difference")
_HEADING = re.compile(r"^## (\w+)$")
_FOUND_DRIFT = 2e-5
_ROUNDING = 1e-9
_SHOWN = 10
_UNCOMPARED = "–"


@dataclass(frozen=True)
class Row:
    """One line of the page."""

    work: str
    place: str
    test: str
    quantity: str
    expected: str
    found: str
    tolerance: str
    difference: str

    @property
    def identity(self) -> tuple[str, ...]:
        """What must be equal on every machine."""
        return (self.work, self.place, self.test, self.quantity, self.expected, self.tolerance)

    @property
    def cells(self) -> tuple[str, ...]:
        return (
            self.place,
            self.test,
            self.quantity,
            self.expected,
            self.found,
            self.tolerance,
            self.difference,
        )


def sources_of(item: pytest.Item) -> list[tuple[str, str]]:
    """Give key and place of every source that a test cites."""
    return [(str(mark.args[0]), str(mark.args[1])) for mark in item.iter_markers("source")]


def marker_problems(items: Iterable[pytest.Item]) -> list[str]:
    """Say what is wrong with the source markers, one sentence a problem."""
    problems = []
    for item in items:
        marks = list(item.iter_markers("source"))
        if not marks and isinstance(item, pytest.Function) and LITERATURE in item.path.parents:
            problems.append(f"{item.nodeid}: a test of literature needs @pytest.mark.source(key, where)")
        for mark in marks:
            if len(mark.args) != 2 or mark.kwargs:
                problems.append(f"{item.nodeid}: source takes a key and a place, and nothing else")
            elif mark.args[0] not in REFERENCES:
                problems.append(f"{item.nodeid}: source {mark.args[0]!r} is not in loads/references.py")
            elif not any(kind in mark.args[1] for kind in KINDS):
                problems.append(f"{item.nodeid}: the place must say one of: {'; '.join(KINDS)}")
    return problems


def rows_of(items: Iterable[pytest.Item], comparisons: Sequence[Comparison]) -> list[Row]:
    """Lay out a run: a row for each source and comparison, or one row for a test that compares nothing."""
    by_test: dict[str, list[Comparison]] = {}
    for comparison in comparisons:
        by_test.setdefault(comparison.test, []).append(comparison)
    rows = []
    for item in items:
        test = item.nodeid.partition("literature/")[2]
        for work, place in sources_of(item):
            made = [_row(work, place, test, one) for one in by_test.get(item.nodeid, [])]
            rows += made or [Row(work, place, test, "asserted in the test", *[_UNCOMPARED] * 4)]
    return sorted(rows, key=lambda row: (row.work, row.test))


def _row(work: str, place: str, test: str, one: Comparison) -> Row:
    difference = one.difference / abs(one.expected) if one.expected else one.difference
    text = "matches to rounding" if difference < _ROUNDING else f"{difference:.1e}"
    found = f"{one.found:.6g}"
    return Row(work, place, test, one.what, one.expected_text, found, one.tolerance_text, text)


def render(rows: Sequence[Row]) -> str:
    """Write the page."""
    lines = [
        "# Verification",
        "",
        "Every figure of the literature that Sillhead is held against, and how far it is from it.",
        "The tolerance is half a unit of the last digit that the source prints, or its reason stands there.",
        "Sources are of three kinds, said with the place: " + "; ".join(KINDS) + ".",
        f"Written by `{COMMAND}`; the test run fails when this page is out of date.",
    ]
    for work in sorted({row.work for row in rows}):
        reference = REFERENCES[work]
        lines += ["", f"## {work}", "", f"{reference.citation}.", f"Edition: {reference.edition}."]
        lines += [f"Status: {reference.status}.", "", _line(_HEADER), _line(["---"] * len(_HEADER))]
        lines += [_line(row.cells) for row in rows if row.work == work]
    return "\n".join(lines) + "\n"


def _line(cells: Iterable[str]) -> str:
    return "| " + " | ".join(cell.replace("|", "¦") for cell in cells) + " |"


def parse(page: str) -> list[Row]:
    """Read the rows back from the page."""
    rows, work = [], ""
    for line in page.splitlines():
        if heading := _HEADING.match(line):
            work = heading[1]
        elif line.startswith("| ") and work:
            cells = line.removeprefix("| ").removesuffix(" |").split(" | ")
            if len(cells) == len(_HEADER) and cells[0] not in {"---", _HEADER[0]}:
                rows.append(Row(work, *cells))
    return rows


def stale(page: Sequence[Row], run: Sequence[Row]) -> list[str]:
    """Say where the page and the run differ; found figures may differ by rounding between machines."""
    problems = []
    written, seen = {row.identity: row for row in page}, {row.identity: row for row in run}
    problems += [f"not on the page: {_name(seen[key])}" for key in seen if key not in written]
    problems += [f"on the page only: {_name(written[key])}" for key in written if key not in seen]
    problems += [
        f"found {seen[key].found} where the page has {row.found}: {_name(row)}"
        for key, row in written.items()
        if key in seen and not _same_found(row.found, seen[key].found)
    ]
    if not problems and len(page) != len(run):
        problems.append(f"the page has {len(page)} rows, the run has {len(run)}")
    return problems


def _name(row: Row) -> str:
    return f"{row.work}, {row.test}, {row.quantity} = {row.expected}, {row.tolerance}"


def _same_found(one: str, other: str) -> bool:
    if _UNCOMPARED in {one, other}:
        return one == other
    return math.isclose(float(one), float(other), rel_tol=_FOUND_DRIFT, abs_tol=1e-9)


class Verification:
    """The part of a test run that checks markers, and writes or checks the page."""

    def __init__(self, config: pytest.Config) -> None:
        self.config = config
        self.items: list[pytest.Item] = []
        self.passed: set[str] = set()
        self.deselected = False
        self.message: list[str] = []

    @pytest.hookimpl(tryfirst=True)
    def pytest_collection_modifyitems(self, items: list[pytest.Item]) -> None:
        if problems := marker_problems(items):
            raise pytest.UsageError("\n".join(problems))
        self.items = [item for item in items if self._of_literature(item)]

    def pytest_deselected(self, items: Sequence[pytest.Item]) -> None:
        self.deselected |= any(self._of_literature(item) for item in items)

    def pytest_runtest_logreport(self, report: pytest.TestReport) -> None:
        if report.when == "call" and report.passed:
            self.passed.add(report.nodeid)

    def pytest_sessionfinish(self, session: pytest.Session) -> None:
        asked = bool(self.config.getoption("write_verification"))
        if not self._complete():
            if asked:
                self._fail(session, ["not written: it takes a passing run of all of tests/literature"])
            return
        kept = self.config.stash[COMPARISONS]
        run = rows_of(self.items, kept)
        if asked:
            PAGE.write_text(render(run), encoding="utf-8")
            self.message = [f"tests/{PAGE.name} written, {len(run)} rows"]
            return
        page = parse(PAGE.read_text(encoding="utf-8")) if PAGE.exists() else []
        if problems := stale(page, parse(render(run))):
            more = [f"and {len(problems) - _SHOWN} more"] if len(problems) > _SHOWN else []
            self._fail(
                session,
                [*problems[:_SHOWN], *more, f"tests/{PAGE.name} is out of date; write it anew: {COMMAND}"],
            )

    def pytest_terminal_summary(self, terminalreporter: pytest.TerminalReporter) -> None:
        if self.message:
            terminalreporter.section("verification")
            for line in self.message:
                terminalreporter.line(line)

    def _fail(self, session: pytest.Session, message: list[str]) -> None:
        self.message = message
        session.exitstatus = pytest.ExitCode.TESTS_FAILED

    def _of_literature(self, item: pytest.Item) -> bool:
        return isinstance(item, pytest.Function) and LITERATURE in item.path.parents

    def _complete(self) -> bool:
        collected = {item.path for item in self.items}
        whole_files = not self.deselected and not any("::" in argument for argument in self.config.args)
        everything = collected >= set(LITERATURE.rglob("test_*.py"))
        return bool(self.items) and whole_files and everything and self._all_passed()

    def _all_passed(self) -> bool:
        return {item.nodeid for item in self.items} <= self.passed
