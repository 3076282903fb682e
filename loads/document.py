"""The plain document behind a scenario: its canonical bytes, its digest and the short code people read out.

A document is a dictionary of text, numbers, true/false, lists, dictionaries, dates and times of a date.
"""

import datetime as dt
import hashlib
import json
import math
from collections.abc import Mapping

from loads.problems import SillheadError

MAX_DOCUMENT_DEPTH = 32
"""Deepest nesting of lists and tables that is read or written."""

CHECK_CODE_ALPHABET = "23456789ABCDEFGHJKMNPQRSTUVWXYZ"
"""Characters of a check code, without those that are taken for one another (0 O 1 I L)."""


class DocumentError(SillheadError, ValueError):
    """A value that no scenario document can hold, such as nothing, infinity or an endless nest."""


def require_plain(document: object) -> None:
    """Refuse a document that holds anything but plain values.

    Parameters
    ----------
    document
        What was read or is about to be written.

    Raises
    ------
    DocumentError
        Naming the first thing that does not belong.

    Examples
    --------
    >>> require_plain({"levels": [104.6, float("inf")]})
    Traceback (most recent call last):
    ...
    loads.document.DocumentError: inf is not a number that can be kept
    """
    if not isinstance(document, dict):
        raise DocumentError("it is not a table of names and values")
    waiting: list[tuple[object, int]] = [(document, 1)]
    while waiting:
        value, depth = waiting.pop()
        if isinstance(value, dict | list) and depth > MAX_DOCUMENT_DEPTH:
            raise DocumentError(f"it is nested more than {MAX_DOCUMENT_DEPTH} deep")
        if isinstance(value, dict):
            for key in value:
                if not isinstance(key, str):
                    raise DocumentError(f"the name {key!r} is not text")
            waiting.extend((part, depth) for part in value)
            waiting.extend((part, depth + 1) for part in value.values())
        elif isinstance(value, list):
            waiting.extend((part, depth + 1) for part in value)
        else:
            _require_plain_value(value)


def _require_plain_value(value: object) -> None:
    if isinstance(value, float) and not math.isfinite(value):
        raise DocumentError(f"{value} is not a number that can be kept")
    if isinstance(value, str) and not _is_whole_text(value):
        raise DocumentError("a text holds half a character")
    if not isinstance(value, str | bool | int | float | dt.date):
        raise DocumentError(f"a {type(value).__name__} cannot be kept")


def _is_whole_text(value: str) -> bool:
    try:
        value.encode()
    except UnicodeEncodeError:
        return False
    return True


def _date_text(value: object) -> str:
    assert isinstance(value, dt.date)  # a datetime is one too; require_plain has let nothing else pass
    return value.isoformat()


def compact_json(document: Mapping[str, object], *, sort_keys: bool) -> bytes:
    """Shortest JSON of a document, dates as ISO text, UTF-8.

    Parameters
    ----------
    document
        A plain document.
    sort_keys
        True for an order that does not depend on the author, False to keep the author's.

    Returns
    -------
    bytes
        The JSON.

    Raises
    ------
    DocumentError
        When the document is not plain.

    Examples
    --------
    >>> compact_json({"title": "Spring plan", "date": dt.date(2031, 3, 2)}, sort_keys=True)
    b'{"date":"2031-03-02","title":"Spring plan"}'
    """
    require_plain(document)
    text = json.dumps(
        document,
        sort_keys=sort_keys,
        separators=(",", ":"),
        ensure_ascii=False,
        allow_nan=False,
        default=_date_text,
    )
    return text.encode()


def canonical_bytes(document: Mapping[str, object]) -> bytes:
    """Bytes that are the same for every document that says the same, whatever the order of its names.

    Parameters
    ----------
    document
        A plain document.

    Returns
    -------
    bytes
        Compact JSON with sorted names.

    Raises
    ------
    DocumentError
        When the document is not plain.

    Examples
    --------
    >>> canonical_bytes({"b": 1, "a": "2 ft"})
    b'{"a":"2 ft","b":1}'
    """
    return compact_json(document, sort_keys=True)


def input_digest(document: Mapping[str, object]) -> str:
    """Fingerprint of the input, printed with every result so that two prints can be told apart.

    Parameters
    ----------
    document
        A plain document.

    Returns
    -------
    str
        "sha256:" and 64 hexadecimal digits.

    Raises
    ------
    DocumentError
        When the document is not plain.

    Examples
    --------
    >>> input_digest({"b": 1, "a": 2}) == input_digest({"a": 2, "b": 1})
    True
    """
    return "sha256:" + hashlib.sha256(canonical_bytes(document)).hexdigest()


def check_code(digest: str) -> str:
    """Six characters of a digest, short enough to compare over a radio.

    Parameters
    ----------
    digest
        As `input_digest` gives it.

    Returns
    -------
    str
        Four characters, a hyphen, two characters; one of 31⁶ ≈ 887 million codes.

    Raises
    ------
    DocumentError
        When the digest has another form.

    Examples
    --------
    >>> check_code("sha256:" + "0" * 63 + "1")
    '2222-23'
    """
    kind, _, figures = digest.partition(":")
    if kind != "sha256" or len(figures) != 64 or not set(figures) <= set("0123456789abcdef"):
        raise DocumentError(f"{digest!r} is not a digest")
    rest, code = int(figures, 16), ""
    for _ in range(6):
        rest, place = divmod(rest, len(CHECK_CODE_ALPHABET))
        code = CHECK_CODE_ALPHABET[place] + code
    return f"{code[:4]}-{code[4:]}"
