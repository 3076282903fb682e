"""Link and file name of a field sheet."""

from __future__ import annotations

import re
from collections.abc import Mapping
from urllib.parse import urlencode

from webapp.links import encode_document

ADDRESS = "s"
"""Parameter of an address that holds the packed document."""


def link_at(base: str, document: Mapping[str, object]) -> str:
    """Frozen link of a document at the address of a server.

    Raises
    ------
    LinkError
        The document is too large for a link.

    Examples
    --------
    >>> link_at("https://flood.example/", {"title": "T"}).startswith("https://flood.example/?s=1.")
    True
    """
    return f"{base.rstrip('?')}?{urlencode({ADDRESS: encode_document(document)})}"


def file_name(closure_id: str, code: str, ending: str) -> str:
    """File name of a sheet: letters, digits and hyphens only.

    Examples
    --------
    >>> file_name("C7 <north>", "9GR8-K6", "pdf")
    'sillhead-C7-north-9GR8-K6.pdf'
    """
    plain = re.sub("[^A-Za-z0-9]+", "-", closure_id).strip("-")
    return f"sillhead-{plain or 'closure'}-{code}.{ending}"
