"""What the browser may do with a page of this server, said in headers on every answer."""

import base64
import hashlib
import re
from pathlib import Path

from starlette.datastructures import MutableHeaders
from starlette.types import ASGIApp, Message, Receive, Scope, Send

_INLINE_SCRIPT = re.compile(r"<script>(.*?)</script>", re.DOTALL)
_REFUSED_FEATURES = ("camera", "microphone", "geolocation", "payment", "usb", "serial", "bluetooth", "midi")


def content_policy(index_html: str) -> str:
    """Content-Security-Policy under which only this server's own files run.

    Parameters
    ----------
    index_html
        The page that starts the application; its inline scripts are allowed by their hash.

    Returns
    -------
    str
        Value of the header.

    Examples
    --------
    >>> "sha256-" in content_policy("<script>let ready = false</script>")
    True
    """
    hashes = "".join(f" 'sha256-{_hash(script)}'" for script in _INLINE_SCRIPT.findall(index_html))
    return "; ".join(
        [
            "default-src 'self'",
            f"script-src 'self'{hashes}",
            "style-src 'self' 'unsafe-inline'",
            "img-src 'self' data: blob:",
            "font-src 'self' data:",
            "connect-src 'self'",
            "worker-src 'self' blob:",
            "object-src 'none'",
            "base-uri 'self'",
            "form-action 'self'",
            "frame-ancestors 'none'",
        ]
    )


def _hash(script: str) -> str:
    return base64.b64encode(hashlib.sha256(script.encode()).digest()).decode()


class SecurityHeaders:
    """Middleware that adds the headers to every answer.

    Parameters
    ----------
    app
        The application behind it.
    index
        The page that starts the application, read once.
    """

    def __init__(self, app: ASGIApp, index: Path) -> None:
        self.app = app
        self._headers = {
            "Content-Security-Policy": content_policy(index.read_text(encoding="utf-8")),
            "Cross-Origin-Opener-Policy": "same-origin",
            "Cross-Origin-Resource-Policy": "same-origin",
            "Permissions-Policy": ", ".join(f"{feature}=()" for feature in _REFUSED_FEATURES),
            "Referrer-Policy": "no-referrer",
            "X-Content-Type-Options": "nosniff",
            "X-Frame-Options": "DENY",
        }

    async def __call__(self, scope: Scope, receive: Receive, send: Send) -> None:
        """Answer one request (ASGI)."""
        if scope["type"] != "http":
            await self.app(scope, receive, send)
            return

        async def send_with_headers(message: Message) -> None:
            if message["type"] == "http.response.start":
                MutableHeaders(scope=message).update(self._headers)
            await send(message)

        await self.app(scope, receive, send_with_headers)
