"""The Jinja environment: undefined names are errors, everything is escaped, one macro a shape."""

from functools import lru_cache
from pathlib import Path
from typing import Protocol

from jinja2 import Environment, FileSystemLoader, StrictUndefined, nodes
from jinja2.compiler import CodeGenerator, Frame
from markupsafe import Markup, escape

from specgen import theme_ref
from specgen.view.shapes import PageView

TEMPLATES = str(Path(theme_ref.__file__).parent)
SHAPES = ("sentence", "table", "figure_line", "drawing", "list", "notice")
_SPECIAL = frozenset("&<>'\"")


def escaped(value: object) -> str:
    """Escape text for HTML; what is markup already stays as it is.

    Most of a dossier's texts hold nothing to escape. Telling so costs a third of what making a new ``Markup`` of each costs,
    and a page is some two thousand texts.

    Examples
    --------
    >>> str(escaped("5 K < 6 K")), str(escaped(Markup("<b>")))
    ('5 K &lt; 6 K', '<b>')
    """
    if type(value) is str and _SPECIAL.isdisjoint(value):
        return value
    return escape(value)


class _Generator(CodeGenerator):
    """Writes templates that escape with ``escaped``."""

    def _output_child_pre(self, node: nodes.Expr, frame: Frame, finalize: CodeGenerator._FinalizeInfo) -> None:
        if not frame.eval_ctx.autoescape or frame.eval_ctx.volatile or finalize.src is not None:
            super()._output_child_pre(node, frame, finalize)
        else:
            self.write("environment.escaped(")


class _Environment(Environment):
    """Looks names of views up directly: they are dataclasses, and a name they lack is an error at once."""

    code_generator_class = _Generator
    escaped = staticmethod(escaped)
    getattr = staticmethod(getattr)  # type: ignore[assignment]  # Jinja's own falls back on items, and takes twice the time


class Template(Protocol):
    """What draws a page, or the part of it between head and foot."""

    def render(self, *, view: PageView, prose: Markup = ..., article: Markup = ...) -> str:
        """Return the text."""


@lru_cache(maxsize=1)
def environment() -> Environment:
    """Return the environment of the dossier's templates.

    ``draw`` maps each shape's name to the macro that draws it, so that a template never asks what a shape is.
    """
    loader = FileSystemLoader(TEMPLATES)
    made = _Environment(
        loader=loader, autoescape=True, undefined=StrictUndefined, auto_reload=False, trim_blocks=True, keep_trailing_newline=True
    )
    made.globals["draw"] = {name: made.get_template(f"shapes/{name}.html").module.draw for name in SHAPES}  # type: ignore[attr-defined]  # a macro
    return made


@lru_cache(maxsize=2)
def _template(name: str) -> Template:
    return environment().get_template(name)


def page(view: PageView) -> bytes:
    """Draw a page as the bytes of its file, UTF-8."""
    return page_text(view).encode()


def page_text(view: PageView, article: str | None = None) -> str:
    """Draw a page.

    Parameters
    ----------
    view : PageView
        The page; its ``prose`` alone is taken as ready HTML, everything else is escaped.
    article : str, optional
        What ``article_text`` has drawn of it already.
    """
    # the article comes from our own template, which has escaped everything
    return _template("dossier.html").render(view=view, article=Markup(article_text(view) if article is None else article))  # noqa: S704


def article_text(view: PageView) -> str:
    """Draw what stands between a page's head and its foot."""
    # prose is what MkDocs made of the user's own Markdown page
    return _template("article.html").render(view=view, prose=Markup(view.prose))  # noqa: S704
