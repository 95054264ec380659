"""The page as HTML: the same content for screen readers and browsers, in one file that needs nothing else."""

from __future__ import annotations

import re
from base64 import b64encode
from html import escape
from pathlib import Path

from desktop.faces import FACE, FACE_FILES, face_path
from desktop.page.content import PageContent, Row
from desktop.page.files import chart_svg
from desktop.wording.page import AGREED, PLAN, QUESTION, TABLE, TRUST, WHICH_DAYS
from desktop.wording.page import HEADS as COLUMN_HEADS

_STYLES = {"400Regular": "normal 400", "400Regular_Italic": "italic 400", "700Bold": "normal 700"}

_CSS = """
body { font-family: FACE, sans-serif; font-size: 1.1rem; line-height: 1.45; color: #1c1c1c; background: #ffffff;
  max-width: 52rem; margin: 2rem auto; padding: 0 1.25rem; }
h1 { font-size: 1.5rem; margin: 0; } h1 span { font-weight: normal; }
h2 { font-size: 1.15rem; margin: 1.6rem 0 0.3rem; }
p { margin: 0.35rem 0; } .facts, .notes p, footer { color: #5b6068; }
.question { border: 1px solid #1c1c1c; padding: 0.7rem 1rem; margin: 1rem 0; }
.answer { font-size: 1.75rem; font-weight: bold; line-height: 1.25; margin: 1.2rem 0 0.5rem; }
.two { font-size: 1.3rem; } .two span { font-weight: normal; }
table { border-collapse: collapse; margin: 1.2rem 0; } th { text-align: left; }
th, td { padding: 0.25rem 1.1rem 0.25rem 0; } tbody tr { border-top: 1px solid #b9bcc2; }
svg { width: 100%; height: auto; } figure { margin: 1.2rem 0; }
.line { border-bottom: 1px solid #5b6068; height: 2.2rem; } footer { font-size: 0.9rem; margin-top: 2rem; }
@media print { body { margin: 0; max-width: none; font-size: 11pt; } }
""".replace("FACE", f'"{FACE}"')


def html_of(content: PageContent) -> bytes:
    """The page as one HTML file: headings, a table with its heads, and each chart told in sentences."""
    unit = f", <span>{escape(content.unit)}</span>" if content.unit else ""
    asked = escape(content.question) if content.question else '<div class="line"></div>'
    parts = [
        f"<header><h1>{escape(content.title)}{unit}</h1>",
        f'<p class="facts">{_said(" · ".join(content.facts))}</p></header>',
        *(
            []
            if content.sections
            else [f'<section class="question"><strong>{QUESTION}:</strong> {asked}</section>']
        ),
        "<main>",
        *_sections(content),
        *_answers(content),
        *_table(content),
        '<div class="notes">',
        *(f"<p>{_said(note)}</p>" for note in content.notes),
        "</div>",
        *_charts(content),
        *_trust(content),
        *([f"<section><h2>{PLAN}</h2><p>{_said(content.plan)}</p></section>"] if content.plan else []),
        f"<section><h2>{AGREED}</h2>",
        *['<div class="line"></div>'] * 3,
        "</section></main>",
        "<footer>",
        f"<p>{_said(content.foot)}</p>",
        "</footer>",
    ]
    head = f'<meta charset="utf-8"/><title>{escape(content.title)}</title><style>{faces_css()}{_CSS}</style>'
    text = (
        f'<!DOCTYPE html>\n<html lang="en"><head>{head}</head>\n<body>\n' + "\n".join(parts) + "\n</body></html>\n"
    )
    return text.encode()


def faces_css() -> str:
    """The typeface itself, so that the file looks alike everywhere."""
    rules = []
    for name in FACE_FILES:
        style, weight = _STYLES[name].split()
        data = b64encode(Path(face_path(name)).read_bytes()).decode("ascii")
        rules.append(
            f'@font-face {{ font-family: "{FACE}"; font-style: {style}; font-weight: {weight}; '
            f"src: url(data:font/ttf;base64,{data}); }}\n"
        )
    return "".join(rules)


def _said(text: str) -> str:
    return escape(text.replace("\u00a0", " "))


def _sections(content: PageContent) -> list[str]:
    parts = []
    for section in content.sections:
        parts += [f"<h2>{escape(section.title)}</h2>", *(f"<p>{_said(line)}</p>" for line in section.sentences)]
    return parts


def _answers(content: PageContent) -> list[str]:
    parts = []
    for answer in content.answers:
        titled = f"<span>{escape(answer.title)}:</span> " if answer.title else ""
        two = " two" if answer.title else ""
        parts.append(f'<h2 class="answer{two}">{titled}{_said(answer.headline)}</h2>')
        parts += [f"<p>{_said(line)}</p>" for line in answer.lines]
    return parts


def _table(content: PageContent) -> list[str]:
    if not content.rows:
        return []
    heads = "".join(f'<th scope="col">{COLUMN_HEADS[name]}</th>' for name in content.columns)
    return [
        f'<table aria-label="{TABLE}"><thead><tr><th scope="col">{WHICH_DAYS}</th>{heads}</tr></thead><tbody>',
        *(_row(row, content.columns) for row in content.rows),
        "</tbody></table>",
    ]


def _row(row: Row, columns: tuple[str, ...]) -> str:
    cells = "".join(f"<td>{_said(row.cells.get(name, ''))}</td>" for name in columns)
    return f'<tr><th scope="row">{escape(row.head)}</th>{cells}</tr>'


def _charts(content: PageContent) -> list[str]:
    parts = []
    for place, chart in enumerate(content.charts):
        drawn = chart_svg(content, place).decode()
        drawn = drawn[drawn.index("<svg") :]
        # Two drawings in one file must not share the names of their patterns.
        drawn = re.sub(r'(id="|url\(#|href="#)', rf"\g<1>c{place}-", drawn)
        told = escape(chart.picture.told.replace("\u00a0", " "), quote=True)
        parts.append(f'<figure role="img" aria-label="{told}">{drawn}</figure>')
    return parts


def _trust(content: PageContent) -> list[str]:
    said = [*content.doubts, *content.always]
    if not said:
        return []
    return [f"<section><h2>{TRUST}</h2><ul>", *(f"<li>{_said(line)}</li>" for line in said), "</ul></section>"]
