"""The record base, and field types that read typed quantities."""

from __future__ import annotations

import difflib
import re
from collections.abc import Mapping
from dataclasses import dataclass
from datetime import date, datetime
from typing import Annotated, Any

from pydantic import BaseModel, ConfigDict, StringConstraints
from pydantic_core import PydanticCustomError, core_schema

from loads.quantity import Quantity, UnreadableQuantityError, read_quantity, with_unit_of
from loads.units import EXAMPLES, units_of

_PEDIGREE_KEYS = ("value", "low", "high", "source", "date")
_SOURCE_LIMIT = 300


class Record(BaseModel):
    """Frozen, keyword-only, no unknown keys, no silent conversion of types."""

    model_config = ConfigDict(frozen=True, extra="forbid", strict=True, arbitrary_types_allowed=True)


def problem_error(rule: str) -> PydanticCustomError:
    """Build the error that carries one rule in the words of the file's reader."""
    return PydanticCustomError("rule", "{rule}", {"rule": rule})


def several_problems(problems: list[tuple[str, str, str]]) -> PydanticCustomError:
    """Build one error that carries several problems, each (path within the record, value, rule)."""
    return PydanticCustomError("rules", "several problems", {"problems": problems})


def nearest_key(key: str, known: list[str]) -> str:
    """End of the sentence about an unknown key: the nearest known one, or the list of them."""
    close = difflib.get_close_matches(key, known, n=1, cutoff=0.6)
    return f'did you mean "{close[0]}"?' if close else "known keys here are " + ", ".join(known)


def read_date(value: object) -> date | None:
    """Day of a pedigree, from a TOML date or ISO text."""
    if value is None:
        return None
    if isinstance(value, datetime):
        return value.date()
    if isinstance(value, date):
        return value
    if isinstance(value, str) and re.fullmatch(r"\d{4}-\d\d-\d\d", value):
        try:
            return date.fromisoformat(value)
        except ValueError:
            pass
    raise problem_error("has a date that is no calendar day; write year-month-day, for example 2030-03-02")


@dataclass(frozen=True, kw_only=True)
class Measure:
    """Field type: a typed quantity of one kind within a range.

    Attributes
    ----------
    kind
        Kind of quantity.
    meaning
        What the field is, for forms, schema and nomenclature.
    above, least, most
        Range as typed text: more than `above`, not less than `least`, not more than `most`.
    example
        Text that a message or an empty form shows.
    """

    kind: str
    meaning: str
    above: str = ""
    least: str = ""
    most: str = ""
    example: str = ""

    def read(self, raw: object) -> Quantity:
        """Read what was typed, alone or with its pedigree.

        Raises
        ------
        PydanticCustomError
            With the rule that is broken.
        """
        if not isinstance(raw, Mapping):
            return self._checked(raw, {})
        unknown = [str(key) for key in raw if key not in _PEDIGREE_KEYS]
        if unknown:
            raise problem_error(
                f"has an unknown key {unknown[0]!r}; {nearest_key(unknown[0], list(_PEDIGREE_KEYS))}"
            )
        if "value" not in raw:
            raise problem_error(f'has no "value"; write for example {{ value = "{self._example()}" }}')
        return self._checked(raw["value"], raw)

    def _checked(self, text: object, pedigree: Mapping[str, object]) -> Quantity:
        value, unit = self._number(text)
        ends = {}
        for end in ("low", "high"):
            ends[end] = self._number(pedigree[end])[0] if end in pedigree else value
        if not ends["low"] <= value <= ends["high"]:
            raise problem_error("must lie between its low and its high")
        source = pedigree.get("source", "")
        if not isinstance(source, str) or len(source) > _SOURCE_LIMIT:
            raise problem_error(f"has a source that is not a text of at most {_SOURCE_LIMIT} characters")
        return Quantity(
            text=str(text).strip(),
            kind=self.kind,
            unit=unit,
            value=value,
            low=ends["low"],
            high=ends["high"],
            source=source,
            dated=read_date(pedigree.get("date")),
            low_text=str(pedigree.get("low", "")),
            high_text=str(pedigree.get("high", "")),
        )

    def _number(self, text: object) -> tuple[float, str]:
        if isinstance(text, (int, float)) and not isinstance(text, bool):
            example = with_unit_of(self._example(), str(text))
            raise problem_error(f'needs a unit, in quotes, for example "{example}"')
        if not isinstance(text, str):
            raise problem_error(f'must be a text with a number and a unit, for example "{self._example()}"')
        try:
            value, unit = read_quantity(text, self.kind, self._example())
        except UnreadableQuantityError as error:
            raise problem_error(str(error)) from None
        above = self.above and read_quantity(self.above, self.kind)[0]
        least = self.least and read_quantity(self.least, self.kind)[0]
        most = self.most and read_quantity(self.most, self.kind)[0]
        low_ok = (above == "" or value > float(above)) and (least == "" or value >= float(least))
        if not low_ok or (most != "" and value > float(most)):
            raise problem_error(f"it must be {self._range()}")
        return value, unit

    def _example(self) -> str:
        return self.example or EXAMPLES[self.kind]

    def _range(self) -> str:
        if self.above and self.most:
            return f"more than {self.above} and not more than {self.most}"
        if self.above:
            return f"more than {self.above}"
        if self.least and self.most:
            number, unit = self.least.split(" ", 1)
            low = number if self.most.endswith(f" {unit}") else self.least
            return f"between {low} and {self.most}"
        return f"not less than {self.least}" if self.least else f"not more than {self.most}"

    def __get_pydantic_core_schema__(self, _source: object, _handler: object) -> core_schema.CoreSchema:
        """Tell pydantic to read the field with `read`."""
        return core_schema.no_info_plain_validator_function(self.read)

    def __get_pydantic_json_schema__(self, _schema: object, _handler: object) -> dict[str, Any]:
        """Describe the field for the exported JSON schema."""
        text: dict[str, Any] = {
            "type": "string",
            "pattern": r"^\s*[+\-−]?[0-9.].*[^0-9.\s].*$",
            "examples": [self._example()],
        }
        pedigree = {
            "type": "object",
            "additionalProperties": False,
            "required": ["value"],
            "properties": {
                "value": text,
                "low": text,
                "high": text,
                "source": {"type": "string", "maxLength": _SOURCE_LIMIT},
                "date": {"type": "string", "format": "date"},
            },
        }
        limits = f" It must be {self._range()}." if self.above or self.least or self.most else ""
        units = ", ".join(units_of(self.kind))
        return {
            "anyOf": [text, pedigree],
            "description": f"{self.meaning}.{limits} Unit: one of {units}.",
        }


def line(limit: int) -> object:
    """Field type of a text of one line and at most `limit` characters."""
    return StringConstraints(strict=True, max_length=limit, pattern=r"^[^\x00-\x1f\x7f]*$")


Name = Annotated[str, line(120)]
Note = Annotated[str, line(300)]
