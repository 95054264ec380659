"""A program killed in the middle of writing loses nothing it told as saved, and leaves no half of a step."""

from __future__ import annotations

import subprocess
import sys
import time
from pathlib import Path
from random import Random

from desktop.storage.store import Store

ROOT = Path(__file__).parents[3]
KILLS = 30
AT_ONCE = 3


def test_killed_while_writing(store: Store, journal_folder: Path, path: Path) -> None:
    store.close()
    random = Random(11)
    told = [1] * AT_ONCE
    paths = [journal_folder / f"log {number}" for number in range(AT_ONCE)]
    for copy in paths:
        copy.write_bytes(path.read_bytes())
    for _ in range(KILLS // AT_ONCE):
        writers = [
            subprocess.Popen(
                [sys.executable, "-m", "tests.desktop.storage.killed_writer", str(copy)],
                cwd=ROOT,
                stdout=subprocess.PIPE,
                text=True,
            )
            for copy in paths
        ]
        for index, writer in enumerate(writers):
            assert writer.stdout is not None
            with writer, writer.stdout:
                first = int(writer.stdout.readline())
                time.sleep(random.uniform(0, 0.01))
                writer.kill()
                ledger = [first, *map(int, writer.stdout.read().split())]
            # A line may be cut by the kill, but never by so much that it names a later step.
            floor = max(told[index], *ledger)
            with Store.open(paths[index]) as survivor:
                survivor.verify()
                assert floor <= survivor.last_step_number <= floor + 1
                told[index] = survivor.last_step_number
                steps = survivor.steps()
                assert [step.number for step in steps] == list(range(1, told[index] + 1))
                assert {len(step.changes) for step in steps[1:]} == {3}
    assert sum(told) > 2 * KILLS
