"""The MkDocs plugin: a host for the dossier's pages and nothing else."""

import logging
from pathlib import Path, PurePosixPath

from mkdocs.config.defaults import MkDocsConfig
from mkdocs.plugins import BasePlugin
from mkdocs.structure.files import File, Files, InclusionLevel
from mkdocs.structure.pages import Page
from mkdocs.structure.toc import TableOfContents
from mkdocs.utils import get_markdown_title, meta

from specgen.design.project import load_design
from specgen.design.types import Design
from specgen.render.environment import TEMPLATES, page_text
from specgen.render.files import files_of
from specgen.view.dossier import Dossier, OwnPage, dossier_of
from specgen.view.pages import own_page_view, page_paths
from specgen.view.words import counted, listed

log = logging.getLogger("mkdocs.plugins.specgen")

PRIVATE_FOLDERS = ("issued", "reviews", "data")
PRIVATE_ENDINGS = (".yml", ".yaml")
ASIDE = "pages"  # where an own page goes whose name is one of the dossier's


class SheetPage(Page):
    """A page that arrives whole: MkDocs neither reads nor converts anything for it."""

    html: str = ""

    def read_source(self, config: MkDocsConfig) -> None:  # noqa: ARG002  MkDocs' signature
        """Read nothing."""
        self.markdown, self.meta = "", {}

    def render(self, config: MkDocsConfig, files: Files) -> None:  # noqa: ARG002  MkDocs' signature
        """Take the page as it is."""
        self.content = self.html
        self.toc = TableOfContents([])
        self.present_anchor_ids, self.links_to_anchors = set(), {}


class SpecgenPlugin(BasePlugin):  # type: ignore[type-arg]  # it has no options
    """Puts the dossier's pages into MkDocs' build; ``design`` is set by who has decided it already."""

    def __init__(self) -> None:
        self.design: Design | None = None
        self._dossier: Dossier | None = None

    def on_startup(self, *, command: str, dirty: bool) -> None:
        """Keep this one instance over the rebuilds of a preview: MkDocs makes a new one where this is not defined."""

    def on_config(self, config: MkDocsConfig) -> MkDocsConfig:
        """Force what a dossier needs to work straight from a disk."""
        config.use_directory_urls = False
        if TEMPLATES not in config.theme.dirs:
            config.theme.dirs.insert(0, TEMPLATES)
        return config

    def on_pre_build(self, *, config: MkDocsConfig) -> None:
        """Decide everything before MkDocs touches the site's folder, and drop what cannot work from a disk or carries a date."""
        config.theme.static_templates.clear()
        search = config.plugins.get("search")
        for methods in config.plugins.events.values():
            methods[:] = [method for method in methods if search is None or getattr(method, "__self__", None) is not search]
        design = self.design or load_design(Path(config.config_file_path).parent, firmness=True, workers=0, remember=True)
        self._dossier = dossier_of(design)
        for line in report(design):
            log.info(line)

    def on_files(self, files: Files, *, config: MkDocsConfig) -> Files:
        """Put the dossier's files in, keep what is private out, and let the user's own pages join."""
        for file in list(files):
            of_theme = file.generated_by is None and file.src_dir != config.docs_dir
            if of_theme or is_private(file.src_uri):
                files.remove(file)
        design = self._decided.design
        taken = {path.lower() for path in page_paths(design)}
        own = [file for file in files.documentation_pages() if file.inclusion.is_included()]
        for file in own:
            if file.dest_uri.lower() in taken:
                file.dest_uri = f"{ASIDE}/{PurePosixPath(file.src_uri).with_suffix('.html').as_posix()}"
        self._dossier = dossier_of(design, [OwnPage(title_of(file), file.dest_uri) for file in own])
        for path, content in files_of(self._dossier).items():
            _put(files, config, path, content)
        return files

    def on_page_content(self, html: str, *, page: Page, config: MkDocsConfig, files: Files) -> str:  # noqa: ARG002  MkDocs' signature
        """Set the user's own pages as the dossier's."""
        if isinstance(page, SheetPage):
            return html
        return page_text(own_page_view(self._decided, page.file.dest_uri, str(page.title), html))

    @property
    def _decided(self) -> Dossier:
        assert self._dossier is not None  # noqa: S101  on_pre_build has run
        return self._dossier


def report(design: Design) -> list[str]:
    """Say what a person who starts a build must know; none of it is a warning, since the pages say it too."""
    lines = [problem.line() for problem in design.problems]
    for verdict in ("held", "open"):
        tags = [loop.tag for loop in design.loops if loop.verdict == verdict]
        if tags:
            lines.append(f"{counted(len(tags), 'loop')} {verdict}: {listed(tags)}")
    return lines


def is_private(src_uri: str) -> bool:
    """Tell whether a file of the loops folder is never published as it is.

    Examples
    --------
    >>> [is_private(name) for name in ("issued/A/record.json", "drying.yml", "handover.md")]
    [True, True, False]
    """
    path = PurePosixPath(src_uri)
    return path.suffix.lower() in PRIVATE_ENDINGS or (len(path.parts) > 1 and path.parts[0].lower() in PRIVATE_FOLDERS)


def title_of(file: File) -> str:
    """Return the title of a Markdown page before MkDocs has read it."""
    text, data = meta.get_data(file.content_string)
    return str(data.get("title") or get_markdown_title(text) or file.name.replace("-", " ").replace("_", " ").capitalize())


def _put(files: Files, config: MkDocsConfig, path: str, content: bytes) -> None:
    pure = PurePosixPath(path)
    is_page = pure.suffix == ".html"
    src_uri = pure.with_suffix(".md").as_posix() if is_page else path
    before = files.get_file_from_path(src_uri)
    if before is not None and is_page:
        # the user's own page keeps its name among the sources, so that links from it still lead where they say
        src_uri = f"dossier/{src_uri}"
    elif before is not None:
        log.warning("%s of the loops folder is left out: the dossier has a file of that name", src_uri)
        files.remove(before)
    file = File.generated(config, src_uri, content="" if is_page else content, inclusion=InclusionLevel.NOT_IN_NAV)
    file.dest_uri = path
    if is_page:
        sheet = SheetPage(pure.stem, file, config)
        sheet.html = content.decode()
    files.append(file)
