"""The forecast page in a real Chromium: a forecast pasted, the crest moved, stale data."""

from __future__ import annotations

import json
import re
from pathlib import Path
from typing import Any

import pytest
from playwright.sync_api import Page, expect

from loads.scenario_file import Document, read_file, write_document
from tests.lines import SCENARIOS
from tests.webapp.driving import Server, Watch
from tests.webapp.test_cli import computed
from webapp.forecast_markup import OFF
from webapp.links import encode_document

pytestmark = pytest.mark.browser

LANDING = next(path for path in SCENARIOS if path.stem == "mill-landing")
ISSUED, LATER = "2031-04-02T09:10:00-05:00", "2031-04-02T15:00:00-05:00"
NEWER = (
    "time [CDT],stage forecast [ft]\n2031-04-02 19:00,24.0\n2031-04-03 07:00,26.0\n"
    "2031-04-03 19:00,27.0\n2031-04-04 07:00,26.5\n"
)
TIMEOUT = 20_000


def opened(page: Page, server: Server, watch: Watch, now: str, document: Document | None = None) -> Page:
    watch.expected_errors.append(r"status of 404")
    page.goto(f"{server.url}/forecast?s={encode_document(document or read_file(LANDING))}")
    expect(page.locator(".sh-name")).to_be_visible(timeout=TIMEOUT)
    tell_for(page, now)
    return page


def tell_for(page: Page, now: str) -> None:
    field = page.get_by_label("Told for the time", exact=True)
    field.fill(now)
    field.press("Enter")
    expect(page.get_by_text("not for now")).to_be_visible(timeout=TIMEOUT)


def cell(page: Page, trace: str) -> Any:
    """Call-out of C-07, the first closure of the table, for one trace."""
    row = page.locator(".sh-clock-table tbody tr").filter(has=page.locator(f"td:text-is('{trace}')")).first
    return row.locator("td").nth(3)


def told(document: Document, now: str, trace: str, tmp_path: Path) -> str:
    """Call-out of C-07 as `sillhead clock --json` tells it."""
    path = tmp_path / "told.toml"
    path.write_bytes(write_document(document))
    answer = json.loads(computed("clock", path, "--now", now, "--json"))
    street = next(one for one in answer["barriers"] if one["id"] == "C-07")
    line = next(one for one in street["timelines"] if one["trace"] == trace)
    return str(line["call_out"]["time"]["local"])


def shown(local: str) -> re.Pattern[str]:
    return re.compile(r"\s+".join(re.escape(word) for word in local.split()))


def test_a_foot_more_moves_the_call_out_as_the_json_says(
    server: Server, page: Page, watch: Watch, tmp_path: Path
) -> None:
    opened(page, server, watch, ISSUED)
    document = read_file(LANDING)
    likely = told(document, ISSUED, "likely", tmp_path)
    assert likely == "21:09 CDT Wed 2 Apr 2031"
    expect(cell(page, "likely")).to_have_text(shown(likely), timeout=TIMEOUT)
    field = page.get_by_label("Crest above forecast, ft", exact=True)
    field.fill("1")
    field.press("Enter")
    higher = told(document, ISSUED, "likely, 1 ft higher", tmp_path)
    assert higher == "13:00 CDT Wed 2 Apr 2031"
    expect(cell(page, "likely")).to_have_text(shown(higher), timeout=TIMEOUT)


def test_a_pasted_forecast_gives_a_new_clock(
    server: Server, page: Page, watch: Watch, tmp_path: Path
) -> None:
    opened(page, server, watch, LATER)
    page.get_by_label("Readings or forecast, pasted", exact=True).fill(NEWER)
    page.get_by_label("Issued, if the text does not say", exact=True).fill("2031-04-02T14:50:00-05:00")
    page.get_by_role("button", name="Take this series").click()
    expect(page.get_by_text("Taken for gauge G1")).to_be_visible(timeout=TIMEOUT)
    document = read_file(LANDING)
    points = [line.split(",") for line in NEWER.splitlines()[1:]]
    document["forecast"].append(
        {
            "gauge": "G1",
            "issued": "2031-04-02T14:50:00-05:00",
            "likely": [[f"{time.replace(' ', 'T')}:00-05:00", f"{stage} ft"] for time, stage in points],
        }
    )
    likely = told(document, LATER, "likely", tmp_path)
    assert likely == "17:48 CDT Wed 2 Apr 2031"
    expect(cell(page, "likely")).to_have_text(shown(likely), timeout=TIMEOUT)
    expect(page).to_have_url(re.compile(r"\?s=1\."))
    page.reload()
    expect(page.locator(".sh-name")).to_be_visible(timeout=TIMEOUT)
    tell_for(page, LATER)
    expect(cell(page, "likely")).to_have_text(shown(likely), timeout=TIMEOUT)


def test_a_stale_forecast_turns_the_advice_off(server: Server, page: Page, watch: Watch) -> None:
    opened(page, server, watch, ISSUED)
    expect(cell(page, "likely")).to_contain_text("21:09", timeout=TIMEOUT)
    expect(page.get_by_text(OFF)).to_have_count(0)
    field = page.get_by_label("Told for the time", exact=True)
    field.fill("2031-04-03T10:15:00-05:00")
    field.press("Enter")
    expect(page.get_by_text(OFF)).to_be_visible(timeout=TIMEOUT)
    expect(cell(page, "likely")).to_contain_text("21:09")


def test_on_a_phone_the_clock_stands_in_the_width(server: Server, phone: Page, watch: Watch) -> None:
    opened(phone, server, watch, ISSUED)
    card = phone.locator(".sh-clock").first
    expect(card).to_be_visible(timeout=TIMEOUT)
    expect(card).to_contain_text("21:09")
    assert phone.evaluate("document.documentElement.scrollWidth") <= 390
