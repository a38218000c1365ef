"""What is taken for granted because nothing else was written: defaults that bear on a result, and inherited limits."""

from dataclasses import dataclass

from specgen.model.loops import ReadLoop
from specgen.model.traits import Traits
from specgen.sizing.candidate import Assumption


@dataclass(frozen=True, slots=True)
class _Default:
    path: tuple[str, ...]
    why: str
    value: str = ""


_LOOP_DEFAULTS = (
    _Default(("need", "stability"), "not written: no sustained oscillation is wanted"),
    _Default(("need", "range"), "not written: the plant is run at its setpoint alone", "the setpoint"),
    _Default(("sensor", "class"), "not written: the usual class"),
    _Default(("sensor", "wires"), "not written: the usual wiring"),
    _Default(("element", "refrigerant_circuit"), "not written: the machine has none of its own", "no"),
    _Default(("element", "pump_down"), "not written: the compressor is stopped directly", "no"),
)


def loop_assumptions(read: ReadLoop, traits: Traits) -> tuple[Assumption, ...]:
    """Return what a loop takes for granted by its own silence."""
    loop = read.loop
    found: list[Assumption] = []
    for default in _LOOP_DEFAULTS:
        section = getattr(loop, default.path[0])
        name = "class_" if default.path[1] == "class" else default.path[1]
        if default.path in read.spans or not hasattr(section, name):
            continue
        if (default.path[1] == "pump_down" and not traits.starts_limited) or (
            default.path[1] == "refrigerant_circuit" and not traits.may_refrigerate
        ):
            continue
        value = default.value or str(getattr(section, name))
        found.append(Assumption(".".join(default.path), value, default.why))
    found += [
        Assumption(".".join(str(step) for step in path), read_written(read, path), f"taken over by same_as, from {read.spans[path].file}")
        for path in sorted(read.inherited, key=str)
        if path[0] == "limits" and len(path) > 1
    ]
    if read.fitted is not None and traits.resistive_power and loop.plant and loop.plant.step_test and loop.plant.step_test.supply is None:
        found.append(
            Assumption("plant.step_test.supply", "not noted", "the supply may have stood anywhere in its tolerance: counted both ways")
        )
    return tuple(found)


def read_written(read: ReadLoop, path: tuple[str | int, ...]) -> str:
    """Return a field's value as it was written."""
    here: object = read.loop
    for step in path:
        here = getattr(here, str(step), None) if not isinstance(step, int) else here
    text = getattr(here, "text", None)
    return str(text if text is not None else here)
