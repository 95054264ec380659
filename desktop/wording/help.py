"""Short help and notices."""

from desktop.wording.cautions import CAUTION

KEY_GROUPS: tuple[tuple[str, tuple[tuple[str, str], ...]], ...] = (
    (
        "Type the days",
        (
            ("0 to 9", "Type a value"),
            ("Enter", "Keep it and go to the next day"),
            ("Tab", "Go to the next measure"),
            ("Delete", "Make the day blank"),
            ("r", "A rest day"),
            ("i", "A day ill"),
            ("a", "A day away, or a pause"),
            ("F2", "Edit what is there"),
            ("Escape", "Leave it as it was"),
        ),
    ),
    (
        "Find a day, take an act back",
        (
            ("Ctrl+T", "Go to today"),
            ("Ctrl+G", "Go to a day"),
            ("Ctrl+F", "Find words or a number, and go to the day"),
            ("Ctrl+Z", "Undo the last act"),
            ("Ctrl+Shift+Z", "Redo the act that was taken back"),
            ("Ctrl+H", "See what this day has held"),
        ),
    ),
    (
        "Say what happened",
        (
            ("Ctrl+M", "Mark a change"),
            ("Ctrl+D", "Set the day aside with a reason, or put it back"),
            ("Ctrl+Shift+D", "Give days a name"),
        ),
    ),
    (
        "Measures and tables",
        (
            ("Ctrl+Shift+A", "Add a measure"),
            ("Ctrl+E", "Settings of this measure"),
            ("Ctrl+Shift+Left", "Move the column left"),
            ("Ctrl+Shift+Right", "Move the column right"),
            ("Ctrl+Shift+V", "Bring in the block that was copied elsewhere, as a table"),
            ("Ctrl+I", "Bring in a table"),
            ("Ctrl+P", "The page for an appointment"),
        ),
    ),
    (
        "On the chart",
        (
            ("Left, Right", "Read out the day before or after"),
            ("+, −", "Show fewer days, or more"),
            ("Ctrl+Left, Ctrl+Right", "Move along the days"),
            ("Home", "Show every day"),
            ("F1", "What the marks mean"),
        ),
    ),
    (
        "The view",
        (
            ("Ctrl+1 to Ctrl+4", "One mark a day, a week, a month, a year"),
            ("Ctrl+0", "Show every day of the chart"),
            ("Ctrl++, Ctrl+-", "Larger text, smaller text"),
            ("F1", "These keys"),
        ),
    ),
)
"""Groups of keys: each key with what it does."""

NAME_AND_VERSION = "Dayfence 0.1"

ABOUT = f"""\
{NAME_AND_VERSION}

{CAUTION}

The typeface is Atkinson Hyperlegible, copyright 2020 Braille Institute of America, \
under the SIL Open Font License. \
Made with Qt and PySide6 (LGPL), pyqtgraph (MIT) and NumPy (BSD)."""
