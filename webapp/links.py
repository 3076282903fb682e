"""The frozen link: a whole scenario document packed into one address parameter, nothing kept on a server.

The packed text is `1.` and the base64url of six check bytes followed by the brotli-compressed JSON.
The check bytes (start of the SHA-256 of the compressed part) are there because brotli has none of its own:
without them one letter changed on the way could open as another level.
"""

import base64
import binascii
import hashlib
import json
import re
from collections.abc import Mapping

import brotli

from loads.document import DocumentError, compact_json, require_plain
from loads.problems import SillheadError

LINK_VERSION = 1
MAX_LINK_CHARACTERS = 60_000
MAX_DOCUMENT_BYTES = 1_000_000
CHECK_BYTES = 6

_DAMAGED = "this link is damaged: {}; ask for it again, or open the scenario file instead"


class LinkError(SillheadError):
    """A frozen link that cannot be made or opened; the message is for the person who tried."""


def encode_document(document: Mapping[str, object]) -> str:
    """Packed text of a document, for the address.

    Parameters
    ----------
    document
        A plain document; dates become ISO text, names keep their order.

    Returns
    -------
    str
        Letters, digits, `-`, `_` and one `.` only.

    Raises
    ------
    LinkError
        When the document is not plain, or too large for a link.

    Examples
    --------
    >>> decode_document(encode_document({"title": "Spring plan", "format": 1}))
    {'title': 'Spring plan', 'format': 1}
    """
    try:
        content = compact_json(document, sort_keys=False)
    except DocumentError as error:
        raise LinkError(f"no link can be made of this scenario: {error}") from error
    if len(content) > MAX_DOCUMENT_BYTES:
        raise LinkError(
            f"this scenario has {len(content):,} bytes, and a link can hold {MAX_DOCUMENT_BYTES:,}; "
            "share the scenario file instead"
        )
    packed = brotli.compress(content, quality=11, mode=brotli.MODE_TEXT)
    text = f"{LINK_VERSION}." + base64.urlsafe_b64encode(_check_bytes(packed) + packed).rstrip(b"=").decode()
    if len(text) > MAX_LINK_CHARACTERS:
        raise LinkError(_too_long(len(text)) + "; share the scenario file instead")
    return text


def decode_document(text: str) -> dict[str, object]:
    """Document held in a packed text; anything that is not exactly what was packed is refused.

    Line breaks and blanks, which mail programs put into long addresses, are passed over.

    Parameters
    ----------
    text
        The value of the address parameter.

    Returns
    -------
    dict
        The document, not yet checked as a scenario.

    Raises
    ------
    LinkError
        When the text is damaged, too long, too large once unpacked, or of a newer format.

    Examples
    --------
    >>> decode_document("7.AAAA")
    Traceback (most recent call last):
    ...
    webapp.links.LinkError: this link was made by a newer Sillhead (link version 7); this one reads version 1
    """
    if len(text) > MAX_LINK_CHARACTERS:
        raise LinkError(_too_long(len(text)))
    text = "".join(text.split())
    version = re.match(r"([1-9][0-9]{0,5})\.", text, re.ASCII)
    if version is None:
        raise LinkError(_DAMAGED.format("its beginning is missing"))
    if int(version[1]) > LINK_VERSION:
        raise LinkError(
            f"this link was made by a newer Sillhead (link version {version[1]}); "
            f"this one reads version {LINK_VERSION}"
        )
    content = _unpacked(_packed_bytes(text[version.end() :]))
    return _document(content)


def _too_long(characters: int) -> str:
    return f"this link has {characters:,} characters, and at most {MAX_LINK_CHARACTERS:,} are read"


def _check_bytes(packed: bytes) -> bytes:
    return hashlib.sha256(packed).digest()[:CHECK_BYTES]


def _packed_bytes(text: str) -> bytes:
    try:
        content = base64.b64decode(text + "=" * (-len(text) % 4), altchars=b"-_", validate=True)
    except (binascii.Error, ValueError) as error:
        raise LinkError(
            _DAMAGED.format("it holds characters that do not belong, or was cut short")
        ) from error
    checked, packed = content[:CHECK_BYTES], content[CHECK_BYTES:]
    if checked != _check_bytes(packed):
        raise LinkError(_DAMAGED.format("part of it was changed or cut off on the way"))
    return packed


def _unpacked(packed: bytes) -> bytes:
    decompressor = brotli.Decompressor()
    content, piece = b"", packed
    try:
        while not decompressor.is_finished():
            more = decompressor.process(piece, output_buffer_limit=MAX_DOCUMENT_BYTES + 1 - len(content))
            piece, content = b"", content + more
            if len(content) > MAX_DOCUMENT_BYTES:
                raise LinkError(
                    f"this link unpacks to more than the {MAX_DOCUMENT_BYTES:,} bytes that are read"
                )
            if not more and not decompressor.is_finished():
                raise LinkError(_DAMAGED.format("its end is missing"))
    except brotli.error as error:
        raise LinkError(_DAMAGED.format("it cannot be unpacked")) from error
    return content


def _document(content: bytes) -> dict[str, object]:
    try:
        document = json.loads(content, parse_constant=_refuse_constant, object_pairs_hook=_table)
        require_plain(document)
    except (ValueError, RecursionError) as error:
        reason = str(error) if isinstance(error, DocumentError) else "what it holds is not a scenario"
        raise LinkError(_DAMAGED.format(reason)) from error
    assert isinstance(document, dict)
    return document


def _refuse_constant(name: str) -> float:
    raise DocumentError(f"{name} is not a number that can be kept")


def _table(pairs: list[tuple[str, object]]) -> dict[str, object]:
    table = dict(pairs)
    if len(table) != len(pairs):
        raise DocumentError("a name stands in it twice")
    return table
