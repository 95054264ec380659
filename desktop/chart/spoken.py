"""Sentences of marks, made when one is asked for."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from typing import overload


class Spoken(Sequence[str]):
    """One sentence a mark: a long log has thousands of marks, and few are read out."""

    def __init__(self, marks: int, tell: Callable[[int], str]) -> None:
        """So many marks, and what says the sentence of one by its place."""
        self._marks = marks
        self._tell = tell

    def __len__(self) -> int:
        return self._marks

    def __iter__(self) -> Iterator[str]:
        return map(self._tell, range(self._marks))

    @overload
    def __getitem__(self, place: int) -> str: ...

    @overload
    def __getitem__(self, place: slice) -> list[str]: ...

    def __getitem__(self, place: int | slice) -> str | list[str]:
        places = range(self._marks)[place]
        return self._tell(places) if isinstance(places, int) else [self._tell(one) for one in places]
