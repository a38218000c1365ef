"""The dossier on this machine's own address, renewed when a file of the project is saved.

MkDocs' own server watches and reloads; what it serves is built beside and swapped in whole, as ``specgen build`` does. A problem
in a loop file is on the pages themselves. What keeps the site from being built at all stands at the head of the pages that
were built last, until it is put right.
"""

import tempfile
import traceback
from collections.abc import Callable
from dataclasses import dataclass, field
from html import escape
from pathlib import Path
from time import perf_counter

from mkdocs.livereload import LiveReloadServer

from specgen.design.project import LOOPS, load_design
from specgen.design.types import Design
from specgen.render.site import CONFIG, SiteError, write_site

HOST = "127.0.0.1"


@dataclass(slots=True)
class Renewal:
    """Builds the site again; ``trouble`` is what kept the last build from being whole.

    Parameters
    ----------
    project, site : pathlib.Path
        The project and the folder that is served.
    tell : callable
        Given the design of every build, and how long it took [s].
    """

    project: Path
    site: Path
    tell: Callable[[Design, float], None]
    trouble: str = field(default="", init=False)

    def __call__(self) -> None:
        """Build; never raise, since the server would then wait for a build that never comes."""
        begun = perf_counter()
        try:
            design = load_design(self.project, workers=0, remember=True)
            write_site(self.project, design, self.site)
        except (SiteError, OSError) as error:
            self.trouble = str(error)
        except Exception as error:  # noqa: BLE001  a fault of specgen must not leave the browser waiting either
            traceback.print_exc()
            self.trouble = f"specgen itself failed, see its terminal: {error}"
        else:
            self.trouble = ""
            self.tell(design, perf_counter() - begun)

    def marked(self, content: bytes) -> bytes:
        """Put the trouble at the head of a page.

        Examples
        --------
        >>> renewal = Renewal(Path(), Path(), print)
        >>> renewal.trouble = "a <b> c"
        >>> renewal.marked(b"<body data-root=''>x")[19:84]
        b'<div class="notice problem" role="alert"><p><b>Not renewed:</b> a'
        """
        if not self.trouble:
            return content
        notice = f'<div class="notice problem" role="alert"><p><b>Not renewed:</b> {escape(self.trouble)}</p></div>'
        at = content.find(b">", content.find(b"<body")) + 1
        return content[:at] + notice.encode() + content[at:]


def serve(project: Path, port: int, tell: Callable[[Design, float], None], ready: Callable[[str], None]) -> None:
    """Serve a project's dossier until the keyboard interrupts.

    Parameters
    ----------
    project : pathlib.Path
        The folder that holds ``mkdocs.yml`` and ``loops/``.
    port : int
        The port on 127.0.0.1.
    tell : callable
        Given the design of every build, and how long it took [s].
    ready : callable
        Given the address once it is served.

    Raises
    ------
    SiteError
        The site cannot be built even once, or the port is taken.
    """
    with tempfile.TemporaryDirectory(prefix="specgen-preview-", ignore_cleanup_errors=True) as folder:
        renewal = Renewal(project, Path(folder) / "site", tell)
        renewal()
        if renewal.trouble:
            raise SiteError(renewal.trouble)
        server = LiveReloadServer(builder=renewal, host=HOST, port=port, root=str(renewal.site))
        inject = server._inject_js_into_html  # noqa: SLF001  the one place where MkDocs' server lets a page be changed
        server._inject_js_into_html = lambda content, epoch: inject(renewal.marked(content), epoch)  # type: ignore[method-assign]  # noqa: SLF001
        server.watch(str(project / LOOPS))
        server.watch(str(project / CONFIG), recursive=False)
        ready(server.url)
        try:
            server.serve()
        except KeyboardInterrupt:
            pass
        except OSError as error:
            raise SiteError(f"port {port} of {HOST} cannot be used: {error.strerror or error}; name another with --port") from error
        finally:
            server.shutdown()
