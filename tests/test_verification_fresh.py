"""tests/VERIFICATION.md says what the literature tests say, and the machinery behind it can fail."""

from __future__ import annotations

import ast
import dataclasses
import subprocess
import sys
from pathlib import Path

import numpy as np
import pytest

from tests.agreement import Agree, Comparison, printed
from tests.verification import HERE, LITERATURE, PAGE, Row, parse, render, stale

ROW = Row("Dighe", "published; Ex. 1", "test_a.py::test_b", "force, lb", "12.0", "12", "± 0.05", "0.0e+00")


def test_the_page_is_as_its_own_rows_render() -> None:
    page = PAGE.read_text(encoding="utf-8")
    assert render(parse(page)) == page


def test_the_page_names_every_literature_test_and_no_other() -> None:
    written = {row.test.partition("[")[0] for row in parse(PAGE.read_text(encoding="utf-8"))}
    present = {
        f"{path.relative_to(LITERATURE).as_posix()}::{node.name}"
        for path in LITERATURE.rglob("test_*.py")
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8")))
        if isinstance(node, ast.FunctionDef) and node.name.startswith("test_")
    }
    assert written == present


def test_rows_survive_the_page() -> None:
    other = dataclasses.replace(ROW, work="Cengel", difference="matches to rounding")
    assert parse(render([other, ROW])) == [other, ROW]


@pytest.mark.parametrize(
    "change",
    [{"expected": "12.1"}, {"tolerance": "± 1"}, {"place": "published; Ex. 2"}, {"found": "12.001"}],
    ids=lambda change: next(iter(change)),
)
def test_a_changed_row_is_stale(change: dict[str, str]) -> None:
    assert stale([ROW], [dataclasses.replace(ROW, **change)])


def test_missing_and_doubled_rows_are_stale() -> None:
    assert stale([], [ROW])
    assert stale([ROW], [])
    assert stale([ROW, ROW], [ROW])


def test_rounding_between_machines_is_not_stale() -> None:
    run = dataclasses.replace(ROW, found="12.0001", difference="8.3e-06")
    assert stale([ROW], [run]) == []


@pytest.mark.parametrize(
    ("text", "tolerance"), [("1412.64", 0.005), ("177", 0.5), ("9.90e3", 5.0), ("0.0866", 0.00005)]
)
def test_a_printed_figure_carries_half_a_unit_of_its_last_digit(text: str, tolerance: float) -> None:
    assert printed(text).value == float(text)
    assert printed(text).tolerance == pytest.approx(tolerance)


def test_agreement_is_kept_and_disagreement_raised() -> None:
    kept: list[Comparison] = []
    agree = Agree("a test", kept.append)
    agree(np.array([12.04]), printed("12.0"), what="force")
    agree(1230.0, 1234.0, digits=3, what="force")
    agree(0.0, 0.0, digits=3, what="nothing")
    agree(101.0, 100.0, rel=0.011, what="force")
    with pytest.raises(AssertionError, match=r"force: found 12\.06"):
        agree(12.06, printed("12.0"), what="force")
    with pytest.raises(AssertionError, match="found nan"):
        agree(float("nan"), 1.0, abs=1e6, what="force")
    assert [comparison.agrees for comparison in kept] == [True] * 4 + [False] * 2


def test_a_wider_tolerance_needs_a_reason() -> None:
    agree = Agree("a test", lambda _: None)
    with pytest.raises(ValueError, match="needs a reason"):
        agree(12.06, printed("12.0"), abs=1.0, what="force")
    with pytest.raises(ValueError, match="exactly one"):
        agree(12.06, 12.0, what="force")
    with pytest.raises(TypeError, match="not a figure"):
        printed("nan")


@pytest.mark.parametrize(
    ("mark", "message"),
    [
        ('"Dighe"', "source takes a key and a place"),
        ('"Nobody", "published; p. 1"', "source 'Nobody' is not in loads/references.py"),
        ('"Dighe", "p. 1"', "the place must say one of"),
    ],
    ids=["one argument", "unknown key", "no kind"],
)
def test_a_wrong_source_marker_stops_the_run(tmp_path: Path, mark: str, message: str) -> None:
    module = tmp_path / "test_marked.py"
    module.write_text(f"import pytest\n\n@pytest.mark.source({mark})\ndef test_it() -> None: ...\n")
    options = ["-c", "pyproject.toml", "--rootdir", ".", "-p", "tests.conftest", "-p", "no:cacheprovider"]
    run = subprocess.run(
        [sys.executable, "-m", "pytest", *options, str(module)],
        cwd=HERE.parent,
        capture_output=True,
        text=True,
        check=False,
    )
    assert run.returncode == pytest.ExitCode.USAGE_ERROR
    assert message in run.stdout + run.stderr
    assert "Traceback" not in run.stdout + run.stderr
