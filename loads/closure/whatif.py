"""What would be carried with one brace or one post lost: computed apart, never mixed into the checks."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

import numpy as np

from loads.check_table import Checks, CheckTable
from loads.checks import Verdict
from loads.closure.assess import AssessedClosure
from loads.closure.demands import Demands, demands_on
from loads.closure.layout import Indices, Layout
from loads.closure.tables import part_tables


@dataclass(frozen=True, kw_only=True)
class WhatIf:
    """One loss and what it does.

    Attributes
    ----------
    name
        "brace lost" or "post lost".
    part
        What is lost, for example "brace of post 2".
    words
        What is assumed and what follows, in plain words.
    stands
        False when the part cannot carry anything at all without it.
    checks
        Of the parts that are affected, most pressing first; none when nothing stands.
    demands
        Forces behind them; None when nothing stands.
    """

    name: str
    part: str
    words: str
    stands: bool
    checks: Checks
    demands: Demands | None

    def verdict(self, index: int = 0) -> Verdict:
        """Most pressing verdict of one state; "above limit" when nothing stands."""
        return self.checks.verdict(index) if self.stands else "above limit"


def what_ifs(barrier: AssessedClosure) -> tuple[WhatIf, ...]:
    """Loss of one brace and of one post, for the first post of each kind."""
    return (*_braces(barrier), *_posts(barrier))


def _distinct(layout: Layout) -> list[int]:
    """First post of each kind, by what it and its neighbours take."""
    posts = layout.posts
    first: dict[object, int] = {}
    for number, post in enumerate(posts):
        ends = (number == 0, number == len(posts) - 1)
        first.setdefault((post.pieces, ends), number)
    return list(first.values())


def _braces(barrier: AssessedClosure) -> Iterator[WhatIf]:
    structure = barrier.structure
    if structure.prop is None:
        return
    pieces: set[object] = set()
    for number in _distinct(structure.layout):
        post = structure.layout.posts[number]
        if post.pieces in pieces:
            continue
        pieces.add(post.pieces)
        part = f"brace of {post.name}"
        if structure.prop.fixity == "pinned":
            words = (
                f"Without its brace {post.name} cannot stand: its base is entered as a pin, which holds no "
                "moment."
            )
            yield WhatIf(
                name="brace lost", part=part, words=words, stands=False, checks=Checks(()), demands=None
            )
            continue
        bare = demands_on(replace(structure, prop=None), barrier.diagram)
        own = _only(bare, logs=np.zeros(0, dtype=np.intp), posts=np.array([number]))
        was, now = barrier.demands.posts.base_moment[:, number], own.posts.base_moment[:, 0]
        words = (
            f"{post.name} stands on its base plate alone, as a cantilever"
            + _times(float(was[0]), float(now[0]), "moment at the base")
            + "."
        )
        checks = Checks(part_tables(own, barrier.basis, _near(barrier)))
        yield WhatIf(name="brace lost", part=part, words=words, stands=True, checks=checks, demands=own)


def _posts(barrier: AssessedClosure) -> Iterator[WhatIf]:
    structure = barrier.structure
    for number in _distinct(structure.layout):
        layout = _without(structure.layout, number)
        lost = demands_on(replace(structure, layout=layout), barrier.diagram)
        logs = np.flatnonzero(layout.bay_of == number)
        beside = np.array(
            [post for post in (number - 1, number) if 0 <= post < len(layout.posts)], dtype=np.intp
        )
        own = _only(lost, logs=logs, posts=beside)
        spans, old = layout.spans, structure.layout.spans
        growth = float((spans[number] / max(old[number], old[number + 1])) ** 2)
        words = (
            f"The logs of bays {number + 1} and {number + 2} lose their bearing at "
            f"{structure.layout.posts[number].name} and fall unless they reach across both bays; such logs "
            f"would carry {growth:.2g} times the bending moment, and the posts beside them more."
        )
        tables = [_renamed(table, number) for table in part_tables(own, barrier.basis, _near(barrier))]
        yield WhatIf(
            name="post lost",
            part=structure.layout.posts[number].name,
            words=words,
            stands=True,
            checks=Checks(tables),
            demands=own,
        )


def _without(layout: Layout, number: int) -> Layout:
    """Layout with the two bays beside a post as one, as high as the higher of their stacks."""
    clear, counts = list(layout.clear), list(layout.counts)
    joined = clear[number] + layout.bearing + layout.strip + clear[number + 1]
    clear[number : number + 2] = [joined]
    counts[number : number + 2] = [max(counts[number : number + 2])]
    return replace(layout, clear=tuple(clear), counts=tuple(counts))


def _renamed(table: CheckTable, number: int) -> CheckTable:
    """Names as they are with the post in place: the joined bay by both, posts beyond it by their own."""

    def name(subject: str) -> str:
        words = subject.split()
        if words[0] == "bay":
            return f"bays {number + 1} and {number + 2}, log {words[3]}"
        if words[0] == "post" and int(words[1]) > number:
            return f"post {int(words[1]) + 1}"
        return subject

    return replace(table, subjects=tuple(name(subject) for subject in table.subjects))


def _only(demands: Demands, *, logs: Indices, posts: Indices) -> Demands:
    """Some columns of demands."""
    return replace(
        demands,
        log_columns=demands.log_columns[logs],
        post_columns=demands.post_columns[posts],
        logs=replace(demands.logs, **{name: value[:, logs] for name, value in vars(demands.logs).items()}),
        posts=replace(
            demands.posts, **{name: value[:, posts] for name, value in vars(demands.posts).items()}
        ),
        anchors=replace(
            demands.anchors, **{name: value[:, posts] for name, value in vars(demands.anchors).items()}
        ),
    )


def _times(was: float, now: float, what: str) -> str:
    if was == 0 or now == 0:
        return ""
    return f": the {what} becomes {abs(now / was):.2g} times what it was"


def _near(barrier: AssessedClosure) -> float:
    return barrier.search.near
