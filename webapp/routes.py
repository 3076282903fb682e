"""The plain addresses beside the pages: health, readiness, a check as JSON, the calculation package."""

import importlib
from collections.abc import Callable
from typing import cast

from starlette.concurrency import run_in_threadpool
from starlette.requests import ClientDisconnect, Request
from starlette.responses import JSONResponse, Response
from starlette.routing import Route

from loads import __version__
from loads.document import check_code, input_digest
from loads.problems import Problem, ScenarioError
from webapp import selfcheck
from webapp.answer import check_json
from webapp.links import LinkError, decode_document
from webapp.pdf import PdfError, PrintJob, pdf_available
from webapp.print_worker import render_pdf

MAX_CHECK_BYTES = 1_000_000
CHECK_OVERRIDES = ("flood_side", "protected_side")
_FRESH = {"Cache-Control": "no-store"}


def routes() -> list[Route]:
    """Every plain address."""
    return [
        Route("/healthz", healthz, methods=["GET"]),
        Route("/readyz", readyz, methods=["GET"]),
        Route("/api/check", check, methods=["POST"]),
        Route("/package.pdf", package, methods=["GET"]),
    ]


async def healthz(_: Request) -> Response:
    """The server is up and answers."""
    return JSONResponse({"status": "alive", "version": __version__}, headers=_FRESH)


async def readyz(_: Request) -> Response:
    """The engine computes the example and both computations agree."""
    ready, facts = await run_in_threadpool(selfcheck.ready)
    return JSONResponse({"ready": ready, **facts}, status_code=200 if ready else 503, headers=_FRESH)


async def check(request: Request) -> Response:
    """A scenario file in the body, its answer as JSON."""
    content = await _body(request)
    if content is None:
        return _refusal(413, f"the scenario file is larger than the {MAX_CHECK_BYTES:,} bytes that are read")
    try:
        text = content.decode("utf-8-sig")
        overrides = _overrides(request)
        result = await run_in_threadpool(check_json, text, overrides)
    except UnicodeDecodeError:
        return _refusal(400, "the scenario file is not UTF-8 text")
    except ScenarioError as error:
        return _problems(400, error.problems)
    return JSONResponse(result, headers=_FRESH)


async def package(request: Request) -> Response:
    """Calculation package of the scenario in a frozen link, as PDF."""
    try:
        document = decode_document(request.query_params.get("s", ""))
        job: PrintJob = await run_in_threadpool(_package_job(), document)
    except LinkError as error:
        return _refusal(400, str(error))
    except ScenarioError as error:
        return _problems(400, error.problems)
    missing = pdf_available()
    if missing is not None:
        return _refusal(503, missing)
    try:
        content = await run_in_threadpool(render_pdf, job)
    except PdfError as error:
        return _refusal(503, str(error))
    name = f"sillhead-{check_code(input_digest(document))}.pdf"
    headers = {**_FRESH, "Content-Disposition": f'attachment; filename="{name}"'}
    return Response(content, media_type="application/pdf", headers=headers)


def _package_job() -> Callable[[dict[str, object]], PrintJob]:
    """What turns a document into a print job; imported when first asked, since only prints need it."""
    module = importlib.import_module("webapp.package")
    return cast("Callable[[dict[str, object]], PrintJob]", module.package_job)


async def _body(request: Request) -> bytes | None:
    """Body of a request, or None as soon as it is known to be too large."""
    announced = request.headers.get("content-length", "0")
    if announced.isdecimal() and int(announced) > MAX_CHECK_BYTES:
        return None
    content = bytearray()
    try:
        async for piece in request.stream():
            content += piece
            if len(content) > MAX_CHECK_BYTES:
                return None
    except ClientDisconnect:
        return None
    return bytes(content)


def _overrides(request: Request) -> dict[str, str]:
    unknown = sorted(set(request.query_params) - set(CHECK_OVERRIDES))
    if unknown:
        known = " or ".join(CHECK_OVERRIDES)
        raise ScenarioError(
            [Problem(path=name, value="", rule=f"is not known here; use {known}") for name in unknown]
        )
    return dict(request.query_params)


def _refusal(status: int, message: str) -> Response:
    return JSONResponse({"problems": [{"message": message}]}, status_code=status, headers=_FRESH)


def _problems(status: int, problems: tuple[Problem, ...]) -> Response:
    told = [{"path": p.path, "value": p.value, "rule": p.rule, "message": str(p)} for p in problems]
    return JSONResponse({"problems": told}, status_code=status, headers=_FRESH)
