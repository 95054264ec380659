from __future__ import annotations

import shutil
import tempfile
from collections.abc import Callable, Iterator
from datetime import datetime
from pathlib import Path

import pytest

from desktop.storage.store import Store
from tests.desktop.storage.samples import EXERCISE, PERSON

MEMORY = Path("/dev/shm")


@pytest.fixture
def journal_folder(tmp_path: Path) -> Iterator[Path]:
    """A folder in memory where there is one: writing through to a disk is not the question here."""
    if not MEMORY.is_dir():
        yield tmp_path
        return
    folder = Path(tempfile.mkdtemp(prefix="dayfence-test-", dir=MEMORY))
    yield folder
    shutil.rmtree(folder)


@pytest.fixture
def clock() -> Callable[[], datetime]:
    return lambda: datetime(2026, 3, 10, 21, 4, 5, 678)


@pytest.fixture
def path(journal_folder: Path) -> Path:
    return journal_folder / "log.dayfence"


@pytest.fixture
def store(path: Path, clock: Callable[[], datetime]) -> Iterator[Store]:
    """A journal with one measure, its only step so far."""
    with Store.create(path, [PERSON, EXERCISE], clock=clock) as opened:
        yield opened
