"""The pages in a real Chromium against the real server."""

import re
from pathlib import Path

import pytest
from playwright.sync_api import Browser, Page, expect

from loads.scenario_file import read_file, write_document
from tests.webapp.driving import Server, Watch
from webapp.links import encode_document
from webapp.scenario_files import example_files

pytestmark = pytest.mark.browser

MISSING_BELOW_A_PAGE = r"status of 404"
"""The front end first looks for its server below the page's own path, then finds it at the root."""

MARKUP = "<script>document.title=1</script><img src=x onerror=alert(1)>*b* [l](javascript:1) $x$"


def opened(page: Page, url: str) -> Page:
    page.goto(url)
    expect(page.locator(".sh-name")).to_be_visible(timeout=20_000)
    return page


def type_level(page: Page, label: str, text: str) -> None:
    field = page.get_by_label(label, exact=True)
    field.fill(text)
    field.press("Enter")


def row(page: Page, name: str) -> str:
    """Text of one barrier's row of the table, spaces made plain."""
    cells = page.locator(".sh-table tr", has_text=name).locator("td").all_inner_texts()
    return re.sub(r"[\u00a0\u202f]", " ", " | ".join(cells))


def link_of(page: Page, server: Server) -> str:
    page.get_by_role("link", name="Sheets and links").click()
    code = page.locator("[data-testid=stCode] code")
    expect(code).to_contain_text("?s=1.", timeout=20_000)
    return code.inner_text().replace("\n", "")


def test_a_first_visit_shows_an_example_with_its_answer(server: Server, page: Page) -> None:
    opened(page, server.url)
    # 62.4 pcf, 6.40 ft of water over 6 ft of panel, 12 ft wide: 62.4 · (6.4² − 0.4²)/2 · 12 = 15 276 lb
    assert "15.3 kip" in row(page, "Pump house shutter")
    assert "not checked" in row(page, "Pump house shutter")
    assert "above limit" in row(page, "Ferry Steps")
    box = page.locator(".sh-wide svg").first.bounding_box()
    assert box is not None
    assert box["y"] + box["height"] < 900, "the picture is in view without scrolling"


def test_a_changed_level_changes_the_force_to_the_figure_by_hand(server: Server, page: Page) -> None:
    opened(page, server.url)
    type_level(page, "Flood side", "103.2 ft")
    # 62.4 · 5²/2 · 12 = 9360 lb and 62.4 · 5³/6 · 12 = 15 600 lb·ft
    expect(page.locator(".sh-table tr", has_text="Pump house shutter")).to_contain_text(
        "15.6 kip·ft", timeout=20_000
    )
    assert "9 360 lb" in row(page, "Pump house shutter")


def test_buttons_move_the_level(server: Server, page: Page) -> None:
    opened(page, server.url)
    raises = page.get_by_role("button", name="+0.5")
    expect(raises).to_have_count(2)
    raises.first.click()
    expect(page.get_by_label("Flood side", exact=True)).to_have_value("105.10 ft", timeout=20_000)


def test_a_level_without_a_unit_is_refused_and_kept(server: Server, page: Page) -> None:
    opened(page, server.url)
    type_level(page, "Flood side", "103.2")
    expect(page.get_by_role("alert")).to_contain_text(
        'it needs a unit, for example "103.2 ft"', timeout=20_000
    )
    assert page.get_by_label("Flood side", exact=True).input_value() == "103.2"
    assert "15.3 kip" in row(page, "Pump house shutter"), "the answer is still that of the level before"


def test_a_frozen_link_opens_the_same_figures_in_a_fresh_browser(
    server: Server, page: Page, browser: Browser, watch: Watch
) -> None:
    opened(page, server.url)
    type_level(page, "Flood side", "103.7 ft")
    expect(page.locator(".sh-table tr", has_text="Pump house shutter")).to_contain_text(
        "11.3 kip", timeout=20_000
    )
    before = row(page, "Ferry Steps")
    code = page.locator(".sh-title").inner_text()
    link = link_of(page, server)
    fresh = browser.new_context(viewport={"width": 1440, "height": 900})
    watch.follow(fresh)
    try:
        other = opened(fresh.new_page(), link)
        assert row(other, "Ferry Steps") == before
        assert other.locator(".sh-title").inner_text() == code
        other.get_by_role("link", name="Barrier").click()
        expect(other.locator(".sh-big")).to_contain_text("11.3 kip", timeout=20_000)
        other.get_by_role("link", name="Flood line").click()
        expect(other.locator(".sh-table tr", has_text="Ferry Steps")).to_be_visible(timeout=20_000)
        assert row(other, "Ferry Steps") == before
        expect(other).to_have_url(re.compile(r"\?s=1\."))
        other.reload()
        expect(other.locator(".sh-table tr", has_text="Ferry Steps")).to_be_visible(timeout=20_000)
        assert row(other, "Ferry Steps") == before
    finally:
        fresh.close()


def test_a_reload_keeps_a_change(server: Server, page: Page) -> None:
    opened(page, server.url)
    type_level(page, "Flood side", "103.2 ft")
    expect(page.locator(".sh-table tr", has_text="Pump house shutter")).to_contain_text(
        "15.6 kip·ft", timeout=20_000
    )
    page.reload()
    expect(page.locator(".sh-table tr", has_text="Pump house shutter")).to_contain_text(
        "15.6 kip·ft", timeout=20_000
    )
    expect(page.get_by_label("Flood side", exact=True)).to_have_value("103.2 ft")


@pytest.mark.parametrize(
    ("packed", "words"),
    [
        ("1.AAAAAAAAAAAAAAAA", "damaged"),
        ("3.AAAA", "newer Sillhead"),
        ("1." + "A" * 60_050, "at most 60,000 are read"),
    ],
)
def test_a_bad_link_is_refused_in_plain_words(server: Server, page: Page, packed: str, words: str) -> None:
    opened(page, f"{server.url}/?s={packed}")
    expect(page.get_by_role("alert")).to_contain_text(words, timeout=20_000)
    assert "15.3 kip" in row(page, "Pump house shutter"), "the example stands in"


def test_units_switch_without_changing_what_was_typed(server: Server, page: Page) -> None:
    opened(page, server.url)
    page.get_by_role("radio", name="SI").click()
    # 15 276 lb · 4.448 N/lb = 67.9 kN
    expect(page.locator(".sh-table tr", has_text="Pump house shutter")).to_contain_text(
        "67.9 kN", timeout=20_000
    )
    assert page.get_by_label("Flood side", exact=True).input_value() == "104.60 ft"
    assert 'flood_side = { value = "104.60 ft"' in example_files()[0].read_text()
    link = link_of(page, server)
    assert link.split("?s=")[1] == encode_document(read_file(example_files()[0])), "the link is unchanged"


def test_a_broken_file_gives_every_message_and_a_good_one_opens(
    server: Server, page: Page, watch: Watch, tmp_path: Path
) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    opened(page, f"{server.url}/sheets")
    broken = tmp_path / "broken.toml"
    text = example_files()[0].read_text().replace('width = "12 ft"', 'widht = "12 ft"')
    broken.write_text(
        text.replace('friction_angle = { value = "28 deg"', 'friction_angle = { value = "62 deg"')
    )
    page.locator("input[type=file]").set_input_files(broken)
    alert = page.get_by_role("alert").first
    expect(alert).to_contain_text('panel[P1].widht is not a known key; did you mean "width"?', timeout=20_000)
    expect(alert).to_contain_text(
        'panel[P3].sediment[0].friction_angle is "62 deg"; it must be between 0 and 45 deg'
    )
    page.locator("input[type=file]").set_input_files(example_files()[1])
    title = str(read_file(example_files()[1])["title"])
    expect(page.locator(".sh-name")).to_have_text(title, timeout=20_000)


def test_the_barrier_page_shows_working_and_reads_off_the_pressure(
    server: Server, page: Page, watch: Watch
) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    opened(page, f"{server.url}/barrier")
    page.get_by_text("Worked steps").click()
    expect(page.get_by_text("Force and moment", exact=False).first).to_be_visible(timeout=20_000)
    page.get_by_text("Read the pressure at any elevation").click()
    expect(page.locator(".js-plotly-plot .xtick").first).to_be_visible(timeout=20_000)


def test_a_panel_edited_in_its_form_changes_the_answer(server: Server, page: Page, watch: Watch) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    opened(page, f"{server.url}/inputs")
    page.get_by_label("Height", exact=True).fill("-6 ft")
    page.get_by_role("button", name="Take these values").first.click()
    alert = page.get_by_role("alert").first
    expect(alert).to_contain_text('panel[P1].height is "-6 ft"; it must be more than 0', timeout=20_000)
    assert page.get_by_label("Height", exact=True).input_value() == "-6 ft", "nothing typed is lost"
    page.get_by_label("Height", exact=True).fill("8 ft")
    page.get_by_label("Force", exact=True).fill("20 kip")
    page.get_by_role("button", name="Take these values").first.click()
    expect(page.get_by_role("alert")).to_have_count(0, timeout=20_000)
    page.get_by_role("link", name="Flood line").click()
    # the whole head of 6.4 ft now bears: 62.4 · 6.4²/2 · 12 = 15 335 lb, 0.767 of the limit entered
    expect(page.locator(".sh-table tr", has_text="Pump house shutter")).to_contain_text(
        "0.767", timeout=20_000
    )


def test_markup_typed_into_text_is_shown_as_text(server: Server, page: Page) -> None:
    document = read_file(example_files()[0])
    document["title"] = MARKUP
    document["panel"][0]["name"] = MARKUP
    document["panel"][1]["rated_level"]["source"] = MARKUP
    document["datum"] = MARKUP
    opened(page, f"{server.url}/?s={encode_document(document)}")
    expect(page.locator(".sh-name")).to_have_text(MARKUP)
    assert page.title() == "Sillhead"
    assert page.locator(".sh img, .sh script, .sh em, .sh a").count() == 0
    page.get_by_role("link", name="Barrier").click()
    expect(page.locator(".sh-big")).to_be_visible(timeout=20_000)
    page.get_by_role("link", name="Inputs").click()
    expect(page.get_by_label("Name", exact=True).first).to_have_value(MARKUP, timeout=20_000)


def test_a_phone_shows_verdict_and_force_without_scrolling_sideways(server: Server, phone: Page) -> None:
    opened(phone, server.url)
    card = phone.locator(".sh-card", has_text="Ferry Steps")
    for text in ("above limit", "8"):
        expect(card).to_contain_text(text)
    for locator in (card.locator(".sh-verdict"), card.locator(".figure")):
        box = locator.bounding_box()
        assert box is not None
        assert box["x"] >= 0
        assert box["x"] + box["width"] <= 390
        assert box["y"] + box["height"] <= 844
    assert phone.evaluate("document.documentElement.scrollWidth") <= 390
    wide = phone.evaluate(
        "() => [...document.querySelectorAll('[data-testid=stMain], .block-container')]"
        ".map(e => e.scrollWidth - e.clientWidth)"
    )
    assert max(wide) <= 0


def test_every_page_opens_in_both_colour_schemes(server: Server, browser: Browser, watch: Watch) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    for scheme in ("light", "dark"):
        context = browser.new_context(viewport={"width": 1440, "height": 900}, color_scheme=scheme)
        watch.follow(context)
        page = context.new_page()
        for name in ("", "barrier", "inputs", "sheets"):
            opened(page, f"{server.url}/{name}")
            assert page.get_by_role("alert").count() == 0
        page.goto(f"{server.url}/method")
        expect(page.get_by_text("Cautions", exact=True)).to_be_visible(timeout=20_000)
        context.close()


def test_a_scenario_saved_is_the_one_typed(server: Server, page: Page, watch: Watch) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    opened(page, f"{server.url}/sheets")
    with page.expect_download() as waiting:
        page.get_by_role("button", name="Scenario file").click()
    saved = Path(waiting.value.path()).read_bytes()
    assert saved == write_document(read_file(example_files()[0]))
