"""One work that a formula or a check value rests on."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, TypeAlias

Status: TypeAlias = Literal["published", "common practice, no source", "from memory, to be confirmed"]

_SEEN_IN = "worked examples as worked in an open companion notebook of the textbook"
_UNSTATED = "not known"


@dataclass(frozen=True, kw_only=True)
class Reference:
    """One work.

    Attributes
    ----------
    key
        How docstrings and tests cite it.
    citation
        Author, title, where it was published, and how its figures were seen when not in the work itself.
    edition
        Edition or year; what is not known is said.
    status
        What the work is worth as a source: published, common practice without a source, or recalled and
        still to be confirmed.
    """

    key: str
    citation: str
    edition: str
    status: Status = "published"


def textbook(key: str, title: str, edition: str = _UNSTATED) -> Reference:
    """Textbook whose worked examples were seen in an open companion notebook."""
    return Reference(key=key, citation=f"{title}; {_SEEN_IN}", edition=edition)
