"""The rows about the page: a whole sheet, laid out and written, against its chart alone."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterator

from tests.bench.measuring import Row, compared


def rows() -> Iterator[Row]:
    """Every row, each measured in one go."""
    os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
    from PySide6.QtCore import QBuffer, QIODevice
    from PySide6.QtGui import QGuiApplication, QPainter, QPdfWriter

    from desktop.chart.whole import paint_chart
    from desktop.faces import load_faces
    from desktop.page.content import PageContent
    from desktop.page.files import page_layout, pdf_of
    from desktop.page.layout import lay_out
    from tests.desktop.page.pages import JOURNALS, page_of

    application = QGuiApplication.instance() or QGuiApplication(["bench"])
    load_faces()

    def whole(content: PageContent) -> bytes:
        return pdf_of(lay_out(content))

    def chart_alone(content: PageContent) -> Callable[[], None]:
        page = lay_out(content)
        charts = [box.chart for box in page.sheets[0] if box.chart is not None]

        def write() -> None:
            buffer = QBuffer()
            buffer.open(QIODevice.OpenModeFlag.WriteOnly)
            writer = QPdfWriter(buffer)
            writer.setResolution(72)
            writer.setPageLayout(page_layout(page))
            with QPainter(writer) as painter:
                for one in charts:
                    paint_chart(
                        painter, one.rect, one.picture, one.style, parts=one.parts, sides=one.sides, days=one.days
                    )

        return write

    for name in ("four weeks", "ten months", "blood pressure", "three changes", "longest words"):
        content = page_of(JOURNALS[name]())
        yield compared(
            f"page of {name}, laid out and as PDF / its chart alone as PDF",
            lambda content=content: whole(content),
            chart_alone(content),
            10,
            names=("page", "chart"),
        )
    del application
