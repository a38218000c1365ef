"""Section Hardware of a sheet: the device, what it is rated for, and the life of every contact in its chain."""

from math import isfinite

from specgen.design.types import DecidedLoop
from specgen.sizing.candidate import Unsized
from specgen.sizing.device import Contact, DeviceChoice
from specgen.view.cells import NO_NUMBER, number, says, word
from specgen.view.shapes import Cell, Column, Item, List, Row, Section, Sentence, Shape, Table
from specgen.view.summary import Summary, designated, summary_of
from specgen.view.words import OUTPUTS, ROLES, capital
from specgen.view.writer import Writer


def hardware_section(writer: Writer, decided: DecidedLoop, number_: str) -> Section:
    """Build the section."""
    device = decided.decision.chosen.case.device
    if isinstance(device, Unsized):
        blocks: tuple[Shape, ...] = (Sentence(says(f"No device is sized: {device.because}.")),)
    else:
        blocks = (_device(decided, device), *_contacts(writer, decided, device), *_open(device))
    return Section(number_, "hardware", "Hardware", blocks)


def _device(decided: DecidedLoop, device: DeviceChoice) -> Table:
    candidate = decided.decision.chosen.case.candidate
    rows = [
        Row((word("designation"), word(named))) if (named := designated(decided.tag, candidate.device)) else None,
        Row((word("device"), word(device.name))),
        Row((word("utilisation category"), word(device.category))) if device.category else None,
        _amperes("rated current", device.rating),
        _amperes("current at the supply's worse end", device.current),
        Row((word("poles"), Cell(str(device.poles)))) if device.poles else None,
        Row((word("controller output it takes"), word(OUTPUTS[device.controller_output]))),
    ]
    return Table("", (Column("What"), Column("Chosen")), tuple(row for row in rows if row is not None))


def _amperes(name: str, value: float | None) -> Row | None:
    return None if value is None else Row((word(name), Cell(f"{value:.3g}\u202fA")))


def _contacts(writer: Writer, decided: DecidedLoop, device: DeviceChoice) -> tuple[Shape, ...]:
    if not device.chain:
        return ()
    short = summary_of(decided)
    columns = (
        Column("Contact"),
        Column("Part"),
        Column("Current", "A", number=True),
        Column("Operations it lasts", number=True),
        Column("A year", number=True),
        Column("Lasts", "years", number=True),
        Column("Highest rate", "an hour", number=True),
    )
    rows = tuple(_contact(writer, short, contact) for contact in device.chain)
    return (Table("Contacts that operate with every switching", columns, rows, wide=True),)


def _contact(writer: Writer, short: Summary, contact: Contact) -> Row:
    life, rate, yearly = contact.life, contact.operations_per_hour, short.operations_per_year
    years = None if life is None or not yearly else life / yearly
    return Row(
        (
            word(capital(ROLES[contact.role]), aside=contact.what if contact.what != contact.name else ""),
            word(contact.name),
            number(writer.bare(contact.current), contact.current),
            Cell("does not wear", number=True, export="") if life is None else number(writer.bare(life), life),
            NO_NUMBER if yearly is None else number(writer.bare(yearly), yearly),
            NO_NUMBER if years is None or not isfinite(years) else number(writer.years_number(years), years),
            NO_NUMBER if rate is None else number(writer.bare(rate), rate),
        )
    )


def _open(device: DeviceChoice) -> tuple[Shape, ...]:
    if not device.open_points:
        return ()
    items = tuple(Item(says(capital(point.because)), aside=", ".join(point.needs)) for point in device.open_points)
    return (List(items, caption="Open for the device"),)
