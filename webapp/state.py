"""What a session holds and how it changes: plain functions over a mapping, no Streamlit.

A session holds one document (everything as typed). The address holds the same document, packed. A change
goes into the document and from there to the address; an address that the session did not write itself (a
link, Back, reload) goes into the document. What was typed and refused stays in its field, with the reason
beside it.
"""

from __future__ import annotations

import copy
from collections.abc import MutableMapping
from typing import Any

from loads.problems import Problem, ScenarioError
from loads.quantity import read_quantity
from loads.records.scenario import Scenario
from loads.scenario_file import (
    Document,
    parse_document,
    read_file,
    scenario_of,
    write_document,
)
from loads.units import from_si
from webapp.display import System
from webapp.links import LinkError, decode_document, encode_document
from webapp.scenario_files import example_files

Session = MutableMapping[Any, Any]

LEVEL_FIELDS = {"flood_side": "level flood side", "protected_side": "level protected side"}
"""Key of each level's field in the session."""

STEPS: dict[System, tuple[str, str, int]] = {"US": ("0.5", "ft", 2), "SI": ("0.1", "m", 3)}
"""How far a button moves a level: number, unit, decimals of a level written by a button."""


def begin(session: Session, address: str | None) -> None:
    """Give the session a document before any field is drawn.

    The address's, when it holds one that the session did not write; else what it has; on a first visit an
    example.

    Parameters
    ----------
    session
        What the session holds.
    address
        Packed document in the address, or None.
    """
    if address and address != session.get("address"):
        session["address"] = address
        _open_link(session, address)
    if "document" not in session:
        open_document(session, read_file(example_files()[0]))
    settle(session)


def _open_link(session: Session, address: str) -> None:
    try:
        open_document(session, decode_document(address))
    except (LinkError, ScenarioError) as error:
        session["link problem"] = str(error)
    else:
        session.pop("link problem", None)


def settle(session: Session) -> None:
    """Fill the fields of levels and units: for a new document, or when a page without them dropped them."""
    document = session["document"]
    kept = None if session.pop("new document", False) else session.get("system")
    session["system"] = kept or scenario_of(document).units  # written anew for the reason told below
    fresh = session.pop("new levels", False)
    for side, key in LEVEL_FIELDS.items():
        if fresh or key not in session:
            session[key] = typed_level(document, side)
            session["level problems"].pop(side, None)
        else:
            # written anew on every run: a field that stood on another page otherwise opens empty on this one
            session[key] = session[key]


def open_document(session: Session, document: Document) -> None:
    """Hold a new document and forget what belonged to the old one.

    Raises
    ------
    ScenarioError
        The document is no scenario; the session then stays as it was.
    """
    scenario_of(document)
    _hold(session, document)
    session["new document"] = True


def _hold(session: Session, document: Document) -> None:
    session["document"] = document
    session["revision"] = session.get("revision", 0) + 1
    session["level problems"] = {}
    session["new levels"] = True


def open_text(session: Session, data: bytes) -> tuple[Problem, ...]:
    """Open the text of a scenario file; return its problems, none when it is open."""
    try:
        open_document(session, parse_document(data))
    except ScenarioError as error:
        return error.problems
    session.pop("link problem", None)
    return ()


def scenario(session: Session) -> Scenario:
    """Scenario of the session's document."""
    return scenario_of(session["document"])


def typed_level(document: Document, side: str) -> str:
    """Level of a side as typed, "dry" when there is none."""
    value = document["water"].get(side, "dry")
    return str(value["value"]) if isinstance(value, dict) else str(value)


def change_level(session: Session, side: str) -> None:
    """Take what stands in a level's field into the document, or say beside the field why not."""
    typed = str(session[LEVEL_FIELDS[side]]).strip()
    problems: dict[str, str] = session["level problems"]
    if typed == typed_level(session["document"], side):
        problems.pop(side, None)
        return
    changed = with_level(session["document"], side, typed)
    try:
        scenario_of(changed)
    except ScenarioError as error:
        problems[side] = "\n".join(str(problem) for problem in error.problems)
        return
    problems.pop(side, None)
    session["document"] = changed


def with_level(document: Document, side: str, typed: str) -> Document:
    """Copy of a document with another level; its range, source and time belonged to the old one and go."""
    changed = copy.deepcopy(document)
    water = changed["water"]
    if side == "protected_side" and typed.lower() in ("", "dry"):
        water.pop(side, None)
    else:
        water[side] = typed
    water.pop("as_of", None)
    return changed


def move_level(session: Session, side: str, direction: int) -> None:
    """Move a level by one step of the unit shown, up or down."""
    amount, unit, decimals = STEPS[session["system"]]
    typed = str(session[LEVEL_FIELDS[side]])
    document = session["document"]
    if typed.strip() != typed_level(document, side) or typed.strip().lower() == "dry":
        return
    metres = read_quantity(typed, "length")[0] + direction * read_quantity(f"{amount} {unit}", "length")[0]
    session[LEVEL_FIELDS[side]] = f"{from_si(metres, unit, 'length'):.{decimals}f} {unit}"
    change_level(session, side)


def replace_document(session: Session, document: Document) -> tuple[Problem, ...]:
    """Take an edited document; return its problems, none when it was taken."""
    try:
        scenario_of(document)
    except ScenarioError as error:
        return error.problems
    _hold(session, document)
    return ()


def keep_choice(session: Session, key: str, options: list[str]) -> None:
    """Keep a choice that is still on offer, else take the first."""
    if session.get(key) not in options:
        session[key] = options[0]


def packed(session: Session) -> str:
    """Packed document for the address, made anew only when the document has changed.

    Raises
    ------
    LinkError
        The document is too large for a link.
    """
    if session.get("packed document") is not session["document"]:
        session["packed"] = encode_document(session["document"])
        session["packed document"] = session["document"]
    return str(session["packed"])


def as_text(document: Document) -> str:
    """Document as the text of a scenario file."""
    return write_document(document).decode()


def take_text(session: Session, text: str) -> tuple[Problem, ...]:
    """Take an edited scenario text; return its problems, none when it was taken."""
    try:
        document = parse_document(text.encode())
    except ScenarioError as error:
        return error.problems
    return replace_document(session, document)
