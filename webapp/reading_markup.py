"""HTML of one reading: the level with its range, and every link of the chain that leads to it."""

from __future__ import annotations

import math

from loads.reading import LevelReading
from loads.reading_chain import Link
from webapp.display import PRINT_DIGITS, System, elevation, moment_text, show
from webapp.markup import escaped, subheading, table
from webapp.reading_levels import NoLevel, figures_of

_ELEVATIONS = ("zero_elevation", "sensor_elevation", "instrument_elevation", "level")
_MARKS = {"entered": "entered", "assumed": "<b>assumed</b>", "computed": "=&nbsp;computed"}


def answer_part(found: LevelReading | NoLevel, system: System, datum: str) -> str:
    """Level with its range in large figures, and the remarks."""
    if isinstance(found, NoLevel):
        return f'<div class="sh-caution">{escaped(found.reason)}</div>'
    remarks = "".join(f"<li>{escaped(remark)}</li>" for remark in found.remarks)
    return headline(found, system, datum) + (f"<ul>{remarks}</ul>" if remarks else "")


def chain_part(found: LevelReading, system: System) -> str:
    """Every link of the chain, as a table on a desk and as cards on a phone."""
    return (
        subheading("From the reading to the level")
        + f'<div class="sh-wide">{chain_table(found, system)}</div>{chain_cards(found, system)}'
    )


def headline(found: LevelReading, system: System, datum: str) -> str:
    """Level, its two ranges and the head, in large figures."""
    reading = found.reading
    when = f", {moment_text(reading.as_of)}" if reading.as_of else ", no time entered"
    head = "what the staff shows" if reading.kind == "staff" else "head above the sensor"
    figures = [
        (_level_words(found, system), f"level in {datum}, {reading.side} side{when}"),
        (_range(found.worst.low[0], found.worst.high[0], system), found.worst.method),
        (_range(found.quadrature.low[0], found.quadrature.high[0], system), found.quadrature.method),
        (show(float(found.head[0]), "length", system, 4), head),
    ]
    if found.dry[0]:
        figures = figures[:1]
    cells = "".join(f"<div><b>{figure}</b><span>{escaped(words)}</span></div>" for figure, words in figures)
    return f'<div class="sh-big">{cells}</div>'


def _level_words(found: LevelReading, system: System) -> str:
    if found.dry[0]:
        return "sensor dry"
    return "no data" if found.no_data[0] else elevation(float(found.level[0]), system)


def _range(low: float, high: float, system: System) -> str:
    if low == high:
        return "not known"
    ends = [elevation(float(end), system) if math.isfinite(end) else "not known" for end in (low, high)]
    return " to ".join(ends)


def chain_table(found: LevelReading, system: System) -> str:
    """Every link of the chain in a row: meaning, symbol, value, low, high, how it came, source and date."""
    rows = [
        [
            escaped(link.meaning),
            escaped(link.symbol),
            *_figures(found, link, system),
            _mark(link),
            escaped(_source(link)),
        ]
        for link in found.links
    ]
    headings = ("what it is", "symbol", "value", "low", "high", "how", "formula or source, date")
    return table(headings, rows, numeric={2, 3, 4})


def chain_cards(found: LevelReading, system: System) -> str:
    """Every link of the chain as a card, for a phone."""
    return f'<div class="sh-cards">{"".join(_card(found, link, system) for link in found.links)}</div>'


def _card(found: LevelReading, link: Link, system: System) -> str:
    value, low, high = _figures(found, link, system)
    band = f"{low} to {high}" if (low, high) != ("–", "–") else "no range"
    return (
        f'<div class="sh-card"><b>{escaped(link.symbol)}</b><span class="figure">{value}</span>'
        f"<small>{escaped(link.meaning)}</small>"
        f'<small class="right">{band}</small><small>{escaped(_source(link))}</small>'
        f'<small class="right">{_mark(link)}</small></div>'
    )


def _figures(found: LevelReading, link: Link, system: System) -> list[str]:
    figures = figures_of(found, link)
    if link.name == "level" and found.dry[0]:
        return ["sensor dry", "–", "–"]
    kind = "elevation" if link.name in _ELEVATIONS else link.kind
    if figures[1] == figures[2]:
        figures = (figures[0], math.nan, math.nan)
    return [show(value, kind, system, PRINT_DIGITS) if math.isfinite(value) else "–" for value in figures]


def _mark(link: Link) -> str:
    typed = f"<br><small>{escaped(link.text)}</small>" if link.text else ""
    return _MARKS[link.basis] + typed


def _source(link: Link) -> str:
    words = link.source or "no source stated"
    return f"{words}, {link.dated.isoformat()}" if link.dated else words
