"""Numbers in, answers out: what a daily log can and cannot show about a change."""

from analysis.answer import Review
from analysis.errors import AnalysisError
from analysis.log import Change, Log, Measure, Span
from analysis.pipeline import review

__all__ = ["AnalysisError", "Change", "Log", "Measure", "Review", "Span", "review"]
