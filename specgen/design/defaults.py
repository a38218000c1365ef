"""Defaults of panel.yml that bear on a loop's result: listed with the loop, so that none is silent."""

from collections.abc import Iterator

from specgen.core.quantity import Quantity
from specgen.core.say import as_difference
from specgen.model.fields import Model
from specgen.model.traits import Traits
from specgen.process.box import Unmodelled
from specgen.rules.base import Case
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, ThreePointSettings

WHY = "the default; not written in panel.yml"


def panel_defaults(case: Case, traits: Traits) -> tuple[Assumption, ...]:
    """Return the defaults of the panel that this loop's decision rests on."""
    return tuple(_of_plant(case, traits)) + tuple(_of_settings(case)) + tuple(_of_device(case))


def _unwritten(section: Model, path: str, *names: str) -> Iterator[Assumption]:
    for name in names:
        if name not in section.model_fields_set:
            yield Assumption(f"{path}.{name}", _text(getattr(section, name)), WHY)


def _text(value: object) -> str:
    if isinstance(value, Quantity):
        return value.text
    if isinstance(value, tuple):
        return ", ".join(f"{number:g}" for number in value) + " s"
    return str(value)


def _of_plant(case: Case, traits: Traits) -> Iterator[Assumption]:
    if isinstance(case.box, Unmodelled):
        return
    if traits.resistive_power:
        yield from _unwritten(case.panel.supply, "supply", "tolerance")
    if case.loop.sensor.lag is None:
        yield Assumption("sensor.lag", "none", "not written: the measurement is taken to follow the true value at once")


def _of_settings(case: Case) -> Iterator[Assumption]:
    panel, need, settings = case.panel, case.loop.need, case.settings
    if isinstance(settings, OnOffSettings | ProportionedSettings):
        if need.duty is None and "duty" not in panel.model_fields_set:
            yield Assumption("duty", f"{panel.duty.hours_per_day.text} a day, {panel.duty.days_per_year} days a year", WHY)
        if settings.contact_life is not None:
            yield from _unwritten(panel.house, "house", "contact_life")
    if isinstance(settings, OnOffSettings) and need.quantity in type(panel.house.setting_step).model_fields:
        yield from _unwritten(panel.house.setting_step, "house.setting_step", need.quantity)
    if isinstance(settings, ProportionedSettings):
        yield from _unwritten(panel.house, "house", "swing_share", "cycle_time_series")
        yield from _unwritten(panel.supply, "supply", "frequency")
    if isinstance(settings, ProportionedSettings | ContinuousSettings | ThreePointSettings):
        for controller in panel.controllers:
            yield from _unwritten(controller, f"controllers.{controller.name}", "scan")
        if not panel.controllers:
            yield Assumption("controllers.scan", "0.25 s", "no controller is declared: the usual scan")
        if need.overshoot is None:
            side = need.tolerance.above if case.loop.raises else need.tolerance.below
            yield Assumption("need.overshoot", as_difference(side.text), "not written: the tolerance on the side that the output drives to")
    limits = case.loop.limits
    if limits.after_power_return is None and panel.house.after_power_return is None and limits.consequence not in ("injury", "fire"):
        why = "not written, neither for the loop nor for the house; for injury and fire it must be (rule S4)"
        yield Assumption("limits.after_power_return", "resume", why)
    if not isinstance(case.error, Unsized):
        yield from _unwritten(panel.house, "house", "sensor_share")


def _of_device(case: Case) -> Iterator[Assumption]:
    if isinstance(case.device, Unsized):
        return
    if case.device.rating is not None:
        yield from _unwritten(case.panel.enclosure, "enclosure", "interior_limit")
    if case.device.drawn:
        yield from _unwritten(case.panel.control_supply, "control_supply", "voltage", "kind")
