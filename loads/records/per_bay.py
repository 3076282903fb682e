"""Field type of whole numbers that hold for every bay, or bay by bay."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from pydantic_core import core_schema

from loads.records.base import problem_error


@dataclass(frozen=True, kw_only=True)
class WholeNumbers:
    """Field type: one whole number for every bay, or a list with one for each.

    Attributes
    ----------
    meaning
        What the field is, for forms and schema.
    least, most
        Range of every number.
    """

    meaning: str
    least: int
    most: int

    def read(self, raw: object) -> int | tuple[int, ...]:
        """Read what was typed.

        Raises
        ------
        PydanticCustomError
            With the rule that is broken.
        """
        if isinstance(raw, (list, tuple)):
            if not raw:
                raise problem_error("must name at least one bay")
            return tuple(self._number(item) for item in raw)
        return self._number(raw)

    def _number(self, raw: object) -> int:
        if not isinstance(raw, int) or isinstance(raw, bool):
            raise problem_error("must be a whole number, or a list with one for each bay")
        if not self.least <= raw <= self.most:
            raise problem_error(f"must be between {self.least} and {self.most}")
        return raw

    def __get_pydantic_core_schema__(self, _source: object, _handler: object) -> core_schema.CoreSchema:
        """Tell pydantic to read the field with `read`."""
        return core_schema.no_info_plain_validator_function(self.read)

    def __get_pydantic_json_schema__(self, _schema: object, _handler: object) -> dict[str, Any]:
        """Describe the field for the exported JSON schema."""
        number: dict[str, Any] = {"type": "integer", "minimum": self.least, "maximum": self.most}
        return {
            "anyOf": [number, {"type": "array", "items": number, "minItems": 1}],
            "description": f"{self.meaning}. One number for every bay, or a list with one for each.",
        }


def for_each_bay(value: int | tuple[int, ...], bays: int) -> tuple[int, ...]:
    """Numbers bay by bay.

    Examples
    --------
    >>> for_each_bay(8, 3), for_each_bay((8, 6, 8), 3)
    ((8, 8, 8), (8, 6, 8))
    """
    return value if isinstance(value, tuple) else (value,) * bays
