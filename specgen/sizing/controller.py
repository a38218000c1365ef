"""The controller's side: the output that a loop uses, gaps filled with typical values."""

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Literal

from specgen.catalogue.load import Catalogue, CatalogueError
from specgen.catalogue.rows import TypicalOutput
from specgen.core.quantity import Quantity
from specgen.model.devices import LifePoint
from specgen.model.panel import ControllerOutput, Panel
from specgen.sizing.candidate import Assumption, Unsized

OutputKind = Literal["relay", "logic", "analogue"]
_REPLACE = "typical; to be replaced by the controller's data sheet before construction"


@dataclass(frozen=True, slots=True)
class OutputSide:
    """One kind of controller output as it is used, gaps filled with typical values that ``assumptions`` list.

    Of a relay: ``rating`` [A] resistive, its life and times; of a logic output ``voltage`` [V] and ``drive`` [A]; of an
    analogue one ``signal`` and ``burden`` [ohm] or ``drive`` [A].
    """

    kind: OutputKind
    controller: str
    count: int
    rating: float | None = None
    voltage: float | None = None
    drive: float | None = None
    signal: str | None = None
    burden: float | None = None
    points: tuple[LifePoint, ...] = ()
    mechanical_life: float = 0.0
    operations_per_hour: float = 0.0
    pull_in: float = 0.0
    drop_out: float = 0.0
    assumptions: tuple[Assumption, ...] = ()


def controller_side(
    panel: Panel, catalogue: Catalogue, kind: OutputKind, *, signal: str | None = None, at_least: int = 1
) -> OutputSide | Unsized:
    """Find the controller output that a loop will use.

    Parameters
    ----------
    panel : Panel
        Its controllers; where none lists its outputs, a typical output is taken.
    catalogue : Catalogue
        Typical outputs.
    kind : {"relay", "logic", "analogue"}
        What is wanted.
    signal : str, optional
        The signal that an analogue output must give.
    at_least : int
        How many outputs one controller must have.

    Returns
    -------
    OutputSide or Unsized
        The weakest of those that fit, so that the loop may be wired to any of them; Unsized where no controller has one.
    """
    listed = [(controller.name, output) for controller in panel.controllers for output in controller.outputs]
    if not listed:
        return _typical_side(catalogue, kind, signal, at_least)
    sides = [_filled(name, output, catalogue) for name, output in listed if output.kind == kind]
    sides = [side for side in sides if side.count >= at_least and (signal is None or side.signal == signal)]
    if not sides:
        wanted = f"{signal} {kind}" if signal else kind
        few = f" with {at_least} of them" if at_least > 1 else ""
        return Unsized(f"no controller of the panel has a {wanted} output{few}", ("controllers.outputs",))
    return min(sides, key=lambda side: (side.rating or side.drive or side.burden or 0.0, side.controller))


def _typical_row(catalogue: Catalogue, kind: OutputKind, signal: str | None) -> TypicalOutput:
    current = signal is None or signal.endswith("mA")
    for known in catalogue.outputs:
        if known.value.kind == kind and (kind != "analogue" or (known.value.burden is not None) == current):
            return known.value
    raise CatalogueError(f"controller_outputs has no {kind} row")


def _typical_side(catalogue: Catalogue, kind: OutputKind, signal: str | None, count: int) -> OutputSide:
    row = _typical_row(catalogue, kind, signal)
    given = signal or row.signal
    said = {
        "relay": f"relay {row.rating.text if row.rating else ''}",
        "logic": f"logic {row.voltage.text if row.voltage else ''}, {row.drive.text if row.drive else ''}",
        "analogue": f"{given}, {row.burden.text + ' at most' if row.burden else row.drive.text if row.drive else ''}",
    }[kind]
    assumed = Assumption("controllers", said, f"no controller is declared: {_REPLACE}")
    return OutputSide(
        kind, "loop controller", count, _number(row.rating), _number(row.voltage), _number(row.drive), given, _number(row.burden),
        row.electrical_life, *_relay_numbers(row), (assumed,),
    )  # fmt: skip


def _filled(name: str, output: ControllerOutput, catalogue: Catalogue) -> OutputSide:
    row = _typical_row(catalogue, output.kind, output.signal)
    assumptions: list[Assumption] = []

    def fill(field: str, declared: Quantity | None, usual: Quantity | None) -> float | None:
        if declared is None and usual is not None:
            assumptions.append(Assumption(f"controllers.{name}.{field}", usual.text, f"not declared: {_REPLACE}"))
            return float(usual)
        return _number(declared)

    rating = fill("rating", output.rating, row.rating)
    voltage = fill("voltage", output.voltage, row.voltage if output.kind == "logic" else None)
    drive = fill("drive", output.drive, row.drive)
    burden = fill("burden", output.burden, row.burden)
    signal = output.signal
    if output.kind == "analogue" and signal is None:
        signal = row.signal
        assumptions.append(Assumption(f"controllers.{name}.signal", str(signal), "not declared: the usual signal"))
    points: tuple[LifePoint, ...] = ()
    if output.kind == "relay" and rating is not None:
        if output.electrical_life is not None:
            points = (LifePoint(current=Quantity(rating), operations=output.electrical_life),)
        else:
            points = tuple(_scaled(row, rating))
            life = f"{points[0].operations:g} at its rating"
            assumptions.append(Assumption(f"controllers.{name}.electrical_life", life, f"not declared: {_REPLACE}"))
        # panel.yml has no fields for these
        times = f"{row.pull_in.text if row.pull_in else ''} to close and to open, {row.operations_per_hour:g} operations an hour"
        assumptions.append(Assumption(f"controllers.{name}", times, f"of its relays: {_REPLACE}"))
    return OutputSide(
        output.kind, name, output.count, rating, voltage, drive, signal, burden, points, *_relay_numbers(row), tuple(assumptions)
    )


def _scaled(row: TypicalOutput, rating: float) -> Iterator[LifePoint]:
    """Move a typical relay's points to another rating: the life at the rated current is what relays have in common."""
    for point in row.electrical_life:
        share = point.current / row.rating if row.rating else 1.0
        yield LifePoint(current=Quantity(share * rating), operations=point.operations)


def _relay_numbers(row: TypicalOutput) -> tuple[float, float, float, float]:
    numbers = (row.mechanical_life, row.operations_per_hour, row.pull_in, row.drop_out)
    return tuple(_number(number) or 0.0 for number in numbers)  # type: ignore[return-value]  # four in, four out


def _number(quantity: Quantity | None) -> float | None:
    return None if quantity is None else float(quantity)
