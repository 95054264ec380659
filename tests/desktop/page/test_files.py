"""The files: one sheet, drawn and not an image, its text whole, its typeface inside; HTML with the same words."""

from __future__ import annotations

import io
import re
import xml.etree.ElementTree as ET

import pytest
from pypdf import PdfReader
from pypdf.generic import IndirectObject
from PySide6.QtCore import QByteArray
from PySide6.QtGui import QImage
from PySide6.QtSvg import QSvgRenderer

from desktop.chart.look import LIGHT
from desktop.page.files import CHART_HEIGHT, CHART_WIDTH, chart_svg, pdf_of, png_of, write_file
from desktop.page.html import html_of
from desktop.page.layout import PAPERS, lay_out
from tests.desktop.page.pages import JOURNALS, page_of, subjects_of
from tests.desktop.page.reading import missing, numbers_of, pdf_text, plain
from tests.desktop.page.test_content import ORDINARY

FEW = ["four weeks", "ten months", "blood pressure", "three changes", "empty"]


def pdf(name: str, paper: str = "a4", large: bool = False) -> bytes:
    return pdf_of(lay_out(page_of(JOURNALS[name]()), paper, large_print=large))


def fonts_of(reader: PdfReader) -> dict[str, dict]:
    """Each typeface of a PDF with its descriptor."""
    found = {}
    for page in reader.pages:
        for font in page["/Resources"]["/Font"].values():
            whole = font.get_object() if isinstance(font, IndirectObject) else font
            below = whole["/DescendantFonts"][0].get_object()
            found[whole["/BaseFont"]] = below["/FontDescriptor"].get_object()
    return found


@pytest.mark.parametrize("name", ORDINARY)
@pytest.mark.parametrize("large", [False, True])
def test_the_text_of_a_pdf_has_every_number_of_the_review(name, large):
    said = pdf_text(pdf(name, large=large))
    for subject in subjects_of(JOURNALS[name]()):
        if len(subject.review.stretches) <= 5:
            # In large print the row of the last days may give way.
            assert missing(numbers_of(subject.review, lately=not large), said) == []


@pytest.mark.parametrize("name", FEW)
@pytest.mark.parametrize("paper", PAPERS)
@pytest.mark.parametrize("large", [False, True])
def test_a_pdf_is_one_sheet_drawn_with_the_typeface_inside(name, paper, large):
    reader = PdfReader(io.BytesIO(pdf(name, paper, large)))
    assert len(reader.pages) == (2 if large else 1)
    for page in reader.pages:
        assert (float(page.mediabox.width), float(page.mediabox.height)) == pytest.approx(PAPERS[paper], abs=1)
        assert len(page.images) == 0
    fonts = fonts_of(reader)
    assert fonts
    assert all("AtkinsonHyperlegible" in name for name in fonts)
    assert all("/FontFile2" in descriptor for descriptor in fonts.values())


def test_words_can_be_searched_letter_by_letter():
    said = pdf_text(pdf("ten months"))
    assert "difference" in said
    assert "fits" in said
    assert not re.search("[\ufb00-\ufb06]", said)


def test_a_pdf_says_what_it_is_of_and_nothing_of_whose_it_is():
    about = PdfReader(io.BytesIO(pdf("four weeks"))).metadata
    assert about.title == "Exercise"
    assert about.creator == "Dayfence 0.1"
    assert not about.author


def html_tree(name: str) -> ET.Element:
    text = html_of(page_of(JOURNALS[name]())).decode()
    assert text.startswith("<!DOCTYPE html>\n")
    return ET.fromstring(text.partition("\n")[2])


def words_in(tree: ET.Element) -> str:
    return plain(" ".join("".join(tree.find("body").itertext()).split()))


@pytest.mark.parametrize("name", JOURNALS)
def test_html_is_well_formed_and_has_all_of_the_content(name):
    content = page_of(JOURNALS[name]())
    tree = html_tree(name)
    said = words_in(tree)
    wanted = [content.title, content.question, content.foot, *content.doubts, *content.always, *content.notes]
    wanted += [text for answer in content.answers for text in (answer.headline, *answer.lines)]
    wanted += [text for row in content.rows for text in (row.head, *row.cells.values())]
    columns = set(content.columns)
    hidden = {row.cells["readings"] for row in content.rows} if "readings" not in columns else set()
    assert [text for text in wanted if plain(text) not in said and text not in hidden] == []


@pytest.mark.parametrize("name", FEW)
def test_html_tells_each_chart_in_sentences_and_heads_each_cell(name):
    content, tree = page_of(JOURNALS[name]()), html_tree(name)
    figures = list(tree.iter("figure"))
    assert [figure.get("aria-label") for figure in figures] == [chart.picture.told for chart in content.charts]
    assert all(figure.get("role") == "img" for figure in figures)
    assert tree.get("lang") == "en"
    assert len(list(tree.iter("h1"))) == 1
    scopes = [cell.get("scope") for cell in tree.iter("th")]
    assert scopes.count("row") == len(content.rows)
    assert scopes.count("col") == (len(content.columns) + 1 if content.rows else 0)


def test_html_needs_nothing_from_anywhere():
    text = html_of(page_of(JOURNALS["blood pressure"]())).decode()
    addresses = set(re.findall(r'(?:https?:)?//[^"\s]+', re.sub(r"base64,[^)]*", "", text)))
    assert addresses <= {"http://www.w3.org/2000/svg", "http://www.w3.org/1999/xlink"}
    names = re.findall(r'\bid="([^"]+)"', text)
    assert len(set(names)) == len(names)
    assert set(re.findall(r"url\(#([^)]+)\)", text)) <= set(names)


def test_letters_with_a_meaning_in_html_are_text():
    from tests.desktop.chart.pictures import LOW, journal_of
    from tests.desktop.page.pages import asked

    journal = asked(journal_of(LOW, change=7, title="a < b & c"), '<script>alert("x")</script>', "<b>")
    tree = ET.fromstring(html_of(page_of(journal)).decode().partition("\n")[2])
    assert list(tree.iter("script")) == []
    assert '<script>alert("x")</script>' in words_in(tree)
    assert "a < b & c" in words_in(tree)


@pytest.mark.parametrize("name", FEW)
def test_a_chart_alone_is_drawn_and_described(name):
    content = page_of(JOURNALS[name]())
    data = chart_svg(content)
    tree = ET.fromstring(data)
    space = "{http://www.w3.org/2000/svg}"
    assert tree.find(f"{space}desc").text == " ".join(chart.picture.told for chart in content.charts)
    assert list(tree.iter(f"{space}image")) == []
    assert len(list(tree.iter(f"{space}text"))) >= 5
    assert QSvgRenderer(QByteArray(data)).isValid()


@pytest.mark.parametrize("name", FEW)
def test_a_chart_in_pixels_is_sharp_and_on_white(name):
    content = page_of(JOURNALS[name]())
    image = QImage.fromData(png_of(content))
    assert (image.width(), image.height()) == (3 * CHART_WIDTH, 3 * CHART_HEIGHT * len(content.charts))
    assert image.pixelColor(2, 2) == LIGHT.colour("paper")
    assert "Chart of" in image.text("Description") or name == "empty"


def test_a_file_that_cannot_be_written_leaves_what_was_there(tmp_path):
    path = tmp_path / "page.pdf"
    write_file(path, b"first")
    write_file(path, b"second")
    assert path.read_bytes() == b"second"
    with pytest.raises(OSError, match="missing"):
        write_file(tmp_path / "missing" / "page.pdf", b"third")
    assert [one.name for one in tmp_path.iterdir()] == ["page.pdf"]
