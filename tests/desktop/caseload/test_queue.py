"""The facts of a journal and the reasons in the queue, each from days that can be checked by hand."""

from __future__ import annotations

from dataclasses import fields, replace

import pytest

from desktop.caseload.facts import Facts, facts_of, measures_of
from desktop.caseload.queue import counts_of, row_of, rows_of, verdict_of
from desktop.errors import StorageError
from desktop.journal.caseload import Caseload
from desktop.journal.clients import Client, Coach
from desktop.journal.records import Change, Entry, Measure, Plan, Span
from desktop.wording.caseload import counts_line, last_entry_words, reason_sentence, row_sentences
from tests.desktop.caseload.journals import (
    CLIENT,
    KNEE,
    MONDAY,
    WALKING,
    day,
    entries,
    journal,
    level,
    session,
)


def facts(*records, sessions=(), client=CLIENT) -> Facts:
    return facts_of(journal(*records), "2031-03-30T21:00:00", 7, client, sessions)


def reasons(found: Facts, client=CLIENT):
    return {one.kind: one for one in row_of(client, found, None, MONDAY).reasons}


def said(found: Facts, kind: str) -> str:
    return reason_sentence(reasons(found)[kind], found)


def test_nothing_new_is_said_as_that():
    found = facts(*level(1, 40, 1, 30), *level(2, 40, 1, 5, 0.2), sessions=[session(20)])
    assert reasons(found) == {}
    assert row_sentences(row_of(CLIENT, found, None, MONDAY)) == ("Nothing new.",)
    looked = replace(CLIENT, looked_on=day(7))
    assert row_sentences(row_of(looked, found, None, MONDAY)) == ("Nothing new since Mon 24 Mar.",)


def test_a_client_gone_quiet_against_their_own_habit():
    found = facts(*level(1, 40, 12, 30))
    assert said(found, "quiet") == "Quiet for 11 days; no day was left out before. The copy is of Sun 30 Mar."
    gappy = facts(*(one for one in level(1, 40, 12, 30) if (day(0) - one.day).days not in (20, 21, 22)))
    assert said(gappy, "quiet").startswith("Quiet for 11 days; the longest before was 3.")
    short = facts(*level(1, 13, 11, 30))
    assert said(short, "quiet").startswith("Quiet for 10 days; the log is too short to say what is usual.")


def test_a_pause_that_was_said_is_not_silence():
    away = Span(1, day(11), day(-3), "away", "at the sea")
    assert "quiet" not in reasons(facts(*level(1, 40, 12, 30), away))
    ill = entries(1, dict.fromkeys(range(11, 0, -1)), kind="ill")
    assert "quiet" not in reasons(facts(*level(1, 40, 12, 30), *ill))


def test_a_plan_missed_two_weeks_running():
    """31 March 2031 is a Monday: the last two whole weeks begin on the 17th and the 24th."""
    done = [20, 19, 18, 17, 16, 14, 12, 10, 7, 5]
    days = [*entries(1, dict.fromkeys(done, 30.0)), *level(2, 40, 1, 5, 0.2)]
    found = facts(*days, sessions=[session(30, times=4)])
    assert said(found, "plan missed") == "The plan of 4 days a week was missed 2 weeks running: 3, 2 days done."
    spared = facts(*days, sessions=[session(30, times=4, spare=1)])
    assert "plan missed" not in reasons(spared)
    fewer = facts(*days, sessions=[session(30, times=5, spare=1)])
    assert said(fewer, "plan missed").startswith("The plan of 5 days a week with 1 to spare was missed 2 weeks")


def test_a_plan_missed_once_is_a_week_like_any_other():
    done = [20, 19, 18, 17, 13, 12, 11, 10, 7, 5]
    found = facts(
        *entries(1, dict.fromkeys(done, 30.0)), *level(2, 40, 1, 5, 0.2), sessions=[session(30, times=4)]
    )
    assert "plan missed" not in reasons(found)


def test_the_clients_own_plan_counts_until_one_is_agreed():
    own = Plan(1, 1, day(60), 7)
    found = facts(*level(2, 40, 1, 5, 0.2), *entries(1, {14: 30.0, 7: 30.0}), own)
    assert [plan.times for plan in found.plans] == [7]
    assert len(reasons(found)["plan missed"].weeks) >= 2
    agreed = facts(
        *level(2, 40, 1, 5, 0.2), *entries(1, {14: 30.0, 7: 30.0}), own, sessions=[session(20, times=1)]
    )
    assert "plan missed" not in reasons(agreed)


def test_a_move_since_the_session():
    found = facts(*level(1, 40, 15, 30), *level(1, 14, 1, 45), sessions=[session(14)])
    assert said(found, "moved").startswith("Walking since Mon 17 Mar: 45")
    # The same days, with the session after the move: nothing moved since.
    later = facts(*level(1, 60, 30, 30), *level(1, 29, 1, 45), sessions=[session(14)])
    assert "moved" not in reasons(later)


def test_two_measures_share_the_budget():
    one = facts(*level(1, 40, 15, 30), *level(1, 14, 1, 36), sessions=[session(14)])
    (walk,) = one.lately
    assert walk.chance is not None
    two = replace(one, lately=(replace(walk, chance=0.02), replace(walk, measure=2, chance=0.9)))
    assert "moved" not in reasons(replace(two, answer=None))
    assert "moved" in reasons(replace(one, lately=(replace(walk, chance=0.02),), answer=None))


def test_an_answer_that_just_became_firm_and_that_was_looked_at():
    change = Change(1, day(14), "earlier stop")
    found = facts(*level(1, 40, 15, 30), *level(1, 14, 1, 45), change)
    assert said(found, "firm").startswith("Walking, firm now: 45")
    row = row_of(CLIENT, found, None, MONDAY)
    looked = replace(CLIENT, looked_on=MONDAY, looked_reasons=row.marks)
    assert row_of(looked, found, None, MONDAY).reasons == ()
    # What is new after that look is a reason again.
    back = facts(*level(1, 40, 15, 30), *level(1, 14, 1, 15), change)
    assert {one.kind for one in row_of(looked, back, None, MONDAY).reasons} == {"firm"}


def test_a_firm_answer_that_says_the_same_as_the_move_is_said_once():
    found = facts(*level(1, 40, 15, 30), *level(1, 14, 1, 45), sessions=[session(14, "earlier stop")])
    assert set(reasons(found)) == {"moved"}


def test_a_change_marked_by_both_on_one_day_is_one_change():
    change = Change(1, day(14), "Earlier stop")
    both = facts(*level(1, 40, 15, 30), *level(1, 14, 1, 45), change, sessions=[session(14, "earlier stop")])
    alone = facts(*level(1, 40, 15, 30), *level(1, 14, 1, 45), change, sessions=[session(14)])
    assert both.answer == alone.answer


def test_values_past_the_clinics_own_limit_in_its_own_words():
    pressure = Measure(
        1, 0, "Upper pressure", "mmHg", aim="less", limit_low=95.0, limit_high=150.0, limit_words="call the ward"
    )
    values = level(1, 30, 1, 130)
    at_limit = replace(values[20], value=150.0)
    beyond = replace(values[24], value=151.0, kind="set aside")
    found = facts(pressure, *values[:20], at_limit, *values[21:24], beyond, *values[25:], sessions=[session(14)])
    assert said(found, "past limit") == (
        f"Upper pressure past the clinic's own limit of 150 mmHg on 1 day, last 151 mmHg on "
        f"{beyond.day:%a} {beyond.day.day} Mar. The clinic's own words: “call the ward”."
    )
    below = facts(pressure, *values[:-1], replace(values[-1], value=94.0), sessions=[session(14)])
    assert "limit of 95 mmHg on 1 day, last 94 mmHg on Sun 30 Mar" in said(below, "past limit")
    assert "past limit" not in reasons(facts(pressure, *values[:20], at_limit, *values[21:]))


def test_a_value_past_the_limit_before_the_session_is_nothing_new():
    pressure = Measure(1, 0, "Upper pressure", "mmHg", limit_high=150.0)
    values = level(1, 30, 1, 130)
    old = facts(pressure, replace(values[0], value=171.0), *values[1:], sessions=[session(14)])
    assert old.past == ()


def test_a_new_device_is_a_fact_and_never_a_move():
    device = Span(1, day(10), day(-60), "device", "new watch")
    found = facts(*level(1, 40, 11, 30), *level(1, 10, 1, 40), device, sessions=[session(20)])
    assert said(found, "device") == "A new device since Fri 21 Mar: numbers before and after may not compare."
    assert facts(*level(1, 40, 11, 30), device, sessions=[session(5)]).devices == ()


def test_the_order_is_that_of_the_coachs_work():
    quiet = facts(*level(1, 40, 12, 30))
    moved = facts(*level(1, 40, 15, 30), *level(1, 14, 1, 45), sessions=[session(14)])
    same = facts(*level(1, 40, 1, 30))
    clients = [Client(number, f"{number:032x}", code) for number, code in enumerate("abcdef", start=1)]
    clients[3] = replace(clients[3], next_session=MONDAY)
    clients[5] = replace(clients[5], ended=True)
    held = dict(zip([one.journal_id for one in clients], [same, moved, quiet, same], strict=False))
    error = StorageError("damaged", path="/logs/e.dayfence")
    rows = rows_of(Caseload.of([Coach("0" * 32), *clients]), held, {clients[4].journal_id: error}, MONDAY)
    assert [row.client.code for row in rows] == ["d", "c", "b", "e", "a"]
    assert [row.reasons[0].kind for row in rows[:4]] == ["session today", "quiet", "moved", "unreadable"]
    assert row_sentences(rows[3])[0].startswith("e.dayfence was not read: it is damaged")
    assert rows_of(Caseload.of([Coach("0" * 32), clients[0]]), {}, {}, MONDAY)[0].reasons[0].kind == "missing"


def test_within_a_reason_what_lasts_longer_comes_first():
    short, long = facts(*level(1, 40, 9, 30)), facts(*level(1, 40, 20, 30))
    clients = [Client(1, "1" * 32, "a"), Client(2, "2" * 32, "b")]
    rows = rows_of(Caseload.of([Coach("0" * 32), *clients]), {"1" * 32: short, "2" * 32: long}, {}, MONDAY)
    assert [row.client.code for row in rows] == ["b", "a"]


@pytest.mark.parametrize(
    ("records", "verdict"),
    [
        ([*level(1, 40, 15, 30), *level(1, 14, 1, 45), Change(1, day(14))], "wanted way"),
        ([*level(1, 40, 15, 45), *level(1, 14, 1, 30), Change(1, day(14))], "other way"),
        ([*level(1, 40, 1, 30), Change(1, day(14))], "no sign"),
        ([*level(1, 17, 1, 30), Change(1, day(2))], "not enough days"),
        ([*level(1, 40, 1, 30)], "not enough days"),
        ([], "not enough days"),
        (
            [replace(WALKING, aim="none"), *level(1, 40, 15, 30), *level(1, 14, 1, 45), Change(1, day(14))],
            "moved",
        ),
    ],
)
def test_what_an_answer_counts_as(records, verdict):
    assert verdict_of(facts(*records)) == verdict


def test_counts_are_numbers_and_never_percent():
    rows = [row_of(CLIENT, facts(*level(1, 40, 15, 30), *level(1, 14, 1, 45), Change(1, day(14))), None, MONDAY)]
    rows += [row_of(CLIENT, None, None, MONDAY)] * 2
    line = counts_line(counts_of(rows))
    assert line == "3 clients: 1 moved the way they wanted, 2 not enough days."
    assert counts_line(counts_of([])) == ""


def test_facts_come_back_equal_from_their_text():
    pressure = Measure(1, 0, "Steps", "steps", "count", limit_high=140.0, limit_words="call “now”")
    full = facts(
        pressure,
        KNEE,
        *level(1, 40, 15, 130),
        *level(1, 14, 1, 150),
        *level(2, 40, 1, 5, 0.2),
        Span(1, day(10), day(-3), "device"),
        Span(2, day(30), day(28), "ill"),
        Plan(1, 1, day(50), 5, 1),
        sessions=[session(14, "x", times=3)],
    )
    for field in fields(Facts):
        assert getattr(full, field.name) not in (None, (), ""), field.name
    assert Facts.of_text(full.to_text()) == full
    empty = facts()
    assert Facts.of_text(empty.to_text()) == empty
    for text in ("", "{}", "[]", full.to_text()[:-2], full.to_text().replace('"done"', '"undone"')):
        with pytest.raises(ValueError, match="not facts"):
            Facts.of_text(text)


def test_which_measures_are_looked_at():
    both = journal()
    assert measures_of(both, None) == (1, 2)
    assert measures_of(both, replace(CLIENT, outcome=1)) == (None, 1)
    assert measures_of(both, replace(CLIENT, doing=99)) == (1, 2)
    pair = journal(Measure(1, 0, "Upper", pair="p"), Measure(2, 1, "Lower", pair="p"))
    assert measures_of(pair, None) == (None, 1)
    assert measures_of(journal(WALKING), None) == (1, None)


def test_an_empty_journal_has_nothing_to_say():
    found = facts()
    assert (found.last, found.usual_gap, found.answer) == (None, None, found.answer)
    assert reasons(found) == {}
    assert last_entry_words(found) == last_entry_words(None) == ""


def test_a_blank_day_is_no_entry():
    blank = [Entry(1, day(1), kind="blank")]
    assert facts(*level(1, 40, 12, 30), *blank).last == day(12).toordinal()


def looked_at(client, found, today=MONDAY):
    """The client after the coach pressed the key for looked at."""
    return replace(client, looked_on=today, looked_reasons=row_of(client, found, None, today).marks)


def test_a_silence_that_goes_on_is_news_again_a_week_later():
    found = facts(*level(1, 40, 12, 30))
    looked = looked_at(CLIENT, found)
    assert row_of(looked, found, None, MONDAY).reasons == ()
    assert row_of(looked, found, None, day(-2)).reasons == ()
    assert [one.kind for one in row_of(looked, found, None, day(-7)).reasons] == ["quiet"]


def test_looking_again_at_what_was_looked_at_brings_nothing_back():
    found = facts(*level(1, 40, 12, 30), Span(1, day(20), day(-60), "device"))
    once = looked_at(CLIENT, found)
    twice = looked_at(once, found)
    assert once.looked_reasons == twice.looked_reasons != ""
    row = row_of(twice, found, None, MONDAY)
    assert row.reasons == ()
    assert {one.kind for one in row.held} == {"quiet", "device"}


def test_a_second_move_after_a_new_session_is_another_one():
    first = facts(*level(1, 60, 36, 30), *level(1, 35, 15, 45), sessions=[session(35, "stairs")])
    looked = looked_at(CLIENT, first, day(15))
    days = [*level(1, 60, 36, 30), *level(1, 35, 15, 45), *level(1, 14, 1, 60)]
    second = facts(*days, sessions=[session(35, "stairs"), session(14, "hills")])
    assert "moved" in {one.kind for one in row_of(looked, second, None, MONDAY).reasons}


def test_a_log_that_was_never_begun_is_on_top():
    found = facts(sessions=[session(28, "walks", times=5)])
    assert said(found, "quiet") == "No entry yet, 27 days after the session."
    assert reasons(facts(sessions=[session(5, "walks")])) == {}


def test_an_entry_of_a_wrong_year_changes_nothing():
    wrong = entries(1, {-700: 30.0})
    plain = facts(*level(1, 40, 12, 30), sessions=[session(20, times=5)])
    with_it = facts(*level(1, 40, 12, 30), *wrong, sessions=[session(20, times=5)])
    assert (with_it.last, with_it.done) == (plain.last, plain.done)
    assert reasons(with_it).keys() == reasons(plain).keys()


def test_before_everything_is_read_nobody_is_said_to_have_no_journal():
    row = row_of(CLIENT, None, None, MONDAY, all_read=False)
    assert row.reasons == ()
    assert row_sentences(row) == ("Not read yet.",)


def test_two_questions_share_one_budget():
    """A move since the session and one since an earlier change: together as rare as one of them alone."""
    change = Change(1, day(30), "earlier stop")
    found = facts(*level(1, 60, 1, 30), change, sessions=[session(14)])
    (lately,), answer = found.lately, found.answer
    weak = replace(found, lately=(replace(lately, chance=0.02),), answer=answer)
    assert "moved" not in reasons(weak)
    assert "moved" in reasons(replace(weak, answer=replace(answer, change=found.session)))


def test_one_measure_chosen_leaves_the_other_to_the_program():
    both = journal()
    assert measures_of(both, replace(CLIENT, doing=1)) == (1, 2)
    assert measures_of(both, replace(CLIENT, outcome=2)) == (1, 2)
