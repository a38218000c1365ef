"""From a folder to a design: read everything, decide every loop that could be read."""

from collections.abc import Sequence
from pathlib import Path

from specgen.catalogue.load import Catalogue, catalogue_digest, load_catalogue, read_devices
from specgen.core.diagnostic import Diagnostic
from specgen.design.cache import Cache
from specgen.design.many import Progress, Task, decide_all
from specgen.design.pairs import with_pair_rules
from specgen.design.panel import panel_of
from specgen.design.recordings import with_recordings
from specgen.design.types import VERDICTS, DecidedLoop, Design, SourceFile, Verdict
from specgen.design.wiring import wirings_of
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import place, read_model
from specgen.rules.engine import rules_digest
from specgen.source.folder import Sources, read_folder

LOOPS = "loops"
DEVICES = f"{LOOPS}/devices.yml"


def load_design(
    project: Path, progress: Progress | None = None, *, firmness: bool = False, workers: int = 1, remember: bool = False
) -> Design:
    """Read a project's ``loops`` folder and decide every loop in it.

    Parameters
    ----------
    project : pathlib.Path
        The folder that holds ``mkdocs.yml`` and ``loops/``.
    progress : callable, optional
        Called with the loops decided and their number.
    firmness : bool
        Whether to tell how firm each decision is, which takes many times as long as the decision itself.
    workers : int
        Processes to decide over where there are many loops; 0 for as many as the machine has processors. More than one
        needs a main module that may be imported again, as every command has; a bare script has none.
    remember : bool
        Whether decisions are taken from ``.specgen/`` beside the dossier and kept there.

    Returns
    -------
    Design
        Every loop that could be decided and every problem met; nothing is raised for what the files hold.
    """
    sources = read_folder(project / LOOPS, LOOPS)
    return design_of(sources, progress, project / LOOPS, firmness=firmness, workers=workers, beside=project if remember else None)


def design_of(
    sources: Sources, progress: Progress | None = None, folder: Path | None = None, *, firmness: bool = False, workers: int = 1,
    beside: Path | None = None,
) -> Design:  # fmt: skip
    """Decide what was read; ``folder`` is where the recordings lie that loops name, ``beside`` where decisions are remembered."""
    problems = list(sources.problems)
    panel, found = panel_of_sources(sources)
    problems += found
    catalogue, found = catalogue_of(sources)
    problems += found
    reading = read_loops(sources.loops)
    problems += reading.problems
    tested = with_recordings(reading.loops, folder, LOOPS)
    problems += tested.problems
    decided: list[DecidedLoop] = []
    if panel is not None:
        devices = dict(sources.files).get(DEVICES, b"")
        cache = None if beside is None else Cache(beside, panel, devices, firmness=firmness)
        for loop, faults in decide_all(tested.loops, Task(panel, catalogue, firmness), cache, progress, workers):
            problems += faults
            if loop is not None:
                decided.append(loop)
    decided = list(with_pair_rules(decided))
    together = panel_of(decided, panel, catalogue) if panel is not None else None
    own = [together.verdict] if together is not None and decided else []
    return Design(
        panel=panel,
        loops=tuple(decided),
        problems=tuple(sorted(set(problems))),
        sources=tuple(SourceFile(name, content) for name, content in (*sources.files, *tested.files)),
        rules_digest=rules_digest(),
        catalogue_digest=catalogue_digest(),
        verdict=worst_verdict([*(loop.verdict for loop in decided), *own]),
        panel_design=together,
        wirings=wirings_of(decided, panel, together, catalogue) if panel is not None and together is not None else {},
    )


def worst_verdict(verdicts: Sequence[Verdict]) -> Verdict:
    """Return the verdict of a panel: the worst of its loops' and of what its own rules find.

    Examples
    --------
    >>> worst_verdict(["meets", "open", "deviates"]), worst_verdict([])
    ('open', 'meets')
    """
    return next((verdict for verdict in VERDICTS if verdict in verdicts), "meets")


def panel_of_sources(sources: Sources) -> tuple[Panel | None, list[Diagnostic]]:
    """Return the panel, and every problem of its file."""
    document = sources.panel
    if document is None:
        return None, []
    panel, problems = read_model(Panel, document.data)
    return (panel if document.sound else None), [place(document, problem) for problem in problems]


def catalogue_of(sources: Sources) -> tuple[Catalogue, list[Diagnostic]]:
    """Return what is looked up, the shop's own devices in the place of generic ones, and every problem of their file."""
    document = sources.devices
    if document is None:
        return load_catalogue(None), []
    devices, problems = read_devices(document)
    return load_catalogue(devices), list(problems)
