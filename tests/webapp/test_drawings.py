"""The drawings: well-formed, safe whatever the names in them, and saying what they show."""

import datetime as dt
import io
import math
import re
import xml.etree.ElementTree as ET
from pathlib import Path

import numpy as np
import pypdf
import pytest

import loads.load
from loads.assessment import Assessed, Withheld, assess
from loads.checks import Verdict
from loads.diagram import Diagram
from loads.load import Load, Setting
from loads.scenario_file import read_file, scenario_of
from loads.states import DRY, Levels
from tests.webapp.drawing_cases import (
    LAYERS,
    LIMITS,
    ODD,
    PALETTES,
    SCENARIOS,
    SVG,
    TANNERY_ROW,
    assessment_of,
    drawings,
    drawn,
    panel,
    texts,
)
from tests.webapp.driving import ROOT
from webapp.display import PAGE_DIGITS, elevation, fixed, show
from webapp.drawing.facts import facts, line_facts
from webapp.drawing.line import line_drawing
from webapp.drawing.palette import LIGHT, MARKS, PRINT, Palette
from webapp.drawing.svg import element, number, on_page
from webapp.pdf import PrintJob, render


@pytest.mark.parametrize("path", SCENARIOS, ids=lambda path: path.stem)
def test_scenarios_give_well_formed_drawings(path: Path) -> None:
    assessment = assess(scenario_of(read_file(path)))
    for palette in PALETTES:
        for narrow in (False, True):
            for drawing in drawings(assessment, palette, narrow=narrow):
                check_form(drawing, narrow=narrow)


@pytest.mark.parametrize("case", ODD)
def test_odd_cases_give_well_formed_drawings(case: str) -> None:
    for narrow in (False, True):
        for drawing in drawings(ODD[case], LIGHT, narrow=narrow):
            check_form(drawing, narrow=narrow)


def check_form(drawing: str, *, narrow: bool) -> None:
    """What holds for every drawing."""
    root = ET.fromstring(drawing)
    assert root.tag == f"{SVG}svg"
    assert all(texts(root))
    assert "\n" not in drawing
    assert not re.search(r"\b(nan|inf|None)\b", drawing)
    ids = [node.attrib["id"] for node in root.iter() if "id" in node.attrib]
    assert len(ids) == len(set(ids))
    assert root.attrib["role"] == "img"
    labels = [node for node in root if node.get("id") in root.attrib["aria-labelledby"].split()]
    assert [node.tag for node in labels] == [f"{SVG}title", f"{SVG}desc"]
    assert all(node.text for node in labels)
    assert set(re.findall(r"url\(#([^)]*)\)", drawing)) <= set(ids)
    width = float(root.attrib["viewBox"].split()[2])
    assert width == 360 if narrow else width > 1000
    sizes = [float(node.attrib["font-size"]) for node in root.iter(f"{SVG}text")]
    assert min(sizes) >= 11
    assert not re.search(r"\b(safe|approved|certified|guaranteed|OK)\b", drawing, re.IGNORECASE)


def test_withheld_barrier_shows_the_word_and_no_result(monkeypatch: pytest.MonkeyPatch) -> None:
    def broken(setting: Setting) -> list[Load]:
        states = setting.levels.states
        return [Load(name="broken", diagram=Diagram.of_terms(states, [(32.0, 777.0, 0.0)]))]

    monkeypatch.setattr(loads.load, "LOADS", (*loads.load.LOADS, broken))
    assessment = assessment_of(panel("P1", 98, 6, limits=LIMITS))
    (barrier,) = assessment.barriers
    assert isinstance(barrier, Withheld)
    for narrow in (False, True):
        for drawing in drawings(assessment, LIGHT, narrow=narrow):
            words = texts(ET.fromstring(drawing))
            assert "withheld" in words
            assert not [word for word in words if re.search(r"\d.*(lb|kip|psf|of limit)", word)]
            assert f'stroke-dasharray="{MARKS["withheld"].dashes}"' in drawing
    told = facts(barrier, system="US", datum="NAVD88")
    assert any("withheld" in sentence for sentence in told)


HOSTILE = "<script>alert(1)</script>\"><img src=x onerror=alert(1)> & 'quoted' ]]> $x$ *y*"


@pytest.mark.parametrize("narrow", [False, True])
def test_names_are_never_markup(narrow: bool) -> None:
    layer = {**LAYERS[0], "top": "100 ft", "name": "<b>&mud"}
    assessment = assessment_of(
        panel('"><svg onload=x>', 98, 6, sediment=[layer], limits=LIMITS) | {"name": HOSTILE[:80]}
    )
    for drawing in drawings(assessment, LIGHT, narrow=narrow):
        root = ET.fromstring(drawing)
        tags = {node.tag.removeprefix(SVG) for node in root.iter()}
        assert tags <= {"svg", "title", "desc", "defs", "pattern", "path", "circle", "rect", "text"}
        assert not {name for node in root.iter() for name in node.attrib if name.startswith("on")}
        assert '"><svg onload=x> · <script>alert(1)</script>' in (root.findtext(f"{SVG}desc") or "")
    assert on_page(drawing) == f"<div>{drawing}</div>"


def test_escaping_covers_text_attributes_and_control_characters() -> None:
    built = element("text", HOSTILE, id=HOSTILE, x=1.0)
    node = ET.fromstring(built)
    assert node.text == HOSTILE
    assert node.attrib["id"] == HOSTILE
    assert ET.fromstring(element("text", "a\x00b\u202ec\nd")).text == "a b c d"
    assert element("g", element("b"), "<b/>") == "<g><b/>&lt;b/&gt;</g>"


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf])
def test_a_place_that_is_no_number_is_refused(value: float) -> None:
    with pytest.raises(ValueError, match="cannot be drawn"):
        number(value)


def test_drawings_on_one_page_share_no_identifier() -> None:
    assessment = TANNERY_ROW
    every = [
        drawing
        for palette in PALETTES
        for narrow in (False, True)
        for drawing in drawings(assessment, palette, narrow=narrow)
    ]
    ids = [name for drawing in every for name in re.findall(r' id="([^"]*)"', drawing)]
    assert len(ids) == len(set(ids)) > 100
    assert every[0] == line_drawing(assessment, system="US", palette=LIGHT)


def luminance(colour: str) -> float:
    channels = [int(colour[i : i + 2], 16) / 255 for i in (1, 3, 5)]
    linear = [c / 12.92 if c <= 0.04045 else ((c + 0.055) / 1.055) ** 2.4 for c in channels]
    return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]


def contrast(one: str, other: str) -> float:
    light, dark = sorted((luminance(one), luminance(other)), reverse=True)
    return (light + 0.05) / (dark + 0.05)


@pytest.mark.parametrize("palette", PALETTES, ids=lambda palette: palette.name)
def test_contrast(palette: Palette) -> None:
    for ground in (palette.ground, palette.face):
        assert contrast(palette.ink, ground) >= 7
        assert contrast(palette.faint, ground) >= 4.5
    assert contrast(palette.water_ink, palette.ground) >= 7
    assert contrast(palette.water, palette.ground) >= 3
    for verdict in ("above limit", "below limit", "not checked", "withheld"):
        assert contrast(palette.colour(verdict), palette.face) >= 3


def test_verdict_words_are_in_ink_on_the_face_and_differ_in_more_than_colour() -> None:
    drawing = ET.fromstring(
        line_drawing(
            assess(scenario_of(read_file(ROOT / "scenarios" / "tannery-row.toml"))),
            system="US",
            palette=PRINT,
        )
    )
    words: dict[Verdict, int] = {
        word: texts(drawing).count(word)
        for word in ("not checked", "above limit", "near limit", "below limit")
    }
    assert set(words.values()) == {1}
    inks = {node.get("fill") for node in drawing.iter(f"{SVG}text") if node.text in words}
    assert inks == {PRINT.ink}
    marks = [(mark.hatch, mark.dashes, mark.sign) for mark in MARKS.values()]
    assert len(set(marks)) == len(MARKS)


def test_facts_say_the_numbers_of_the_page() -> None:
    assessment = TANNERY_ROW
    barrier = assessment.barrier("P2")
    assert isinstance(barrier, Assessed)
    told = " ".join(facts(barrier, system="US", datum="NAVD88"))
    assert told.startswith("P2 · Ferry Steps panel: above limit.")
    for value, kind in ((barrier.resultant.horizontal, "force"), (barrier.resultant.moment, "moment")):
        assert show(float(value[0]), kind, "US", PAGE_DIGITS) in told
    for level in (104.6, 97.0, 99.4, 104.2):
        assert f"{fixed(level, 2)}\u00a0ft NAVD88" in told
    assert "toward the protected side" in told
    assert "engineer of record" in told
    assert "computed screening figure" in told
    drawing = ET.fromstring(drawn(barrier, assessment))
    assert drawing.findtext(f"{SVG}desc") == told


def test_facts_of_a_line_name_every_barrier_and_its_verdict() -> None:
    told = line_facts(ODD["forty"], system="US")
    assert told[0] == "Flood side 104.60\u00a0ft NAVD88."
    for barrier, sentence in zip(ODD["forty"].barriers, told[2:], strict=True):
        assert sentence.startswith(f"{barrier.record.id} · {barrier.record.name}: {barrier.verdict()}")


def test_each_state_is_drawn_with_its_own_levels_and_first_limit_only_where_it_holds() -> None:
    scenario = ODD["reverse"].scenario
    levels = Levels(flood_side=np.array([31.0, 31.5, 31.5]), protected_side=np.array([DRY, DRY, 30.5]))
    assessment = assess(scenario, levels)
    drawings_of_states = [line_drawing(assessment, index=i, system="US", palette=LIGHT) for i in range(3)]
    first = assessment.barriers[0]
    assert isinstance(first, Assessed)
    assert first.first_limit is not None
    assert first.first_limit.level is not None
    label = fixed(first.first_limit.level / 0.3048, 2)
    shown = [label in texts(ET.fromstring(drawing)) for drawing in drawings_of_states]
    assert shown == [True, True, False]
    for index, drawing in enumerate(drawings_of_states):
        assert elevation(float(levels.flood_side[index]), "US") in texts(ET.fromstring(drawing))


def test_pdf_holds_the_drawing_with_its_text(pango: None) -> None:
    assessment = TANNERY_ROW
    html = "".join(drawings(assessment, PRINT, narrow=False)[:2])
    content = render(PrintJob(html=html, created=dt.datetime(2031, 4, 2, tzinfo=dt.UTC)))
    told = pypdf.PdfReader(io.BytesIO(content)).pages[0].extract_text()
    for words in ("Pump house shutter", "above limit", "near limit", "over the top by", "Net pressure"):
        assert words in told
