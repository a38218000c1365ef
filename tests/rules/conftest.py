"""Cases for rules: loops read by the real models, with settings and figures set by hand so that every number is in the test."""

import json
from dataclasses import dataclass, replace
from types import SimpleNamespace

import pytest

from specgen.core.say import THIN, Phrasing
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.model.traits import traits_of
from specgen.process.box import Point
from specgen.process.box_of import box_of
from specgen.process.on_off import OnOffPrediction
from specgen.process.time_proportioned import RipplePrediction
from specgen.process.worst_case import Worst
from specgen.rules.base import Case
from specgen.rules.engine import examine_all
from specgen.sizing.candidate import Candidate, Unsized
from specgen.sizing.faults import Faults, Stuck
from specgen.sizing.measurement import MeasuringError
from specgen.sizing.settings import Bound, ContinuousSettings, OnOffSettings, ProportionedSettings, ThreePointSettings, Tuning
from specgen.source.read import read_text

PANEL = {
    "panel": {"reference": "PNL-1", "title": "Rules", "revision": "A", "status": "for review", "date": "2026-01-01"},
    "supply": {"voltage": "400 V", "phases": "3", "frequency": "50 Hz"},
    "enclosure": {"height": "1800 mm", "width": "800 mm", "depth": "400 mm", "ambient": "5 degC to 35 degC"},
}
WARM = {
    "tag": "TIC-1",
    "service": "warm side",
    "need": {"quantity": "temperature", "direction": "raise", "setpoint": "65 degC", "tolerance": "1.5 K"},
    "sensor": {"kind": "pt100", "step": "0.1 K", "noise": "0.1 K"},
    "limits": {"danger_high": "95 degC", "on_sensor_fault": "off"},
}
COLD = {
    "tag": "TIC-2",
    "service": "cold side",
    "need": {"quantity": "temperature", "direction": "lower", "setpoint": "4 degC", "tolerance": "1 K"},
    "sensor": {"kind": "pt100", "step": "0.1 K", "noise": "0.1 K"},
    "limits": {"on_sensor_fault": "off"},
}
ELEMENTS = {
    "heater": (WARM, {"kind": "resistive_heater", "power": "9 kW", "voltage": "400 V", "phases": "3", "needs": ["airflow"]}),
    "lamp": (WARM, {"kind": "infrared_lamp_heater", "power": "9 kW", "voltage": "400 V", "phases": "3"}),
    "burner": (WARM, {"kind": "gas_burner", "stages": "on_off", "starts_per_hour": "6", "min_run": "60 s"}),
    "two_stage": (WARM, {"kind": "gas_burner", "stages": "high_low", "starts_per_hour": "6", "second_stage_offset": "0.5 K"}),
    "compressor": (
        COLD,
        {"kind": "fixed_speed_compressor", "current": "8.4 A", "voltage": "400 V", "phases": "3", "min_run": "180 s", "min_rest": "120 s",
         "starts_per_hour": "10"},
    ),
    "inverter": (COLD, {"kind": "variable_speed_compressor", "power": "4 kW", "signal": "4-20 mA", "lowest_speed": "30 percent"}),
    "blower": (COLD, {"kind": "fan", "power": "1.5 kW", "voltage": "400 V", "phases": "3", "starts_per_hour": "12"}),
    "valve": (
        WARM,
        {"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "60 s", "on_signal_loss": "close", "on_supply_loss": "close"},
    ),
    "cold_valve": (
        COLD,
        {"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "60 s", "on_signal_loss": "open", "on_supply_loss": "open"},
    ),
    "motor_valve": (WARM, {"kind": "three_point_valve", "travel_time": "120 s", "on_supply_loss": "hold"}),
    "solenoid": (WARM, {"kind": "solenoid_valve", "coil_power": "12 W", "voltage": "24 V", "fails": "closed"}),
}  # fmt: skip
DEVICES = {"on_off": "contactor", "time_proportioned": "contactor", "analogue": "power_controller", "three_point": "relay_pair"}
NOT_SIZED = Unsized("not sized here")


def laid(data, changes):
    """Return data with changes laid over, section by section; None takes a key out."""
    made = dict(data)
    for key, value in changes.items():
        if value is None:
            made.pop(key, None)
        elif isinstance(value, dict) and isinstance(made.get(key), dict):
            made[key] = laid(made[key], value)
        else:
            made[key] = value
    return made


def loop(name, **changes):
    """Return a loop by the name of its element, with sections changed."""
    base, element = ELEMENTS[name]
    # every JSON text is a YAML text
    documents, problems = read_text(json.dumps(laid({**base, "element": element}, changes)), "loops/rules.yml")
    reading = read_loops(documents)
    assert not problems
    assert not reading.problems, reading.problems
    return reading.loops[0].loop


def panel(**changes):
    """Return a panel, with sections changed."""
    made, problems = read_model(Panel, laid(PANEL, changes))
    assert not problems, problems
    return made


def case(name, mode, device=None, *, house=None, controllers=None, settings=NOT_SIZED, on_off=NOT_SIZED, error=0.3, faults=NOT_SIZED,
         device_choice=NOT_SIZED, **changes):  # fmt: skip
    """Return a case of a loop and a candidate; ``error`` [K] and everything else as given, the box from the loop's own plant."""
    declared = loop(name, **changes)
    shop = panel(**{key: value for key, value in (("house", house), ("controllers", controllers)) if value is not None})
    return Case(
        loop=declared,
        panel=shop,
        traits=traits_of(declared.element),
        candidate=Candidate(mode, device or DEVICES[mode]),
        box=box_of(declared, shop),
        device=device_choice,
        settings=settings,
        on_off=on_off,
        error=MeasuringError(error, error) if isinstance(error, float) else error,
        faults=faults,
    )


@dataclass(frozen=True)
class Answer:
    """A finding with its sentence filled in, thin spaces written as plain ones."""

    outcome: str
    text: str
    margin: float | None
    needs: tuple


def said(found, asked):
    """Fill a finding's sentence."""
    text = Phrasing(asked.loop.unit, asked.loop.difference_unit).fill(found.text, found.words).replace(THIN, " ")
    assert "{" not in text
    return Answer(found.outcome, text, found.margin, found.needs)


def ask(code, asked):
    """Ask one rule through the engine and fill its sentence."""
    return said(next(finding for finding in examine_all(asked) if finding.rule == code), asked)


def on_off(**changes):
    """Return settings of an on-off loop: 1 K between 64.5 and 65.5 degC, 1.0 K above and 0.8 K below."""
    made = {
        "differential": 1.0, "placement": "centred", "switch_on": 64.5, "switch_off": 65.5, "least": 0.4, "most": 2.0, "least_bounds": (),
        "most_bound": None, "starts_per_hour": 8.0, "operations_per_year": 32000.0, "contact_life": 20.0, "weakest": "contactor",
        "chosen_by": "computed",
    }  # fmt: skip
    enforced = prediction(**changes.pop("enforced", {}))
    natural = prediction(**changes.pop("natural", {}))
    return OnOffSettings(**{**made, "enforced": enforced, "natural": natural, **changes})


def worst(value):
    """Return a figure's worst value, as if found in the only case of a plain plant."""
    plant = {"response": {"change": "100 K", "time_constant": "20 min", "dead_time": "25 s", "rest_value": "20 degC"}}
    box = box_of(loop("valve", plant=plant), panel())
    return Worst(value, box.plant_at(Point()), Point(), box)


def prediction(**changes):
    """Return what an on-off loop is predicted to do: 1.0 K above and 0.8 K below, 8 starts an hour, 150 s on, 200 s off."""
    made = {"above": 1.0, "below": 0.8, "swing": 1.8, "starts_per_hour": 8.0, "shortest_on": 150.0, "shortest_off": 200.0, **changes}
    figures = {name: worst(value) for name, value in made.items()}
    return OnOffPrediction(differential=1.0, placement="centred", switch_off=0.5, switch_on=-0.5, min_run=0.0, min_rest=0.0, **figures)


def tuning(**changes):
    """Return starting values: 8 K band, 240 s, delay 60 s of which 15 s for the cycle."""
    made = {
        "gain": 0.125, "proportional_band": 8.0, "integral_time": 240.0, "derivative_time": 0.0, "effective_delay": 60.0,
        "delay_without_cycle": 45.0, "gain_margin": 3.1, "phase_margin": 61.0, "peak_sensitivity": 1.6, "stable": True,
        "load_deviation": None, "overshoot": 0.5, "time_to_band": 900.0,
    }  # fmt: skip
    return Tuning(**{**made, **changes})


def proportioned(**changes):
    """Return settings of a time-proportioned loop: 30 s cycle, 0.2 K ripple on each side."""
    sizes = {"above": 0.2, "below": 0.2, "swing": 0.4, "shortest_on": 3.0, "shortest_off": 3.0, **changes.pop("ripple", {})}
    figures = {name: worst(value) for name, value in sizes.items()}
    ripple = RipplePrediction(cycle_time=30.0, duty_low=0.1, duty_high=0.9, held_back=False, **figures)
    made = {
        "cycle_time": 30.0, "least": 10.0, "most": 40.0, "least_bounds": (Bound("C3", 10.0, "contact life"),),
        "most_bounds": (Bound("C1", 50.0, "ripple"), Bound("C8", 40.0, "delay")), "lowest_duty": 0.05, "highest_duty": 0.95,
        "shortest_on": 1.5, "shortest_off": 1.5, "least_pulse": 0.25, "operations_per_year": 480000.0, "contact_life": 12.0,
        "weakest": "contactor", "tuning": tuning(), "chosen_by": "computed",
    }  # fmt: skip
    return ProportionedSettings(**{**made, "ripple": ripple, **changes})


def continuous(**changes):
    """Return settings of an analogue loop."""
    made = {"signal": "4-20 mA", "tuning": tuning(delay_without_cycle=60.0), "duty_low": 0.1, "duty_high": 0.8}
    return ContinuousSettings(**{**made, **changes})


def stepped(**changes):
    """Return settings of a three-point loop."""
    made = {"neutral_zone": 0.4, "travel_step": 0.005, "tuning": tuning(delay_without_cycle=60.0), "duty_low": 0.1, "duty_high": 0.8}
    return ThreePointSettings(**{**made, **changes})


def faults(on=(None, None, None), off=(None, None, None), **times):
    """Return stuck states as (settles at, passes high, passes low); times by name such as ``on_danger``."""
    made = {
        state: replace(
            Stuck(*stuck), time_to_danger=times.get(f"{state}_danger"), time_to_spoil=times.get(f"{state}_spoil")
        )
        for state, stuck in (("on", on), ("off", off))
    }  # fmt: skip
    return Faults(made["on"], made["off"])


@pytest.fixture(scope="session")
def make():
    """Give everything a rule's test builds its cases from."""
    return SimpleNamespace(
        loop=loop, panel=panel, case=case, ask=ask, said=said, on_off=on_off, proportioned=proportioned, tuning=tuning,
        continuous=continuous, stepped=stepped, faults=faults, unsized=NOT_SIZED, bound=Bound,
    )  # fmt: skip
