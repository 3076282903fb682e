"""loads/NOMENCLATURE.md and the code name the same quantities with the same units."""

from __future__ import annotations

from dataclasses import dataclass
from types import ModuleType

import pytest

from loads.arrays import FloatArray
from tests.nomenclature import (
    OF_ITS_KIND,
    PAGE,
    UNTOLD,
    Quantity,
    brought_up_to_date,
    of_module,
    quantities,
    row_of,
    rows,
)

COMMAND = "python -m tests.nomenclature"


def written() -> list[tuple[str, ...]]:
    return rows(PAGE.read_text(encoding="utf-8"))


def test_the_page_names_what_the_code_names() -> None:
    code, page = {(q.name, q.unit): q for q in quantities()}, {(row[0], row[2]) for row in written()}
    missing = ["| " + " | ".join(row_of(code[key])) + " |" for key in sorted(code.keys() - page)]
    gone = [f"{name} [{unit}]" for name, unit in sorted(page - code.keys())]
    assert not missing, f"missing from loads/NOMENCLATURE.md ({COMMAND}):\n" + "\n".join(missing)
    assert not gone, f"no longer in the code, or with another unit ({COMMAND}): {', '.join(gone)}"


def test_the_page_is_in_order_and_complete() -> None:
    keys = [(row[0], row[2]) for row in written()]
    assert keys == sorted(set(keys))
    assert [row for row in written() if len(row) != 4 or not all(row) or UNTOLD in row] == []


def test_a_page_brought_up_to_date_keeps_what_somebody_wrote() -> None:
    page = PAGE.read_text(encoding="utf-8")
    assert brought_up_to_date(page, quantities()) == page
    new = Quantity("seepage", "m²/s", "flow per metre of width, shape (n,).", "loads.newcomer")
    old = [q for q in quantities() if q.name != "bulge"]
    changed = rows(brought_up_to_date(page, [*old, new]))
    assert ("seepage", "–", "m²/s", "Flow per metre of width") in changed
    assert not [row for row in changed if row[0] == "bulge"]
    assert {row for row in written() if row[0] != "bulge"} < set(changed)


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
