"""The texts of a field sheet as blocks under each other, to tell how large they may be set."""

from __future__ import annotations

from typing import Any

from webapp.sheet.fit import CODE, LABEL, PICTURE, SHEETS, Block

Parts = dict[str, Any]

_STAMP_ROOM, _STAMP_HEIGHT = 62.0, 11.0
_BOX_INSET, _FIGURE = 6.0, 2.1
_SMALL, _META, _FOOT = 0.92, 0.88, 0.8
_TIMES = 9.8
_TITLES = {"large": 2.0, "middle": 1.42, "small": 1.1}
_BOLD = 1.05
_CODE_ROOM = "AB12-C3 · version ________ · sheet 1 of 1"
_TICK, _TICK_HEAD = 1.3, 1.1
_ALARM = 1.3
_GUTTER = 4.0
_CAUTION = 0.97


def blocks(parts: Parts) -> list[Block]:
    """Blocks of a sheet from head to foot.

    Parameters
    ----------
    parts
        Texts by the names that the template knows.
    """
    width, _ = SHEETS[parts["paper"]]
    column = width - LABEL - 1
    wide = [parts["where"], parts["remove"], [parts["short"]], [_sentence(*pair) for pair in parts["watch"]]]
    wide += [[parts["remarks"]]] if parts["remarks"] else []
    middle = _withheld_blocks(parts, width) if parts["withheld"] else _computed_blocks(parts, width, column)
    return [
        Block(
            texts=(parts["title"],),
            width=width - _STAMP_ROOM,
            scale=_TITLES[parts["title_size"]] * _BOLD,
            least=_STAMP_HEIGHT,
        ),
        Block(texts=(parts["scenario_title"] + _CODE_ROOM, "issued"), width=width, scale=_META),
        *middle,
        Block(texts=(), width=width, least=_TIMES),
        *(Block(texts=tuple(texts), width=column) for texts in wide),
        _tick_block(parts, width),
        Block(texts=(parts["caution"],), width=width, scale=_CAUTION),
        Block(
            texts=(f"{parts['printed']} {parts['notice']} {parts['id']} {_CODE_ROOM}",),
            width=width,
            scale=_FOOT,
        ),
    ]


def _sentence(sign: str, words: str) -> str:
    return f"{sign}: {words}."


def _withheld_blocks(parts: Parts, width: float) -> list[Block]:
    return [Block(texts=tuple(parts["withheld"]), width=width - _BOX_INSET, extra=5.0)]


def _computed_blocks(parts: Parts, width: float, column: float) -> list[Block]:
    return [
        max((_box_block(box, width / 3 - _BOX_INSET) for box in parts["boxes"]), key=lambda b: b.height(12)),
        Block(texts=tuple(parts["water"]), width=column),
        Block(
            texts=tuple(text for text, _ in parts["build"]),
            width=column - PICTURE[0] - _GUTTER,
            scale=_BOLD,
            least=PICTURE[1],
        ),
        Block(texts=tuple(parts["limit"]), width=column, scale=_BOLD),
        Block(texts=("headings", *("row" for _ in parts["loads"].rows), *parts["load_notes"]), width=column),
    ]


def _box_block(box: Any, width: float) -> Block:
    return Block(
        texts=(box.label, *box.lines), width=width, scale=_SMALL, extra=_FIGURE + (_ALARM if box.alarm else 0)
    )


def _tick_block(parts: Parts, width: float) -> Block:
    rows = max(len(half) for half in parts["ticks"])
    shown = parts["code_picture"] is not None
    return Block(texts=(), width=width, least=CODE + 1 if shown else 0.0, extra=_TICK_HEAD + rows * _TICK)


def texts_of(parts: Parts) -> list[str]:
    """Every text of a sheet that may have been cut short."""
    return [
        *(parts[name] for name in ("title", "scenario_title", "version", "short", "remarks")),
        *parts["where"],
        *parts.get("water", ()),
        *parts.get("limit", ()),
        *parts.get("load_notes", ()),
        *(text for text, _ in parts.get("build", ())),
        *(line for box in parts.get("boxes", ()) for line in box.lines),
    ]
