"""Closures on the pages: in a real Chromium against the real server, and forms in process."""

import html
import json
import re
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest
from playwright.sync_api import Page, expect
from streamlit.testing.v1 import AppTest

from loads.assessment import Assessed
from loads.scenario_file import Document, write_document
from tests.webapp.closure_cases import POST, assessed_line, closure, line
from tests.webapp.driving import ROOT, Server, Watch
from webapp.check_groups import limits_reached
from webapp.display import elevation
from webapp.links import decode_document, encode_document

MISSING_BELOW_A_PAGE = r"status of 404"
WAIT = 20_000


def checked(document: Document, folder: Path, *, flood_side: str) -> dict[str, Any]:
    """What `sillhead check --json` says of the only barrier at a level."""
    path = folder / "trial.toml"
    path.write_bytes(write_document(document))
    command = [sys.executable, "-m", "webapp.cli", "check", str(path), "--json", "--flood-side", flood_side]
    told = subprocess.run(command, capture_output=True, check=True, cwd=ROOT, text=True)
    (barrier,) = json.loads(told.stdout)["barriers"]
    assert isinstance(barrier, dict)
    return barrier


def plain(text: str) -> str:
    return re.sub(r"[\u00a0\u202f]", " ", text)


def key_of(page: Page) -> str:
    """Texts of the drawing on a desk, where the key names the parts of each verdict."""
    return plain(" | ".join(page.locator(".sh-wide svg text").all_text_contents()))


def hatches(page: Page) -> set[str]:
    """Hatches that shapes of the drawing on a desk are filled with."""
    fills = page.locator(".sh-wide svg path").evaluate_all("all => all.map(e => e.getAttribute('fill'))")
    return {found[1] for fill in fills if (found := re.search(r"-(near|above|unchecked)\)$", fill or ""))}


@pytest.mark.browser
def test_logs_taken_out_and_water_raised_until_a_log_is_above_its_limit(
    server: Server, page: Page, watch: Watch, tmp_path: Path
) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    document = line(closure(post=POST), flood="102 ft")
    page.goto(f"{server.url}/barrier?s={encode_document(document)}")
    expect(page.locator(".sh-big")).to_contain_text("8 of 10", timeout=WAIT)
    # the bottom log carries 62.4 · 0.5 · 1.75 = 54.6 lb/ft of the 77 it may
    expect(page.locator(".sh-first")).to_contain_text("0.709")
    assert hatches(page) == {"unchecked"}, "posts without a limit"
    page.get_by_role("button", name="−1 log").click()
    expect(page.locator(".sh-big")).to_contain_text("7 of 10", timeout=WAIT)
    for level in ("102.50 ft", "103.00 ft"):
        page.get_by_role("button", name="+0.5").first.click()
        expect(page.get_by_label("Flood side", exact=True)).to_have_value(level, timeout=WAIT)
    # 62.4 · 0.5 · 2.75 = 85.8 lb/ft
    expect(page.locator(".sh-first")).to_contain_text("1.11", timeout=WAIT)
    expect(page.locator(".sh-big .sh-verdict")).to_have_text("above limit")
    assert hatches(page) == {"above", "near", "unchecked"}, "log 2 carries 70.2 lb/ft, 0.912 of its limit"
    lower = {**document, "closure": [closure(post=POST, logs_in_place=7)]}
    barrier = checked(lower, tmp_path, flood_side="103 ft")
    assert barrier["verdict"] == "above limit"
    above = [check["subject"] for check in barrier["checks"] if check["verdict"] == "above limit"]
    assert sorted(above) == ["bay 1 log 1", "bay 2 log 1", "bay 3 log 1"]
    assert "above limit: log 1 of bays 1–3" in key_of(page)
    first = barrier["first_limit"]
    assert (first["subject"], first["check"]) == ("bay 1 log 1", "line load")
    told = plain(page.locator(".sh-first").inner_text())
    level = plain(elevation(first["level"], "US"))
    assert told.startswith(f"First limit: log 1 of bays 1–3, line load at {level}")
    # 62.4 · 0.5 · (h − 0.25) = 77 at h = 2.718 ft
    assert "102.72 ft" in told


@pytest.mark.browser
def test_a_phone_shows_the_verdict_of_a_closure_without_scrolling_sideways(
    server: Server, phone: Page, watch: Watch
) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    phone.goto(f"{server.url}/barrier?s={encode_document(line(closure(post=POST)))}")
    mark = phone.locator(".sh-big .sh-verdict")
    expect(mark).to_have_text("above limit", timeout=WAIT)
    box = mark.bounding_box()
    assert box is not None
    assert box["x"] >= 0
    assert box["x"] + box["width"] <= 390
    assert box["y"] + box["height"] <= 844
    sideways = phone.evaluate(
        "() => [...document.querySelectorAll('html, [data-testid=stMain], .block-container')]"
        ".map(e => e.scrollWidth - e.clientWidth)"
    )
    assert max(sideways) <= 0


def app(document: Document, page: str) -> AppTest:
    test = AppTest.from_file(ROOT / "webapp" / "main.py", default_timeout=30)
    test.query_params["s"] = encode_document(document)
    test.run()
    test.switch_page(f"views/{page}.py").run()
    assert not test.exception
    return test


def shown(test: AppTest) -> str:
    return plain("\n".join(item.value for item in test.markdown))


def field(test: AppTest, name: str) -> Any:
    return test.text_input(key=f"field 1.closure.0.{name}")


def taken(test: AppTest) -> list[str]:
    """Take the form; what is said to be wrong."""
    next(button for button in test.button if button.label == "Take these values").click()
    test.run()
    assert not test.exception
    return [html.unescape(item.value) for item in test.error]


def test_a_closure_is_changed_in_its_form_and_nothing_refused_is_lost() -> None:
    test = app(line(closure(post=POST)), "inputs")
    field(test, "log.height").set_value("9")
    field(test, "log.limits.line_load source").set_value("works engineer")
    field(test, "post.limits.moment").set_value("4 kip·ft")
    (message,) = taken(test)
    assert 'closure[C1].log.height is "9"; it needs a unit, for example "9 in"' in message
    assert field(test, "log.height").value == "9"
    assert field(test, "log.limits.line_load source").value == "works engineer"
    field(test, "log.height").set_value("9 in")
    field(test, "logs_in_place").set_value("7, 8, 8")
    (message,) = taken(test)
    assert "the 8 logs in place would stand above the top of the post" in message
    field(test, "post.height").set_value("7.6 ft")
    assert taken(test) == []
    document: Any = decode_document(test.query_params["s"])
    (record,) = document["closure"]
    assert record["log"]["height"] == "9 in"
    assert record["logs_in_place"] == [7, 8, 8]
    assert record["log"]["limits"]["line_load"] == {"value": "77 lb/ft", "source": "works engineer"}
    assert record["post"] == POST | {"height": "7.6 ft", "limits": {"moment": "4 kip·ft"}}


def test_the_page_of_a_closure_holds_parts_losses_and_water() -> None:
    text = shown(app(line(closure(post=POST, logs_in_place=[8, 8, 7])), "barrier"))
    for words in (
        "Bays 1, 2, each: 8 of 10 logs in place, top 104.00 ft",
        "Bay 3: 7 of 10 logs in place, top 103.50 ft",
        "If a part were lost",
        "brace of post 1",
        "Water begins to go over at 103.50 ft.",
        "not checked",
        "117 lb/ft",
    ):
        assert words in text, words


def test_the_flood_line_lists_closures_with_the_part_that_presses() -> None:
    document = line(closure(), closure("C2", sill="103 ft"))
    document["panel"] = [{"id": "P1", "bottom": "101 ft", "width": "6 ft", "height": "4 ft"}]
    text = shown(app(document, "flood_line"))
    assert "C1 · Closure C1" in text
    assert "bay 1 log 1 line load" in text
    assert text.index("P1") < text.index("C1 · Closure C1") < text.index("C2 · Closure C2")


def test_parts_share_a_row_only_while_they_carry_the_same() -> None:
    post = {key: value for key, value in POST.items() if key != "brace"}
    limited = post | {"limits": {"moment": {"value": "8 kip·ft", "source": "engineer of record"}}}
    alike, apart = (
        assessed_line(closure(post=limited, logs_in_place=counts, log={"limits": {}})).barriers[0]
        for counts in (8, [8, 8, 10])
    )
    assert isinstance(alike, Assessed)
    assert isinstance(apart, Assessed)
    (row,) = limits_reached(alike, 6)
    assert row.parts == "posts 1, 2"
    (row,) = limits_reached(apart, 6)
    # both posts carry the same now; above the lower stacks the third bay bears on post 2 alone
    assert row.parts == "post 2"
