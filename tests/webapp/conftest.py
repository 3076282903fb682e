import os
import re
import shutil
import subprocess
import sys
import time
import urllib.error
import urllib.request
from collections.abc import Iterator
from pathlib import Path
from urllib.parse import urlsplit

import pytest
from playwright.sync_api import Browser, Page, sync_playwright

from tests.webapp.driving import ROOT, Server, Watch
from webapp.pdf import pdf_available

BROWSER_NAMES = ("chromium", "chromium-browser", "google-chrome")
BROWSER_ARGUMENTS = (
    "--no-sandbox",
    "--disable-gpu",
    "--disable-background-networking",
    "--disable-component-update",
    "--no-first-run",
)


def _missing(reason: str, switch: str) -> None:
    if os.environ.get(switch) == "1":
        pytest.fail(f"{reason} ({switch}=1 asks for it)", pytrace=False)
    pytest.skip(reason)


@pytest.fixture(scope="session")
def pango() -> None:
    """The text library that PDF needs, or the test is skipped."""
    reason = pdf_available()
    if reason is not None:
        _missing(reason, "SILLHEAD_REQUIRE_PDF")


@pytest.fixture(scope="session")
def server(tmp_path_factory: pytest.TempPathFactory) -> Iterator[Server]:
    """The real server in a process of its own, on a free port of this machine."""
    place = tmp_path_factory.mktemp("server")
    log = place / "log.txt"
    command = [sys.executable, "-m", "webapp.cli", "serve", "--port", "0", "--data", str(place / "data")]
    environment = {**os.environ, "PYTHONUNBUFFERED": "1"}
    with (
        log.open("wb") as output,
        subprocess.Popen(
            command, stdout=output, stderr=subprocess.STDOUT, cwd=ROOT, env=environment
        ) as process,
    ):
        try:
            yield Server(url=_started(process, log), process_id=process.pid, log=log)
        finally:
            process.terminate()
            try:
                process.wait(10)
            except subprocess.TimeoutExpired:
                process.kill()


def _started(process: subprocess.Popen[bytes], log: Path) -> str:
    for _ in range(600):
        told = re.search(r"Sillhead: (http://\S+)", log.read_text())
        if told is not None and _answers(f"{told[1]}/healthz"):
            return told[1]
        if process.poll() is not None:
            break
        time.sleep(0.05)
    raise AssertionError(f"the server did not start:\n{log.read_text()}")


def _answers(url: str) -> bool:
    try:
        with urllib.request.urlopen(url, timeout=5) as response:
            return bool(response.status == 200)
    except urllib.error.URLError:
        return False


@pytest.fixture(scope="session")
def browser() -> Iterator[Browser]:
    """A real Chromium, or the test is skipped."""
    path = next(filter(None, map(shutil.which, BROWSER_NAMES)), None)
    if path is None:
        _missing(
            "no Chromium on this machine; on Debian install it with: apt-get install chromium",
            "SILLHEAD_REQUIRE_BROWSER",
        )
    with sync_playwright() as playwright:
        browser = playwright.chromium.launch(executable_path=path, args=list(BROWSER_ARGUMENTS))
        yield browser
        browser.close()


@pytest.fixture
def watch(server: Server) -> Watch:
    """Console errors and requests to other hosts of this test's pages; both must be empty at its end."""
    return Watch(host=urlsplit(server.url).netloc)


def _fresh_page(browser: Browser, watch: Watch, width: int, height: int, *, touch: bool) -> Iterator[Page]:
    context = browser.new_context(
        viewport={"width": width, "height": height}, has_touch=touch, is_mobile=touch, reduced_motion="reduce"
    )
    watch.follow(context)
    yield context.new_page()
    context.close()
    watch.conclude()


@pytest.fixture
def page(browser: Browser, watch: Watch) -> Iterator[Page]:
    """An empty page of a browser that has never been here, on a desk."""
    yield from _fresh_page(browser, watch, 1440, 900, touch=False)


@pytest.fixture
def phone(browser: Browser, watch: Watch) -> Iterator[Page]:
    """An empty page of a browser that has never been here, on a phone."""
    yield from _fresh_page(browser, watch, 390, 844, touch=True)
