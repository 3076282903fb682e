"""The calculation package, read back from the real PDF."""

from __future__ import annotations

import copy
import io
import re
import socketserver
import threading
from functools import cache
from pathlib import Path

import pypdf
import pytest

from loads import __version__
from loads.assessment import Assessed, assess
from loads.cautions import CAUTIONS, HEADLINE
from loads.diagram import Diagram
from loads.document import check_code, input_digest
from loads.load import Load, Setting, sediment_loads, water_loads
from loads.method import METHODS
from loads.scenario_file import Document, parse_document, read_file, scenario_of, write_document
from loads.working import working
from tests.hand_calculation import number_of
from tests.lines import SCENARIOS
from webapp.answer import answer
from webapp.display import elevation, in_unit
from webapp.package import package_html, package_job, package_pdf
from webapp.package.barrier import DISAGREEMENT_DIGITS
from webapp.package.drawings import metre_on_axis, section_drawing
from webapp.package.entered import NO_SOURCE, entry_groups
from webapp.package.tables import RESULT_DIGITS
from webapp.print_worker import PrintWorker
from webapp.step_text import figure, line_text, with_unit

FORBIDDEN = re.compile(r"\b(safe|approved|certified|guaranteed|OK)\b", re.IGNORECASE)


def plain(text: str) -> str:
    """Text without spaces and hyphens, which a line break may bring or take."""
    return re.sub(r"[\s\u00a0\u202f\u00ad-]+", "", text)


class Package:
    """A PDF and its text."""

    def __init__(self, document: Document) -> None:
        self.document = document
        self.content = package_pdf(document)
        self.reader = pypdf.PdfReader(io.BytesIO(self.content))
        self.pages = [page.extract_text() for page in self.reader.pages]
        self.text = plain(" ".join(self.pages))

    def says(self, words: str) -> bool:
        return plain(words) in self.text


@cache
def package_of(path: Path) -> Package:
    return Package(read_file(path))


@pytest.fixture(params=SCENARIOS, ids=lambda path: path.stem)
def package(request: pytest.FixtureRequest, pango: None) -> Package:
    return package_of(request.param)


TANNERY = next(path for path in SCENARIOS if path.stem == "tannery-row")


def tannery() -> Document:
    return read_file(TANNERY)


def test_every_page_carries_title_check_code_and_number(package: Package) -> None:
    code = check_code(input_digest(package.document))
    count = len(package.pages)
    for number, page in enumerate(package.pages, 1):
        assert package.document["title"] in page
        assert code in page
        assert f"page {number} of {count}" in page
    assert package.reader.metadata is not None
    assert str(package.reader.metadata.title).startswith(package.document["title"])


def test_the_sheet_fits_the_unit_system(package: Package) -> None:
    box = package.reader.pages[0].mediabox
    expected = (612, 792) if package.document["units"] == "US" else (595.28, 841.89)
    assert (float(box.width), float(box.height)) == pytest.approx(expected, abs=0.1)


def test_the_cover_says_what_it_is_and_signs_nothing(package: Package) -> None:
    cover = plain(package.pages[0])
    digest = input_digest(package.document)
    for words in (
        "This is a screening calculation.",
        HEADLINE,
        package.document["location"],
        package.document["purpose"],
        "Statusscreening",
        f"Sillhead, version {__version__}",
        digest,
        "Left blank by the program",
    ):
        assert plain(words) in cover
    signing = cover[cover.index("Sign") :]
    assert "Preparedby" + "Checkedby" + "Engineer’sseal" + "Leftblank" in signing


def test_figures_are_those_of_the_engine_and_of_the_json(package: Package) -> None:
    assessment = assess(scenario_of(package.document))
    system = assessment.scenario.units
    told = answer(assessment, package.document)
    for barrier, data in zip(assessment.barriers, told["barriers"], strict=True):
        assert isinstance(barrier, Assessed)
        kind = barrier.record.kind
        shape = getattr(barrier.record, "shape", "")
        foot = {"panel": "bottom edge", "closure": "sill", "wall": "toe"}[kind]
        foot = "protected-side ground" if shape == "I" else foot
        force, moment = ("line load", "moment per length") if kind == "wall" else ("force", "moment")
        assert package.says(f"{kind.capitalize()} {barrier.record.id} · {barrier.record.name}")
        load = data["load"]
        for name, value, kind in (
            ("Horizontal force H, toward the protected side", load["horizontal"], force),
            (f"Moment M about the {foot}", load["moment"], moment),
        ):
            assert package.says(f"{name} {with_unit(value, kind, system, RESULT_DIGITS)}")
        acts, datum = load["line_of_action"], assessment.scenario.datum
        height = "none, the force is nil" if acts is None else elevation(acts, system, datum)
        assert package.says(f"Line of action of H {height}")
        printed = figure(load["horizontal"], force, system, RESULT_DIGITS)
        assert number_of(printed) == pytest.approx(in_unit(load["horizontal"], force, system), rel=5e-4)
        for step in working(barrier):
            for line in step.lines:
                assert package.says(line_text(line, system).replace("_", ""))
        for check in data["checks"]:
            if check["limit"] is not None:
                assert package.says(check["source"])
        if data["first_limit"] and data["first_limit"]["level"] is not None:
            level = elevation(data["first_limit"]["level"], system, assessment.scenario.datum)
            assert package.says(f"First-limit level {level}")


def test_every_input_stands_as_typed_with_its_source_and_date(package: Package) -> None:
    scenario = scenario_of(package.document)
    for group in entry_groups(scenario):
        assert package.says(group.title)
        for entry in group.entries:
            said = f"{entry.label} {entry.text} {entry.span} {entry.source} {entry.dated}"
            for part in (f"{entry.label} {entry.text}", entry.span, entry.source, entry.dated):
                assert package.says(part), said
    assert package.says(NO_SOURCE)
    typed = [entry.text for group in entry_groups(scenario) for entry in group.entries]
    assert package.document["water"]["flood_side"]["value"] in typed


def test_methods_references_cautions_and_not_checked_are_there(package: Package) -> None:
    for group in METHODS:
        for method in group.methods:
            assert package.says(method.name)
            assert all(package.says(key) for key in method.sources)
    assert all(package.says(caution) for caution in CAUTIONS)
    assert package.says("not checked")
    assert not FORBIDDEN.search(" ".join(package.pages))


def test_the_scenario_file_inside_gives_the_same_document_and_package(package: Package) -> None:
    attached = package.reader.attachments["scenario.toml"]
    assert attached == [write_document(package.document)]
    again = parse_document(attached[0])
    assert again == package.document
    assert input_digest(again) == input_digest(package.document)


def test_the_same_document_gives_the_same_bytes_here_and_in_the_worker(pango: None) -> None:
    worker = PrintWorker(seconds=100)
    try:
        first = package_of(TANNERY)
        again = parse_document(first.reader.attachments["scenario.toml"][0])
        assert package_pdf(again) == first.content
        assert worker.render(package_job(again)) == first.content
    finally:
        worker.shutdown()


def test_one_more_foot_and_the_ends_of_the_range(pango: None) -> None:
    """P4 has 2 ft of fresh water on 9 ft: force 62.4·9·h²/2, moment a third of h times it."""
    text = package_of(TANNERY).text
    section = text[text.rindex(plain("Panel P4 · Chapel")) :]

    def row(name: str, level: str, head: float) -> str:
        force = 62.4 * 9 * head**2 / 2
        change, turn = head**2 / 4 - 1, head**3 / 8 - 1
        texts = [f"{force:.4g}", f"{100 * change:+.3g} %", f"{force * head / 3:.4g}", f"{100 * turn:+.3g} %"]
        return plain(f"{name} {level} 97.00 {' '.join(texts)}").replace("−", "").replace("-", "")

    said = section.replace("−", "")
    assert row("flood side low", "104.00", 1.4) in said
    assert row("flood side high", "105.40", 2.8) in said
    assert plain("flood side 1 ft higher 105.60 97.00 2527 +125 %") in said


def faulty_water(setting: Setting) -> list[Load]:
    """Water that is 1 ‰ too heavy on one panel."""
    loads = water_loads(setting)
    if setting.panel.id != "P2":
        return loads
    return [Load(name=load.name, diagram=_heavier(load.diagram)) for load in loads]


def _heavier(diagram: Diagram) -> Diagram:
    return diagram.scaled(1.001)


def test_a_withheld_barrier_shows_the_word_and_both_figures_and_no_result(
    monkeypatch: pytest.MonkeyPatch, pango: None
) -> None:
    right = assess(scenario_of(tannery())).barrier("P2")
    assert isinstance(right, Assessed)
    force, moment = float(right.resultant.horizontal[0]), float(right.resultant.moment[0])
    monkeypatch.setattr("loads.load.LOADS", (faulty_water, sediment_loads))
    package = Package(tannery())
    start = next(i for i, page in enumerate(package.pages) if "two computations of this panel" in page)
    section = package.pages[start : start + 1]
    said = plain(" ".join(section))
    assert "withheld" in said
    for value, kind in ((force, "force"), (moment, "moment")):
        assert plain(with_unit(value, kind, "US", DISAGREEMENT_DIGITS)) in said
        assert plain(with_unit(1.001 * value, kind, "US", DISAGREEMENT_DIGITS)) in said
    assert "Workedsteps" not in said
    assert "Checks" not in said
    assert "Panel P3" in package.pages[start + 1]
    assert not package.says(with_unit(force, "force", "US", RESULT_DIGITS) + "Vertical")
    summary = plain(package.pages[2])
    assert "P2·FerryStepspanel99.40–––––––104.20" not in summary
    assert re.search(r"P2·FerryStepspanel99\.40–+104\.20–withheld", summary)


MARKUP = "<b>bold</b><img src=http://127.0.0.1:{port}/x><script>x</script>{{{{ 7*7 }}}} & 'a' \"q\""


class Listener(socketserver.ThreadingTCPServer):
    callers = 0

    def verify_request(self, *_: object) -> bool:
        self.callers += 1
        return False


def marked_up(port: int) -> Document:
    """Markup in every text that a file can hold."""
    text = MARKUP.format(port=port)
    document = copy.deepcopy(tannery())
    for key in ("title", "location", "purpose", "author", "revision", "datum"):
        document[key] = f"{key} {text}"[:120]
    panel = document["panel"][2]
    panel |= {"id": "<i>P3</i>", "name": f"name {text}"[:120], "note": f"note {text}"}
    panel["sediment"][0]["name"] = f"mud {text}"[:120]
    panel["rated_level"]["source"] = f"who {text}"
    document["water"]["flood_side"]["source"] = f"gauge {text}"
    return document


def test_markup_in_every_text_is_shown_as_text_and_nothing_is_fetched(pango: None) -> None:
    with Listener(("127.0.0.1", 0), socketserver.BaseRequestHandler) as listener:
        threading.Thread(target=listener.serve_forever, daemon=True).start()
        port = int(listener.server_address[1])
        document = marked_up(port)
        package = Package(document)
        listener.shutdown()
    assert listener.callers == 0
    panel = document["panel"][2]
    for text in (
        *(document[key] for key in ("title", "location", "purpose", "author", "revision", "datum")),
        panel["id"],
        panel["name"],
        panel["note"],
        panel["sediment"][0]["name"],
        panel["rated_level"]["source"],
        document["water"]["flood_side"]["source"],
    ):
        assert package.says(text), text
    job = package_job(document)
    assert not re.search(r"<(img|script|b|i)\b", job.html)
    assert package.reader.metadata is not None
    assert str(package.reader.metadata.title).startswith(document["title"])


def test_the_page_names_no_address_but_that_of_svg() -> None:
    for path in SCENARIOS:
        addresses = set(re.findall(r"\w+://[^\s\"'<>]+", package_job(read_file(path)).html))
        assert addresses <= {"http://www.w3.org/2000/svg"}


@pytest.mark.slow
def test_a_line_of_forty_barriers(pango: None) -> None:
    document = tannery()
    panels = [
        {**copy.deepcopy(panel), "id": f"P{i}{n}"}
        for n in range(10)
        for i, panel in enumerate(document["panel"])
    ]
    document["panel"] = panels
    package = Package(document)
    assert len(panels) == 40
    for panel in panels:
        assert package.says(f"Panel {panel['id']} · {panel['name']}")


def test_sections_are_at_the_scale_that_is_stated() -> None:
    for path in SCENARIOS:
        assessment = assess(scenario_of(read_file(path)))
        system = assessment.scenario.units
        for barrier in assessment.barriers:
            assert isinstance(barrier, Assessed)
            drawing = section_drawing(barrier, system, assessment.scenario.datum)
            share = metre_on_axis(str(drawing.svg), system)
            assert share is not None
            assert drawing.ratio is not None
            assert share * drawing.width == pytest.approx(1000 / drawing.ratio)
            assert drawing.width <= 181
            assert drawing.width > 160
            assert drawing.ratio == float(f"{drawing.ratio:.2g}")


def test_the_html_is_the_same_for_the_same_input() -> None:
    document = tannery()
    assessment = assess(scenario_of(document))
    digest = input_digest(document)
    first = package_html(assessment, document, digest=digest, version="1")
    assert first == package_html(assessment, document, digest=digest, version="1")
    assert first != package_html(assessment, document, digest=digest, version="2")


def test_the_templates_hold_no_verdict_on_strength() -> None:
    for path in (Path(__file__).parents[2] / "webapp" / "package" / "templates").iterdir():
        assert not FORBIDDEN.search(path.read_text(encoding="utf-8")), path.name
