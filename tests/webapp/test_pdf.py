import datetime as dt
import io
import os
import signal
import socketserver
import subprocess
import sys
import threading
import time
import urllib.parse
from collections.abc import Iterator
from pathlib import Path

import pypdf
import pytest

from webapp import pdf
from webapp.pdf import Attachment, PdfError, PrintJob, render
from webapp.print_worker import PrintWorker

pytestmark = pytest.mark.usefixtures("pango")

SCENARIO = b'format = 1\ntitle = "Tannery Row"\n'
DRAWING = (
    "<svg xmlns='http://www.w3.org/2000/svg' width='200' height='120'>"
    "<rect x='10' y='10' width='80' height='60' fill='#0072b2'/><text x='10' y='100'>γ′ 62.4 pcf</text></svg>"
)
JOB = PrintJob(
    html=f"<html lang=en><title>Tannery Row</title><h1>Pump house</h1>{DRAWING}<p>φ′ = 28°, K₀ = 0.531</p>",
    created=dt.datetime(2031, 3, 2, 6, 30, tzinfo=dt.UTC),
    attachments=(Attachment(name="tannery.toml", description="Scenario file", content=SCENARIO),),
)


@pytest.fixture
def worker() -> Iterator[PrintWorker]:
    worker = PrintWorker(seconds=60)
    yield worker
    worker.shutdown()


def test_the_pdf_carries_text_title_date_and_the_scenario_file() -> None:
    reader = pypdf.PdfReader(io.BytesIO(render(JOB)))
    assert "K₀ = 0.531" in reader.pages[0].extract_text()
    assert reader.metadata is not None
    assert reader.metadata.title == "Tannery Row"
    assert reader.metadata.creation_date == JOB.created
    assert reader.metadata.modification_date == JOB.created
    assert reader.attachments["tannery.toml"] == [SCENARIO]


def test_the_same_job_gives_the_same_bytes_in_every_process(worker: PrintWorker) -> None:
    here = render(JOB)
    there = worker.render(JOB)
    first_process = worker.process_id
    worker.shutdown()
    assert here == there == worker.render(JOB)
    assert worker.process_id != first_process


def test_a_time_without_zone_is_refused() -> None:
    with pytest.raises(PdfError, match="needs a zone"):
        render(PrintJob(html="<p>x", created=dt.datetime(2031, 3, 2)))  # noqa: DTZ001


class _Listener(socketserver.ThreadingTCPServer):
    """Counts who connects."""

    callers = 0

    def verify_request(self, *_: object) -> bool:
        self.callers += 1
        return False


def test_no_address_outside_the_html_is_fetched(tmp_path: Path) -> None:
    secret = tmp_path / "secret.txt"
    secret.write_text("cache of the pump house keys")
    drawing = tmp_path / "secret.svg"
    drawing.write_text("<svg xmlns='http://www.w3.org/2000/svg'><text y='20'>pump house keys</text></svg>")
    with _Listener(("127.0.0.1", 0), socketserver.BaseRequestHandler) as listener:
        threading.Thread(target=listener.serve_forever, daemon=True).start()
        place = f"127.0.0.1:{listener.server_address[1]}"
        addresses = [f"{scheme}://{place}/x" for scheme in ("http", "HTTP", "https", "ftp", "gopher")]
        addresses += [f"//{place}/x", secret.as_uri(), drawing.as_uri(), str(drawing), "file:///etc/hostname"]
        probes = "".join(
            f"<img src='{address}'><object data='{address}'></object><embed src='{address}'>"
            f"<link rel=stylesheet href='{address}'><link rel=attachment href='{address}'>"
            f"<a rel=attachment href='{address}'>a</a><style>@import url({address}); "
            f"@font-face {{ font-family: probe; src: url({address}) }} p {{ background: url({address}); "
            f"list-style-image: url({address}); font-family: probe }}</style>"
            f"<svg xmlns='http://www.w3.org/2000/svg' xmlns:xlink='http://www.w3.org/1999/xlink'>"
            f"<image xlink:href='{address}' width='9' height='9'/><use xlink:href='{address}#a'/></svg>"
            for address in addresses
        )
        base = f"<base href='http://{place}/'>"
        content = render(
            PrintJob(html=f"<html><head>{base}</head><p>kept{probes}</p><img src=y>", created=JOB.created)
        )
        listener.shutdown()
    assert listener.callers == 0
    reader = pypdf.PdfReader(io.BytesIO(content))
    assert "kept" in reader.pages[0].extract_text()
    assert not dict(reader.attachments)
    assert not any("keys" in page.extract_text() for page in reader.pages)


def test_the_listener_of_the_probe_test_does_count() -> None:
    with _Listener(("127.0.0.1", 0), socketserver.BaseRequestHandler) as listener:
        threading.Thread(target=listener.serve_forever, daemon=True).start()
        import weasyprint

        html = f"<img src='http://127.0.0.1:{listener.server_address[1]}/x'>"
        weasyprint.HTML(string=html).write_pdf()
        listener.shutdown()
    assert listener.callers == 1


def test_pictures_inside_the_html_are_drawn() -> None:
    drawing = urllib.parse.quote("<svg xmlns='http://www.w3.org/2000/svg'><text y='20'>sill</text></svg>")
    content = render(PrintJob(html=f'<img src="data:image/svg+xml,{drawing}">', created=JOB.created))
    assert "sill" in pypdf.PdfReader(io.BytesIO(content)).pages[0].extract_text()


def test_a_nest_too_deep_to_lay_out_is_a_message(worker: PrintWorker) -> None:
    deep = PrintJob(html="<div>" * 3000 + "x", created=JOB.created)
    with pytest.raises(PdfError, match="nested too deeply"):
        worker.render(deep)
    assert worker.render(JOB).startswith(b"%PDF-")


def test_a_dead_worker_is_replaced(worker: PrintWorker) -> None:
    worker.render(JOB)
    first = worker.process_id
    assert first is not None
    os.kill(first, signal.SIGKILL)
    for _ in range(100):
        if worker.process_id is None:
            break
        time.sleep(0.02)
    assert worker.render(JOB).startswith(b"%PDF-")
    assert worker.process_id not in (None, first)


def test_a_print_that_takes_too_long_is_stopped() -> None:
    worker = PrintWorker(seconds=0.05)  # less than an interpreter needs to start
    with pytest.raises(PdfError, match=r"not finished within 0\.05 s"):
        worker.render(JOB)
    assert worker.process_id is None


def test_shutdown_ends_a_job_under_way(worker: PrintWorker) -> None:
    long_job = PrintJob(html="<p>Tannery Row</p>" * 50_000, created=JOB.created)
    problems: list[str] = []

    def print_it() -> None:
        try:
            worker.render(long_job)
        except PdfError as error:
            problems.append(str(error))

    thread = threading.Thread(target=print_it)
    thread.start()
    while worker.process_id is None:
        time.sleep(0.01)
    worker.shutdown()
    thread.join(10)
    assert problems == ["the print process stopped before the PDF was finished; try again"]


def test_the_worker_ends_when_its_server_is_killed() -> None:
    code = (
        "import datetime, sys, time\n"
        "from webapp import print_worker\n"
        "from webapp.pdf import PrintJob\n"
        "noon = datetime.datetime(2031, 1, 1, 12, tzinfo=datetime.UTC)\n"
        "print_worker.render_pdf(PrintJob(html='x', created=noon))\n"
        "print(print_worker.shared_worker().process_id, flush=True)\n"
        "time.sleep(60)\n"
    )
    root = Path(pdf.__file__).parents[1]
    with subprocess.Popen(
        [sys.executable, "-c", code], stdout=subprocess.PIPE, text=True, cwd=root
    ) as server:
        assert server.stdout is not None
        worker_process = int(server.stdout.readline())
        server.kill()
    for _ in range(200):
        if not _is_running(worker_process):
            break
        time.sleep(0.02)
    assert not _is_running(worker_process)


def _is_running(process_id: int) -> bool:
    try:
        status = Path(f"/proc/{process_id}/stat").read_text()
    except FileNotFoundError:
        return False
    return status.rpartition(")")[2].split()[0] != "Z"


def test_a_machine_without_pango_gets_the_package_names(tmp_path: Path) -> None:
    blocked = tmp_path / "sitecustomize.py"
    blocked.write_text(
        "import ctypes.util, sys\n"
        "import cffi\n"
        "sound = cffi.FFI.dlopen\n"
        "def dlopen(self, name, flags=0):\n"
        "    if name and 'pango' in name:\n"
        "        raise OSError(f'cannot load library {name!r}')\n"
        "    return sound(self, name, flags)\n"
        "cffi.FFI.dlopen = dlopen\n"
    )
    code = "from webapp.pdf import pdf_available; print(pdf_available())"
    root = str(Path(pdf.__file__).parents[1])
    environment = {**os.environ, "PYTHONPATH": os.pathsep.join([str(tmp_path), root])}
    done = subprocess.run(
        [sys.executable, "-c", code], capture_output=True, text=True, env=environment, check=True
    )
    assert done.stdout.strip().endswith(
        "apt-get install libpango-1.0-0 libpangoft2-1.0-0 libharfbuzz-subset0"
    )
