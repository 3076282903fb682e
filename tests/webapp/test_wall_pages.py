"""Walls on the pages: in a real Chromium against the real server, and in process."""

import json
import re
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest
from playwright.sync_api import Page, expect
from streamlit.testing.v1 import AppTest

from loads.assessment import AssessedWall
from loads.scenario_file import Document, write_document
from tests.webapp.driving import ROOT, Server, Watch
from tests.webapp.wall_cases import assessed, block, i_wall, line, t_wall
from webapp.links import encode_document
from webapp.package.wall import wall_facts

MISSING_BELOW_A_PAGE = r"status of 404"
WAIT = 20_000


def plain(text: str) -> str:
    return re.sub(r"[\u00a0\u202f]", " ", text)


def checked(document: Document, folder: Path, flood_side: str) -> dict[str, Any]:
    """What `sillhead check --json` says of the only barrier at a level."""
    path = folder / "trial.toml"
    path.write_bytes(write_document(document))
    command = [sys.executable, "-m", "webapp.cli", "check", str(path), "--json", "--flood-side", flood_side]
    told = subprocess.run(command, capture_output=True, check=True, cwd=ROOT, text=True)
    (barrier,) = json.loads(told.stdout)["barriers"]
    assert isinstance(barrier, dict)
    return barrier


@pytest.mark.browser
def test_moving_the_level_changes_what_governs_as_the_json_says(
    server: Server, page: Page, watch: Watch, tmp_path: Path
) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    document = line(t_wall(), flood="97 ft")
    page.goto(f"{server.url}/barrier?s={encode_document(document)}")
    seen = []
    for level in ("97 ft", "100 ft", "101 ft"):
        field = page.get_by_label("Flood side", exact=True)
        expect(field).to_be_visible(timeout=WAIT)
        field.fill(level)
        field.press("Enter")
        wall = checked(document, tmp_path, level)
        governing = wall["checks"][0]
        seen.append((governing["check"], governing["verdict"]))
        big = page.locator(".sh-big")
        expect(big).to_contain_text(f"{governing['ratio']:.3g}"[:4], timeout=WAIT)
        expect(big).to_contain_text(governing["check"], timeout=WAIT)
        expect(page.locator(".sh-big .sh-verdict")).to_have_text(wall["verdict"], timeout=WAIT)
        (band,) = wall["sliding"]
        expect(big).to_contain_text(f"{band['low']:.2f} – {band['high']:.2f}", timeout=WAIT)
        expect(big).to_contain_text(f"{wall['base']['compressed'] * 100:.0f} %", timeout=WAIT)
    assert len(set(seen)) == 3, seen
    expect(page.get_by_text("Criteria in force: Basis of design, rev 2").first).to_be_visible()


@pytest.mark.browser
def test_a_phone_shows_the_verdict_of_a_wall_without_scrolling_sideways(
    server: Server, phone: Page, watch: Watch
) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    phone.goto(f"{server.url}/barrier?s={encode_document(line(t_wall(), flood='103 ft'))}")
    mark = phone.locator(".sh-big .sh-verdict")
    expect(mark).to_have_text("above limit", timeout=WAIT)
    expect(phone.locator(".sh-narrow svg").first).to_be_visible()
    sideways = phone.evaluate(
        "() => [...document.querySelectorAll('html, [data-testid=stMain], .block-container')]"
        ".map(e => e.scrollWidth - e.clientWidth)"
    )
    assert max(sideways) <= 0


def shown(document: Document, page: str, **session: Any) -> str:
    """Every Markdown text of a page."""
    test = AppTest.from_file(ROOT / "webapp" / "main.py", default_timeout=60)
    test.query_params["s"] = encode_document(document)
    for key, value in session.items():
        test.session_state[key.replace("_", " ")] = value
    test.run()
    test.switch_page(str(ROOT / "webapp" / "views" / f"{page}.py")).run()
    assert not test.exception
    return plain(" ".join(element.value for element in test.markdown))


def test_the_page_of_a_wall_shows_forces_band_criteria_and_states() -> None:
    told = shown(line(block(), flood="8 ft"), "barrier")
    for words in (
        "Criteria in force&#58; Basis of design, rev 2",
        "sliding at least 1.5",
        "1.69 – 2.07",
        "resultant from the toe, base 6.00 ft",
        "Sliding as a band",
        "water, flood side",
        "one more foot on the flood side",
        "moment about the toe",
    ):
        assert words in told, words
    # 31.2·8² = 1996.8 lb/ft at 8/3 ft: 5325 lb·ft/ft
    assert re.search(r"water, flood side</td><td>across</td><td[^>]*>2 000 lb/ft", told)
    assert "5 320 lb" in told or "5 325 lb" in told


def test_the_page_of_an_i_wall_shows_embedment_and_what_it_cannot_decide() -> None:
    told = shown(line(i_wall(), flood="100 ft"), "barrier")
    assert "embedment needed, the sheet has 20.0 ft" in told
    assert "A licensed engineer must." in told
    assert "moment about the ground" in told
    assert "moments about the tip, passive pressure over 1.5" in told


def test_the_page_without_criteria_says_so() -> None:
    bare = block()
    del bare["own_criteria"]
    told = shown(line(bare, flood="8 ft"), "barrier")
    assert "none entered; stability is computed and not checked" in told


def test_the_flood_line_lists_walls_per_length_with_head_above_the_ground() -> None:
    told = shown(line(t_wall(), i_wall(), flood="100 ft"), "flood_line")
    assert "lb·ft/ft" in told
    assert told.count("lb/ft") >= 2
    assert "head 4.00 ft" in told
    assert "head 2.00 ft" in told


def test_the_package_states_criteria_band_and_resultant_of_the_block() -> None:
    (barrier,) = assessed(block(), flood="8 ft").barriers
    assert isinstance(barrier, AssessedWall)
    facts = {name: plain(text) for name, text in wall_facts(barrier, "US", "NAVD88")}
    assert facts["Horizontal force H, toward the protected side"] == "1 997 lb/ft"
    assert facts["Moment M about the toe"] == "−15 685 lb·ft/ft"
    assert facts["Resultant on the base, from the toe"] == "2.091 ft"
    assert facts["Sliding factor on the base"] == (
        "1.88; 1.69 to 2.07 over the friction; without uplift 2.03 to 2.48"
    )
    assert facts["In force"].startswith("Criteria in force: Basis of design, rev 2")
