"""The program's own source as trees, and what a rule looks for in them."""

from __future__ import annotations

import ast
import re
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

import loads

ROOT = Path(loads.__file__).parents[1]
PACKAGES = ("loads", "webapp")

_PROMISE = re.compile(r"\b(safe|approved|certified|guaranteed)\b|\bOK\b", re.IGNORECASE)
_NEGATION = re.compile(r"\b(not|never|no|nor|nothing|nobody)\b[^.;]*$", re.IGNORECASE)
_CONTAINERS = (ast.List, ast.Dict, ast.Set, ast.ListComp, ast.DictComp, ast.SetComp)
_CONTAINER_CALLS = {"list", "dict", "set", "defaultdict", "Counter", "deque", "OrderedDict", "bytearray"}
_CHANGES = {
    *("append", "extend", "insert", "remove", "pop", "popitem", "clear", "update", "setdefault", "add"),
    *("discard", "sort", "reverse", "appendleft"),
}
_EVALUATING_MODULES = {
    "pickle",
    "cPickle",
    "dill",
    "shelve",
    "marshal",
    "joblib",
    "cloudpickle",
    "jsonpickle",
}
_EVALUATING_CALLS = {"eval", "exec", "compile", "__import__"}


@dataclass(frozen=True)
class Module:
    """One source file."""

    name: str
    lines: int
    tree: ast.Module


def modules_of(*folders: str) -> list[Module]:
    """Every source file below folders of the repository."""
    paths = sorted(path for folder in folders for path in (ROOT / folder).rglob("*.py"))
    assert paths
    return [module_of(path.read_text(encoding="utf-8"), str(path.relative_to(ROOT))) for path in paths]


def module_of(text: str, name: str = "module") -> Module:
    """One source text."""
    return Module(name=name, lines=len(text.splitlines()), tree=ast.parse(text))


def function_lengths(tree: ast.Module) -> Iterator[tuple[str, int]]:
    """Lines of each function's body without its docstring."""
    for node in ast.walk(tree):
        if isinstance(node, ast.FunctionDef | ast.AsyncFunctionDef):
            body = node.body[1:] if ast.get_docstring(node) is not None else node.body
            if body:
                yield node.name, (body[-1].end_lineno or 0) - body[0].lineno + 1


def shown_strings(tree: ast.Module) -> Iterator[tuple[int, str]]:
    """Every text of a program that is no docstring and no description of a name."""
    silent = {
        id(node.value)
        for node in ast.walk(tree)
        if isinstance(node, ast.Expr) and isinstance(node.value, ast.Constant)
    }
    for node in ast.walk(tree):
        if isinstance(node, ast.JoinedStr):
            parts = [part.value for part in node.values if isinstance(part, ast.Constant)]
            silent |= {id(part) for part in node.values}
            yield node.lineno, " … ".join(str(part) for part in parts)
    for node in ast.walk(tree):
        if isinstance(node, ast.Constant) and isinstance(node.value, str) and id(node) not in silent:
            yield node.lineno, node.value


def promises(text: str) -> bool:
    """Whether a text says that something holds, unless it says so in the negative."""
    plain = re.sub(r"\|\s*safe\b", "", text)  # a template's word for markup that is escaped already
    return any(not _NEGATION.search(plain[: found.start()]) for found in _PROMISE.finditer(plain))


def kept_state(tree: ast.Module) -> Iterator[tuple[int, str]]:
    """What a module keeps and changes: globals written, containers that are no constants or are changed."""
    own = set()
    for statement in tree.body:
        names = _bound(statement)
        own |= set(names)
        if _is_container(getattr(statement, "value", None)):
            yield from (
                (statement.lineno, f"{name} is no constant")
                for name in names
                if name not in {name.upper(), "__all__"}
            )
    for node in ast.walk(tree):
        if isinstance(node, ast.Global):
            yield node.lineno, f"global {', '.join(node.names)}"
        elif isinstance(node, ast.expr | ast.stmt) and (changed := _changed(node)) in own:
            yield node.lineno, f"{changed} is changed"


def _bound(statement: ast.stmt) -> list[str]:
    """Names that a statement gives a value."""
    if isinstance(statement, ast.Assign):
        return [target.id for target in statement.targets if isinstance(target, ast.Name)]
    if isinstance(statement, ast.AnnAssign) and isinstance(statement.target, ast.Name):
        return [statement.target.id]
    return []


def _is_container(value: ast.AST | None) -> bool:
    if isinstance(value, ast.Call) and isinstance(value.func, ast.Name):
        return value.func.id in _CONTAINER_CALLS
    return isinstance(value, _CONTAINERS)


def _changed(node: ast.AST) -> str:
    """Name of what a statement changes in place."""
    parts: list[ast.expr] = []
    if isinstance(node, ast.Assign):
        parts = [part for part in node.targets if isinstance(part, ast.Subscript | ast.Attribute)]
    elif isinstance(node, ast.AugAssign | ast.AnnAssign) and not isinstance(node.target, ast.Name):
        parts = [node.target]
    elif isinstance(node, ast.Delete):
        parts = [part for part in node.targets if not isinstance(part, ast.Name)]
    elif isinstance(node, ast.Call) and isinstance(node.func, ast.Attribute) and node.func.attr in _CHANGES:
        parts = [node.func]
    for part in parts:
        inner: ast.expr = part
        while isinstance(inner, ast.Subscript | ast.Attribute):
            inner = inner.value
        if isinstance(inner, ast.Name):
            return inner.id
    return ""


def evaluations(tree: ast.Module) -> Iterator[tuple[int, str]]:
    """Imports and calls that turn data into program."""
    for node in ast.walk(tree):
        if isinstance(node, ast.Import | ast.ImportFrom):
            imported = [alias.name for alias in node.names]
            names = imported if isinstance(node, ast.Import) else [node.module or ""]
            roots = {name.split(".")[0] for name in names}
            yield from ((node.lineno, f"import {name}") for name in sorted(roots & _EVALUATING_MODULES))
        elif (
            isinstance(node, ast.Call)
            and isinstance(node.func, ast.Name)
            and node.func.id in _EVALUATING_CALLS
        ):
            yield node.lineno, f"{node.func.id}()"
