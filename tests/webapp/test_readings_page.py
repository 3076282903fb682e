"""The page of readings in a real Chromium against the real server."""

import re

import pytest
from playwright.sync_api import Page, expect

from loads.scenario_file import read_file
from tests.lines import SCENARIOS
from tests.webapp.driving import Server, Watch
from tests.webapp.test_pages import MISSING_BELOW_A_PAGE, opened, row
from webapp.links import encode_document

pytestmark = pytest.mark.browser


def chain(page: Page) -> str:
    """Text of the chain's table, spaces made plain."""
    return re.sub(r"[\u00a0\u202f]", " ", page.locator(".sh-wide .sh-table").inner_text())


def test_a_staff_reading_becomes_the_flood_side_level(server: Server, page: Page, watch: Watch) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    opened(page, server.url)
    page.get_by_role("link", name="Readings").click()
    for label, text in (
        ("Zero elevation", "98.20 ft"),
        ("Zero elevation: source", "survey of the wall"),
        ("Staff reading", "5.00"),
        ("Staff reading: low", "4.90 ft"),
        ("Staff reading: high", "5.10 ft"),
    ):
        page.get_by_label(label, exact=True).fill(text)
    page.get_by_role("button", name="Take this reading").click()
    expect(page.get_by_role("alert")).to_contain_text(
        'reading[R1].staff_reading is "5.00"; it needs a unit', timeout=20_000
    )
    assert page.get_by_label("Zero elevation: source", exact=True).input_value() == "survey of the wall"
    page.get_by_label("Staff reading", exact=True).fill("5.00 ft")
    page.get_by_role("button", name="Take this reading").click()
    # 98.20 + 5.00 = 103.20 ft, and 0.10 ft either way
    expect(page.locator(".sh-big")).to_contain_text("103.20", timeout=20_000)
    shown = chain(page)
    assert "survey of the wall" in shown
    assert re.search(r"Elevation of the water\s+L\s+103\.20 ft\s+103\.10 ft\s+103\.30 ft", shown)
    page.get_by_role("button", name="Use this as the flood-side level").click()
    expect(page.get_by_label("Flood side", exact=True)).to_have_value("103.20 ft", timeout=20_000)
    page.get_by_role("link", name="Flood line").click()
    # 62.4 · 5²/2 · 12 = 9360 lb and 62.4 · 5³/6 · 12 = 15 600 lb·ft
    expect(page.locator(".sh-table tr", has_text="Pump house shutter")).to_contain_text(
        "15.6 kip·ft", timeout=20_000
    )
    assert "9 360 lb" in row(page, "Pump house shutter")
    page.reload()
    expect(page.get_by_label("Flood side", exact=True)).to_have_value("103.20 ft", timeout=20_000)
    page.get_by_role("link", name="Readings").click()
    expect(page.locator(".sh-big")).to_contain_text("103.20", timeout=20_000)


def test_a_phone_shows_the_level_and_the_chain_without_scrolling_sideways(
    server: Server, phone: Page, watch: Watch
) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    document = read_file(next(path for path in SCENARIOS if path.stem == "reading-house"))
    opened(phone, f"{server.url}/readings?s={encode_document(document)}")
    figure = phone.locator(".sh-big b").first
    expect(figure).to_contain_text("641.35", timeout=20_000)
    box = figure.bounding_box()
    assert box is not None
    assert box["y"] + box["height"] <= 844, "the level is in view without scrolling"
    expect(phone.locator(".sh-card", has_text="Elevation of the water")).to_contain_text("= computed")
    wide = phone.evaluate(
        "() => [...document.querySelectorAll('[data-testid=stMain], .block-container')]"
        ".map(e => e.scrollWidth - e.clientWidth)"
    )
    assert max(wide) <= 0
