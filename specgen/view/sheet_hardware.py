"""Section Hardware of a sheet: the device, what it is rated for, and the life of every contact in its chain."""

from math import isfinite

from specgen.design.types import DecidedLoop
from specgen.sizing.candidate import Unsized
from specgen.sizing.device import Contact, DeviceChoice
from specgen.view.cells import NO_NUMBER, number, says, word
from specgen.view.shapes import Cell, Column, Item, List, Row, Section, Sentence, Shape, Table
from specgen.view.sheet_feeder import feeder_blocks
from specgen.view.summary import Summary, designated, summary_of
from specgen.view.words import OUTPUTS, ROLES, capital, with_stop
from specgen.view.writer import Writer

_COOLING = {"natural": "natural air", "forced": "forced air", "none": "none would do"}


def hardware_section(writer: Writer, decided: DecidedLoop, number_: str) -> Section:
    """Build the section."""
    case = decided.decision.chosen.case
    device = case.device
    if isinstance(device, Unsized):
        blocks: tuple[Shape, ...] = (Sentence(says(f"No device is sized: {with_stop(device.because)}")),)
    else:
        blocks = (_device(writer, decided, device), *_contacts(writer, decided, device), *_around(writer, device), *_open(device))
    return Section(number_, "hardware", "Hardware", (*blocks, *feeder_blocks(writer, case.feeder)))


def _device(writer: Writer, decided: DecidedLoop, device: DeviceChoice) -> Table:
    named = designated(decided.tag, decided.decision.chosen.case.candidate.device)
    rows = [
        ("designation", named, ""),
        ("device", device.name, device.because),
        ("utilisation category", device.category, ""),
        ("rated current", _said(writer, device.rating, "current"), ""),
        ("current at the supply's worse end", _said(writer, device.current, "current"), ""),
        ("poles", str(device.poles or ""), ""),
        ("isolated by", device.isolator, "opens every line where the device leaves one live"),
        ("heat left in the panel", _said(writer, device.loss, "power"), "at full output"),
        (
            "heat sink",
            f"{_said(writer, device.heat_sink, 'thermal_resistance')} or less" if device.heat_sink else "",
            _COOLING.get(device.cooling, ""),
        ),
        ("leaks when off", _said(writer, device.leakage, "current"), ""),
        ("controller output it takes", OUTPUTS[device.controller_output], ""),
    ]
    made = tuple(Row((word(name), Cell(value, aside=remark))) for name, value, remark in rows if value)
    return Table("", (Column("What"), Column("Chosen")), made)


def _said(writer: Writer, value: float | None, dimension: str) -> str:
    return "" if value is None else writer.say(value, dimension)


def _around(writer: Writer, device: DeviceChoice) -> tuple[Shape, ...]:
    """List what the controller's output has to drive and what is fitted across coils."""
    items = [
        Item(says(f"{capital(drive.what)}: {writer.say(drive.asked, drive.dimension)} of {writer.say(drive.able, drive.dimension)}."))
        for drive in device.drives
    ]
    if device.undriven is not None:
        items.append(Item(says(f"What the controller's output drives is not known: {with_stop(device.undriven.because)}")))
    items += [Item(says(f"{capital(fitted.part)} across {fitted.across}: {with_stop(fitted.because)}")) for fitted in device.suppressors]
    return (List(tuple(items), quiet=True, caption="Control side"),) if items else ()


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
    items = tuple(Item(says(capital(with_stop(point.because))), aside=", ".join(point.needs)) for point in device.open_points)
    return (List(items, caption="Open for the device"),)
