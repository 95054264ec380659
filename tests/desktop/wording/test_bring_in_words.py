"""What is said of a table that was read."""

import re
from datetime import date
from pathlib import Path

import desktop.exchange
from desktop.wording.bring_in import REASONS, Preview, aside_line, preview_sentences

NO_REASONS = {"set aside"}
SOURCES = Path(desktop.exchange.__file__).parent


def test_every_reason_the_importer_gives_has_words():
    code = "\n".join(path.read_text("utf-8") for path in SOURCES.glob("*.py"))
    given = set(re.findall(r'(?:Refusal\(|reason = |return |or )"([a-z]+ [a-z ]+|negative|repeated|pair)"', code))
    assert {"not exact", "pair reversed", "left out there", "no such day", "negative", "repeated"} <= given
    assert given - NO_REASONS <= set(REASONS)


def test_the_counts_of_a_preview_add_up():
    said = preview_sentences("a.csv", Preview(10, 2, 3, (date(2026, 1, 2), date(2026, 3, 4)), several=1))
    assert said.startswith("a.csv: 10 lines read, 5 kept, 2 with a day and no value, 3 set aside.")
    assert "2 January 2026 to 4 March 2026" in said
    assert "1 day with more than one value" in said


def test_what_was_guessed_or_could_be_meant_otherwise_is_said():
    said = preview_sentences(
        "a.csv", Preview(1, 0, 0, None, guessed=True, durations=[("Walk", "min"), ("Sleep", "h")])
    )
    assert "“Walk” was read as hours and minutes, so 1:30 is 90 min." in said
    assert "1:30 is 1.5 h" in said
    assert "do the names below look right?" in said


def test_a_line_set_aside_says_its_number_why_and_its_text():
    assert aside_line(12, "not exact", "~40") == "line 12: its value is not one exact number: ~40"
