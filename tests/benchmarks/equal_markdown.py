"""A page of the dossier as Markdown that says the same: headings, paragraphs, lists and tables; drawings stay as they are."""

import re
from html.parser import HTMLParser

_BLOCKS = {"p", "h1", "h2", "h3", "figcaption", "caption", "dt", "dd", "address"}
_HEADS = {"h1": "# ", "h2": "## ", "h3": "### "}


class _Reader(HTMLParser):
    def __init__(self):
        super().__init__()
        self.out, self.cell, self.row, self.text, self.svg = [], None, None, [], []
        self.heads = 0

    def handle_starttag(self, tag, attrs):
        if tag == "svg" or self.svg:
            self.svg.append(self.get_starttag_text() or "")
            return
        if tag == "tr":
            self.row = []
        elif tag in ("td", "th"):
            self.cell = []
        elif tag == "a":
            href = dict(attrs).get("href", "")
            self._put("[")
            self.href = href

    def handle_endtag(self, tag):
        if self.svg:
            self.svg.append(f"</{tag}>")
            if tag == "svg":
                self.out.append("\n\n" + "".join(self.svg) + "\n\n")
                self.svg = []
            return
        if tag == "a":
            self._put(f"]({getattr(self, 'href', '')})")
        elif tag in ("td", "th") and self.cell is not None and self.row is not None:
            self.row.append(" ".join("".join(self.cell).split()).replace("|", "/"))
            self.cell = None
        elif tag == "tr" and self.row:
            self.out.append("| " + " | ".join(self.row) + " |\n")
            if self.heads == 0:
                self.out.append("|" + "---|" * len(self.row) + "\n")
            self.heads += 1
            self.row = None
        elif tag == "table":
            self.out.append("\n")
            self.heads = 0
        elif tag in _BLOCKS or tag == "li":
            said = " ".join("".join(self.text).split())
            self.text = []
            if said:
                self.out.append("\n" + _HEADS.get(tag, "- " if tag == "li" else "") + said + "\n")

    def handle_data(self, data):
        if self.svg:
            self.svg.append(data)
        else:
            self._put(data)

    def _put(self, data):
        (self.cell if self.cell is not None else self.text).append(data)


def markdown_of(html: str) -> str:
    """Return a page's content as Markdown."""
    body = re.search(r"<main.*?</main>", html, re.DOTALL)
    reader = _Reader()
    reader.feed(body[0] if body else html)
    return "".join(reader.out)
