"""The field sheet as one HTML page that needs nothing else: style, picture and code stand in it."""

from __future__ import annotations

import datetime as dt
from functools import cache
from pathlib import Path
from typing import Literal

from jinja2 import Environment, FileSystemLoader, StrictUndefined
from markupsafe import Markup

from loads import __version__
from loads.assessment import Assessment, Withheld
from loads.document import check_code, input_digest
from loads.records.closure import Closure
from loads.records.scenario import Scenario
from loads.scenario_file import Document
from webapp.display import System, barrier_title, moment_text
from webapp.drawing.measure import text_width
from webapp.qr import qr_svg
from webapp.sheet.blocks import Parts, blocks, texts_of
from webapp.sheet.boxes import TIMES, boxes
from webapp.sheet.build import build_lines, removal_lines, short_text, water_lines, where_lines
from webapp.sheet.fit import CODE, LABEL, LINE, PICTURE, type_size
from webapp.sheet.lists import tick_items, watch_lines
from webapp.sheet.picture import stack_picture
from webapp.sheet.plan import STAMPS, Plan, SheetError, Stamp, plan_for
from webapp.sheet.strength import (
    first_limit_line,
    load_notes,
    load_table,
    rated_lines,
    remark_texts,
)
from webapp.sheet.words import ELLIPSIS, cut, listed

Paper = Literal["letter", "A4"]
PAPERS: dict[System, Paper] = {"US": "letter", "SI": "A4"}
"""Sheet of each unit system."""

CAUTION = (
    "These figures help planning. They do not say the closure is strong. The O&M manual, local codes and a "
    "licensed engineer decide."
)
_TITLE_EMS, _NAME_EMS, _REMARK_EMS, _REVISION_EMS = 52.0, 76.0, 46.0, 14.0
_HEADINGS = ((22.0, "large"), (36.0, "middle"), (float("inf"), "small"))
_NOTICE = f"texts ending in {ELLIPSIS} are cut short"


@cache
def _environment() -> Environment:
    return Environment(
        loader=FileSystemLoader(Path(__file__).parent / "templates"),
        autoescape=True,
        undefined=StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )


def sheet_html(
    assessment: Assessment,
    closure_id: str,
    document: Document,
    *,
    stamp: Stamp = "draft",
    link: str | None = None,
    paper: Paper | None = None,
    now: dt.datetime | None = None,
) -> str:
    """Field sheet of one closure.

    Parameters
    ----------
    assessment
        Of the document; its first state is now.
    closure_id
        Of a closure.
    document
        What was computed, for the check code.
    stamp
        What the sheet is for; every sheet has a stamp.
    link
        Frozen link that the code on the sheet opens.
    paper
        "letter" or "A4"; by the unit system when None.
    now
        Time of printing, from which ages are told; none is told without it.

    Returns
    -------
    str
        The same for the same input.

    Raises
    ------
    SheetError
        There is no such closure, or no such stamp.
    """
    parts = sheet_parts(assessment, closure_id, document, stamp=stamp, link=link, paper=paper, now=now)
    return set_in(parts, type_size(blocks(parts), parts["paper"]))


def sheet_parts(
    assessment: Assessment,
    closure_id: str,
    document: Document,
    *,
    stamp: Stamp,
    link: str | None,
    paper: Paper | None,
    now: dt.datetime | None,
) -> Parts:
    """Everything that the template of a sheet needs but the size of its type; as `sheet_html`."""
    if stamp not in STAMPS:
        raise SheetError(f'a sheet is stamped {", ".join(STAMPS[:-1])} or {STAMPS[-1]}, not "{stamp}"')
    scenario = assessment.scenario
    plan = plan_for(assessment, closure_id)
    closure = plan.closure if isinstance(plan, Plan) else plan.record
    assert isinstance(closure, Closure)
    if now is not None and scenario.water.as_of is not None:
        now = now.astimezone(scenario.water.as_of.tzinfo)
    parts = {**_head(scenario, closure, document, stamp, now), **_every_sheet(scenario, closure, plan, link)}
    parts |= _withheld(plan) if isinstance(plan, Withheld) else _computed(plan, scenario, now)
    parts["paper"] = paper or PAPERS[scenario.units]
    return parts | _style(parts)


def set_in(parts: Parts, size: float) -> str:
    """Sheet in one size of type. [pt]."""
    html = _environment().get_template("sheet.html").render(parts, size=f"{size:g}")
    assert isinstance(html, str)
    return html


def _head(
    scenario: Scenario, closure: Closure, document: Document, stamp: Stamp, now: dt.datetime | None
) -> Parts:
    revision = cut(scenario.revision, _REVISION_EMS)
    return {
        "id": closure.id,
        "title": cut(barrier_title(closure.id, closure.name), _NAME_EMS),
        "stamp": stamp.upper(),
        "scenario_title": cut(scenario.title, _TITLE_EMS),
        "code": check_code(input_digest(document)),
        "version": f"version {revision}" if revision else "version ________",
        "program": f"Sillhead {__version__}",
        "printed": f"printed {moment_text(now)}" if now else "time of printing not stated",
    }


def _every_sheet(scenario: Scenario, closure: Closure, plan: Plan | Withheld, link: str | None) -> Parts:
    braced = closure.post is not None and closure.post.brace is not None
    items = tick_items(posts=closure.bay_count - 1, braced=braced)
    half = (len(items) + 1) // 2
    picture = qr_svg(link) if link else None
    return {
        "where": where_lines(scenario, closure),
        "watch": watch_lines(plan if isinstance(plan, Plan) else None),
        "ticks": (items[:half], items[half:]),
        "remove": removal_lines(closure),
        "short": short_text(closure),
        "code_picture": Markup(picture) if picture else None,  # noqa: S704  built from modules only
        "link_notice": "link too long for a code: open the scenario file" if link and not picture else "",
        "caution": CAUTION,
        "times": TIMES,
    }


def _computed(plan: Plan, scenario: Scenario, now: dt.datetime | None) -> Parts:
    remarks = remark_texts(plan)
    return {
        "withheld": (),
        "boxes": boxes(plan, scenario, now),
        "water": water_lines(plan, scenario),
        "build": build_lines(plan),
        "picture": Markup(stack_picture(plan)),  # noqa: S704  built and escaped by webapp.drawing.svg
        "limit": [*rated_lines(plan), first_limit_line(plan)],
        "loads": load_table(plan),
        "load_notes": load_notes(plan),
        "remarks": listed(remarks, _REMARK_EMS, "more on its page") if remarks else "",
    }


def _withheld(found: Withheld) -> Parts:
    """A withheld closure: the word, and what was entered."""
    rated = found.record.rated_level
    return {
        "withheld": (
            "The two computations of this closure disagree, so this sheet gives no figure for it.",
            "Use no figure of this closure from anywhere. Call the engineer.",
            f"Rated level as entered: {rated.text}." if rated else "No rated level entered.",
        ),
        "remarks": "",
    }


def _style(parts: Parts) -> Parts:
    """What the style needs, and the notice that something was cut short."""
    ems = text_width(parts["title"], 1.0, bold=True)
    notices = [_NOTICE] if any(ELLIPSIS in text for text in texts_of(parts)) else []
    notices += [parts["link_notice"]] if parts["link_notice"] else []
    return {
        "notice": "; ".join(notices),
        "title_size": next(name for most, name in _HEADINGS if ems <= most),
        "line": LINE,
        "picture_width": PICTURE[0],
        "picture_height": PICTURE[1],
        "code_side": CODE,
        "label_width": LABEL,
    }
