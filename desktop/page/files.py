"""The page as a PDF, and its charts alone as SVG or PNG. Each function gives the bytes of the file."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

from PySide6.QtCore import QBuffer, QIODevice, QMarginsF, QPointF, QRectF, QSize
from PySide6.QtGui import QImage, QPageLayout, QPageSize, QPainter, QPdfWriter
from PySide6.QtSvg import QSvgGenerator

from desktop.chart.look import LIGHT
from desktop.chart.style import Style
from desktop.chart.whole import paint_chart, side_widths
from desktop.page.content import ChartWords, PageContent
from desktop.page.layout import Page
from desktop.page.painter import paint_sheet
from desktop.page.words import Face, font_of, plain_font, set_words
from desktop.wording.help import NAME_AND_VERSION

CHART_WIDTH, CHART_HEIGHT = 720, 380
"""In points, of one chart alone; two stand under one another."""

_PIXELS_A_POINT = 3
_EDGE = 12.0
_STYLE_SIZE = 12
_HEAD = Face(13, bold=True)


def page_layout(page: Page) -> QPageLayout:
    """The paper as Qt names it, without margins: the layout has its own."""
    names = {"a4": QPageSize.PageSizeId.A4, "letter": QPageSize.PageSizeId.Letter}
    size = QPageSize(names[page.paper])
    return QPageLayout(size, QPageLayout.Orientation.Portrait, QMarginsF(), QPageLayout.Unit.Point)


def pdf_of(page: Page, *more: Page) -> bytes:
    """The page as a PDF: drawn, not an image; its text can be searched and copied, its typeface is inside.

    Args:
        page: the first.
        more: further pages behind it, on the same paper.
    """
    buffer = _opened()
    writer = QPdfWriter(buffer)
    writer.setTitle(page.title)
    writer.setCreator(NAME_AND_VERSION)
    writer.setResolution(72)
    writer.setPageLayout(page_layout(page))
    with QPainter(writer) as painter:
        for place, one in enumerate((page, *more)):
            for sheet in range(len(one.sheets)):
                if place or sheet:
                    writer.newPage()
                paint_sheet(painter, one, sheet)
    return _taken(buffer)


def chart_svg(content: PageContent, place: int | None = None) -> bytes:
    """The charts alone, drawn, or the one at ``place``; with their sentences for those who do not see them."""
    charts = content.charts if place is None else content.charts[place : place + 1]
    buffer = _opened()
    generator = QSvgGenerator()
    generator.setOutputDevice(buffer)
    generator.setResolution(72)
    size = _charts_size(charts)
    generator.setSize(size)
    generator.setViewBox(QRectF(0, 0, size.width(), size.height()))
    generator.setTitle(content.title)
    generator.setDescription(_told(charts))
    with QPainter(generator) as painter:
        _paint_charts(painter, content, charts)
    return _taken(buffer)


def png_of(content: PageContent) -> bytes:
    """The charts alone as a picture, three pixels a point."""
    buffer = _opened()
    chart_image(content).save(buffer, "PNG")  # type: ignore[call-overload]
    return _taken(buffer)


def chart_image(content: PageContent) -> QImage:
    """The charts alone in pixels, on white."""
    size = _charts_size(content.charts)
    image = QImage(size * _PIXELS_A_POINT, QImage.Format.Format_RGB32)
    image.setDevicePixelRatio(_PIXELS_A_POINT)
    image.fill(LIGHT.colour("paper"))
    image.setText("Description", _told(content.charts))
    with QPainter(image) as painter:
        _paint_charts(painter, content, content.charts)
    return image


def write_file(path: Path, data: bytes) -> None:
    """Write a file whole: what was there under its name stays until all of it is on the disk.

    Raises:
        OSError: it cannot be written there.
    """
    part = path.with_name(f".{path.name}.part")
    try:
        part.write_bytes(data)
        part.replace(path)
    except OSError:
        part.unlink(missing_ok=True)
        raise


def _told(charts: Sequence[ChartWords]) -> str:
    return " ".join(chart.picture.told for chart in charts)


def _charts_size(charts: Sequence[ChartWords]) -> QSize:
    return QSize(CHART_WIDTH, CHART_HEIGHT * len(charts))


def _paint_charts(painter: QPainter, content: PageContent, charts: Sequence[ChartWords]) -> None:
    """Each chart under its title, days under days."""
    style = Style(LIGHT, plain_font(), float(_STYLE_SIZE))
    whole = f"{content.title}, {content.unit}" if content.unit else content.title
    pictures = [chart.picture for chart in content.charts]
    days = (min(one.x0 for one in pictures), max(one.x1 for one in pictures))
    wide = [side_widths(one, style, CHART_HEIGHT - 4 * _EDGE) for one in pictures]
    sides = (max(left for left, _ in wide), max(right for _, right in wide))
    for place, chart in enumerate(charts):
        rect = QRectF(0, place * CHART_HEIGHT, CHART_WIDTH, CHART_HEIGHT).adjusted(_EDGE, _EDGE, -_EDGE, -_EDGE)
        words, height = set_words([(chart.title or whole, _HEAD)], rect.width())
        painter.setPen(LIGHT.colour("ink"))
        for one in words:
            painter.setFont(font_of(one.face))
            painter.drawText(rect.topLeft() + QPointF(one.x, one.y), one.text)
        below = rect.adjusted(0, height + _EDGE / 2, 0, 0)
        paint_chart(painter, below, chart.picture, style, sides=sides, days=days)


def _opened() -> QBuffer:
    buffer = QBuffer()
    buffer.open(QIODevice.OpenModeFlag.WriteOnly)
    return buffer


def _taken(buffer: QBuffer) -> bytes:
    buffer.close()
    return bytes(buffer.data().data())
