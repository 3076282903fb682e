"""Names of many parts of a closure in few words: "logs 1–3 of bays 1–3"."""

from __future__ import annotations

import re
from collections import defaultdict
from collections.abc import Iterable, Sequence

from loads.checks import Check
from loads.first_limit import FirstLimit

_LOG = re.compile(r"bay (\d+) log (\d+)")
_POST = re.compile(r"post (\d+)")
_MEMBER = re.compile(r", (stem|heel|toe)$")


def log_place(part: str) -> tuple[int, int] | None:
    """Bay and place from the sill of a log, None for any other part.

    Examples
    --------
    >>> log_place("bay 2 log 10"), log_place("post 1")
    ((2, 10), None)
    """
    found = _LOG.fullmatch(part)
    return (int(found[1]), int(found[2])) if found else None


def class_of(part: str) -> str:
    """What kind of part a name is for: "log", "post", or the name itself.

    Examples
    --------
    >>> class_of("bay 1 log 4"), class_of("post 2"), class_of("left guide")
    ('log', 'post', 'left guide')
    """
    if _LOG.fullmatch(part):
        return "log"
    return "post" if _POST.fullmatch(part) else part


def numbered(word: str, numbers: Iterable[int]) -> str:
    """Numbers with their word, runs of them shortened.

    Examples
    --------
    >>> numbered("bay", [1, 2, 3, 5]), numbered("log", [4])
    ('bays 1–3, 5', 'log 4')
    """
    ordered = sorted(set(numbers))
    runs: list[list[int]] = []
    for number in ordered:
        if runs and runs[-1][1] == number - 1:
            runs[-1][1] = number
        else:
            runs.append([number, number])
    told = [str(a) if a == b else f"{a}{', ' if b == a + 1 else '–'}{b}" for a, b in runs]
    return f"{word}{'s' if len(ordered) > 1 else ''} {', '.join(told)}"


def parts_text(parts: Iterable[str]) -> str:
    """Parts in few words; bays whose logs are alike are named together.

    Examples
    --------
    >>> parts_text(["bay 1 log 1", "bay 2 log 1", "post 1", "left guide"])
    'log 1 of bays 1, 2; post 1; left guide'
    """
    logs: dict[int, set[int]] = defaultdict(set)
    posts: list[int] = []
    others: list[str] = []
    for part in parts:
        place, post = log_place(part), _POST.fullmatch(part)
        if place:
            logs[place[0]].add(place[1])
        elif post:
            posts.append(int(post[1]))
        elif part not in others:
            others.append(part)
    alike: dict[frozenset[int], list[int]] = defaultdict(list)
    for bay, rows in sorted(logs.items()):
        alike[frozenset(rows)].append(bay)
    told = [f"{numbered('log', rows)} of {numbered('bay', bays)}" for rows, bays in alike.items()]
    return "; ".join([*told, *([numbered("post", posts)] if posts else []), *others])


def bay_groups(keys: Sequence[object]) -> list[tuple[int, ...]]:
    """Bays that are alike, counted from 1, in order.

    Parameters
    ----------
    keys
        What tells bays apart, one for each bay.

    Examples
    --------
    >>> bay_groups([8.0, 8.0, 6.0])
    [(1, 2), (3,)]
    """
    groups: dict[object, list[int]] = defaultdict(list)
    for bay, key in enumerate(keys, 1):
        groups[key].append(bay)
    return [tuple(bays) for bays in groups.values()]


def check_title(check: Check, kind: str) -> str:
    """Name of a check with the part it is about; of a whole barrier of a kind the name alone."""
    return _titled(check.subject, check.name, kind)


def _titled(subject: str, name: str, kind: str) -> str:
    member = _MEMBER.search(subject) if kind == "wall" else None
    if member:
        return f"{member[1]} {name}"
    return name if subject.startswith(kind) else f"{subject} {name}"


def first_words(first: FirstLimit, kind: str) -> str:
    """Check that reaches its limit first, with the part it is about."""
    return _titled(first.subject, first.check, kind)
