"""The page laid out once, in points: screen, printer and files paint these very boxes.

Nothing is ever cut off. Where room is short the charts give way first, then the doubts, told by their number, then
lines under the answer and rows of the table.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace
from typing import Literal

from PySide6.QtCore import QLineF, QRectF

from desktop.chart.look import LIGHT
from desktop.chart.pieces import Picture
from desktop.chart.style import Style
from desktop.chart.whole import Parts, least_height, side_widths
from desktop.page.content import PageContent, Row
from desktop.page.table import tall_tables, wide_table
from desktop.page.words import LINE, Face, Run, Words, plain_font, set_words, width_of
from desktop.wording.page import AGREED, PLAN, QUESTION, TRUST, more_in_the_app

PaperName = Literal["a4", "letter"]
PAPERS: dict[PaperName, tuple[float, float]] = {"a4": (595.276, 841.89), "letter": (612.0, 792.0)}
"""Width and height in points."""

MARGIN = 42.0
_HEAD_MARGIN, _FOOT_MARGIN = 31.0, 27.0
_WRITING_LINES = 3
_SHORT_FACT = 40
_CHART_MORE = 0.1
"""What charts take beyond their part of the sheet where nothing else needs it."""

_LEAST_GAP, _AIR, _MOST_AIR = 0.5, 0.35, 1.1
"""Room between boxes, in letters: what there must be, what comes before larger charts, what comes after them."""


@dataclass(frozen=True)
class Sizes:
    """Heights of letters in points, and how much of the sheet the charts take where there is room."""

    body: int
    title: int
    headline: int
    headline_of_two: int
    foot: int
    chart: int
    chart_part: float


NORMAL = Sizes(body=11, title=16, headline=19, headline_of_two=14, foot=9, chart=11, chart_part=0.40)
LARGE = Sizes(body=17, title=22, headline=25, headline_of_two=19, foot=14, chart=15, chart_part=0.52)


@dataclass(frozen=True)
class Chart:
    """A chart in its box; charts under one another share ``sides`` and ``days``."""

    rect: QRectF
    picture: Picture
    style: Style
    parts: Parts
    sides: tuple[float, float] = (0.0, 0.0)
    days: tuple[float, float] = (0.0, 1.0)


@dataclass(frozen=True)
class Box:
    """One part of a sheet, by its name; no two boxes of a sheet overlap, and all that is in one stays in it.

    Attributes:
        words: text.
        rules: thin lines.
        writing: lines to write on.
        framed: whether a line runs round it.
        chart: a chart that fills the box.
    """

    name: str
    rect: QRectF
    words: tuple[Words, ...] = ()
    rules: tuple[QLineF, ...] = ()
    writing: tuple[QLineF, ...] = ()
    framed: bool = False
    chart: Chart | None = None

    def moved(self, dx: float, dy: float) -> Box:
        """The same box in another place."""
        return replace(
            self,
            rect=self.rect.translated(dx, dy),
            words=tuple(one.moved(dx, dy) for one in self.words),
            rules=tuple(one.translated(dx, dy) for one in self.rules),
            writing=tuple(one.translated(dx, dy) for one in self.writing),
        )


@dataclass(frozen=True)
class Page:
    """One sheet, or two in large print; ``sheets`` holds the boxes of each from top to bottom."""

    paper: PaperName
    title: str
    sheets: tuple[tuple[Box, ...], ...]

    @property
    def size(self) -> tuple[float, float]:
        """Width and height of a sheet in points."""
        return PAPERS[self.paper]


@dataclass(frozen=True)
class _Shown:
    """How much of what gives way is shown."""

    doubts: int
    lines: int
    rows: tuple[Row, ...]


def lay_out(content: PageContent, paper: PaperName = "a4", *, large_print: bool = False) -> Page:
    """Lay the page out.

    Args:
        content: what is on it.
        paper: its size.
        large_print: larger letters on two sheets.
    """
    return _Layout(content, paper, LARGE if large_print else NORMAL).page(two_sheets=large_print)


class _Layout:
    def __init__(self, content: PageContent, paper: PaperName, sizes: Sizes) -> None:
        self.content, self.paper, self.sizes = content, paper, sizes
        self.width = PAPERS[paper][0] - 2 * MARGIN
        self.height = PAPERS[paper][1] - _HEAD_MARGIN - _FOOT_MARGIN
        self.plain, self.bold = Face(sizes.body), Face(sizes.body, bold=True)
        self.quiet = Face(sizes.body, quiet=True)
        self.style = Style(LIGHT, plain_font(), float(sizes.chart))

    def page(self, *, two_sheets: bool) -> Page:
        if two_sheets:
            sheets = [self._sheet(self._first), self._sheet(self._second)]
        else:
            sheets = [self._sheet(lambda shown: [*self._first(shown), *self._second(shown)])]
        return Page(self.paper, self.content.title, tuple(sheets))

    def _first(self, shown: _Shown) -> list[Box]:
        if self.content.sections:
            return [self._title(), *self._sections(), *self._tables(shown)]
        return [self._title(), self._question(), *self._answers(shown), *self._tables(shown)]

    def _second(self, shown: _Shown) -> list[Box]:
        trust = self._trust(shown)
        return [*self._notes(), *self._charts(), *trust, *self._plan(), self._agreed(), self._foot()]

    def _sheet(self, boxes_of: Callable[[_Shown], list[Box]]) -> tuple[Box, ...]:
        """The boxes of one sheet with as much as it has room for."""
        boxes: list[Box] = []
        for shown in self._attempts():
            boxes = boxes_of(shown)
            if self._needed(boxes) <= self.height:
                break
        return self._spread(boxes)

    def _attempts(self) -> list[_Shown]:
        """What is shown, from everything to the least: the first that fits is taken."""
        doubts = len(self.content.doubts)
        lines = max((len(one.lines) for one in self.content.answers), default=0)
        rows = self.content.rows
        # In large print a row is a column, which leaves no room when it goes.
        kept = rows if self.sizes is LARGE else tuple(row for row in rows if not row.gives_way)
        ends = tuple(row for row in kept if row.head in (kept[0].head, kept[-1].head))
        tried = [_Shown(place, lines, rows) for place in range(doubts, 0, -1)]
        tried += [_Shown(min(doubts, 1), lines, rows), _Shown(min(doubts, 1), lines, kept), _Shown(0, lines, kept)]
        tried += [_Shown(0, place, kept) for place in range(lines - 1, -1, -1)]
        return [*tried, _Shown(0, 0, ends)]

    def _needed(self, boxes: Sequence[Box]) -> float:
        return sum(box.rect.height() for box in boxes) + self._gap(_LEAST_GAP) * (len(boxes) - 1)

    def _gap(self, part: float) -> float:
        return self.sizes.body * part

    def _spread(self, boxes: list[Box]) -> tuple[Box, ...]:
        """Give what room is left to the charts, then to the gaps; the foot stands at the foot."""
        left = self.height - self._needed(boxes)
        gaps = max(len(boxes) - 1, 1)
        wider = min(left / gaps, self._gap(_AIR))
        left -= wider * gaps
        many = sum(box.chart is not None for box in boxes)
        grown = 0.0
        if many:
            least = sum(box.rect.height() for box in boxes if box.chart is not None)
            grown = max(0.0, min(left, PAPERS[self.paper][1] * self.sizes.chart_part - least))
            left -= grown
        airy = min(left / gaps, self._gap(_MOST_AIR))
        left -= airy * gaps
        if many:
            grown += min(left, PAPERS[self.paper][1] * _CHART_MORE)
        gap = self._gap(_LEAST_GAP) + wider + airy
        placed: list[Box] = []
        top = _HEAD_MARGIN
        for box in boxes:
            one = self._grown(box, grown / many) if box.chart is not None else box
            if box.name == "foot":
                top = _HEAD_MARGIN + self.height - box.rect.height()
            placed.append(one.moved(MARGIN, top))
            top += one.rect.height() + gap
        return self._aligned(placed)

    def _grown(self, box: Box, by: float) -> Box:
        return replace(box, rect=box.rect.adjusted(0, 0, 0, by))

    def _aligned(self, boxes: list[Box]) -> tuple[Box, ...]:
        """The boxes with their charts given the place they now have, days under days."""
        heads = {id(box): self._chart_head(box) for box in boxes if box.chart is not None}
        drawn = [box for box in boxes if box.chart is not None]
        if not drawn:
            return tuple(boxes)
        pictures = [box.chart.picture for box in drawn if box.chart is not None]
        days = (min(one.x0 for one in pictures), max(one.x1 for one in pictures))
        wide = [
            side_widths(box.chart.picture, self.style, box.rect.height() - heads[id(box)], box.chart.parts)
            for box in drawn
            if box.chart is not None
        ]
        sides = (max(left for left, _ in wide), max(right for _, right in wide))
        finished = []
        for box in boxes:
            if box.chart is not None:
                rect = box.rect.adjusted(0, heads[id(box)], 0, 0)
                box = replace(box, chart=replace(box.chart, rect=rect, sides=sides, days=days))
            finished.append(box)
        return tuple(finished)

    def _chart_head(self, box: Box) -> float:
        return max((one.face.size * LINE for one in box.words), default=0.0)

    # The boxes, each from (0, 0) on.

    def _text(self, name: str, paragraphs: Sequence[Sequence[Run]], *, between: float = 0.0) -> Box:
        words: list[Words] = []
        top = 0.0
        for place, runs in enumerate(paragraphs):
            top += between if place else 0.0
            placed, height = set_words(runs, self.width)
            words += [one.moved(0, top) for one in placed]
            top += height
        return Box(name, QRectF(0, 0, self.width, top), tuple(words))

    def _title(self) -> Box:
        size = self.sizes.title
        unit = self.content.unit
        title: list[Run] = [(self.content.title + ("," if unit else ""), Face(size, bold=True))]
        if unit:
            title.append((unit, Face(size)))
        # A short fact, such as a date, is not parted by the end of a line.
        facts = (fact.replace(" ", "\u00a0") if len(fact) < _SHORT_FACT else fact for fact in self.content.facts)
        return self._text("title", [title, [(" · ".join(facts), self.quiet)]])

    def _sections(self) -> list[Box]:
        return [
            self._text(f"section {place}", [[(f"{one.title}:", self.bold), (" ".join(one.sentences), self.plain)]])
            for place, one in enumerate(self.content.sections, start=1)
        ]

    def _question(self) -> Box:
        pad = self.sizes.body * 0.8
        asked = [(f"{QUESTION}:", self.bold), (self.content.question, self.plain)]
        words, height = set_words(asked if self.content.question else asked[:1], self.width - 2 * pad)
        if not self.content.question:
            height += self.sizes.body * LINE  # Room to write it by hand.
        rect = QRectF(0, 0, self.width, height + 1.6 * pad)
        return Box("question", rect, tuple(one.moved(pad, pad * 0.8) for one in words), framed=True)

    def _answers(self, shown: _Shown) -> list[Box]:
        boxes = []
        is_one = len(self.content.answers) == 1
        largest = self.sizes.headline if is_one else self.sizes.headline_of_two
        for place, answer in enumerate(self.content.answers):
            size = self._fitting(
                f"{answer.title}: {answer.headline}" if answer.title else answer.headline, largest
            )
            headline: list[Run] = [(answer.headline, Face(size, bold=True))]
            if answer.title:
                headline.insert(0, (f"{answer.title}:", Face(size)))
            lines: list[list[Run]] = [[(line, self.plain)] for line in answer.lines[: shown.lines]]
            boxes.append(self._text(f"answer {place + 1}", [headline, *lines], between=self.sizes.body * 0.18))
        return boxes

    def _fitting(self, headline: str, largest: int) -> int:
        """The size at which a headline has one line, where one a little smaller does; else the largest."""
        sizes = range(largest, largest - 3, -1)
        one_line = (size for size in sizes if width_of(headline, Face(size, bold=True)) <= self.width)
        return next(one_line, largest)

    def _tables(self, shown: _Shown) -> list[Box]:
        rows = shown.rows
        if not rows:
            return []
        if self.sizes is not LARGE:
            words, rules, height = wide_table(self.content, rows, self.sizes.body, self.width)
            return [Box("table", QRectF(0, 0, self.width, height), tuple(words), tuple(rules))]
        boxes = []
        for which, words, rules, height in tall_tables(self.content, rows, self.sizes.body, self.width):
            if which:
                head, tall = set_words([(which, self.bold)], self.width)
                words = [*head, *(one.moved(0, tall) for one in words)]
                rules = [one.translated(0, tall) for one in rules]
                height += tall
            rect = QRectF(0, 0, self.width, height)
            boxes.append(Box(f"table {which}".strip(), rect, tuple(words), tuple(rules)))
        return boxes

    def _notes(self) -> list[Box]:
        notes: list[list[Run]] = [[(note, self.quiet)] for note in self.content.notes]
        return [self._text("notes", notes)] if notes else []

    def _charts(self) -> list[Box]:
        charts = self.content.charts
        shares = len(charts) == 2 and charts[0].picture.lane == charts[1].picture.lane
        parts = [Parts(days=False), Parts(lane=False, key=True)] if shares else [Parts(key=True)] * len(charts)
        boxes = []
        for place, (chart, around) in enumerate(zip(charts, parts, strict=True), start=1):
            words: list[Words] = []
            head = 0.0
            if chart.title:
                words, head = set_words([(chart.title, self.bold)], self.width)
            rect = QRectF(0, 0, self.width, head + least_height(self.style, around))
            drawn = Chart(rect, chart.picture, self.style, around)
            boxes.append(Box(f"chart {place}", rect, tuple(words), chart=drawn))
        return boxes

    def _trust(self, shown: _Shown) -> list[Box]:
        said = list(self.content.doubts[: shown.doubts])
        left = len(self.content.doubts) - len(said)
        if left:
            said.append(more_in_the_app(left))
        said += self.content.always
        if not said:
            return []
        indent = self.sizes.body
        words, top = set_words([(TRUST, self.bold)], self.width)
        for line in said:
            placed, height = set_words([(line, self.plain)], self.width - indent)
            words += [Words(indent * 0.3, placed[0].y + top, "·", self.bold)]
            words += [one.moved(indent, top) for one in placed]
            top += height
        return [Box("trust", QRectF(0, 0, self.width, top), tuple(words))]

    def _plan(self) -> list[Box]:
        said = self.content.plan
        return [self._text("plan", [[(f"{PLAN}:", self.bold), (said, self.plain)]])] if said else []

    def _agreed(self) -> Box:
        words, _ = set_words([(AGREED, self.bold)], self.width)
        step = self.sizes.body * 2
        begin = words[0].rect.right() + self.sizes.body * 0.6
        height = step * (_WRITING_LINES - 1) + words[0].rect.bottom()
        lines = tuple(
            QLineF(
                0.0 if place else begin, words[0].y + 2 + step * place, self.width, words[0].y + 2 + step * place
            )
            for place in range(_WRITING_LINES)
        )
        return Box("agreed", QRectF(0, 0, self.width, height), tuple(words), writing=lines)

    def _foot(self) -> Box:
        small = Face(self.sizes.foot, quiet=True)
        return self._text("foot", [[(self.content.foot, small)]])
