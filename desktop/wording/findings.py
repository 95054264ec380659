"""A review in plain words: the answer first, the four questions, what would settle it."""

from __future__ import annotations

from dataclasses import replace

from analysis.answer import Review
from desktop.wording.cautions import CAUTION
from desktop.wording.doubts import doubt_sentence
from desktop.wording.moved import MovedTeller
from desktop.wording.one_stretch import OneStretchTeller
from desktop.wording.telling import Findings, Section, speech_of

_NOTHING_YET = (
    "There is no value in this log yet.",
    "Type a number and press Enter. Arrow up goes to earlier days.",
)


def findings_of(review: Review) -> Findings:
    """What a review says, in plain words."""
    if not review.stretches:
        return Findings("No answer yet.", (Section("", _NOTHING_YET),))
    if len(review.stretches) == 1:
        return OneStretchTeller(review).tell()
    return MovedTeller(review).tell()


def worded(review: Review) -> Review:
    """The review with its findings, its doubts' sentences and the caution filled in."""
    speech = speech_of(review)
    return replace(
        review,
        findings=findings_of(review).lines(),
        doubts=tuple(replace(doubt, sentence=doubt_sentence(doubt, speech)) for doubt in review.doubts),
        caution=CAUTION,
    )


def findings_text(review: Review) -> str:
    """The findings as plain text to paste elsewhere, with the caution below them."""
    told = findings_of(review)
    blocks = [told.headline]
    blocks += ["\n".join([section.title, *section.sentences]).strip() for section in told.sections]
    return "\n\n".join([*blocks, CAUTION]) + "\n"
