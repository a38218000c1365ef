"""The pages of a dossier as one: identifiers made unique, links between pages turned into links within it."""

import re
from collections.abc import Collection, Iterator, Sequence
from dataclasses import dataclass, replace
from html import escape, unescape
from posixpath import dirname, join, normpath

from markupsafe import Markup

from specgen.render.environment import article_text, environment
from specgen.view.dossier import Dossier
from specgen.view.frame import PRINT
from specgen.view.pages import page_views
from specgen.view.print_page import SITE_CHECKS, batch_page, panels_own_checks, printed_anchor
from specgen.view.shapes import PageView, Standing

_ATTRIBUTE = re.compile(r' (id|for|aria-labelledby|href)="([^"]*)"')
_DATA = re.compile(r' data-(?:plot|named-by)="[^"]*"')
MOST_BYTES = 4_000_000  # some 900 sheets of paper
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


def print_text(view: PageView, parts: Sequence[Part]) -> str:
    """Draw the page."""
    anchors = {part.anchor for part in parts}
    paths = {f"{anchor}.html" for anchor in anchors}
    within = replace(view, standing=None if view.standing is None else _within(view.standing, paths))
    # the article comes from our own template, which has escaped everything
    return environment().get_template("print.html").render(view=within, article=Markup(article_text(view)), parts=parts)  # noqa: S704


def relinked(article: str, path: str, paths: Collection[str]) -> str:
    """Prefix identifiers with the page they come from, and lead links to pages that stand on the same page there.

    A link to anything else is dropped: in a PDF it would lead to the folder that it was printed from. A text never looks like an
    attribute, since its quotes are escaped.

    Examples
    --------
    >>> relinked('<h2 id="basis"></h2><a href="#f1">1</a><a href="../a.html#x">a</a><a href="../b.csv">b</a>', "loops/T-1.html", {"a.html"})
    '<h2 id="loops/T-1:basis"></h2><a href="#loops/T-1:f1">1</a><a href="#a:x">a</a><a>b</a>'
    """
    own = printed_anchor(path)

    def replaced(match: re.Match[str]) -> str:
        name, value = match.groups()
        if name != "href":
            return f' {name}="{own}{INNER}{value}"'
        if value.startswith("#"):
            return match[0] if value.startswith(_SYMBOL) else f' href="#{own}{INNER}{value[1:]}"'
        led = _led(unescape(value), path, paths)
        return f' href="{escape(led)}"' if led else ""

    # sections of many pages share their names, and a landmark has to have one of its own
    return _ATTRIBUTE.sub(replaced, _DATA.sub("", article.replace(_LANDMARK, "<section data-named-by=")))


def _within(standing: Standing, paths: Collection[str]) -> Standing:
    items = []
    for item in standing.items:
        spans = tuple(replace(span, href=_led(span.href, PRINT, paths)) for span in item.spans)
        items.append(replace(item, spans=spans))
    return replace(standing, items=tuple(items))


def _led(link: str, path: str, paths: Collection[str]) -> str:
    """Return where a link leads on the page itself, empty where that is nowhere."""
    target, _, anchor = link.partition("#")
    target = normpath(join(dirname(path), target))
    if target not in paths:
        return ""
    return f"#{printed_anchor(target)}{INNER}{anchor}" if anchor else f"#{printed_anchor(target)}"


def batches(dossier: Dossier, most: int = MOST_BYTES) -> Iterator[bytes]:
    """Draw every page of a dossier in batches, each a page of its own that begins with its contents.

    Parameters
    ----------
    dossier : Dossier
        One with more sheets than stand on one page.
    most : int
        Bytes above which a batch is not added to; a page that is longer than that is a batch by itself.

    Yields
    ------
    bytes
        The page.
    """
    held: list[tuple[PageView, str]] = []
    size = 0
    for view in page_views(dossier):
        if view.path == PRINT:
            continue
        shown = panels_own_checks(dossier) if view.path == SITE_CHECKS else view
        article = article_text(shown)
        if held and size + len(article) > most:
            yield _batch(dossier, held)
            held, size = [], 0
        held.append((shown, article))
        size += len(article)
    if held:
        yield _batch(dossier, held)


def _batch(dossier: Dossier, held: Sequence[tuple[PageView, str]]) -> bytes:
    paths = {view.path for view, _ in held}
    parts = tuple(part_of(view, article, paths) for view, article in held)
    return print_text(batch_page(dossier, [view for view, _ in held]), parts).encode()
