"""Drawings of closures: every log where it stands, its verdict as word and hatch, and the facts as text."""

import datetime as dt
import io
import re
import xml.etree.ElementTree as ET
from typing import Any

import pypdf
import pytest

import loads.load
from loads.assessment import Withheld, assess
from loads.diagram import Diagram
from loads.load import Load, Setting
from loads.scenario_file import scenario_of
from tests.webapp.closure_cases import ODD_CLOSURES, POST, assessed_line, closure, line
from tests.webapp.drawing_cases import PALETTES, SVG, corners, drawings, drawn, feet, texts
from tests.webapp.test_drawings import check_form
from webapp.drawing.facts import facts
from webapp.drawing.palette import LIGHT, MARKS, PRINT
from webapp.pdf import PrintJob, render


@pytest.mark.parametrize("case", ODD_CLOSURES)
def test_odd_closures_give_well_formed_drawings(case: str) -> None:
    for palette in PALETTES:
        for narrow in (False, True):
            for drawing in drawings(ODD_CLOSURES[case], palette, narrow=narrow):
                check_form(drawing, narrow=narrow)


def wide(case: str) -> ET.Element:
    assessment = ODD_CLOSURES[case]
    return ET.fromstring(drawn(assessment.barriers[0], assessment))


def hatched(drawing: ET.Element, name: str) -> list[ET.Element]:
    """Shapes filled with the hatch of a verdict, the samples of the key left out."""
    return [
        node
        for node in drawing.iter(f"{SVG}path")
        if node.get("fill", "").endswith(f"-{name})") and len(corners(node)) == 4 and _tall(node)
    ]


def _tall(node: ET.Element) -> bool:
    heights = [y for _, y in corners(node)]
    return max(heights) - min(heights) > 12


def span(drawing: ET.Element, node: ET.Element) -> tuple[float, float]:
    """Lower and upper end of a shape, read off the axis. [ft]."""
    heights = [feet(drawing, y) for _, y in corners(node)]
    return min(heights), max(heights)


def test_logs_above_and_near_their_limit_are_hatched_where_they_stand() -> None:
    drawing = wide("plain")
    above, near = hatched(drawing, "above"), hatched(drawing, "near")
    assert len(above) == len(near) == 3, "one run in each bay"
    for node in above:
        assert span(drawing, node) == pytest.approx((100.0, 101.5), abs=0.06)
    for node in near:
        assert span(drawing, node) == pytest.approx((101.5, 102.0), abs=0.06)


def test_the_key_and_the_text_alternative_name_the_logs_of_each_verdict() -> None:
    assessment = ODD_CLOSURES["plain"]
    told = facts(assessment.barriers[0], system="US", datum="NAVD88")
    assert "Above limit: logs 1–3 of bays 1–3." in told
    assert "Near limit: log 4 of bays 1–3." in told
    assert "Below limit: logs 5–8 of bays 1–3." in told
    assert "Not checked: posts 1, 2." in told
    assert "Bays 1–3: 8 of 10 logs in place, top 104.00\u00a0ft NAVD88." in told
    for narrow in (False, True):
        drawing = ET.fromstring(drawn(assessment.barriers[0], assessment, narrow=narrow))
        words = texts(drawing)
        assert "above limit: logs 1–3 of bays 1–3" in words
        assert "near limit: log 4 of bays 1–3" in words
        assert " ".join(told) == drawing.findtext(f"{SVG}desc")


def test_every_log_is_numbered_from_the_sill() -> None:
    words = texts(wide("plain"))
    for number in range(1, 11):
        assert words.count(str(number)) >= 3, number
    lowest = min(
        (node for node in wide("plain").iter(f"{SVG}text") if node.text == "1"),
        key=lambda node: -float(node.attrib["y"]),
    )
    assert feet(wide("plain"), float(lowest.attrib["y"]) - 4) == pytest.approx(100.25, abs=0.1)


def test_logs_not_in_place_are_dashed() -> None:
    drawing = wide("unequal")
    dashed = [
        span(drawing, node)
        for node in drawing.iter(f"{SVG}path")
        if node.get("stroke-dasharray") == "3 3" and len(corners(node)) == 4 and _tall(node)
    ]
    assert any(ends == pytest.approx((100, 105), abs=0.06) for ends in dashed)
    assert any(ends == pytest.approx((104, 105), abs=0.06) for ends in dashed)
    assert "dashed: on hand, not in place" in texts(drawing)
    assert any("over the open sill by 4.00" in words.lower() for words in texts(drawing))


def test_an_open_closure_shows_no_pressure() -> None:
    words = texts(wide("open"))
    assert "No logs in place: nothing is pressed." in words
    assert not [word for word in words if "kip" in word]


def test_posts_carry_their_own_verdict() -> None:
    post = POST | {"limits": {"moment": {"value": "10 lb·ft", "source": "engineer of record"}}}
    assessment = assessed_line(closure(log={"limits": {}}, post=post))
    drawing = ET.fromstring(drawn(assessment.barriers[0], assessment))
    assert len(hatched(drawing, "above")) == 2
    assert "above limit: posts 1, 2" in texts(drawing)
    assert "Not checked: logs 1–8 of bays 1–3." in facts(assessment.barriers[0], system="US", datum="NAVD88")


def test_a_withheld_closure_shows_no_verdict_of_a_part(monkeypatch: pytest.MonkeyPatch) -> None:
    def broken(setting: Setting) -> list[Load]:
        return [Load(name="broken", diagram=Diagram.of_terms(setting.levels.states, [(31.0, 777.0, 0.0)]))]

    monkeypatch.setattr(loads.load, "LOADS", (*loads.load.LOADS, broken))
    assessment = assess(scenario_of(line(closure())))
    (barrier,) = assessment.barriers
    assert isinstance(barrier, Withheld)
    drawing = ET.fromstring(drawn(barrier, assessment))
    words = " ".join(texts(drawing))
    assert "withheld" in words
    assert not re.search(r"(above|near|below) limit", words)
    assert not [word for word in texts(drawing) if re.search(r"\d.*(lb|kip|psf|of limit)", word)]
    assert [
        node
        for node in drawing.iter(f"{SVG}path")
        if node.get("stroke-dasharray") == MARKS["withheld"].dashes
    ]


@pytest.mark.usefixtures("pango")
def test_a_closure_prints_with_its_words() -> None:
    assessment = ODD_CLOSURES["braced"]
    drawing = drawn(assessment.barriers[0], assessment, PRINT)
    html = f'<meta charset="utf-8"><style>@page {{ size: 300mm 200mm }}</style><div>{drawing}</div>'
    job = PrintJob(html=html, created=dt.datetime(2031, 4, 2, tzinfo=dt.UTC))
    page = pypdf.PdfReader(io.BytesIO(render(job))).pages[0].extract_text()
    for words in ("above limit: logs 1–3 of bays 1–3", "Front, from the protected side", "sill 100.00"):
        assert words in page


HOSTILE = "<script>alert(1)</script>"


def test_names_of_a_closure_are_never_markup() -> None:
    hostile: dict[str, Any] = closure('"><svg onload=x>') | {"name": HOSTILE}
    for narrow in (False, True):
        for drawing in drawings(assessed_line(hostile), LIGHT, narrow=narrow):
            tags = {node.tag.removeprefix(SVG) for node in ET.fromstring(drawing).iter()}
            assert tags <= {"svg", "title", "desc", "defs", "pattern", "path", "circle", "rect", "text"}
