"""Writing the site: MkDocs builds it beside the old one, and it is swapped in whole."""

import os
import shutil
import tempfile
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from importlib.metadata import entry_points
from pathlib import Path
from typing import Any

from mkdocs.commands.build import build
from mkdocs.config import load_config
from mkdocs.config.defaults import MkDocsConfig
from mkdocs.exceptions import MkDocsException

from specgen.design.types import Design
from specgen.render.environment import TEMPLATES
from specgen.render.plugin import SpecgenPlugin

CONFIG = "mkdocs.yml"
NAME = "specgen"


class SiteError(Exception):
    """The site could not be written; the one before it, if any, stands as it was."""


def write_site(project: Path, design: Design, site: Path | None = None, finish: Callable[[Path], None] | None = None) -> Path:
    """Build a dossier's site as ``mkdocs build`` does and swap it in.

    Parameters
    ----------
    project : pathlib.Path
        The folder that holds ``mkdocs.yml`` and ``loops/``.
    design : Design
        The decided panel.
    site : pathlib.Path, optional
        Where the site is wanted; ``site_dir`` of ``mkdocs.yml`` where absent.
    finish : callable, optional
        Called with the new site's folder before it takes the place of the old one.

    Returns
    -------
    pathlib.Path
        The site's folder.

    Raises
    ------
    SiteError
        The configuration cannot be read, or the site cannot be written. The site before it is left as it was, also when the
        build is interrupted from the keyboard.
    """
    with _reported():
        config = configuration(project)
        target = (site or Path(config.site_dir)).resolve()
        if project.resolve().is_relative_to(target):
            raise SiteError(f"{target} holds the project itself; the site needs a folder of its own")
        if target.exists() and not target.is_dir():
            raise SiteError(f"{target} is a file; the site needs a folder of that name, so move the file away")
        target.parent.mkdir(parents=True, exist_ok=True)
        fresh = Path(tempfile.mkdtemp(prefix=f"{target.name}.new-", dir=target.parent))
        try:
            _open_to_all(fresh)
            config.site_dir = str(fresh)
            plugin_of(config).design = design
            config.plugins.on_startup(command="build", dirty=False)
            try:
                build(config)
            finally:
                config.plugins.on_shutdown()
            if finish is not None:
                finish(fresh)
            swap(fresh, target)
        finally:
            shutil.rmtree(fresh, ignore_errors=True)
    return target


def configuration(project: Path) -> MkDocsConfig:
    """Read ``mkdocs.yml``; theme and plugin are ours also where specgen runs from a clone without being installed."""
    file = project / CONFIG
    if not file.is_file():
        raise SiteError(f"{file} is missing; a whole one is: site_name, docs_dir: loops, theme: {{name: specgen}}, plugins: [specgen]")
    installed = any(point.name == NAME for point in entry_points(group="mkdocs.plugins"))
    ours: dict[str, Any] = {} if installed else {"theme": {"name": None, "custom_dir": TEMPLATES}, "plugins": []}
    config = load_config(str(file), **ours)
    plugin_of(config)
    return config


def plugin_of(config: MkDocsConfig) -> SpecgenPlugin:
    """Return the plugin of a configuration, putting it there where mkdocs.yml does not name it."""
    plugin = config.plugins.get(NAME)
    if not isinstance(plugin, SpecgenPlugin):
        plugin = config.plugins[NAME] = SpecgenPlugin()
    return plugin


def swap(fresh: Path, target: Path) -> None:
    """Put a whole folder where another stood; what stood there comes back if the second step fails.

    Hidden files of the old folder (a ``.git`` of a published branch) are carried over, as MkDocs leaves them.
    """
    if not target.exists():
        fresh.rename(target)
        return
    old = Path(tempfile.mkdtemp(prefix=f"{target.name}.old-", dir=target.parent)) / target.name
    try:
        target.rename(old)
        try:
            fresh.rename(target)
        except BaseException:
            old.rename(target)
            raise
        for hidden in [entry for entry in old.iterdir() if entry.name.startswith(".")]:
            hidden.rename(target / hidden.name)
    finally:
        shutil.rmtree(old.parent, ignore_errors=True)


@contextmanager
def _reported() -> Iterator[None]:
    """Turn what the machine and MkDocs may refuse into the one error of this module."""
    try:
        yield
    except OSError as error:
        where = f" ({error.filename})" if error.filename else ""
        raise SiteError(f"the site cannot be written: {error.strerror or error}{where}; the one before it is unchanged") from error
    except MkDocsException as error:
        raise SiteError(f"MkDocs stopped: {error}") from error


def _open_to_all(folder: Path) -> None:
    """Give a folder the rights that any new one would have: a temporary folder is its owner's alone."""
    mask = os.umask(0)
    os.umask(mask)
    folder.chmod(0o777 & ~mask)
