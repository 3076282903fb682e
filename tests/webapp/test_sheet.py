"""The field sheet, read back from the real PDF and opened in a real browser without a network."""

from __future__ import annotations

import datetime as dt
import io
import re
from functools import cache
from pathlib import Path
from typing import Any

import pypdf
import pytest
import segno
from playwright.sync_api import Browser

from loads import __version__
from loads.assessment import AssessedClosure, assess
from loads.diagram import Diagram
from loads.document import check_code, input_digest
from loads.load import Load, Setting, sediment_loads, water_loads
from loads.scenario_file import Document, read_file, scenario_of
from tests.lines import SCENARIOS
from tests.webapp import test_apptest as pages
from tests.webapp.sheet_cases import BARE, CROWDED, LONG, PLAIN, changed
from tests.webapp.test_package import FORBIDDEN, plain
from webapp.links import decode_document
from webapp.parts import ADDRESS as PAGE_ADDRESS
from webapp.pdf import PrintJob, render
from webapp.print_worker import PrintWorker
from webapp.sheet import PAPERS, SheetError, sheet_html, sheet_job
from webapp.sheet.fit import SIZES
from webapp.sheet.link import ADDRESS, link_at
from webapp.sheet.lists import CALL, LEAVE, tick_items
from webapp.sheet.page import CAUTION

BASE = "https://flood.example/"
NOW = dt.datetime(2031, 4, 2, 12, 10, tzinfo=dt.UTC)
MEDIA = {"letter": (612, 792), "A4": (595.28, 841.89)}


def closure_ids(document: Document) -> list[str]:
    return [str(closure["id"]) for closure in document.get("closure", [])]


def html_of(document: Document, closure_id: str = "", **options: Any) -> str:
    chosen = closure_id or closure_ids(document)[0]
    return sheet_html(assess(scenario_of(document)), chosen, document, **options)


def job_of(document: Document, closure_id: str = "", **options: Any) -> PrintJob:
    chosen = closure_id or closure_ids(document)[0]
    return sheet_job(assess(scenario_of(document)), chosen, document, **options)


def reader_of(content: bytes) -> pypdf.PdfReader:
    return pypdf.PdfReader(io.BytesIO(content))


def said(document: Document, closure_id: str = "", **options: Any) -> str:
    """Text of the one page of a printed sheet, without spaces."""
    (page,) = reader_of(render(job_of(document, closure_id, **options))).pages
    return plain(page.extract_text())


@cache
def plain_sheet() -> str:
    return said(PLAIN, stamp="exercise", link=link_at(BASE, PLAIN), now=NOW)


SHEETS = [(path, closure_id) for path in SCENARIOS for closure_id in closure_ids(read_file(path))]


@pytest.mark.usefixtures("pango")
@pytest.mark.parametrize(("units", "paper"), [("US", "letter"), ("SI", "A4")])
@pytest.mark.parametrize("document", [PLAIN, BARE, *CROWDED.values()], ids=["plain", "bare", *CROWDED])
def test_it_is_one_page_however_long_the_texts_are(document: Document, paper: str, units: str) -> None:
    document = {**document, "units": units}
    content = render(job_of(document, paper=paper, link=link_at(BASE, document), now=NOW))
    (page,) = reader_of(content).pages
    size = (float(page.mediabox.width), float(page.mediabox.height))
    assert size == pytest.approx(MEDIA[paper], abs=0.1)
    text = plain(page.extract_text())
    for words in (CAUTION, "sheet 1 of 1", check_code(input_digest(document)), *CALL, *LEAVE, "DRAFT"):
        assert plain(words) in text
    assert text.count("sheet1of1") == 2


@pytest.mark.usefixtures("pango")
@pytest.mark.parametrize(("path", "closure_id"), SHEETS, ids=lambda value: getattr(value, "stem", value))
def test_every_closure_of_the_examples_has_a_sheet_in_twelve_points(path: Path, closure_id: str) -> None:
    document = read_file(path)
    job = job_of(document, closure_id, link=link_at(BASE, document), now=NOW)
    assert len(reader_of(render(job)).pages) == 1
    sizes = [size_of(html) for html in (job.html, *job.smaller)]
    fitting = next(
        size
        for size, html in zip(sizes, (job.html, *job.smaller), strict=True)
        if len(reader_of(render(PrintJob(html=html, created=job.created))).pages) == 1
    )
    assert fitting >= 12


def size_of(html: str) -> float:
    found = re.search(r"body \{ font: ([\d.]+)pt", html)
    assert found
    return float(found[1])


def test_the_paper_goes_with_the_units() -> None:
    assert PAPERS == {"US": "letter", "SI": "A4"}
    for units, paper in PAPERS.items():
        assert f"size: {paper};" in html_of({**PLAIN, "units": units})


@pytest.mark.usefixtures("pango")
def test_every_field_is_on_it() -> None:
    """438.30 + 1.0 + 1.0 = 440.30; (440.30 − 437.40)/0.50 = 5.8, so 6 logs to 440.40 ft."""
    text = plain_sheet()
    for words in (
        "K-1 · Lower street",
        "EXERCISE",
        "Trial of the lower street",
        check_code(input_digest(PLAIN)),
        f"Sillhead {__version__}",
        "Issued",
        "replaces",
        "Fit now 6 of 14 logs in each bay, 3 bays top 440.40 ft 3.00 ft (3 ft 0 in) above sill",
        "Water now 438.30 ft 0.90 ft (about 0 ft 11 in) above sill",
        "2 Apr 2031 06:00 UTC−05:00",
        "70 min old when printed",
        "Call engineer at 442.40 ft",
        "1 ft below rated level 443.40 ft engineer of record, 2 Mar 2030",
        *("Owner told at", "Call out by", "Start by", "Closed by", "Staff reads"),
        "Lower street at the race",
        "Store 2, key at the gate",
        "Flood side 438.30 ft, staff at the race, 2 Apr 2031.",
        "Protected side dry. Water 438.30 − sill 437.40 = 0.90 ft above it, datum trial datum.",
        "Top asked for: 438.30 + allowance 1.00 + freeboard 1.00 = 440.30 ft.",
        "2 posts, 2 braces, bolts of each post: 2 in tension and 4 in shear",
        "Log 62 lb, 2 people, 31.0 lb each (limit 51 lb).",
        "Crew 4, lift: forklift, 3 min a log.",
        "Logs CAN be added from the protected side, last chance 439.90 ft.",
        "Rated level 443.40 ft, 6.00 ft (6 ft 0 in) above sill; engineer of record, 2 Mar 2030.",
        "water at 442.40 ft",
        "Not before the river is at",
        "one clamp away for repair.",
        "printed 2 Apr 2031 07:10 UTC−05:00",
        *tick_items(posts=2, braced=True),
    ):
        assert plain(words) in text, words
    assert not FORBIDDEN.search(text)


@pytest.mark.usefixtures("pango")
def test_loads_are_those_of_a_pocket_calculator() -> None:
    """At the rated level, 6.0 ft on the sill: ½·62.4·6² = 1 123 lb/ft and 8 ft of it on a post.

    Without a brace its base takes 62.4·6³/6·8 = 17 971 lb·ft. The bottom log, centre 5.75 ft deep, carries
    62.4·5.75·0.5·8²/8 = 1 435 lb·ft, more than the 1 300 entered: at h ft it carries 62.4·(h − 0.25)·0.5·8,
    which is 1 300 at h = 5.458 ft, level 442.86 ft.
    """
    document = changed({"post": {}, "anchor": None, "handling": None})
    text = said(document)
    row = "443.40 ft rated level 1 120 lb/ft 8 990 lb 18.0 kip·ft above limit"
    assert plain(row) in text
    assert plain("438.30 ft now 25.3 lb/ft 202 lb 60.7 lb·ft") in text
    level = 437.40 + 1300 / (62.4 * 0.5 * 8) + 0.25
    assert (
        plain(f"First-limit level {level:.2f} ft (bay 1 log 1 bending moment): computed, for screening")
        in text
    )
    assert "14logsineachbay;above444.40" in text


@pytest.mark.usefixtures("pango")
def test_a_stack_that_is_lower_than_the_logs_to_fit_is_computed_with_them() -> None:
    """Two logs stand, six are to fit; the loads are those on six, which reach above the water."""
    text = said(changed({"logs_in_place": 2}))
    words = "Of the post that takes most, with 6 logs in each bay; above 440.40 ft water goes over them."
    assert plain(words) in text
    assert plain("In place as entered: 2 in each bay.") in text
    assert plain("At the rated level above limit:") in text


def test_logs_that_are_not_there_or_can_not_be_added_are_called_out() -> None:
    """446.1 + 2 ft asks for 22 logs; 14 are on hand."""
    short = html_of(changed(water={"flood_side": "446.10 ft"}))
    assert '<span class="alarm">8 too few in each bay</span>' in short
    assert "Water and allowance would pass the rated level 443.40" in short
    assert '<span class="alarm">reached: call now</span>' in short
    stuck = html_of(changed({"logs_in_place": 4}, water={"flood_side": "440.00 ft"}))
    assert '<span class="alarm">4 stand, none can be added</span>' in stuck
    assert "Water is past it." in stuck
    closed = html_of(changed({"adding": {"with_water": False}}))
    assert "Logs CANNOT be added with water at the sill, last chance 437.40" in closed
    assert "Do not count on it." in html_of(changed({"adding": None}))


def test_the_engineer_is_called_at_the_level_itself() -> None:
    at = html_of(
        changed({"rated_level": "4.40 m", "sill": "2.50 m"}, units="SI", water={"flood_side": "4.10 m"})
    )
    under = html_of(
        changed({"rated_level": "4.40 m", "sill": "2.50 m"}, units="SI", water={"flood_side": "4.099 m"})
    )
    assert "reached: call now" in at
    assert "reached: call now" not in under


@pytest.mark.usefixtures("pango")
def test_what_was_not_entered_is_said_or_left_blank() -> None:
    text = said(BARE)
    for words in (
        "Call engineer at not set",
        "No rated level entered: ask the engineer for it before water is on the sill.",
        "Top asked for: the water level itself. No allowance and no freeboard were entered.",
        "Weight of a log: not entered. Weigh one: __________",
        "Store, key ____________________",
        "No posts: one bay between its guides.",
        "First-limit level: none computed, no load limit was entered.",
        "Now not checked: no limit was entered.",
        "time of printing not stated",
    ):
        assert plain(words) in text, words
    assert "beforewater" in text
    rated = said(changed({"rated_level": "443.40 ft"}))
    assert plain("no name entered, no date entered") in rated


@pytest.mark.parametrize("stamp", ["actual", "exercise", "draft"])
def test_the_stamp_stands_in_head_foot_and_title(stamp: str) -> None:
    html = html_of(PLAIN, stamp=stamp)
    assert f'<p class="stamp">{stamp.upper()}</p>' in html
    assert html.count(stamp.upper()) == 3
    others = {"ACTUAL", "EXERCISE", "DRAFT"} - {stamp.upper()}
    assert not any(other in html for other in others)


def test_there_is_no_sheet_without_a_stamp() -> None:
    assert "DRAFT" in html_of(PLAIN)
    with pytest.raises(SheetError, match='stamped actual, exercise or draft, not ""'):
        html_of(PLAIN, stamp="")


def test_only_closures_have_sheets() -> None:
    document = read_file(next(path for path in SCENARIOS if path.stem == "mill-street"))
    with pytest.raises(
        SheetError, match='"P-3" is a panel; field sheets are for closures; closures here: C-07'
    ):
        html_of(document, "P-3")
    with pytest.raises(SheetError, match='there is no barrier "C-9" in this scenario; closures here: C-07'):
        html_of(document, "C-9")


def modules_of(svg: str) -> set[tuple[int, int]]:
    """Dark modules of a drawn code, (row, column), without its quiet zone."""
    drawn = re.search(r'class="qrline" d="([^"]*)"|stroke="#000[^>]* d="([^"]*)"|d="(M[^"]*)" stroke', svg)
    assert drawn
    path = next(filter(None, drawn.groups()))
    x, y, dark = 0.0, 0.0, set()
    for move, numbers in re.findall(r"([Mmh])\s*([-\d. ]+)", path):
        values = [float(number) for number in numbers.split()]
        if move == "h":
            dark |= {(int(y), int(x) + step) for step in range(int(values[0]))}
            x += values[0]
        elif move == "M":
            x, y = values
        else:
            x, y = x + values[0], y + values[1]
    top, left = min(row for row, _ in dark), min(column for _, column in dark)
    return {(row - top, column - left) for row, column in dark}


def test_the_code_holds_the_link_and_the_link_the_document() -> None:
    link = link_at(BASE, PLAIN)
    html = html_of(PLAIN, link=link)
    svg = re.search(r'<div class="qr">(<svg.*?</svg>)', html, re.DOTALL)
    assert svg
    matrix = segno.make(link, error="l", micro=False).matrix
    assert modules_of(svg[1]) == {
        (r, c) for r, row in enumerate(matrix) for c, dark in enumerate(row) if dark
    }
    assert decode_document(link.partition("?s=")[2]) == PLAIN
    assert ADDRESS == PAGE_ADDRESS


def test_a_link_too_long_for_a_code_is_said() -> None:
    html = html_of(PLAIN, link=BASE + "x" * 3000)
    assert '<div class="qr">' not in html
    assert "link too long for a code: open the scenario file" in html


def test_texts_that_are_cut_short_say_so() -> None:
    notice = "texts ending in … are cut short"
    assert notice in html_of(CROWDED["long words"])
    assert LONG[:40] in html_of(CROWDED["long words"])
    assert notice not in html_of(PLAIN)


def grey(values: list[Any]) -> bool:
    numbers = [float(value) for value in values]
    return len(set(numbers)) == 1 if len(numbers) == 3 else numbers[:3] == [0, 0, 0]


@pytest.mark.usefixtures("pango")
def test_it_is_black_on_white_only() -> None:
    html = html_of(PLAIN, link=link_at(BASE, PLAIN))
    colours = set(re.findall(r"#[0-9a-fA-F]{3,8}\b(?=[\";\s])", html))
    assert colours == {"#000", "#fff"}
    named = re.findall(r"(?:color|fill|stroke|background)\s*[:=]\s*\"?([a-z]+)", html)
    assert set(named) <= {"none", "light"}
    reader = reader_of(render(job_of(PLAIN, link=link_at(BASE, PLAIN))))
    seen = 0
    for operands, operator in pypdf.generic.ContentStream(reader.pages[0].get_contents(), reader).operations:
        if operator in (b"rg", b"RG"):
            assert grey(operands)
            seen += 1
        elif operator in (b"k", b"K", b"sc", b"SC", b"scn", b"SCN"):
            assert all(float(value) in (0.0, 1.0) for value in operands)
            assert len({float(value) for value in operands[:3]}) <= 1
            seen += 1
    assert seen > 0
    assert not reader.pages[0].images


MARKUP = "<b>b</b><script>x</script>{{ 7*7 }} & 'a' \"q\""


@pytest.mark.usefixtures("pango")
def test_markup_in_every_text_is_shown_as_text() -> None:
    document = changed(
        {
            "id": "<i>K</i>",
            "name": f"name {MARKUP}",
            "note": f"note {MARKUP}",
            "parts_short": [f"part {MARKUP}"],
            "install": {"lift": MARKUP[:20]},
            "rated_level": {"value": "443.40 ft", "source": MARKUP[:24]},
        },
        title=f"title {MARKUP}",
        location=f"place {MARKUP}",
        datum=f"datum {MARKUP}"[:20],
    )
    html = html_of(document)
    assert not re.search(r"<(script|i)\b", html)
    text = said(document)
    closure = document["closure"][0]
    for words in (
        closure["id"],
        closure["name"],
        closure["note"],
        *closure["parts_short"],
        document["title"],
    ):
        assert plain(words) in text, words


def heavier(setting: Setting) -> list[Load]:
    """Water that is 1 ‰ too heavy."""
    return [Load(name=load.name, diagram=_scaled(load.diagram)) for load in water_loads(setting)]


def _scaled(diagram: Diagram) -> Diagram:
    return diagram.scaled(1.001)


@pytest.mark.usefixtures("pango")
def test_a_withheld_closure_prints_the_word_and_no_figure(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr("loads.load.LOADS", (heavier, sediment_loads))
    document = changed({"note": "key at the gate"}, title="Trial")
    html = html_of(document)
    text = said(document)
    assert "WITHHELD" in text
    assert plain("Rated level as entered: 443.40 ft.") in text
    body = html.partition("<body>")[2].replace("443.40 ft", "")
    assert not re.search(r"[\d.]+[\u00a0 ](ft|lb|kip|lb/ft|lb·ft|in|kip·ft)\b", body)
    assert not re.search(r"\d+ of \d+ logs|Fit now|Loads", body)
    assert "<figure>" not in html
    for words in (CAUTION, *LEAVE, "DRAFT", check_code(input_digest(document))):
        assert plain(words) in text


def test_the_same_input_gives_the_same_sheet_here_and_in_the_worker(pango: None) -> None:
    job = job_of(PLAIN, link=link_at(BASE, PLAIN), now=NOW)
    assert job == job_of(PLAIN, link=link_at(BASE, PLAIN), now=NOW)
    worker = PrintWorker(seconds=100)
    try:
        assert worker.render(job) == render(job)
    finally:
        worker.shutdown()


@pytest.mark.usefixtures("pango")
def test_a_page_is_set_smaller_until_it_is_one() -> None:
    def page(size: int) -> str:
        return f"<html lang=en><p style='font-size:{size}pt'>" + "sill and slots clean " * 150

    job = PrintJob(html=page(24), created=NOW, smaller=(page(20), page(9), page(3)))
    first, wanted = (reader_of(render(one)) for one in (job, PrintJob(html=page(9), created=NOW)))
    assert len(wanted.pages) == 1
    assert [sheet.extract_text() for sheet in first.pages] == [wanted.pages[0].extract_text()]
    assert len(reader_of(render(PrintJob(html=page(24), created=NOW, smaller=(page(20),)))).pages) > 1
    sheet = job_of(PLAIN)
    tried = [size_of(html) for html in (sheet.html, *sheet.smaller)]
    assert tried == list(SIZES[SIZES.index(tried[0]) :])


@pytest.mark.browser
@pytest.mark.parametrize("document", [PLAIN, BARE, CROWDED["wide letters"]], ids=["plain", "bare", "crowded"])
def test_the_file_opens_from_disk_without_a_network(
    document: Document, browser: Browser, tmp_path: Path
) -> None:
    path = tmp_path / "sheet.html"
    path.write_text(html_of(document, stamp="actual", link=link_at(BASE, document)), encoding="utf-8")
    context = browser.new_context(viewport={"width": 390, "height": 844}, is_mobile=True, has_touch=True)
    context.set_offline(True)
    asked, errors = [], []
    context.on("request", lambda request: asked.append(request.url))
    context.on("console", lambda told: errors.append(told.text) if told.type == "error" else None)
    page = context.new_page()
    page.goto(path.as_uri())
    assert (asked, errors) == ([path.as_uri()], [])
    assert page.evaluate("document.documentElement.scrollWidth") <= 390
    assert page.locator("script").count() == 0
    assert page.locator("h1").inner_text().startswith(document["closure"][0]["id"][:20])
    stamp = page.locator(".stamp")
    for media in ("screen", "print"):
        page.emulate_media(media=media)
        assert stamp.is_visible()
        assert stamp.inner_text() == "ACTUAL"
    page.emulate_media(media="screen")
    assert page.evaluate("parseFloat(getComputedStyle(document.body).fontSize)") >= 16
    figures = page.locator(".figure").all()
    sizes = [one.evaluate("e => parseFloat(getComputedStyle(e).fontSize)") for one in figures]
    assert len(sizes) == 3
    assert min(sizes) >= 40
    context.close()


@pytest.mark.browser
@pytest.mark.parametrize("document", [PLAIN, BARE], ids=["plain", "bare"])
def test_the_file_prints_on_one_page_from_a_browser(
    document: Document, browser: Browser, tmp_path: Path
) -> None:
    path = tmp_path / "sheet.html"
    path.write_text(html_of(document, link=link_at(BASE, document), now=NOW), encoding="utf-8")
    context = browser.new_context()
    context.set_offline(True)
    page = context.new_page()
    page.goto(path.as_uri())
    assert len(reader_of(page.pdf(prefer_css_page_size=True)).pages) == 1
    context.close()


def test_logs_to_fit_are_those_of_the_engine() -> None:
    for path, closure_id in SHEETS:
        document = read_file(path)
        found = assess(scenario_of(document)).barrier(closure_id)
        assert isinstance(found, AssessedClosure)
        needed = [
            min(int(count), had)
            for count, had in zip(found.hydraulics.needed.count[0], found.record.on_hand, strict=True)
        ]
        shown = re.search(r'<b class="figure">([\d–]+) of ([\d–]+)</b>', html_of(document, closure_id))
        assert shown
        assert shown[1].split("–") == sorted({str(min(needed)), str(max(needed))}, key=int)


def test_the_page_offers_the_sheet_of_the_closure_and_the_stamp_chosen() -> None:
    street = next(path for path in SCENARIOS if path.stem == "mill-street")
    test = pages.on(pages.app(read_file(street)), "sheets")
    names = [getattr(button, "label", "") for button in test.get("download_button")]
    assert "Field sheet (HTML, opens without a network)" in names
    assert test.selectbox(key="sheet closure").options == ["C-07 · Mill Street", "C-08 · Mill Lane footpath"]
    assert test.segmented_control(key="sheet stamp").value == "draft"
    pages.run(test.segmented_control(key="sheet stamp").set_value("actual"))
    pages.run(test.selectbox(key="sheet closure").set_value("C-08"))
    assert test.segmented_control(key="sheet stamp").value == "actual"
    quay = next(path for path in SCENARIOS if path.stem == "quay-street")
    without = pages.words(pages.on(pages.app(read_file(quay)), "sheets"))
    assert "Field sheets are for closures, and this scenario has none." in without
