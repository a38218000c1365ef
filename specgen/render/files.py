"""Every file of a dossier, as bytes, without MkDocs: all pages exist before the first byte is written."""

import datetime
from collections.abc import Mapping, Sequence
from pathlib import Path, PurePosixPath

from specgen.design.record import dump, record_of
from specgen.design.types import Design
from specgen.render.csv_files import csv_bytes
from specgen.render.environment import TEMPLATES, article_text, page_text
from specgen.render.print_file import Part, part_of, print_text
from specgen.render.search_index import Sections, search_files, sections_of
from specgen.render.workbook import workbook
from specgen.view.conductors_page import conductors_table
from specgen.view.dossier import Dossier, OwnPage, dossier_of
from specgen.view.firmness_page import firmness_table
from specgen.view.frame import PRINT, Place
from specgen.view.heat_page import control_supply_table, losses_table
from specgen.view.instruments_page import instruments_table
from specgen.view.load_page import contributions_table
from specgen.view.pages import page_views
from specgen.view.parts_page import parts_table
from specgen.view.print_page import SITE_CHECKS, panels_own_checks, printed_paths, sheets_are_printed
from specgen.view.protection_page import protection_table
from specgen.view.registers import assumptions_table, loops_table, open_points_table
from specgen.view.schedules import outputs_table
from specgen.view.shapes import PageView, Table
from specgen.view.terminals_page import terminals_table

ASSETS = "assets"
SUFFIXES = (".css", ".js", ".svg")
UNDATED = datetime.date(1980, 1, 1)  # of a workbook whose panel could not be read


def dossier_files(design: Design, own_pages: Sequence[OwnPage] = ()) -> Mapping[str, bytes]:
    """Write every file of a dossier.

    Parameters
    ----------
    design : Design
        The decided panel.
    own_pages : sequence of OwnPage
        The user's own pages, which are linked and not written here.

    Returns
    -------
    mapping of str to bytes
        Path below the site's folder, with forward slashes, to content.
    """
    return files_of(dossier_of(design, own_pages))


def files_of(dossier: Dossier) -> dict[str, bytes]:
    """Write every file of a gathered dossier."""
    files: dict[str, bytes] = {}
    sheets: list[Sections] = []
    printed = dict.fromkeys(printed_paths(dossier))
    parts: list[Part] = []
    whole: PageView | None = None
    for view in page_views(dossier):
        if view.path == PRINT:
            whole = view
            continue
        article = article_text(view)
        files[view.path] = page_text(view, article).encode()
        if view.path in printed:
            shown = panels_own_checks(dossier) if view.path == SITE_CHECKS and not sheets_are_printed(dossier) else view
            parts.append(part_of(shown, article if shown is view else article_text(shown), printed))
        if view.tag:
            sheets.append(sections_of(view))
    if whole is not None:
        files[PRINT] = print_text(whole, tuple(parts)).encode()
    files |= asset_files()
    files |= search_files(dossier, sheets)
    files |= data_files(dossier)
    return files


def asset_files() -> dict[str, bytes]:
    """Return style sheets, scripts and the icon as they stand."""
    folder = Path(TEMPLATES) / ASSETS
    return {f"{ASSETS}/{file.name}": file.read_bytes() for file in sorted(folder.iterdir()) if file.suffix in SUFFIXES}


def data_tables(dossier: Dossier) -> dict[str, Table]:
    """Return every table that is a file of its own and a sheet of the workbook, by its name."""
    place = Place("data/loops.csv")
    return {
        "loops": loops_table(dossier),
        "outputs": outputs_table(dossier, place),
        "parts": parts_table(dossier),
        "protection": protection_table(dossier, place),
        "conductors": conductors_table(dossier, place),
        "terminals": terminals_table(dossier, place),
        "instruments": instruments_table(dossier, place),
        "load": contributions_table(dossier, place),
        "heat": losses_table(dossier, place),
        "control-supply": control_supply_table(dossier),
        "open-points": open_points_table(dossier, place),
        "assumptions": assumptions_table(dossier),
        "firmness": firmness_table(dossier),
    }


def data_files(dossier: Dossier) -> dict[str, bytes]:
    """Write the record, one part of it a loop, the tables as CSV files and as a workbook, and the sources."""
    design = dossier.design
    record = record_of(design)
    tables = data_tables(dossier)
    date = design.panel.panel.date if design.panel else UNDATED
    files = {
        "data/record.json": dump(record),
        "data/schedules.xlsx": workbook({name.replace("-", " ").capitalize(): table for name, table in tables.items()}, date),
    }
    files |= {f"data/{name}.csv": csv_bytes(table) for name, table in tables.items()}
    files |= {f"data/{loop['tag']}.json": dump(loop) for loop in record["loops"]}
    files |= {f"data/source/{name}": source.content for source in design.sources if (name := inside(source.name))}
    return files


def inside(name: str) -> str:
    """Return a source's name where it stays inside a folder, else nothing.

    Examples
    --------
    >>> inside("loops/drying.yml"), inside("../secret.yml"), inside("/etc/hosts")
    ('loops/drying.yml', '', '')
    """
    path = PurePosixPath(name)
    return "" if path.is_absolute() or ".." in path.parts or "\\" in name or ":" in name else path.as_posix()
