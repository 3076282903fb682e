"""One formula as data, and formulas that belong together."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, kw_only=True)
class Method:
    """One formula.

    Attributes
    ----------
    name
        What it gives.
    formula
        In symbols.
    words
        What the symbols are and how it is used here.
    sources
        Keys of `loads.references.REFERENCES`; empty for plain statics and definitions.
    limits
        Range within which it is used.
    """

    name: str
    formula: str
    words: str
    sources: tuple[str, ...] = ()
    limits: str = ""


@dataclass(frozen=True, kw_only=True)
class MethodGroup:
    """Formulas that belong together."""

    title: str
    methods: tuple[Method, ...]
