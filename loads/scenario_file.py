"""Scenario files: reading TOML into a document and a document into a scenario, and writing it back.

A *document* is the plain mapping of the file, with everything as typed. A *scenario* is the validated record
made from it. Editing changes the document; nothing typed is ever rewritten.
"""

from __future__ import annotations

import tomllib
from collections import Counter
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import Any

import tomli_w
from pydantic import ValidationError

from loads.problems import Problem, ScenarioError
from loads.records.base import Record, nearest_key
from loads.records.scenario import FORMAT, Scenario

Document = dict[str, Any]

MAX_FILE_BYTES = 1_000_000
BARRIER_KEYS = ("panel", "closure", "wall", "i_wall")
"""Tables of the file that hold barriers; their ids share one space."""
_SHOWN = 40
_VERBS = ("belongs", "has", "is", "must", "needs", "would")


def parse_document(data: bytes) -> Document:
    """Read TOML text into a document.

    Raises
    ------
    ScenarioError
        Too large a file, not UTF-8, or not TOML.
    """
    if len(data) > MAX_FILE_BYTES:
        raise _too_large(len(data))
    try:
        document = tomllib.loads(data.decode("utf-8-sig").replace("\r\n", "\n"))
        if not _holds_vast_number(document):
            return document
        rule = "holds a whole number of more than 18 digits"
    except UnicodeDecodeError:
        rule = "is not UTF-8 text; save it as a plain text file"
    except tomllib.TOMLDecodeError as error:
        rule = f"is not a scenario file (TOML): {error}"
    except ValueError:  # from int(), for thousands of digits
        rule = "holds a whole number of more than 18 digits"
    except RecursionError:
        rule = "is nested too deeply to be a scenario file"
    raise ScenarioError([Problem(path="the file", value="", rule=rule)]) from None


def _too_large(size: int) -> ScenarioError:
    rule = f"is {size:,} bytes long; a scenario file may have at most {MAX_FILE_BYTES:,}".replace(",", " ")
    return ScenarioError([Problem(path="the file", value="", rule=rule)])


def _holds_vast_number(document: Document) -> bool:
    waiting: list[object] = [document]
    while waiting:
        value = waiting.pop()
        if isinstance(value, dict):
            waiting.extend(value.values())
        elif isinstance(value, list):
            waiting.extend(value)
        elif isinstance(value, int) and abs(value) >= 10**18:
            return True
    return False


def read_file(path: Path) -> Document:
    """Read a scenario file into a document.

    Raises
    ------
    ScenarioError
        The file cannot be read, or is not TOML.
    """
    try:
        with path.open("rb") as stream:
            data = stream.read(MAX_FILE_BYTES + 1)
        if len(data) > MAX_FILE_BYTES:
            raise _too_large(path.stat().st_size)
    except OSError as error:
        rule = f"cannot be read: {error.strerror or error}"
        raise ScenarioError([Problem(path=f"the file {path}", value="", rule=rule)]) from None
    return parse_document(data)


def write_document(document: Document) -> bytes:
    """Write a document as TOML; reading it back gives the same document."""
    return tomli_w.dumps(document).encode()


def scenario_of(document: Mapping[str, Any]) -> Scenario:
    """Validate a document.

    Raises
    ------
    ScenarioError
        With every problem at once, each with its path in the file's words.
    """
    version = document.get("format")
    if isinstance(version, int) and not isinstance(version, bool) and version > FORMAT:
        rule = f"this Sillhead reads formats up to {FORMAT}; open the file with a newer one"
        raise ScenarioError([Problem(path="format", value=str(version), rule=rule)])
    problems = _id_problems(document)
    try:
        scenario = Scenario.model_validate(document)
    except ValidationError as error:
        problems = _problems(error, document) + problems
    if problems:
        raise ScenarioError(problems)
    return scenario


def _id_problems(document: Mapping[str, Any]) -> list[Problem]:
    barriers = [item for kind in BARRIER_KEYS for item in _listed(document.get(kind))]
    if not barriers:
        rule = "has no barrier; add at least one, under [[panel]], [[closure]], [[wall]] or [[i_wall]]"
        return [Problem(path="the scenario", value="", rule=rule)]
    readings = _listed(document.get("reading"))
    return _used_twice(barriers, "barrier") + _used_twice(readings, "reading")


def _used_twice(records: Sequence[Mapping[str, Any]], what: str) -> list[Problem]:
    counts = Counter(item["id"] for item in records if isinstance(item.get("id"), str))
    return [
        Problem(
            path="id",
            value=_shown(name),
            rule=f"it is used {count} times; every {what} needs an id of its own",
        )
        for name, count in counts.items()
        if count > 1
    ]


def _listed(value: object) -> list[Mapping[str, Any]]:
    return [item for item in value if isinstance(item, Mapping)] if isinstance(value, (list, tuple)) else []


def _problems(error: ValidationError, document: Mapping[str, Any]) -> list[Problem]:
    problems: list[Problem] = []
    for item in error.errors(include_url=False):
        loc = [part for part in item["loc"] if not (isinstance(part, str) and part.startswith("function-"))]
        where = _path(loc, document)
        if item["type"] == "rules":
            problems += [
                Problem(path=_joined(where, path), value=value, rule=_clause(value, rule))
                for path, value, rule in item["ctx"]["problems"]
            ]
        else:
            problems.append(Problem(path=where, **_wording(item, loc)))
    return problems


def _joined(where: str, path: str) -> str:
    return f"{where}{path}" if not where or path.startswith("[") else f"{where}.{path}"


def _path(loc: Sequence[int | str], document: Mapping[str, Any]) -> str:
    text = ""
    here: Any = document
    for part in loc:
        if isinstance(part, int):
            here = here[part] if isinstance(here, (list, tuple)) and part < len(here) else None
            name = here.get("id") if isinstance(here, Mapping) else None
            text += f"[{_shortened(name)}]" if isinstance(name, str) and name else f"[{part}]"
        else:
            here = here.get(part) if isinstance(here, Mapping) else None
            text += f".{part}" if text else str(part)
    return text


def _shortened(text: str) -> str:
    return text if len(text) <= _SHOWN else text[:_SHOWN] + "…"


def _shown(value: object) -> str:
    if isinstance(value, Mapping):
        return _shown(value["value"]) if "value" in value else "a table"
    if isinstance(value, (list, tuple)):
        return "a list"
    return f'"{_shortened(value)}"' if isinstance(value, str) else _shortened(str(value))


def _wording(item: Any, loc: Sequence[int | str]) -> dict[str, str]:
    kind, context = item["type"], item.get("ctx", {})
    if kind == "missing":
        return {"value": "", "rule": "is missing"}
    if kind == "extra_forbidden":
        return {"value": "", "rule": f"is not a known key; {nearest_key(str(loc[-1]), _known_keys(loc))}"}
    if kind == "rule":
        rule = str(context["rule"])
        value = "" if rule.startswith(("has ", "is ")) else _shown(item["input"])
        return {"value": value, "rule": _clause(value, rule)}
    if kind in ("literal_error", "enum"):
        return {"value": _shown(item["input"]), "rule": f"it must be {context['expected']}"}
    return {"value": _shown(item["input"]), "rule": _general_rule(kind, item["msg"], context)}


def _clause(value: str, rule: str) -> str:
    """Rule as it follows the value in a sentence."""
    return f"it {rule}" if value and rule.split(" ", 1)[0] in _VERBS else rule


def _general_rule(kind: str, message: str, context: Mapping[str, Any]) -> str:
    rules = {
        "datetime_type": "it must be a date and time with a zone, for example 2031-04-02T06:00:00-05:00",
        "string_type": "it must be a text in quotes",
        "float_type": "it must be a plain number without a unit",
        "int_type": "it must be a whole number",
        "finite_number": "it must be a finite number",
        "model_type": "it must be a table",
        "tuple_type": "it must be a list",
        "string_pattern_mismatch": "it must be one line of text",
        "greater_than_equal": "it must be at least {ge}",
        "greater_than": "it must be more than {gt}",
        "less_than_equal": "it must be at most {le}",
        "less_than": "it must be less than {lt}",
        "string_too_long": "it may have at most {max_length} characters",
        "string_too_short": "it must not be empty",
        "too_short": "it needs at least {min_length}",
        "too_long": "it may have at most {max_length}",
    }
    bounds = {name: f"{bound:g}" if isinstance(bound, float) else bound for name, bound in context.items()}
    return rules[kind].format(**bounds) if kind in rules else message[:1].lower() + message[1:]


def _known_keys(loc: Sequence[int | str]) -> list[str]:
    """Keys that the record at the parent of `loc` knows."""
    record: Any = Scenario
    for part in loc[:-1]:
        if isinstance(part, int) or not (isinstance(record, type) and issubclass(record, Record)):
            continue
        record = _record_within(record.model_fields[str(part)].annotation)
    return list(record.model_fields) if isinstance(record, type) and issubclass(record, Record) else []


def _record_within(annotation: Any) -> Any:
    if isinstance(annotation, type) and issubclass(annotation, Record):
        return annotation
    for argument in getattr(annotation, "__args__", ()):
        found = _record_within(argument)
        if found is not None:
            return found
    return None
