"""A fault at each disk operation, once or from then on; and recovery killed at each of its own."""

from __future__ import annotations

import os
import sqlite3
import subprocess
import sys
from collections import Counter
from pathlib import Path
from random import Random

from desktop.errors import StorageError
from desktop.storage.store import Store
from tests.endurance.figures import Figure, folder
from tests.endurance.power import ROOT, is_good, recorded_states
from tests.endurance.writer import AS_IT_IS, NO_TRANSACTION, start, write

FAILING = (
    ("pwrite64", "ENOSPC"),
    ("pwrite64", "EIO"),
    ("fdatasync", "EIO"),
    ("fsync", "EIO"),
    ("unlink", "EIO"),
)
AT = 400
"""The fault comes at this call of a process; calls that lead nowhere are made first, so that it hits any one."""
STEPS = 3
THROUGH = 3
"""What a child ends with when no fault was met, or none that mattered."""
MOST = 60
"""Operations of one kind that three steps take at most."""


def faults(every: int = 1) -> Figure:
    """A fault at every so-many-th operation of three steps."""
    wrong = tried = 0
    reasons: Counter[str] = Counter()
    with folder() as place:
        for call, error in FAILING:
            for after in ("", "+"):
                outcomes = run(
                    place / f"{call}{error}{after}", f"{call}:error={error}:when={AT}{after}", call, every
                )
                tried += len(outcomes)
                wrong += sum(not good for good, _ in outcomes)
                reasons.update(reason for _, reason in outcomes)
    said = ", ".join(f"{reason} {many}" for reason, many in reasons.most_common())
    found = lost_without_transaction()
    return Figure(
        "fault at each disk operation",
        tried,
        wrong,
        f"said: {said}",
        f"without transactions: {found} of them leave a torn step",
        found > 0,
    )


def lost_without_transaction() -> int:
    """How many faults leave something wrong where a step is not one transaction."""
    with folder() as place:
        outcomes = run(place / "control", f"pwrite64:error=EIO:when={AT}+", "pwrite64", 1, how=NO_TRANSACTION)
        return sum(not good for good, _ in outcomes)


def recoveries(journals: int, every: int = 1) -> Figure:
    """Recovery after a power cut, killed at each of its own operations, then let through."""
    wrong = tried = 0
    random = Random(3)
    with folder() as place:
        hot = [
            (floor, state)
            for (floor, state), _ in zip(recorded_states(AS_IT_IS, place, halves=1), range(600), strict=False)
            if is_hot(state.get("log.dayfence-journal", b""))
        ]
        for number, (floor, state) in enumerate(random.sample(hot, journals)):
            for call in ("pwrite64", "fdatasync", "fsync", "unlink"):
                base = place / f"recovery {number} {call}"
                outcomes = run(base, f"{call}:signal=SIGKILL:when={AT}", call, every, state)
                for copy, _ in outcomes_of(base):
                    left = {path.name: path.read_bytes() for path in copy.iterdir()}
                    wrong += not is_good(left, floor, base / "opened")
                    tried += 1
                wrong += sum(not good for good, _ in outcomes)
    return Figure("recovery killed at each operation", tried, wrong)


def run(
    base: Path,
    inject: str,
    call: str,
    every: int,
    state: dict[str, bytes] | None = None,
    how: str = AS_IT_IS,
) -> list[tuple[bool, str]]:
    """For each operation of a kind: whether the journal is whole after the fault there, and what was said."""
    base.mkdir()
    copies = [base / f"{number}" for number in range(1, MOST + 1, every)]
    start(base / "log.dayfence")
    first = state or {"log.dayfence": (base / "log.dayfence").read_bytes()}
    for copy in copies:
        copy.mkdir()
        for name, contents in first.items():
            (copy / name).write_bytes(contents)
    # The quicker way of tracing does not deliver signals.
    quick = ["--seccomp-bpf"] if "error" in inject else []
    act = "open" if state else how
    tracer = ["strace", "-f", *quick, "-o", "/dev/null", "-e", f"trace={call}", "-e", f"inject={inject}"]
    subprocess.run(
        [
            *tracer,
            sys.executable,
            "-m",
            "tests.endurance.faults",
            call,
            act,
            *map(str, copies),
        ],
        cwd=ROOT,
        check=True,
        capture_output=True,
        env={**os.environ, "OPENBLAS_NUM_THREADS": "1"},
    )
    if state:
        return []
    return [(is_whole(copy, told), reason) for copy, (told, reason) in outcomes_of(base) if reason]


def outcomes_of(base: Path) -> list[tuple[Path, tuple[int, str]]]:
    """The trials of a base that met their fault, with the last step told and the reason given."""
    found = []
    for said in sorted(base.glob("*.said")):
        told, _, reason = said.read_text().partition(" ")
        found.append((said.with_suffix(""), (int(told or 0), reason)))
    return found


def is_hot(journal: bytes) -> bool:
    """Whether SQLite would take a step back with it."""
    return journal.startswith(b"\xd9\xd5\x05\xf9 \xa1c\xd7") and journal[8:12] != bytes(4)


def is_whole(copy: Path, told: int) -> bool:
    """Whether a journal is whole and holds every step that was told."""
    try:
        with Store.open(copy / "log.dayfence") as store:
            store.verify()
            return told <= store.last_step_number <= told + 1
    except StorageError:
        return False


def serve(call: str, act: str, copies: list[Path]) -> None:
    """Under the tracer: one child for each trial, so that Python is started once."""
    through = 0
    for copy in copies:
        before = AT - int(copy.name)
        child = os.fork()
        if child == 0:
            os._exit(_try(call, act, copy, before))
        _, status = os.waitpid(child, 0)
        if os.WIFSIGNALED(status):
            copy.with_suffix(".said").write_text("0 killed")
        # A failed sync of a folder is passed over now and then; many in a row mean that there are no more.
        through = through + 1 if os.WIFEXITED(status) and os.WEXITSTATUS(status) == THROUGH else 0
        if through > 8:
            break


def _try(call: str, act: str, copy: Path, before: int) -> int:
    _use_up(call, before, copy)
    told: list[int] = [0]
    try:
        if act != "open":
            with Store.open(copy / "log.dayfence") as store:
                told.append(store.last_step_number)
            write(copy / "log.dayfence", told.append, STEPS, act)
        else:
            Store.open(copy / "log.dayfence").close()
    except (StorageError, sqlite3.Error) as error:
        reason = error.reason if isinstance(error, StorageError) else "unsaid"
        copy.with_suffix(".said").write_text(f"{told[-1]} {reason}")
        return 0
    return THROUGH


def _use_up(call: str, many: int, copy: Path) -> None:
    """Make calls of a kind that lead nowhere."""
    scratch = os.open(copy.with_suffix(".scratch"), os.O_CREAT | os.O_RDWR)
    for _ in range(many):
        match call:
            case "pwrite64":
                os.pwrite(scratch, b"x", 0)
            case "fsync":
                os.fsync(scratch)
            case "fdatasync":
                os.fdatasync(scratch)
            case "unlink":
                copy.with_suffix(".none").unlink(missing_ok=True)
    os.close(scratch)


if __name__ == "__main__":
    serve(sys.argv[1], sys.argv[2], [Path(name) for name in sys.argv[3:]])
