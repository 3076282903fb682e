import gzip
import http.client
import importlib.util
import json
import os
import signal
import socket
import subprocess
import sys
from collections.abc import Mapping
from pathlib import Path
from urllib.parse import urlsplit

import brotli
import pytest
from playwright.sync_api import Page, expect
from streamlit import file_util

from loads import __version__
from tests.webapp.driving import ROOT, Server, Watch
from webapp import selfcheck
from webapp.links import encode_document
from webapp.routes import MAX_CHECK_BYTES
from webapp.scenario_files import example_files

STATIC = Path(file_util.get_static_dir()) / "static"
SCRIPT = max(STATIC.glob("js/index.*.js"), key=lambda path: path.stat().st_size)
needs_package = pytest.mark.skipif(
    importlib.util.find_spec("webapp.package") is None, reason="this source tree has no webapp/package.py"
)


class Reply:
    """Status, headers (lower case) and body of one raw request: no client tidies the address up."""

    def __init__(
        self,
        server: Server,
        path: str,
        *,
        method: str = "GET",
        body: bytes | None = None,
        headers: Mapping[str, str] | None = None,
    ) -> None:
        connection = http.client.HTTPConnection(urlsplit(server.url).netloc, timeout=20)
        try:
            connection.request(method, path, body=body, headers=dict(headers or {}))
            response = connection.getresponse()
            self.status = response.status
            self.headers = {name.lower(): value for name, value in response.getheaders()}
            self.body = response.read()
        finally:
            connection.close()

    @property
    def messages(self) -> list[str]:
        return [problem["message"] for problem in json.loads(self.body)["problems"]]


def test_health_tells_the_version(server: Server) -> None:
    reply = Reply(server, "/healthz")
    assert (reply.status, json.loads(reply.body)) == (200, {"status": "alive", "version": __version__})
    assert reply.headers["cache-control"] == "no-store"


@pytest.mark.parametrize("examples", [[], [Path("nowhere.toml")], ["one with faults in it"]])
def test_an_installation_that_cannot_compute_is_not_ready(
    examples: list[object], tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    broken = tmp_path / "broken.toml"
    broken.write_text("format = 1\n")
    found = [broken if isinstance(example, str) else example for example in examples]
    monkeypatch.setattr(selfcheck, "example_files", lambda: found)
    ready, facts = selfcheck.ready()
    assert not ready
    assert facts["problems"]


def test_readiness_has_computed_the_example(server: Server) -> None:
    reply = Reply(server, "/readyz")
    facts = json.loads(reply.body)
    assert (reply.status, facts["ready"], facts["problems"]) == (200, True, [])
    assert facts["example"] == example_files()[0].name


@pytest.mark.parametrize(
    "path", ["/", "/healthz", "/readyz", "/static/js/" + SCRIPT.name, "/nowhere", "/api/check"]
)
def test_every_answer_carries_the_security_headers(server: Server, path: str) -> None:
    headers = Reply(server, path).headers
    policy = dict(rule.split(" ", 1) for rule in headers["content-security-policy"].split("; "))
    assert policy["default-src"] == policy["connect-src"] == "'self'"
    assert policy["frame-ancestors"] == policy["object-src"] == "'none'"
    assert "unsafe" not in policy["script-src"]
    assert headers["x-content-type-options"] == "nosniff"
    assert headers["x-frame-options"] == "DENY"
    assert headers["referrer-policy"] == "no-referrer"
    assert "geolocation=()" in headers["permissions-policy"]


@pytest.mark.browser
def test_the_page_opens_with_no_violation_and_no_request_elsewhere(
    page: Page, server: Server, watch: Watch
) -> None:
    page.goto(server.url)
    expect(page.get_by_role("heading", level=1)).to_be_visible()
    expect(page.get_by_test_id("stStatusWidget")).to_have_count(0)
    assert page.evaluate("window.prerenderReady") is not None  # the one inline script ran
    assert watch.console_errors == []
    assert watch.outside_requests == []


@pytest.mark.browser
def test_the_watch_sees_what_it_is_there_for(page: Page, server: Server, watch: Watch) -> None:
    page.goto(server.url)
    page.evaluate("fetch('http://elsewhere.invalid/x').catch(() => 0)")
    page.evaluate(
        "{const s = document.createElement('script'); s.text = 'window.broken = 1'; document.body.append(s)}"
    )
    assert page.evaluate("window.broken") is None
    page.wait_for_timeout(200)
    assert len(watch.console_errors) >= 2
    assert all("Content Security Policy" in error for error in watch.console_errors)
    watch.console_errors.clear()
    watch.outside_requests.clear()
    page.context.new_page().goto("data:text/html,<img src=http://elsewhere.invalid/y>")
    assert watch.outside_requests == ["http://elsewhere.invalid/y"]
    watch.outside_requests.clear()
    watch.console_errors.clear()


@pytest.mark.parametrize(("coding", "unpack"), [("br", brotli.decompress), ("gzip", gzip.decompress)])
def test_scripts_are_sent_compressed_and_kept(server: Server, coding: str, unpack: object) -> None:
    path = f"/static/js/{SCRIPT.name}"
    reply = Reply(server, path, headers={"Accept-Encoding": f"deflate, {coding};q=0.8"})
    assert (reply.status, reply.headers["content-encoding"]) == (200, coding)
    assert callable(unpack)
    assert unpack(reply.body) == SCRIPT.read_bytes()
    assert len(reply.body) < 0.5 * SCRIPT.stat().st_size
    assert reply.headers["content-type"].startswith("text/javascript")
    assert reply.headers["cache-control"] == "public, immutable, max-age=31536000"
    assert reply.headers["vary"] == "Accept-Encoding"
    asked = {"Accept-Encoding": coding, "If-None-Match": reply.headers["etag"]}
    again = Reply(server, path, headers=asked)
    assert (again.status, again.body) == (304, b"")
    head = Reply(server, path, method="HEAD", headers={"Accept-Encoding": coding})
    assert (head.status, head.body) == (200, b"")
    assert head.headers["content-length"] == reply.headers["content-length"]


@pytest.mark.parametrize("accepted", ["", "identity", "br;q=0, gzip;q=0", "deflate"])
def test_scripts_are_sent_plain_to_who_asks_for_plain(server: Server, accepted: str) -> None:
    reply = Reply(server, f"/static/js/{SCRIPT.name}", headers={"Accept-Encoding": accepted})
    assert reply.status == 200
    assert "content-encoding" not in reply.headers
    assert reply.body == SCRIPT.read_bytes()


@pytest.mark.parametrize(
    "path",
    [
        "/static/../../../../../../etc/passwd",
        "/static/%2e%2e/%2e%2e/%2e%2e/%2e%2e/etc/passwd",
        "/static/js/..%2f..%2f..%2f__init__.py",
        "/../main.py",
        "/main.py",
        "//etc/passwd",
        "/static/js/....//....//index.html%00.js",
        "/media/../../etc/passwd",
    ],
)
@pytest.mark.parametrize("accepted", ["br", "identity"])
def test_no_file_outside_is_served(server: Server, path: str, accepted: str) -> None:
    reply = Reply(server, path, headers={"Accept-Encoding": accepted})
    assert b"root:" not in reply.body
    assert b"import streamlit" not in reply.body
    assert reply.status in {400, 404} or reply.body.lstrip().startswith((b"<!--", b"<!DOCTYPE"))


@pytest.mark.parametrize(
    ("method", "path"),
    [("POST", "/healthz"), ("DELETE", "/readyz"), ("PUT", "/api/check"), ("POST", "/package.pdf")],
)
def test_other_methods_are_refused(server: Server, method: str, path: str) -> None:
    assert Reply(server, path, method=method, body=b"x").status == 405


def test_a_body_too_large_is_refused_with_the_limit(server: Server) -> None:
    reply = Reply(server, "/api/check", method="POST", body=b"#" * (MAX_CHECK_BYTES + 1))
    assert reply.status == 413
    assert reply.messages == ["the scenario file is larger than the 1,000,000 bytes that are read"]


def test_a_body_that_hides_its_size_is_cut_off_at_the_limit(server: Server) -> None:
    parts = urlsplit(server.url)
    with socket.create_connection((parts.hostname or "", parts.port or 0), timeout=20) as connection:
        connection.sendall(b"POST /api/check HTTP/1.1\r\nHost: x\r\nTransfer-Encoding: chunked\r\n\r\n")
        piece = b"10000\r\n" + b"#" * 0x10000 + b"\r\n"
        for _ in range(MAX_CHECK_BYTES // 0x10000 + 1):
            connection.sendall(piece)
        assert connection.recv(64).startswith(b"HTTP/1.1 413 ")


def test_a_body_that_is_no_text_is_refused(server: Server) -> None:
    reply = Reply(server, "/api/check", method="POST", body=b"title = '\xff'")
    assert (reply.status, reply.messages) == (400, ["the scenario file is not UTF-8 text"])


def test_an_unknown_override_is_refused(server: Server) -> None:
    reply = Reply(server, "/api/check?flod_side=3", method="POST", body=b"")
    assert (reply.status, reply.messages) == (
        400,
        ["flod_side is not known here; use flood_side or protected_side"],
    )


def test_a_scenario_is_answered_and_an_override_changes_it(server: Server) -> None:
    content = example_files()[0].read_bytes()
    plain = Reply(server, "/api/check", method="POST", body=content)
    raised = Reply(server, "/api/check?flood_side=200%20ft", method="POST", body=content)
    assert plain.status == raised.status == 200
    levels = [json.loads(reply.body)["barriers"][0]["levels"]["flood_side"] for reply in (plain, raised)]
    assert levels[0] != levels[1] == pytest.approx(200 * 0.3048)


def test_a_scenario_with_faults_is_refused_with_all_of_them(server: Server) -> None:
    reply = Reply(
        server, "/api/check", method="POST", body=b'format = 1\ntitle = "x"\ndatum = 3\nunits = "ells"\n'
    )
    assert reply.status == 400
    assert len(reply.messages) >= 2
    assert any("units" in message for message in reply.messages)


@pytest.mark.parametrize(
    ("link", "words"),
    [
        ("", "damaged"),
        ("7.AAAA", "newer Sillhead"),
        ("1.AAAA", "damaged"),
        ("1." + "A" * 60_000, "at most 60,000"),
    ],
)
def test_a_package_of_a_broken_link_is_refused(server: Server, link: str, words: str) -> None:
    reply = Reply(server, f"/package.pdf?s={link}")
    assert reply.status == 400
    assert words in reply.messages[0]


@needs_package
@pytest.mark.usefixtures("pango")
def test_the_package_of_a_link_is_a_pdf_named_by_its_check_code(server: Server) -> None:
    import tomllib

    link = encode_document(tomllib.loads(example_files()[0].read_text()))
    reply = Reply(server, f"/package.pdf?s={link}")
    assert (reply.status, reply.headers["content-type"]) == (200, "application/pdf")
    assert reply.body.startswith(b"%PDF-")
    assert reply.headers["content-disposition"].startswith('attachment; filename="sillhead-')


def test_the_agent_interface_of_streamlit_is_off(server: Server) -> None:
    reply = Reply(server, "/_stcore/agent/interact", method="POST", body=b"{}")
    assert reply.status in {403, 404}


def test_no_other_page_may_steer_this_one(server: Server) -> None:
    assert json.loads(Reply(server, "/_stcore/host-config").body)["allowedOrigins"] == []


def test_only_this_machine_is_listened_to(server: Server) -> None:
    port = f"{urlsplit(server.url).port:04X}"
    listening = [
        row.split()[1]
        for table in ("/proc/net/tcp", "/proc/net/tcp6")
        if Path(table).exists()
        for row in Path(table).read_text().splitlines()[1:]
        if row.split()[1].endswith(":" + port) and row.split()[3] == "0A"
    ]
    assert listening == [f"0100007F:{port}"]


@pytest.mark.parametrize("address", ["elsewhere.invalid", "1.2.3", "http://127.0.0.1"])
def test_an_address_that_is_none_is_a_message(address: str) -> None:
    command = [sys.executable, "-m", "webapp.cli", "serve", "--address", address]
    done = subprocess.run(command, capture_output=True, text=True, cwd=ROOT, timeout=20, check=False)
    assert done.returncode == 2
    assert "it must be an IP address" in done.stderr
    assert "Traceback" not in done.stderr


def test_a_taken_port_is_a_message(server: Server) -> None:
    command = [sys.executable, "-m", "webapp.cli", "serve", "--port", str(urlsplit(server.url).port)]
    done = subprocess.run(command, capture_output=True, text=True, cwd=ROOT, timeout=20, check=False)
    assert done.returncode == 1
    assert "is not available" in done.stderr
    assert "Traceback" not in done.stderr


@pytest.mark.parametrize("stop", [signal.SIGINT, signal.SIGTERM])
def test_the_server_stops_quietly(stop: signal.Signals, tmp_path: Path) -> None:
    command = [sys.executable, "-m", "webapp.cli", "serve", "--port", "0", "--data", str(tmp_path / "data")]
    environment = {**os.environ, "PYTHONUNBUFFERED": "1"}
    with subprocess.Popen(
        command, stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True, cwd=ROOT, env=environment
    ) as process:
        assert process.stdout is not None
        assert process.stderr is not None
        assert process.stdout.readline().startswith("Sillhead: http://127.0.0.1:")
        process.send_signal(stop)
        assert process.wait(15) in {0, -stop}
        told = process.stderr.read()
        assert "Traceback" not in told
        assert "Abort" not in told
    assert (tmp_path / "data").is_dir()
