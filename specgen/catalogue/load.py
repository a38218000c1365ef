"""The catalogue: packaged tables, with the shop's approved devices in place of the generic classes."""

from collections.abc import Iterator
from dataclasses import dataclass, replace
from functools import cache, lru_cache
from itertools import pairwise
from typing import TypeVar

from specgen.catalogue.rows import (
    Converter,
    CoupleClass,
    CoupleFunction,
    FlickerPoint,
    MotorProduct,
    PlatinumClass,
    PlatinumFunction,
    PlatinumRange,
    Practice,
    TypicalOutput,
)
from specgen.catalogue.table import CatalogueError, Known, Row, catalogue_digest, known_rows, row_named, table, table_names
from specgen.catalogue.wiring import Wiring, read_wiring
from specgen.core.diagnostic import Diagnostic
from specgen.model.devices import Contactor, Devices, PowerController, Relay, SolidState
from specgen.model.fields import Model
from specgen.model.reader import Plain, Problem, place, read_model

__all__ = ["Catalogue", "CatalogueError", "Known", "catalogue_digest", "load_catalogue", "read_devices"]

M = TypeVar("M", bound=Model)
CLASSES = ("contactors", "relays", "ssrs", "power_controllers")


@dataclass(frozen=True, slots=True)
class Catalogue:
    """Everything that is looked up.

    ``shop`` names the classes of device that the shop's own list fills; the others are packaged generic classes:
    typical values, to be replaced by a data sheet before construction.
    """

    contactors: tuple[Contactor, ...]
    relays: tuple[Relay, ...]
    ssrs: tuple[SolidState, ...]
    power_controllers: tuple[PowerController, ...]
    outputs: tuple[Known[TypicalOutput], ...]
    platinum_classes: tuple[Known[PlatinumClass], ...]
    platinum_ranges: tuple[Known[PlatinumRange], ...]
    platinum: Known[PlatinumFunction]
    couple_classes: tuple[Known[CoupleClass], ...]
    couple_functions: tuple[Known[CoupleFunction], ...]
    motors: tuple[Known[MotorProduct], ...]
    converters: tuple[Known[Converter], ...]
    flicker: tuple[Known[FlickerPoint], ...]
    practices: tuple[Known[Practice], ...]
    wiring: Wiring
    rows: tuple[Row, ...]
    shop: frozenset[str] = frozenset()

    def practice(self, name: str) -> Known[Practice]:
        """Return a single figure of the trade.

        Raises
        ------
        CatalogueError
            There is no such figure: a mistake in specgen itself.

        Examples
        --------
        >>> load_catalogue().practice("relay_coil_share_ac").value.quantity
        0.2
        """
        return row_named(self.practices, f"practice/{name}")

    def converter(self, kind: str) -> Known[Converter]:
        """Return the typical error of a controller's input.

        Raises
        ------
        CatalogueError
            There is no such input: a mistake in specgen itself.
        """
        for known in self.converters:
            if known.value.input == kind:
                return known
        raise CatalogueError(f"there is no converter for {kind}")

    def device(self, name: str) -> Contactor | Relay | SolidState | PowerController | None:
        """Return a device by its name, as a `DeviceChoice` has it; None for what is no listed device (a plain signal)."""
        devices: tuple[Contactor | Relay | SolidState | PowerController, ...]
        devices = (*self.contactors, *self.relays, *self.ssrs, *self.power_controllers)
        return next((device for device in devices if device.name == name), None)

    def is_typical(self, kind: str) -> bool:
        """Tell whether a class of device holds packaged typical values."""
        return kind not in self.shop


def read_devices(document: Plain) -> tuple[Devices | None, list[Diagnostic]]:
    """Read devices.yml.

    Parameters
    ----------
    document : Plain
        The file as a source document.

    Returns
    -------
    Devices or None, list of Diagnostic
        The shop's devices, None where anything is wrong with them, and every problem with its place.
    """
    devices, problems = read_model(Devices, document.data)
    if devices is not None:
        problems = [*_taken_names(devices), *_rising_motor_life(devices)]
    found = sorted(place(document, problem) for problem in problems)
    return (None if found or not getattr(document, "sound", True) else devices), found


def _taken_names(devices: Devices) -> Iterator[Problem]:
    """Find names written twice: schedules and checks refer to a device by its name."""
    first: dict[str, str] = {}
    for kind in CLASSES:
        for number, device in enumerate(getattr(devices, kind)):
            name = device.name.lower()
            if name in first:
                told = f"the name '{device.name}' is already taken"
                yield Problem((kind, number, "name"), "F181", told, f"its first use is in {first[name]}")
            first.setdefault(name, kind)


def _rising_motor_life(devices: Devices) -> Iterator[Problem]:
    for number, contactor in enumerate(devices.contactors):
        ordered = sorted(contactor.motor_life, key=lambda point: point.current)
        if any(b.current == a.current or b.operations > a.operations for a, b in pairwise(ordered)):
            told = "life with motors must fall as the current rises, one point a current"
            yield Problem(("contactors", number, "motor_life"), "F180", told)


@lru_cache(maxsize=16)
def load_catalogue(devices: Devices | None = None) -> Catalogue:
    """Return the catalogue, the shop's devices in place of the generic ones of the same class.

    Parameters
    ----------
    devices : Devices or None
        What devices.yml lists.

    Returns
    -------
    Catalogue
        Where the shop lists any device of a class, only the shop's are in it.

    Raises
    ------
    CatalogueError
        A packaged table is broken.

    Examples
    --------
    >>> load_catalogue().ssrs[0].name, load_catalogue().is_typical("ssrs")
    ('solid-state switch 10 A, 1-pole', True)
    """
    packaged = _packaged()
    if devices is None:
        return packaged
    shop = frozenset(kind for kind in CLASSES if getattr(devices, kind))
    return replace(
        packaged,
        contactors=devices.contactors or packaged.contactors,
        relays=devices.relays or packaged.relays,
        ssrs=devices.ssrs or packaged.ssrs,
        power_controllers=devices.power_controllers or packaged.power_controllers,
        shop=shop,
    )


@cache
def _packaged() -> Catalogue:
    return Catalogue(
        contactors=_devices("contactors", Contactor),
        relays=_devices("relays", Relay),
        ssrs=_devices("ssrs", SolidState),
        power_controllers=_devices("power_controllers", PowerController),
        outputs=known_rows("controller_outputs", TypicalOutput),
        platinum_classes=known_rows("platinum_classes", PlatinumClass),
        platinum_ranges=known_rows("platinum_ranges", PlatinumRange),
        platinum=known_rows("platinum_functions", PlatinumFunction)[0],
        couple_classes=known_rows("couple_classes", CoupleClass),
        couple_functions=known_rows("couple_functions", CoupleFunction),
        motors=known_rows("motors", MotorProduct),
        converters=known_rows("converters", Converter),
        flicker=known_rows("flicker", FlickerPoint),
        practices=known_rows("practice", Practice),
        wiring=read_wiring(),
        rows=tuple(row for name in table_names() for row in table(name)),
    )


def _devices(name: str, model: type[M]) -> tuple[M, ...]:
    # a device keeps its source for the schedules; the row's standing is part of it
    return tuple(known.value.model_copy(update={"source": f"{known.row.source}: {known.row.id}"}) for known in known_rows(name, model))
