"""One line of the table, and the folder things are tried in."""

from __future__ import annotations

import shutil
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

MEMORY = Path("/dev/shm")


@dataclass(frozen=True)
class Figure:
    """What was tried how often, what went wrong, and what the same trial finds where it must find something.

    Attributes:
        what: the trial.
        tried: how often.
        wrong: how often anything was lost, torn or damaged; 0 is wanted.
        more: other figures of it.
        control: the trial against something known to be bad, in words; empty where none is needed.
        has_teeth: whether the control found what it must.
    """

    what: str
    tried: int
    wrong: int
    more: str = ""
    control: str = ""
    has_teeth: bool = True

    @property
    def is_good(self) -> bool:
        return self.wrong == 0 and self.has_teeth and self.tried > 0


@contextmanager
def folder() -> Iterator[Path]:
    """A folder in memory where there is one, gone afterwards."""
    place = Path(tempfile.mkdtemp(prefix="dayfence-endurance-", dir=MEMORY if MEMORY.is_dir() else None))
    try:
        yield place
    finally:
        shutil.rmtree(place)
