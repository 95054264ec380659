"""No box of any page overlaps another, leaves the sheet or loses a word, whatever the findings say."""

from __future__ import annotations

import re
from functools import cache
from itertools import combinations

import pytest
from PySide6.QtCore import QRectF

from desktop.chart.whole import least_height
from desktop.page.content import PageContent
from desktop.page.layout import MARGIN, PAPERS, Page, lay_out
from desktop.page.words import Words
from desktop.wording.page import AGREED, QUESTION, TRUST, more_in_the_app
from tests.desktop.page.pages import JOURNALS, page_of

LEAST_MARGIN = 25.0
"""Printers leave up to this much of each edge white."""

KINDS = [(paper, large) for paper in PAPERS for large in (False, True)]


@cache
def content(name: str) -> PageContent:
    return page_of(JOURNALS[name]())


@cache
def laid_out(name: str, paper: str, large: bool) -> Page:
    return lay_out(content(name), paper, large_print=large)


def words_on(page: Page) -> list[Words]:
    return [one for sheet in page.sheets for box in sheet for one in box.words]


def letters(text: str) -> str:
    return re.sub(r"\s", "", text)


def body_of(one: Words) -> QRectF:
    """What the letters themselves cover: lines may stand close without touching."""
    rect = one.rect
    return rect.adjusted(0.1, rect.height() * 0.16, -0.1, -rect.height() * 0.16)


every_page = pytest.mark.parametrize(("paper", "large"), KINDS, ids=lambda one: str(one))
every_log = pytest.mark.parametrize("name", JOURNALS)


@every_log
@every_page
def test_no_box_overlaps_another_or_leaves_the_sheet(name, paper, large):
    page = laid_out(name, paper, large)
    width, height = PAPERS[paper]
    room = QRectF(0, 0, width, height).adjusted(MARGIN - 0.01, LEAST_MARGIN, -MARGIN + 0.01, -LEAST_MARGIN)
    assert len(page.sheets) == (2 if large else 1)
    for sheet in page.sheets:
        assert [box.name for box in sheet if not room.contains(box.rect)] == []
        touching = [(a.name, b.name) for a, b in combinations(sheet, 2) if a.rect.intersects(b.rect)]
        assert touching == []


@every_log
@every_page
def test_all_words_stay_in_their_box_and_off_one_another(name, paper, large):
    for sheet in laid_out(name, paper, large).sheets:
        for box in sheet:
            inside = box.rect.adjusted(-0.5, -2.0, 0.5, 2.0)
            assert [one.text for one in box.words if not inside.contains(one.rect)] == []
        placed = [one for box in sheet for one in box.words]
        over = [(a.text, b.text) for a, b in combinations(placed, 2) if body_of(a).intersects(body_of(b))]
        assert over == []


@every_log
@every_page
def test_nothing_is_cut_off(name, paper, large):
    page, held = laid_out(name, paper, large), content(name)
    said = letters("".join(one.text for one in words_on(page)))
    wanted = [held.title, held.unit, QUESTION, held.question, AGREED, held.foot, *held.notes, *held.always]
    wanted += [answer.headline for answer in held.answers]
    wanted += [chart.title for chart in held.charts]
    for row in held.rows:
        if row.head in ("Before", "After", "All days"):
            wanted += [row.head, row.cells["middle"], row.cells["dates"]]
    assert [text for text in wanted if letters(text) not in said] == []
    shown = [doubt for doubt in held.doubts if letters(doubt) in said]
    hidden = len(held.doubts) - len(shown)
    assert shown == list(held.doubts[: len(shown)])
    assert (letters(more_in_the_app(hidden)) in said) == (hidden > 0)
    assert (TRUST.replace(" ", "") in said) == bool(held.doubts or held.always)


@every_log
@every_page
def test_letters_are_large_enough(name, paper, large):
    for sheet in laid_out(name, paper, large).sheets:
        for box in sheet:
            least = (14 if large else 9) if box.name == "foot" else (17 if large else 11)
            assert all(one.face.size >= least for one in box.words), box.name
            if box.chart is not None:
                assert box.chart.style.size >= (15 if large else 11)


@every_log
@every_page
def test_charts_are_never_smaller_than_can_be_read_and_stand_day_under_day(name, paper, large):
    charts = [box.chart for sheet in laid_out(name, paper, large).sheets for box in sheet if box.chart is not None]
    assert len(charts) == len(content(name).charts)
    for chart in charts:
        assert chart.rect.height() >= least_height(chart.style, chart.parts) - 0.01
    assert len({(chart.sides, chart.days) for chart in charts}) == 1


@pytest.mark.parametrize("name", ["two weeks", "four weeks", "ten months", "two weeks without a change"])
@pytest.mark.parametrize("paper", PAPERS)
def test_an_ordinary_page_shows_everything_with_a_large_chart(name, paper):
    page, held = laid_out(name, paper, False), content(name)
    said = letters("".join(one.text for one in words_on(page)))
    (chart,) = [box.rect for box in page.sheets[0] if box.chart is not None]
    assert chart.height() >= 0.28 * PAPERS[paper][1]
    wanted = [*held.doubts, *(line for answer in held.answers for line in answer.lines)]
    wanted += [cell for row in held.rows for cell in (row.head, *row.cells.values())]
    assert [text for text in wanted if letters(text) not in said] == []


def test_where_room_is_short_doubts_are_told_by_number():
    page, held = laid_out("longest words", "letter", False), content("longest words")
    said = letters("".join(one.text for one in words_on(page)))
    assert len(held.doubts) >= 3
    assert any(letters(more_in_the_app(hidden)) in said for hidden in range(1, len(held.doubts) + 1))


def test_two_charts_share_the_names_above_and_the_days_below():
    upper, lower = [
        box.chart for box in laid_out("blood pressure", "a4", False).sheets[0] if box.chart is not None
    ]
    assert (upper.parts.lane, upper.parts.days) == (True, False)
    assert (lower.parts.lane, lower.parts.days) == (False, True)


def test_an_empty_question_leaves_a_line_to_write_on():
    (empty,) = [box for box in laid_out("too early", "a4", False).sheets[0] if box.name == "question"]
    (asked,) = [box for box in laid_out("two weeks", "a4", False).sheets[0] if box.name == "question"]
    assert empty.framed
    assert empty.rect.height() > asked.rect.height() + 10
