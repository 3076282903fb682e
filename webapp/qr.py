"""A link as a QR code, for a phone's camera and for paper."""

from __future__ import annotations

import io

import segno

MAX_QR_CHARACTERS = 2_000
"""Longest link that is drawn: a denser code does not read off wet paper."""


def qr_svg(text: str, *, scale: float = 3.0, dark: str = "#000000") -> str | None:
    """Draw a text as an inline SVG.

    Parameters
    ----------
    text
        Usually a frozen link.
    scale
        Size of one module in SVG units.
    dark
        Colour of the dark modules; the ground is white.

    Returns
    -------
    str or None
        None when the text is too long to read off paper.

    Examples
    --------
    >>> qr_svg("http://127.0.0.1/?s=1.A").startswith("<svg")
    True
    >>> qr_svg("x" * 3000) is None
    True
    """
    if len(text) > MAX_QR_CHARACTERS:
        return None
    code = segno.make(text, error="l", micro=False)
    out = io.BytesIO()
    code.save(
        out,
        kind="svg",
        scale=scale,
        dark=dark,
        light="#ffffff",
        xmldecl=False,
        svgns=True,
        omitsize=False,
        nl=False,
    )
    return out.getvalue().decode()
