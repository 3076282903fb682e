"""loads/NOMENCLATURE.md and the code name the same quantities with the same units."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path
from types import ModuleType

import pytest

import loads
from loads.arrays import FloatArray
from tests.nomenclature import OF_ITS_KIND, of_module, quantities

PAGE = Path(loads.__file__).parent / "NOMENCLATURE.md"


def rows() -> list[list[str]]:
    """Cells of the table, without its head."""
    lines = [line for line in PAGE.read_text(encoding="utf-8").splitlines() if line.startswith("| ")]
    return [[cell.strip() for cell in line.strip("|").split("|")] for line in lines[1:]]


def test_every_quantity_of_the_code_has_its_row() -> None:
    written = {(name, unit) for name, _, unit, _ in rows()}
    missing = {
        (q.name, q.unit): f"| {q.name} | – | {q.unit} | {q.meaning or '?'} |   ({q.place})"
        for q in quantities()
        if (q.name, q.unit) not in written
    }
    assert not missing, "add to loads/NOMENCLATURE.md:\n" + "\n".join(missing[key] for key in sorted(missing))


def test_every_row_is_a_quantity_of_the_code() -> None:
    known = {(q.name, q.unit) for q in quantities()}
    gone = [(name, unit) for name, _, unit, _ in rows() if (name, unit) not in known]
    assert not gone, f"no longer in the code, or with another unit: {gone}"


def test_the_table_is_in_order_and_complete() -> None:
    keys = [(name, unit) for name, _, unit, _ in rows()]
    assert [name for name, _ in keys] == sorted(name for name, _ in keys)
    assert len(set(keys)) == len(keys)
    assert all(all(row) and len(row) == 4 for row in rows())


@dataclass(frozen=True, kw_only=True)
class Newcomer:
    """A result as a new module would bring it.

    Attributes
    ----------
    seepage
        Flow per metre of width, shape (n,). [m²/s]
    ends
        Of the range. [m, m²/s]
    gradient
        Without a unit.
    name
        No quantity.
    """

    seepage: FloatArray
    ends: tuple[float, float]
    gradient: float
    name: str

    @property
    def exit_height(self) -> float:
        """Where it comes out. [m]."""
        return 0.0


def seepage_under(head: FloatArray, depth: FloatArray, name: str) -> FloatArray:
    """Flow.

    Parameters
    ----------
    head, depth
        Of the water, and of the ground, shape (n,). [m, ft]
    name
        No quantity.

    Returns
    -------
    FloatArray
        Flow. [m²/s]
    """
    return head * depth * len(name)


@pytest.mark.parametrize(
    ("thing", "expected"),
    [
        (
            Newcomer,
            {
                ("seepage", "m²/s"),
                ("ends", "m, m²/s"),
                ("gradient", OF_ITS_KIND),
                ("exit_height", "m"),
            },
        ),
        (seepage_under, {("head", "m"), ("depth", "ft")}),
    ],
    ids=["result", "function"],
)
def test_a_newcomer_is_seen(thing: type, expected: set[tuple[str, str]]) -> None:
    module = ModuleType(__name__)
    setattr(module, thing.__name__, thing)
    assert {(q.name, q.unit) for q in of_module(module)} == expected
