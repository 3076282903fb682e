"""The tools find nothing, the code keeps to its bounds, and what the README says is there is there."""

from __future__ import annotations

import ast
import importlib.util
import re
import shutil
import subprocess
import sys
import tomllib
from collections.abc import Callable, Iterator
from pathlib import Path

import click
import pytest

from loads import __version__
from tests import source
from tests.source import PACKAGES, ROOT, modules_of
from webapp.cli import main

MODULE_LINES, FUNCTION_LINES, PAGE_LINES = 300, 40, 80
TOP_LEVEL = {
    "README.md",
    "DEVELOPERS.md",
    "pyproject.toml",
    "Dockerfile",
    "webapp",
    "loads",
    "tests",
    "scenarios",
}
README = (ROOT / "README.md").read_text(encoding="utf-8")


def run(*command: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(command, cwd=ROOT, capture_output=True, text=True, encoding="utf-8", check=False)


def test_tools_are_of_this_environment() -> None:
    assert Path(sys.prefix) in Path(sys.executable).parents


@pytest.mark.parametrize(
    ("module", "command"),
    [
        ("ruff", ("-m", "ruff", "check", "--no-fix", "--output-format", "concise", ".")),
        ("ruff", ("-m", "ruff", "format", "--check", ".")),
        ("mypy", ("-m", "mypy")),
        ("importlinter", ("-c", "from importlinter.cli import lint_imports_command; lint_imports_command()")),
    ],
    ids=["ruff check", "ruff format", "mypy", "lint-imports"],
)
def test_the_tool_finds_nothing(module: str, command: tuple[str, ...]) -> None:
    if importlib.util.find_spec(module) is None:
        pytest.skip(f"{module} is not installed; it comes with: pip install --editable '.[test]'")
    result = run(sys.executable, *command)
    assert result.returncode == 0, f"{result.stdout[-6000:]}\n{result.stderr[-2000:]}"


def test_modules_functions_and_pages_are_short() -> None:
    long = [
        f"{module.name} has {module.lines} lines"
        for module in modules_of(*PACKAGES)
        if module.lines > MODULE_LINES
    ]
    long += [
        f"{module.name}, {function} has {lines} lines"
        for module in modules_of(*PACKAGES)
        for function, lines in source.function_lengths(module.tree)
        if lines > FUNCTION_LINES
    ]
    long += [
        f"{module.name} has {module.lines} lines"
        for module in modules_of("webapp/views")
        if module.lines > PAGE_LINES
    ]
    assert not long, "\n".join(long)


def test_nothing_that_is_shown_promises_strength() -> None:
    shown = [
        (module.name, line, text)
        for module in modules_of(*PACKAGES)
        for line, text in source.shown_strings(module.tree)
    ]
    shown += [
        (str(path.relative_to(ROOT)), number, line)
        for pattern in ("**/*.html", "**/*.svg")
        for path in sorted((ROOT / "webapp").glob(pattern))
        for number, line in enumerate(path.read_text(encoding="utf-8").splitlines(), 1)
    ]
    promises = [f"{name}:{line}: {text}" for name, line, text in shown if source.promises(text)]
    assert not promises, "\n".join(promises)


def test_pages_keep_nothing_between_sessions() -> None:
    scripts = {"webapp/main.py", *(module.name for module in modules_of("webapp/views"))}
    kept = [
        f"{module.name}:{line}: {what}"
        for module in modules_of("webapp")
        if module.name not in scripts  # a script starts anew with each run
        for line, what in source.kept_state(module.tree)
    ]
    assert not kept, "\n".join(kept)


def test_nothing_is_unpickled_or_evaluated() -> None:
    found = [
        f"{module.name}:{line}: {what}"
        for module in modules_of("loads", "webapp", "tests")
        for line, what in source.evaluations(module.tree)
    ]
    assert not found, "\n".join(found)


@pytest.mark.parametrize(
    ("rule", "text", "found"),
    [
        (source.kept_state, "visits = []", "visits is no constant"),
        (source.kept_state, "SEEN: dict[str, int] = {}\ndef f(): SEEN['a'] = 1", "SEEN is changed"),
        (source.kept_state, "SEEN = set()\ndef f(): SEEN.add(1)", "SEEN is changed"),
        (source.kept_state, "COUNT = 0\ndef f():\n    global COUNT", "global COUNT"),
        (source.kept_state, "PLACE = make()\ndef f(): PLACE.seen.append(1)", "PLACE is changed"),
        (source.evaluations, "import pickle", "import pickle"),
        (source.evaluations, "from joblib.x import load", "import joblib"),
        (source.evaluations, "eval(text)", "eval()"),
    ],
)
def test_the_rules_can_say_no(
    rule: Callable[[ast.Module], Iterator[tuple[int, str]]], text: str, found: str
) -> None:
    assert found in [what for _, what in rule(source.module_of(text).tree)]


@pytest.mark.parametrize(
    ("text", "broken"),
    [
        ("The wall is safe.", True),
        ("Approved for use", True),
        ("verdict: OK", True),
        ("It never says that a barrier is safe or approved", False),
        ("No level is guaranteed", False),
        ("This is not sure. The panel is certified", True),
        ("{{ text | safe }}", False),
        ("safely, unsafe, look, a token", False),
    ],
)
def test_promises_are_told_from_their_negation(text: str, broken: bool) -> None:
    assert source.promises(text) is broken


def test_what_is_shown_is_told_from_what_is_said_to_programmers() -> None:
    text = '"""Doc."""\nX = "shown"\n"""Said of X."""\ndef f():\n    """Doc."""\n    return f"a {X} b"\n'
    assert [shown for _, shown in source.shown_strings(source.module_of(text).tree)] == ["a  …  b", "shown"]


def test_lengths_are_counted_without_the_docstring() -> None:
    text = 'def f():\n    """Doc.\n\n    More.\n    """\n    a = 1\n    return a\n'
    assert list(source.function_lengths(source.module_of(text).tree)) == [("f", 2)]


def test_the_top_level_holds_nothing_else() -> None:
    if shutil.which("git") is None or not (ROOT / ".git").exists():
        pytest.skip("this tree is no git checkout, so what belongs to it is not known")
    listed = run("git", "ls-files", "--cached", "--others", "--exclude-standard")
    assert listed.returncode == 0, listed.stderr
    top = {line.split("/")[0] for line in listed.stdout.splitlines()}
    assert {name for name in top if not name.startswith(".")} <= TOP_LEVEL


@pytest.mark.parametrize("heading", ["Run it", "Test it"])
def test_the_readme_has_one_command_under_each_heading(heading: str) -> None:
    sections = re.findall(rf"^## {heading}\n(.*?)(?=^## |\Z)", README, re.DOTALL | re.MULTILINE)
    assert len(sections) == 1
    blocks = re.findall(r"^```\w*\n(.*?)^```", sections[0], re.DOTALL | re.MULTILINE)
    assert len(blocks) == 1
    assert len([line for line in blocks[0].splitlines() if line.strip()]) == 1
    assert sections[0].lstrip().startswith("```"), "the command comes first"


def test_the_version_is_the_same_everywhere() -> None:
    assert (
        tomllib.loads((ROOT / "pyproject.toml").read_text(encoding="utf-8"))["project"]["version"]
        == __version__
    )


def options_of(command: click.Command) -> set[str]:
    return {text for parameter in command.params for text in (*parameter.opts, *parameter.secondary_opts)}


def test_every_command_and_option_of_the_readme_exists() -> None:
    prose = re.sub(r"^```.*?^```", "", README, flags=re.DOTALL | re.MULTILINE)
    spans = [(line, span) for line in prose.splitlines() for span in re.findall(r"`([^`]+)`", line)]
    named = {match[1] for _, span in spans if (match := re.match(r"sillhead (\w+)", span))}
    assert named == set(main.commands), "the README names every command and no other"
    options = {
        (line, option)
        for line, span in spans
        if not span.startswith(("docker", "pip", "apt-get"))
        for option in re.findall(r"(?<![\w-])--?[a-z][\w-]*", span)
    }
    assert options
    for line, option in options:
        row = re.match(r"\| `sillhead (\w+)", line)
        commands = [main.commands[row[1]]] if row else list(main.commands.values())
        assert any(option in options_of(command) for command in commands), f"{option} in: {line}"


def test_every_option_has_its_help() -> None:
    for name, command in main.commands.items():
        assert command.help, name
        for parameter in command.params:
            assert not isinstance(parameter, click.Option) or parameter.help, f"{name} {parameter.name}"
