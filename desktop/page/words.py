"""Text set into lines: faces, and words placed so that no line is wider than its room."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from functools import cache

from PySide6.QtCore import QRectF
from PySide6.QtGui import QFont, QFontMetricsF

from desktop.faces import FACE

LINE = 1.3
"""From one line to the next, of the height of letters."""


@dataclass(frozen=True)
class Face:
    """A size in points, bold or not, in the ink of the text or the quiet one."""

    size: int
    bold: bool = False
    quiet: bool = False


@dataclass(frozen=True)
class Words:
    """Words on one line in one face; ``y`` is the line they stand on."""

    x: float
    y: float
    text: str
    face: Face

    @property
    def rect(self) -> QRectF:
        """What they cover."""
        metrics = metrics_of(self.face)
        return QRectF(self.x, self.y - metrics.ascent(), metrics.horizontalAdvance(self.text), metrics.height())

    def moved(self, dx: float, dy: float) -> Words:
        """The same words in another place."""
        return Words(self.x + dx, self.y + dy, self.text, self.face)


Run = tuple[str, Face]


def plain_font() -> QFont:
    """The program's face as paper needs it: letters stay letters, and widths are those of the printer."""
    font = QFont(FACE)
    # A ligature is one letter to whoever searches or copies the text.
    for tag in ("liga", "clig", "dlig"):
        font.setFeature(QFont.Tag(tag), 0)
    font.setHintingPreference(QFont.HintingPreference.PreferNoHinting)
    return font


@cache
def font_of(face: Face) -> QFont:
    """The font of a face, one unit a point."""
    font = plain_font()
    font.setPixelSize(face.size)
    font.setBold(face.bold)
    return font


@cache
def metrics_of(face: Face) -> QFontMetricsF:
    """The measures of a face."""
    return QFontMetricsF(font_of(face))


def width_of(text: str, face: Face) -> float:
    """How wide a text is on one line."""
    return metrics_of(face).horizontalAdvance(text)


def set_words(runs: Sequence[Run], width: float) -> tuple[list[Words], float]:
    """Set runs of text one after another into lines from (0, 0) on.

    A line ends at a space; a word that is wider than a whole line is parted where it must be. Spaces that do not
    break are set as spaces.

    Args:
        runs: texts with their faces.
        width: of a line.

    Returns:
        The words, and the height they take.
    """
    lines: list[list[Run]] = [[]]
    for text, face in runs:
        for word in text.split(" "):
            for piece in _pieces(word.replace("\u00a0", " "), face, width):
                longer = _joined(lines[-1], piece, face)
                if lines[-1] and _width(longer) > width:
                    lines.append([(piece, face)])
                else:
                    lines[-1] = longer
    placed: list[Words] = []
    top = 0.0
    for line in lines:
        size = max((face.size for _, face in line), default=0)
        baseline = top + max((_baseline(face) for _, face in line), default=0.0)
        x = 0.0
        for text, face in line:
            placed.append(Words(x, baseline, text, face))
            x += width_of(text + " ", face)
        top += size * LINE
    return placed, top


def _baseline(face: Face) -> float:
    metrics = metrics_of(face)
    return (face.size * LINE - metrics.height()) / 2 + metrics.ascent()


def _joined(line: list[Run], word: str, face: Face) -> list[Run]:
    """The line with one more word; words in one face are one run, so that they are found as one text."""
    if line and line[-1][1] == face:
        return [*line[:-1], (f"{line[-1][0]} {word}", face)]
    return [*line, (word, face)]


def _width(line: list[Run]) -> float:
    spaced = sum(width_of(text + " ", face) for text, face in line[:-1])
    return spaced + width_of(*line[-1])


def _pieces(word: str, face: Face, width: float) -> Iterator[str]:
    if width_of(word, face) <= width:
        yield word
        return
    piece = ""
    for letter in word:
        if piece and width_of(piece + letter, face) > width:
            yield piece
            piece = ""
        piece += letter
    yield piece
