"""The Jinja environment: undefined names are errors, everything is escaped, one macro a shape."""

from functools import lru_cache
from pathlib import Path
from typing import Protocol

from jinja2 import Environment, FileSystemLoader, StrictUndefined
from markupsafe import Markup

from specgen import theme_ref
from specgen.view.shapes import PageView

TEMPLATES = str(Path(theme_ref.__file__).parent)
SHAPES = ("sentence", "table", "figure_line", "drawing", "list", "notice")


class PageTemplate(Protocol):
    """What draws a page."""

    def render(self, *, view: PageView, prose: Markup) -> str:
        """Return the page's text."""


@lru_cache(maxsize=1)
def environment() -> Environment:
    """Return the environment of the dossier's templates.

    ``draw`` maps each shape's name to the macro that draws it, so that a template never asks what a shape is.
    """
    loader = FileSystemLoader(TEMPLATES)
    made = Environment(
        loader=loader, autoescape=True, undefined=StrictUndefined, auto_reload=False, trim_blocks=True, keep_trailing_newline=True
    )
    made.globals["draw"] = {name: made.get_template(f"shapes/{name}.html").module.draw for name in SHAPES}  # type: ignore[attr-defined]  # a macro
    return made


@lru_cache(maxsize=1)
def page_template() -> PageTemplate:
    """Return the template of a whole page."""
    return environment().get_template("dossier.html")


def page(view: PageView) -> bytes:
    """Draw a page as the bytes of its file, UTF-8."""
    return page_text(view).encode()


def page_text(view: PageView) -> str:
    """Draw a page.

    Parameters
    ----------
    view : PageView
        The page; its ``prose`` alone is taken as ready HTML, everything else is escaped.
    """
    # prose is what MkDocs made of the user's own Markdown page
    return page_template().render(view=view, prose=Markup(view.prose))  # noqa: S704
