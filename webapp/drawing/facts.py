"""What the drawings say, as sentences: their text alternative."""

from __future__ import annotations

import math

from loads.assessment import Assessment, Barrier
from loads.checks import SEVERITY, Verdict
from loads.first_limit import FirstLimit
from loads.states import Levels
from webapp.display import System, elevation, pedigree
from webapp.drawing.reading import (
    Reading,
    check_words,
    direction,
    head_text,
    inclined,
    over_top_texts,
    ratio_text,
    reverse_text,
)
from webapp.drawing.wall_facts import wall_facts
from webapp.part_words import bay_groups, numbered, parts_text
from webapp.part_words import first_words as words_of_first

_NIL = 1e-9


def _capital(text: str) -> str:
    return text[:1].upper() + text[1:]


def facts(barrier: Barrier, *, index: int = 0, system: System, datum: str) -> tuple[str, ...]:
    """What the drawing of a barrier says, as sentences.

    Parameters
    ----------
    barrier
        Assessed or withheld.
    index
        The state.
    system, datum
        Units, and datum of the elevations.
    """
    reading = Reading(barrier, index, system, datum)
    sentences = [f"{reading.title}: {reading.verdict}"]
    sentences += [_level_fact(reading, side) for side in ("flood", "protected")]
    sentences += [_capital(text) for text in (*over_top_texts(reading), reverse_text(reading)) if text]
    sentences += wall_facts(reading) if reading.wall else _load_facts(reading)
    sentences += _limit_facts(reading) + _closure_facts(reading)
    return tuple(f"{sentence}." for sentence in sentences)


def _level_fact(reading: Reading, side: str) -> str:
    level, bottom = reading.level(side), reading.foot_level
    if not math.isfinite(level):
        return f"{_capital(side)} side dry"
    head = f"{reading.length(level - bottom)} above" if level > bottom else "not above"
    place = f"{head} the {reading.foot} at {reading.elevation(bottom)}"
    return f"{_capital(side)} side at {reading.elevation(level)}, {place}"


def _load_facts(reading: Reading) -> list[str]:
    if reading.assessed is None:
        return ["The two computations of its load disagree, so force and moment are withheld"]
    resultant, index = reading.assessed.resultant, reading.index
    horizontal, vertical = float(resultant.horizontal[index]), float(resultant.vertical[index])
    moment, acts = float(resultant.moment[index]), float(resultant.line_of_action[index])
    if math.isnan(acts):
        first = "No net horizontal force"
    else:
        rise = acts - reading.face.bottom
        place = f"{reading.length(abs(rise))} {'above' if rise >= 0 else 'below'} the {reading.foot}"
        kind = "horizontal force" if inclined(horizontal, vertical) else "force"
        first = (
            f"Net {kind} {reading.show(abs(horizontal), 'force')} toward the {direction(horizontal)}, "
            f"acting at {reading.elevation(acts)}, {place}"
        )
    said = [first]
    if inclined(horizontal, vertical):
        said.append(
            f"Vertical force {reading.show(abs(vertical), 'force')} {'up' if vertical > 0 else 'down'}"
        )
    if abs(moment) > _NIL:
        said.append(
            f"Moment about the {reading.foot} {reading.show(abs(moment), 'moment')}, turning the top toward "
            f"the {direction(moment)}"
        )
    return said


def _limit_facts(reading: Reading) -> list[str]:
    said = []
    check = reading.check
    if check is not None:
        said.append(
            f"Most pressing: {check_words(reading, check)}, {ratio_text(check, reading.index)} "
            f"(set by: {check.source})"
        )
    elif reading.assessed is not None:
        said.append("No limit entered")
    rated = reading.record.rated_level
    if rated is not None:
        said.append(f"Rated level {reading.elevation(rated.value)} ({pedigree(rated)})")
    first = reading.first_limit
    if first is not None:
        said.append(_first_limit_fact(reading, first))
    return said


def _first_limit_fact(reading: Reading, first: FirstLimit) -> str:
    if first.level is None:
        return f"No load limit is reached up to {reading.elevation(first.ceiling)}"
    if first.without_water:
        return f"The limit of {first_words(reading, first)} is reached without water on the flood side"
    words = f"First-limit level {reading.elevation(first.level)} by {first_words(reading, first)}"
    return f"{words}, a computed screening figure"


def level_text(levels: Levels, index: int, side: str, system: System, datum: str) -> str:
    """Level of one side in words."""
    level = float(levels.of(side)[index])
    return f"{side} side {elevation(level, system, datum)}" if math.isfinite(level) else f"{side} side dry"


def line_facts(assessment: Assessment, *, index: int = 0, system: System) -> tuple[str, ...]:
    """What the drawing of a flood line says, as sentences.

    Parameters
    ----------
    assessment
        All barriers.
    index
        The state.
    system
        Units.
    """
    datum = assessment.scenario.datum
    sentences = [
        f"{_capital(level_text(assessment.levels, index, side, system, datum))}."
        for side in ("flood", "protected")
    ]
    for barrier in assessment.barriers:
        reading = Reading(barrier, index, system, datum)
        parts = [f"{reading.title}: {reading.verdict}"]
        check = reading.check
        if check is not None:
            parts.append(f"{ratio_text(check, index)}, {check_words(reading, check)}")
        parts += [head_text(reading), *over_top_texts(reading)]
        parts += [reverse_text(reading)] if reverse_text(reading) else []
        sentences.append("; ".join(parts) + ".")
    return tuple(sentences)


def first_words(reading: Reading, first: FirstLimit) -> str:
    """Which check reaches its limit first, with the part it is about."""
    return words_of_first(first, reading.record.kind)


def stack_texts(reading: Reading) -> list[str]:
    """How many logs stand in each bay and how high, bays that are alike together."""
    stack = reading.stack
    if stack is None:
        return []
    counts = list(zip(stack.layout.counts, stack.on_hand, strict=True))
    told = []
    for bays in bay_groups(counts):
        placed, on_hand = counts[bays[0] - 1]
        top = stack.layout.sill + placed * stack.layout.log_height
        place = f", top {reading.elevation(top)}" if placed else ", open to the sill"
        told.append(f"{numbered('bay', bays)}: {placed} of {on_hand} logs in place{place}")
    return told


def verdict_texts(reading: Reading) -> list[tuple[Verdict, str]]:
    """Logs and posts of each verdict, the most pressing verdict first."""
    stack = reading.stack
    if stack is None or reading.assessed is None:
        return []
    own = [*stack.layout.log_names, *(post.name for post in stack.posts)]
    verdicts = {name: reading.verdicts.get(name, "not checked") for name in own}
    found = []
    for verdict in reversed(SEVERITY):
        named = [name for name, given in verdicts.items() if given == verdict]
        if named:
            found.append((verdict, parts_text(named)))
    return found


def _closure_facts(reading: Reading) -> list[str]:
    told = [_capital(text) for text in stack_texts(reading)]
    told += [f"{_capital(verdict)}: {names}" for verdict, names in verdict_texts(reading)]
    return told
