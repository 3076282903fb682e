"""The methods data and the list of references fit each other, the docstrings and the tests."""

from __future__ import annotations

import ast
import re
from collections.abc import Iterator
from pathlib import Path

from loads.method import METHODS
from loads.references import REFERENCES

ROOT = Path(__file__).parents[1]
CITATION = re.compile(r"(?<![\w`])\[([A-Z][A-Za-z]*\d*)\]")
SYMBOLS = {"K", "Pa", "N", "T", "V", "M"}
"""Units and other words that stand in brackets in docstrings."""


def trees(*folders: str) -> Iterator[tuple[Path, ast.Module]]:
    for folder in folders:
        for path in sorted((ROOT / folder).rglob("*.py")):
            yield path, ast.parse(path.read_text(encoding="utf-8"))


def docstring_keys() -> dict[str, Path]:
    """Keys in docstrings, those under constants among them."""
    found: dict[str, Path] = {}
    for path, tree in trees("loads", "webapp"):
        for node in ast.walk(tree):
            constant = node.value if isinstance(node, ast.Expr) else None
            if isinstance(constant, ast.Constant) and isinstance(constant.value, str):
                found |= {key: path for key in CITATION.findall(constant.value) if key not in SYMBOLS}
    return found


def marker_keys() -> dict[str, Path]:
    """Keys of the source markers of the tests."""
    found: dict[str, Path] = {}
    for path, tree in trees("tests"):
        for node in ast.walk(tree):
            if isinstance(node, ast.Call) and isinstance(node.func, ast.Attribute):
                first = node.args[0] if node.args else None
                if node.func.attr == "source" and isinstance(first, ast.Constant):
                    found[str(first.value)] = path
    return found


def method_keys() -> set[str]:
    return {key for group in METHODS for method in group.methods for key in method.sources}


def test_every_cited_key_is_in_the_list_of_references() -> None:
    cited = docstring_keys() | marker_keys() | dict.fromkeys(method_keys(), ROOT / "loads" / "method.py")
    unknown = {key: str(path.relative_to(ROOT)) for key, path in cited.items() if key not in REFERENCES}
    assert not unknown


def test_every_reference_is_cited_by_a_method_a_docstring_or_a_test() -> None:
    cited = set(docstring_keys()) | set(marker_keys()) | method_keys()
    assert sorted(set(REFERENCES) - cited) == []


def test_the_sources_of_formulas_are_named_where_methods_are_listed() -> None:
    """What a docstring of the engine cites for a formula, the page of methods cites too."""
    cited = {key for key, path in docstring_keys().items() if path.parent.name == "loads"}
    assert sorted(cited - method_keys()) == []


def test_no_two_methods_share_a_name_and_each_is_whole() -> None:
    methods = [method for group in METHODS for method in group.methods]
    assert len({method.name for method in methods}) == len(methods)
    for method in methods:
        assert method.formula
        assert method.words.endswith(".")
        assert not method.limits.endswith(".")
