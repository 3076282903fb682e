"""A sequence whose items are built when they are first asked for."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import Generic, TypeVar, overload

Item = TypeVar("Item")


class Built(Sequence[Item], Generic[Item]):
    """So many items, each built once, on demand.

    The figures behind them stand in arrays; thousands of small records are made only for whoever reads them.

    Examples
    --------
    >>> squares = Built(4, lambda index: index**2)
    >>> squares[2], len(squares), list(squares)
    (4, 4, [0, 1, 4, 9])
    """

    def __init__(self, count: int, build: Callable[[int], Item]) -> None:
        self._build = build
        self._items: list[Item | None] = [None] * count

    def __len__(self) -> int:
        return len(self._items)

    @overload
    def __getitem__(self, index: int) -> Item: ...
    @overload
    def __getitem__(self, index: slice) -> Sequence[Item]: ...
    def __getitem__(self, index: int | slice) -> Item | Sequence[Item]:
        if isinstance(index, slice):
            return tuple(self[number] for number in range(*index.indices(len(self))))
        item = self._items[index]
        if item is None:
            item = self._items[index] = self._build(index % len(self))
        return item
