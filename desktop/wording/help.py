"""Short help and notices."""

from desktop.wording.cautions import CAUTION

KEYS = """\
Digits: type a value. Enter: keep it and go to the next day. Tab: next measure. Delete: blank.
r, i, a: rest, ill, away. F2: edit what is there. Escape: leave it as it was.
Ctrl+M: mark a change. Ctrl+D: set the day aside with a reason.
Ctrl+T: go to today. Ctrl+G: go to a day. Ctrl+Z, Ctrl+Shift+Z: undo, redo.
Ctrl+P: the page for an appointment, to print or to save.
On the chart: Left and Right read out a day, + and − zoom, Ctrl with arrows moves, Home shows all."""

NAME_AND_VERSION = "Dayfence 0.1"

ABOUT = f"""\
{NAME_AND_VERSION}

{CAUTION}

The typeface is Atkinson Hyperlegible, copyright 2020 Braille Institute of America, \
under the SIL Open Font License. \
Made with Qt and PySide6 (LGPL), pyqtgraph (MIT) and NumPy (BSD)."""
