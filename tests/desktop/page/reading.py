"""What a page must say of a review, and what a reader finds in its files."""

from __future__ import annotations

import io
import re

from pypdf import PdfReader

from analysis import Review
from desktop.wording.telling import speech_of


def numbers_of(review: Review, *, lately: bool = True) -> list[str]:
    """Every number of the table, as the review has it."""
    number = speech_of(review).number
    said = []
    for stretch in review.stretches:
        values = review.points.values[
            (review.points.first >= stretch.first) & (review.points.first <= stretch.last) & review.points.known
        ]
        if not len(values):
            continue
        said += [number(stretch.median), number(stretch.mean)]
        said.append(f"{number(stretch.lower_fourth)} to {number(stretch.upper_fourth)}")
        said.append(f"{number(float(values.min()))} to {number(float(values.max()))}")
    if lately and review.answer.still is not None and review.answer.still.last_14 is not None:
        said.append(number(review.answer.still.last_14))
    if review.answer.goal is not None:
        said += [f"{inside} of {days}" for inside, days in (review.answer.goal.before, review.answer.goal.after)]
    return said


def plain(text: str) -> str:
    return re.sub(r"\s+", " ", text)


def pdf_text(data: bytes) -> str:
    """The text of a PDF in one line, as copying it gives."""
    return plain(" ".join(page.extract_text() for page in PdfReader(io.BytesIO(data)).pages))


def missing(wanted: list[str], said: str) -> list[str]:
    """What is wanted and not said; numbers are whole numbers there."""
    return [one for one in wanted if not re.search(rf"(?<![\d.−]){re.escape(one)}(?!\.?\d)", said)]
