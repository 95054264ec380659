"""What is said of a file that cannot simply be opened."""

from datetime import date
from pathlib import Path

import pytest

from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure, Person
from desktop.wording.damage import (
    abrupt_sentence,
    clock_sentence,
    copy_sentence,
    missing_sentence,
    readable_sentence,
)


@pytest.mark.parametrize(
    ("proven", "of", "said"),
    [
        (0, 0, "No values were found in it."),
        (1, 1, "Its value can be read."),
        (420, 420, "All 420 values can be read with certainty."),
        (419, 420, "419 of 420 values can be read with certainty; one more is known from one place only, "),
        (410, 420, "410 of 420 values can be read with certainty; 10 more are known from one place only, "),
    ],
)
def test_how_much_can_be_read(proven, of, said):
    assert readable_sentence(proven, of).startswith(said)


@pytest.mark.parametrize(
    ("made", "behind", "said"),
    [
        (None, 0, "There is no good earlier copy."),
        ("9 March", 0, "The newest good copy, of 9 March, holds all of this too."),
        ("9 March", 1, "The newest good copy is of 9 March. It lacks one thing of this, or has it otherwise."),
        ("9 March", 4, "The newest good copy is of 9 March. It lacks 4 things of this, or has them otherwise."),
    ],
)
def test_what_the_copy_is_worth(made, behind, said):
    assert copy_sentence(made, behind) == said


def test_after_a_session_that_was_cut_short():
    person, measure = Person("0" * 32), Measure(1, 0, "Sleep")
    nothing = "The last session ended abruptly. Everything that was saved is here."
    assert abrupt_sentence(Journal.of([person, measure])) == nothing
    one = Journal.of([person, measure, Entry(1, date(2031, 3, 4), value=7.0)])
    assert abrupt_sentence(one).endswith("here: 1 value, the last of 4 March 2031.")


def test_a_journal_that_is_gone():
    said = missing_sentence(Path("/a/journal.dayfence"), "9 March 2031, 20:15")
    assert said.startswith("journal.dayfence is not where it was.")


def test_a_clock_that_went_back():
    assert clock_sentence(date(2031, 3, 28), date(2031, 3, 30)) == (
        "This computer's date, 28 March 2031, is before your last entry, made on 30 March 2031. "
        "Check it before you add today."
    )
