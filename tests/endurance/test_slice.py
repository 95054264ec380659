"""A small slice of the endurance trials, each with its control."""

from random import Random

import pytest

from tests.endurance.__main__ import LONG, SHORT, TRACED, _function, table
from tests.endurance.changeovers import changeovers
from tests.endurance.damage import flips, full_disk, pages
from tests.endurance.disk import Disk
from tests.endurance.faults import FAILING, lost_without_transaction
from tests.endurance.figures import Figure
from tests.endurance.kills import kills
from tests.endurance.power import can_record, power_cuts
from tests.endurance.saving import saving
from tests.endurance.sessions import sessions, undo

traced = pytest.mark.skipif(not can_record(), reason="this machine cannot trace a program")


@pytest.mark.parametrize(
    "trial",
    [
        lambda: kills(10),
        lambda: flips(150),
        lambda: pages(3),
        lambda: sessions(8),
        lambda: undo(3),
        lambda: changeovers(5),
        lambda: saving(20),
        full_disk,
        pytest.param(lambda: power_cuts(120), marks=traced),
    ],
    ids=["kills", "flips", "pages", "sessions", "undo", "changeovers", "saving", "full disk", "power cuts"],
)
def test_nothing_is_lost_and_the_control_finds_what_it_must(trial):
    figure = trial()
    assert figure.is_good, figure


@traced
def test_a_fault_in_the_middle_of_a_step_that_is_no_transaction_is_found():
    assert lost_without_transaction() > 0
    assert {call for call, _ in FAILING} == {"pwrite64", "fdatasync", "fsync", "unlink"}


def test_both_forms_try_the_same():
    assert {_function(trial) for trial in SHORT} == {_function(trial) for trial in LONG}
    assert {_function(trial) for trial in SHORT} >= TRACED


def test_the_table_says_what_is_not_good_and_what_was_skipped():
    text = table([Figure("one", 3, 1), Figure("two", 3, 0, "more", "bad way", has_teeth=False)], 1.0, ["power"])
    lines = text.splitlines()
    assert [line.split()[0] for line in lines if line.endswith("NOT GOOD")] == ["one", "two"]
    assert "    control: bad way" in lines
    assert lines[-1].split()[:2] == ["power", "skipped:"]


def test_the_disk_keeps_what_was_synced_and_may_lose_the_rest(tmp_path):
    """The model itself, by hand: one file written in two pieces, its journal made and taken away."""
    folder = "".join(f"\\x{byte:02x}" for byte in str(tmp_path).encode())
    (tmp_path / "log").write_bytes(b"old")
    disk = Disk.of(tmp_path)
    log, journal = (f'"{folder}\\x2f{name}"' for name in (r"\x6c\x6f\x67", r"\x6a"))

    def states():
        return {tuple(sorted(state.items())) for state in disk.states(Random(1), 8)}

    assert not disk.take(f"12 openat(AT_FDCWD, {log}, O_RDWR) = 3")
    assert disk.take(r'12 pwrite64(3, "\x6e\x65", 2, 0) = 2')
    assert states() == {(("log", b"old"),), (("log", b"ned"),)}
    assert disk.take("12 fsync(3) = 0")
    assert states() == {(("log", b"ned"),)}
    assert not disk.take(f"12 openat(AT_FDCWD, {journal}, O_RDWR|O_CREAT, 0600) = 4")
    assert disk.take("12 ftruncate(3, 1) = 0")
    assert states() == {
        (("log", b"n"),),
        (("log", b"ned"),),
        (("j", b""), ("log", b"n")),
        (("j", b""), ("log", b"ned")),
    }
    assert not disk.take(r'12 write(1, "\x37\x0a", 2) = 2')
    assert disk.told == 7
    assert not disk.take(r'12 pwrite64(9, "\x37", 1, 0) = 1')
    assert not disk.take(f"12 unlink({journal}) = -1 EIO")
    assert disk.take(f"12 unlink({journal}) = 0")
    assert not disk.take(f"12 unlink({journal}) = 0")
    assert not disk.take("12 close(4) = 0")
    assert not disk.take("12 --- SIGCHLD ---")
    assert disk.current() == {"log": 0}
