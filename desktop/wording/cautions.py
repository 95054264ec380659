"""The caution that stands beside every answer."""

CAUTION = (
    "This describes a log. It does not replace medical advice and does not watch for emergencies. "
    "The plan agreed with your clinician and local guidance come first."
)
"""Shown on screen, on the page and with every export."""
