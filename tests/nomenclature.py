"""The public quantities of the engine, read from its code: record fields, results, parameters with a unit.

`python -m tests.nomenclature` brings loads/NOMENCLATURE.md up to date: rows of quantities that are gone are
taken out, new ones are put in with what the code says of them, and all others stay as somebody wrote them.
"""

from __future__ import annotations

import dataclasses
import importlib
import inspect
import pkgutil
import re
import sys
from collections.abc import Iterable, Iterator
from pathlib import Path
from types import ModuleType
from typing import Any, NamedTuple, get_args

import loads
from loads.records.base import Measure, Record
from loads.units import SI_UNITS

PAGE = Path(loads.__file__).parent / "NOMENCLATURE.md"
UNTOLD = "?"
OF_ITS_KIND = "of its kind"
"""Unit of a field that holds a value of any kind, in the SI base unit of that kind."""

_NUMBERS = {"float", "FloatArray", "float | None", "tuple[float, float]"}
_NO_QUANTITY = {("Scenario", "format")}
_SECTION = re.compile(r"(Parameters|Attributes)\n-+\n(.*?)(?=\n\S[^\n]*\n-{3,}|\Z)", re.DOTALL)
_ENTRY = re.compile(r"^(\w+(?:, \w+)*)(?: :[^\n]*)?\n((?: +[^\n]+\n?|\n)+)", re.MULTILINE)
_UNIT = re.compile(r"\[([^\[\]]+)\]\.?\s*$")
_SHAPE = re.compile(
    r"(?:, )?(?:each )?(?:of )?(?:shape )?(?:\([nmkbqs](?:,| ?[-−+,] ?\w)*\)(?: or )?)+", re.IGNORECASE
)


class Quantity(NamedTuple):
    """One name with one unit; `meaning` and `place` say what the code says, for a message."""

    name: str
    unit: str
    meaning: str
    place: str


def modules() -> list[ModuleType]:
    """Every module of the engine."""
    found = pkgutil.walk_packages(loads.__path__, "loads.")
    return [importlib.import_module(item.name) for item in found]


def quantities() -> list[Quantity]:
    """Every public quantity of the engine."""
    return [quantity for module in modules() for quantity in of_module(module)]


def of_module(module: ModuleType) -> Iterator[Quantity]:
    """Public quantities that a module defines."""
    for name, thing in vars(module).items():
        if name.startswith("_") or getattr(thing, "__module__", "") != module.__name__:
            continue
        place = f"{module.__name__}.{name}"
        if inspect.isclass(thing):
            if issubclass(thing, Record):
                yield from of_record(thing, place)
            elif dataclasses.is_dataclass(thing):
                yield from of_dataclass(thing, place)
            yield from of_members(thing, place)
        elif callable(thing):
            yield from of_docstring(thing.__doc__, "Parameters", place)


def of_record(record: type[Record], place: str) -> Iterator[Quantity]:
    """Fields of a record that hold a typed quantity or a plain number."""
    for name, field in record.model_fields.items():
        if (record.__name__, name) in _NO_QUANTITY:
            continue
        parts = list(within(field.annotation, field.metadata))
        measure = next((part for part in parts if isinstance(part, Measure)), None)
        if measure is not None:
            yield Quantity(name, SI_UNITS[measure.kind] or "–", measure.meaning, place)
        elif float in parts or int in parts:
            yield Quantity(name, "–", field.description or "", place)


def within(annotation: object, metadata: Iterable[object] = ()) -> Iterator[object]:
    """Everything that a type expression consists of."""
    yield annotation
    yield from metadata
    for part in get_args(annotation):
        yield from within(part)
    yield from getattr(annotation, "__metadata__", ())


def of_dataclass(thing: Any, place: str) -> Iterator[Quantity]:
    """Fields of a dataclass that hold numbers."""
    told = {q.name: q for q in of_docstring(thing.__doc__, "Attributes", place, every=True)}
    for field in dataclasses.fields(thing):
        if field.type in _NUMBERS:
            found = told.get(field.name, Quantity(field.name, OF_ITS_KIND, "", place))
            whole = found.unit if field.type != "tuple[float, float]" else _whole_unit(thing, field.name)
            yield found._replace(unit=whole)


def _whole_unit(thing: type, name: str) -> str:
    for names, text in entries(thing.__doc__, "Attributes"):
        if name in names and (unit := _UNIT.search(text)):
            return unit[1]
    return OF_ITS_KIND


def of_members(thing: type, place: str) -> Iterator[Quantity]:
    """Properties with a unit, and parameters of public methods."""
    for name, member in vars(thing).items():
        if name.startswith("_"):
            continue
        if isinstance(member, property):
            text = inspect.getdoc(member) or ""
            if unit := _UNIT.search(text.partition("\n")[0]):
                yield Quantity(name, unit[1], text.partition("\n")[0], place)
        elif callable(member) or isinstance(member, classmethod):
            yield from of_docstring(inspect.getdoc(member), "Parameters", f"{place}.{name}")


def of_docstring(text: str | None, section: str, place: str, *, every: bool = False) -> Iterator[Quantity]:
    """Entries of a section that carry a unit in square brackets; with `every` the others too."""
    for names, meaning in entries(text, section):
        unit = _UNIT.search(meaning)
        if unit is None:
            if every:
                yield from (Quantity(name, OF_ITS_KIND, meaning, place) for name in names)
            continue
        units = unit[1].split(", ")
        shared = units if len(units) == len(names) else [unit[1]] * len(names)
        for name, own in zip(names, shared, strict=True):
            yield Quantity(name, own, meaning[: unit.start()].strip(), place)


def entries(text: str | None, section: str) -> Iterator[tuple[list[str], str]]:
    """Names and text of each entry of a section of a docstring."""
    for title, body in _SECTION.findall(inspect.cleandoc(text or "")):
        if title == section:
            for names, told in _ENTRY.findall(body + "\n"):
                yield names.split(", "), " ".join(told.split())


def rows(page: str) -> list[tuple[str, ...]]:
    """Cells of the table: name, symbol, unit, meaning."""
    lines = [line for line in page.splitlines() if line.startswith("| ")]
    return [tuple(cell.strip() for cell in line.strip("|").split("|")) for line in lines[1:]]


def row_of(quantity: Quantity) -> tuple[str, str, str, str]:
    """Row of a quantity as the code describes it."""
    told = _SHAPE.sub("", _UNIT.sub("", quantity.meaning)).strip(" .,;|")
    meaning = told[:1].upper() + told[1:] if len(told) > 1 else UNTOLD
    return (quantity.name, "–", quantity.unit, meaning.replace("|", "¦"))


def brought_up_to_date(page: str, found: Iterable[Quantity]) -> str:
    """Page with a row for each quantity, those already described as they are."""
    described: dict[tuple[str, str], tuple[str, ...]] = {}
    for quantity in found:
        row = row_of(quantity)
        before = described.get((quantity.name, quantity.unit))
        if before is None or before[3] == UNTOLD:
            described[quantity.name, quantity.unit] = row
    written = {(row[0], row[2]): row for row in rows(page) if row[3] != UNTOLD}
    table = [written.get(key, described[key]) for key in sorted(described)]
    head = page[: page.index("\n|---") + 1].splitlines()
    lines = [*head, "|---|---|---|---|", *(f"| {' | '.join(row)} |" for row in table)]
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    PAGE.write_text(brought_up_to_date(PAGE.read_text(encoding="utf-8"), quantities()), encoding="utf-8")
    untold = [row[0] for row in rows(PAGE.read_text(encoding="utf-8")) if UNTOLD in row]
    sys.stdout.write(f"{PAGE.name} written; without a meaning: {', '.join(untold) or 'none'}\n")
