"""The pages of a dossier as one: identifiers made unique, links between pages turned into links within it."""

import re
from collections.abc import Collection, Iterator
from dataclasses import dataclass
from html import escape, unescape
from posixpath import dirname, join, normpath

from markupsafe import Markup

from specgen.render.environment import article_text, environment
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.print_page import MOST_SHEETS, batch_page, printed_anchor
from specgen.view.shapes import PageView
from specgen.view.sheet import sheet_page

_ATTRIBUTE = re.compile(r' (id|for|aria-labelledby|href)="([^"]*)"')
_DATA = re.compile(r' data-(?:plot|named-by)="[^"]*"')
_LANDMARK = "<section aria-labelledby="
INNER = ":"  # between a page and a place on it: a row of loops.html is another than a sheet in loops/
_SYMBOL = "#m-"  # the shapes of the verdicts, which stand once on a page


@dataclass(frozen=True, slots=True)
class Part:
    """One page on the page: its anchor, its running head, and what it holds as ready HTML."""

    anchor: str
    marginal: str
    sheet: str
    html: Markup


def part_of(view: PageView, article: str, paths: Collection[str]) -> Part:
    """Make a page a part.

    Parameters
    ----------
    view : PageView
        The page.
    article : str
        What is drawn between its head and its foot.
    paths : collection of str
        The files of all pages that stand on the same page.
    """
    # the article comes from our own templates, which have escaped everything
    return Part(printed_anchor(view.path), view.marginal, view.title, Markup(relinked(article, view.path, paths)))  # noqa: S704


def print_text(view: PageView, parts: tuple[Part, ...]) -> str:
    """Draw the page."""
    return environment().get_template("print.html").render(view=view, article=Markup(article_text(view)), parts=parts)  # noqa: S704


def relinked(article: str, path: str, paths: Collection[str]) -> str:
    """Prefix identifiers with the page they come from, and lead links to pages that stand on the same page there.

    A text never looks like an attribute: its quotes are escaped.

    Examples
    --------
    >>> relinked('<h2 id="basis"></h2><a href="#f1">1</a><a href="../a.html#x">a</a><a href="../b.csv">b</a>', "loops/T-1.html", {"a.html"})
    '<h2 id="loops/T-1:basis"></h2><a href="#loops/T-1:f1">1</a><a href="#a:x">a</a><a href="b.csv">b</a>'
    """
    own = printed_anchor(path)

    def replaced(match: re.Match[str]) -> str:
        name, value = match.groups()
        if name != "href":
            value = f"{own}{INNER}{value}"
        elif value.startswith("#"):
            value = value if value.startswith(_SYMBOL) else f"#{own}{INNER}{value[1:]}"
        elif "://" not in value:
            value = escape(_led(unescape(value), path, paths))
        return f' {name}="{value}"'

    # sections of many pages share their names, and a landmark has to have one of its own
    return _ATTRIBUTE.sub(replaced, _DATA.sub("", article.replace(_LANDMARK, "<section data-named-by=")))


def _led(link: str, path: str, paths: Collection[str]) -> str:
    target, _, anchor = link.partition("#")
    target = normpath(join(dirname(path), target))
    if target in paths:
        return f"#{printed_anchor(target)}{INNER}{anchor}" if anchor else f"#{printed_anchor(target)}"
    return f"{target}#{anchor}" if anchor else target


def batches(dossier: Dossier) -> Iterator[bytes]:
    """Draw the sheets of a dossier that has more than one page holds, some at a time."""
    loops = dossier.design.loops
    for first in range(0, len(loops), MOST_SHEETS):
        some = loops[first : first + MOST_SHEETS]
        paths = {f"loops/{loop.tag}.html" for loop in some}
        views = (sheet_page(dossier, Place(f"loops/{loop.tag}.html"), loop, None, None) for loop in some)
        parts = tuple(part_of(view, article_text(view), paths) for view in views)
        yield print_text(batch_page(dossier, some), parts).encode()
