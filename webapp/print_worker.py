"""Printing in a process of its own, so that a long print does not hold up the people on the pages.

The worker is this module run with `-m`.
Jobs and answers pass through its standard input and output, each after eight bytes that tell its length;
a job is JSON, an answer is a PDF or a message.
Closing its input ends it, so it never outlives the server, not even one that was killed.
"""

import base64
import contextlib
import datetime as dt
import functools
import json
import os
import signal
import subprocess
import sys
import threading
from pathlib import Path
from typing import IO

from webapp.pdf import Attachment, PdfError, PrintJob, render

PRINT_SECONDS = 120.0
_PDF, _MESSAGE = b"P", b"M"


class PrintWorker:
    """One worker process, started at the first job, replaced when it died; jobs wait for each other."""

    def __init__(self, *, seconds: float = PRINT_SECONDS) -> None:
        self._seconds = seconds
        self._turn = threading.Lock()
        self._process: subprocess.Popen[bytes] | None = None

    @property
    def process_id(self) -> int | None:
        """Process number of the running worker, None when there is none."""
        process = self._process
        return None if process is None or process.poll() is not None else process.pid

    def render(self, job: PrintJob) -> bytes:
        """PDF of a job, from the worker.

        Parameters
        ----------
        job
            What to print.

        Returns
        -------
        bytes
            The PDF file, the same as `webapp.pdf.render` gives.

        Raises
        ------
        PdfError
            When it cannot be printed, takes too long, or the worker died.
        """
        if not self._turn.acquire(timeout=self._seconds):
            raise PdfError("the printer is busy with earlier jobs; try again in a few minutes")
        try:
            return self._render(job)
        finally:
            self._turn.release()

    def shutdown(self) -> None:
        """Stop the worker; a job under way ends with an error. A later job starts a new one."""
        process, self._process = self._process, None
        if process is not None:
            _stop(process)

    def _render(self, job: PrintJob) -> bytes:
        process = self._process
        if process is None or process.poll() is not None:
            if process is not None:
                _stop(process)
            process = self._process = _start()
        assert process.stdin is not None
        assert process.stdout is not None
        too_late = threading.Event()

        def give_up() -> None:
            too_late.set()
            process.kill()

        timer = threading.Timer(self._seconds, give_up)
        timer.start()
        try:
            _write_frame(process.stdin, _job_bytes(job))
            answer = _read_frame(process.stdout)
        except OSError:
            answer = None
        finally:
            timer.cancel()
        if answer is None:
            _stop(process)
            if too_late.is_set():
                raise PdfError(
                    f"the PDF was not finished within {self._seconds:g} s; print fewer barriers at once"
                )
            raise PdfError("the print process stopped before the PDF was finished; try again")
        if answer[:1] == _PDF:
            return answer[1:]
        raise PdfError(answer[1:].decode())


@functools.cache
def shared_worker() -> PrintWorker:
    """The worker of this server."""
    return PrintWorker()


def render_pdf(job: PrintJob) -> bytes:
    """PDF of a job, from this server's worker; see `PrintWorker.render`."""
    return shared_worker().render(job)


def shutdown() -> None:
    """Stop this server's worker."""
    shared_worker().shutdown()


def _start() -> subprocess.Popen[bytes]:
    return subprocess.Popen(
        [sys.executable, "-m", "webapp.print_worker"],
        stdin=subprocess.PIPE,
        stdout=subprocess.PIPE,
        cwd=Path(__file__).parents[1],
    )


def _stop(process: subprocess.Popen[bytes]) -> None:
    process.kill()
    process.wait()
    for pipe in (process.stdin, process.stdout):
        assert pipe is not None
        with contextlib.suppress(OSError):
            pipe.close()


def _job_bytes(job: PrintJob) -> bytes:
    return json.dumps(
        {
            "html": job.html,
            "created": job.created.isoformat(),
            "smaller": job.smaller,
            "attachments": [
                [item.name, item.description, base64.b64encode(item.content).decode()]
                for item in job.attachments
            ],
        }
    ).encode()


def _job(content: bytes) -> PrintJob:
    fields = json.loads(content)
    return PrintJob(
        html=fields["html"],
        created=dt.datetime.fromisoformat(fields["created"]),
        smaller=tuple(fields["smaller"]),
        attachments=tuple(
            Attachment(name=name, description=description, content=base64.b64decode(content))
            for name, description, content in fields["attachments"]
        ),
    )


def _write_frame(pipe: IO[bytes], content: bytes) -> None:
    pipe.write(len(content).to_bytes(8, "big"))
    pipe.write(content)
    pipe.flush()


def _read_frame(pipe: IO[bytes]) -> bytes | None:
    """Next frame, or None when the other side closed the pipe before the frame was whole."""
    head = pipe.read(8)
    size = int.from_bytes(head, "big")
    content = pipe.read(size)
    return content if len(head) == 8 and len(content) == size else None


def _work() -> None:
    signal.signal(
        signal.SIGINT, signal.SIG_IGN
    )  # Ctrl+C reaches the whole group; the server ends this process
    answers = os.fdopen(os.dup(1), "wb")
    os.dup2(2, 1)  # whatever a library prints must not get between the frames
    while (content := _read_frame(sys.stdin.buffer)) is not None:
        try:
            answer = _PDF + render(_job(content))
        except PdfError as error:
            answer = _MESSAGE + str(error).encode()
        except Exception as error:  # noqa: BLE001  one bad job must not end the worker
            answer = _MESSAGE + f"the PDF could not be made ({type(error).__name__})".encode()
        _write_frame(answers, answer)


if __name__ == "__main__":
    _work()
