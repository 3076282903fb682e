"""Building of SVG elements. Every text and every attribute is escaped here and nowhere else."""

from __future__ import annotations

import math
import re
from collections.abc import Iterable
from functools import cache

Point = tuple[float, float]

_ESCAPES = str.maketrans({"&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;", "'": "&#39;"})
_UNUSABLE = re.compile("[^ -\ud7ff\ue000-\ufffd\U00010000-\U0010ffff]|[\x7f-\x9f\u202a-\u202e\u2066-\u2069]+")


class Svg(str):
    """Markup that `element` built; any other text is escaped before it becomes part of a drawing."""

    __slots__ = ()


def escaped(text: str) -> Svg:
    """Text as it may stand between tags and in an attribute; control characters become spaces.

    Examples
    --------
    >>> escaped('<b title="x">R&D')
    '&lt;b title=&quot;x&quot;&gt;R&amp;D'
    """
    return Svg(_UNUSABLE.sub(" ", text).translate(_ESCAPES))


def number(value: float) -> str:
    """Coordinate rounded to two decimals, without trailing zeros.

    Raises
    ------
    ValueError
        The value is not finite: a drawing never guesses a place.

    Examples
    --------
    >>> number(12.0), number(-0.001), number(3.14159)
    ('12', '0', '3.14')
    """
    if not math.isfinite(value):
        raise ValueError(f"{value} cannot be drawn")
    text = f"{value:.2f}".rstrip("0").rstrip(".")
    return "0" if text == "-0" else text


@cache
def _attribute_name(name: str) -> str:
    return name.rstrip("_").replace("_", "-")


def element(name: str, *children: str, **attributes: float | str | None) -> Svg:
    """One element; underscores of attribute names become hyphens, attributes that are None are left out.

    Parameters
    ----------
    name
        Name of the element.
    children
        Built markup, or text, which is escaped.
    attributes
        Numbers or text, which is escaped.

    Examples
    --------
    >>> element("text", "a < b", font_size=12.0)
    '<text font-size="12">a &lt; b</text>'
    """
    parts = [f"<{name}"]
    for key, value in attributes.items():
        if value is not None:
            text = escaped(value) if isinstance(value, str) else number(value)
            parts.append(f' {_attribute_name(key)}="{text}"')
    if not children:
        return Svg("".join(parts) + "/>")
    inner = "".join(child if isinstance(child, Svg) else escaped(child) for child in children)
    return Svg(f"{''.join(parts)}>{inner}</{name}>")


def path_data(rings: Iterable[Iterable[Point]], *, closed: bool = True) -> str:
    """Data of a path through the corners of each ring.

    Examples
    --------
    >>> path_data([[(0, 0), (2, 0), (2, 1.5)]])
    'M0 0L2 0L2 1.5Z'
    """
    end = "Z" if closed else ""
    return "".join("M" + "L".join(f"{number(x)} {number(y)}" for x, y in ring) + end for ring in rings)


def on_page(drawing: str) -> str:
    """Drawing as a block that Markdown passes through untouched, whatever the names in it contain.

    Without the block around it, ``*``, ``$`` and ``:`` in a name would be read as Markdown.
    """
    return f"<div>{drawing}</div>"
