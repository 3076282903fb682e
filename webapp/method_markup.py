"""HTML of the page of methods: formulas with limits of use, sources with edition and status, cautions."""

from __future__ import annotations

from collections.abc import Sequence

from loads.cautions import ASSUMPTIONS, CAUTIONS, NOT_COUNTED
from loads.method import METHODS
from loads.method_data import MethodGroup
from loads.references import REFERENCES
from webapp.markup import escaped, subheading, table


def cautions() -> str:
    """Every caution, then what the figures rest on and what they leave out."""
    parts = (("Cautions", CAUTIONS), ("Assumptions", ASSUMPTIONS), ("Not counted", NOT_COUNTED))
    return "".join(subheading(title) + _list(sentences) for title, sentences in parts)


def methods() -> str:
    """Every formula, group by group."""
    return subheading("Formulas") + "".join(_group(group) for group in METHODS)


def sources() -> str:
    """Works that the formulas and the check values rest on."""
    cited = {key for group in METHODS for method in group.methods for key in method.sources}
    rows = [
        [
            escaped(key),
            escaped(REFERENCES[key].citation),
            escaped(REFERENCES[key].edition),
            REFERENCES[key].status,
        ]
        for key in sorted(cited)
    ]
    return subheading("Sources of the formulas") + table(
        ("key", "work", "edition", "status"), rows, numeric=set()
    )


def _group(group: MethodGroup) -> str:
    rows = [
        [
            escaped(method.name),
            escaped(method.formula),
            escaped(method.words) + (f"<br><i>{escaped(method.limits)}</i>" if method.limits else ""),
            escaped(", ".join(method.sources)) or "statics",
        ]
        for method in group.methods
    ]
    headings = ("what", "formula", "how it is used, and its limits", "source")
    return subheading(group.title, small=True) + table(headings, rows, numeric=set())


def _list(sentences: Sequence[str]) -> str:
    return "<ul>" + "".join(f"<li>{escaped(sentence)}</li>" for sentence in sentences) + "</ul>"
