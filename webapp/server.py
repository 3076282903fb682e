"""The server: Streamlit's pages, the plain addresses beside them, and the options all of them run under."""

import os
from collections.abc import AsyncIterator
from contextlib import asynccontextmanager, suppress
from pathlib import Path
from typing import Any

import click
import streamlit as st
from starlette.middleware import Middleware
from streamlit import config, file_util

from webapp import print_worker
from webapp.routes import routes
from webapp.security import SecurityHeaders
from webapp.static_files import CompressedStaticFiles

LOOPBACK = "127.0.0.1"
DATA_VARIABLE = "SILLHEAD_DATA"

OPTIONS: dict[str, Any] = {
    "browser.gatherUsageStats": False,
    "client.allowedOrigins": [],
    "client.showErrorDetails": "none",
    "client.showErrorLinks": "false",
    "client.toolbarMode": "minimal",
    "logger.hideWelcomeMessage": True,
    "runner.magicEnabled": False,
    "runner.postScriptGC": False,
    "server.enableAgentApi": False,
    "server.enableCORS": True,
    "server.enableStaticServing": False,
    "server.enableXsrfProtection": True,
    "server.fileWatcherType": "none",
    "server.headless": True,
    "server.maxMessageSize": 50,
    "server.maxUploadSize": 2,
    "server.maxWidgetStateSize": 4,
    "server.runOnSave": False,
    "server.showEmailPrompt": False,
    "theme.font": "system-ui, 'Segoe UI', Roboto, Arial, sans-serif",
    "theme.light.primaryColor": "#00507d",
    "theme.light.backgroundColor": "#fbfaf7",
    "theme.light.secondaryBackgroundColor": "#f0eee8",
    "theme.light.textColor": "#1d2733",
    "theme.dark.primaryColor": "#8cc8ea",
    "theme.dark.backgroundColor": "#15191e",
    "theme.dark.secondaryBackgroundColor": "#232a32",
    "theme.dark.textColor": "#eef1f4",
}
"""Streamlit's options; sizes in MB. Its collection of garbage after each rerun costs five times the rerun."""


def build_app() -> st.App:
    """The application with its pages, plain addresses and middleware, not yet started.

    Returns
    -------
    streamlit.App
        For `serve`, or for any ASGI server.
    """
    frontend = Path(file_util.get_static_dir())
    return st.App(
        Path(__file__).parent / "main.py",
        routes=routes(),
        middleware=[
            Middleware(SecurityHeaders, index=frontend / "index.html"),
            Middleware(CompressedStaticFiles, directory=frontend / "static"),
        ],
        lifespan=_lifespan,
    )


def serve(*, address: str = LOOPBACK, port: int | None = None, data: Path | None = None) -> None:
    """Run the server until it is stopped.

    Parameters
    ----------
    address
        Where to listen; the default is this machine alone.
    port
        Port, 0 for any free one; None for 8501 or the next free one.
    data
        Folder for whatever is kept between starts; made when missing.
    """
    options = {**OPTIONS, "server.address": address}
    if port is not None:
        options["server.port"] = port
    if data is not None:
        data.mkdir(parents=True, exist_ok=True)
        os.environ[DATA_VARIABLE] = str(data)
    with suppress(KeyboardInterrupt):
        build_app().run(config=options)


@asynccontextmanager
async def _lifespan(_: st.App) -> AsyncIterator[None]:
    address = config.get_option("server.address")
    place = f"[{address}]" if ":" in address else address
    click.echo(f"Sillhead: http://{place}:{config.get_option('server.port')}  (Ctrl+C ends it)")
    try:
        yield
    finally:
        print_worker.shutdown()
