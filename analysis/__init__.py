"""Numbers in, answers out: what a daily log can and cannot show about a change."""

from analysis.answer import Review
from analysis.errors import AnalysisError
from analysis.log import Change, Log, Measure, Span
from analysis.many_logs import review_many
from analysis.pipeline import chance_of, review
from analysis.what_if import Choice, other_choices

__all__ = [
    "AnalysisError",
    "Change",
    "Choice",
    "Log",
    "Measure",
    "Review",
    "Span",
    "chance_of",
    "other_choices",
    "review",
    "review_many",
]
