"""A relay loop followed in time with scipy, from the differential equations alone (the outside reference), and loops to make boxes of."""

import json
from typing import NamedTuple

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from specgen.core.quantity import Unit
from specgen.core.say import Phrasing
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.process.axis import Axis, Declared
from specgen.process.box import Box
from specgen.source.read import read_text


class Observed(NamedTuple):
    """What the last followed cycle showed."""

    peak: float
    trough: float
    t_on: float
    t_off: float
    measured_peak: float
    measured_trough: float
    settled: bool


def rates(plant, full):
    """Return the right-hand side for states ``input lag, value, measurement`` with a steady plant input."""
    kind = type(plant).__name__
    target = (plant.rise if full else -plant.fall) if kind == "SelfRegulating" else (plant.r_on if full else -plant.r_off)

    def right(_t, state):
        w, z, m = state
        drive = w if plant.lag else target
        return [
            (target - w) / plant.lag if plant.lag else 0.0,
            (drive - z) / plant.tau if kind == "SelfRegulating" else drive,
            (z - m) / plant.sensor_lag if plant.sensor_lag else 0.0,
        ]

    return right


def follow_relay(  # noqa: C901, PLR0912, PLR0915 - one event loop, kept whole so that it can be checked by eye
    plant, high, low, min_run=0.0, min_rest=0.0, start=0.0, cycles=400, rtol=1e-10
):
    """Follow the loop from ``start`` until two cycles agree to 1e-8, or for ``cycles``; return the last cycle."""
    read = 2 if plant.sensor_lag else 1
    scale = high - low + plant.gain_per_second * (plant.theta + plant.lag + plant.sensor_lag)
    state = np.array([0.0, start, start])
    now, output, plant_input = 0.0, False, False
    since = -1e9
    pending = []
    marks, top, bottom = [], [], []
    states = []
    settled = False
    tops, bottoms = [], []
    horizon = 1e3 * (scale / plant.gain_per_second) * 50
    while True:
        target = low if not output else high
        free_at = since + (min_rest if not output else min_run)

        def meets(_t, y, target=target):
            return y[read] - target

        meets.terminal = True
        meets.direction = 1 if output else -1

        right = rates(plant, plant_input)

        def turns(_t, y, right=right):
            return right(_t, y)[1]

        def measured_turns(_t, y, right=right):
            return right(_t, y)[2]

        until = min([*pending, now + horizon] + ([free_at] if free_at > now else []))
        past = state[read] >= target if output else state[read] <= target
        if past and free_at <= now:
            output = not output
            since = now
            pending.append(now + plant.theta)
            marks.append(now)
            states.append(state.copy())
            if len(marks) > 6 and len(marks) % 2:
                on, off = marks[-2] - marks[-3], marks[-1] - marks[-2]
                was_on, was_off = marks[-4] - marks[-5], marks[-3] - marks[-4]
                steady = abs(np.subtract(state, states[-3])).max() < 1e-9 * scale
                settled = bool(steady and abs(on - was_on) < 1e-9 * on and abs(off - was_off) < 1e-9 * off)
                if settled:
                    break
            if len(marks) > 2 * cycles:
                break
            if len(marks) % 2:
                top, bottom = [], []
            tops, bottoms = top, bottom
            if plant.theta == 0:
                pending.clear()
                plant_input = output
            continue
        events = [turns, measured_turns]
        if free_at <= now:
            events.append(meets)
        done = solve_ivp(right, (now, until), state, method="DOP853", rtol=rtol, atol=1e-12 * scale, events=events)
        for y in [state, done.y[:, -1], *done.y_events[0], *done.y_events[1]]:
            tops.append((y[1], y[read]))
            bottoms.append((y[1], y[read]))
        if done.status == 1:
            now, state = done.t_events[2][0], done.y_events[2][0].copy()
            state[read] = target
        else:
            now, state = done.t[-1], done.y[:, -1]
        if not plant.lag:
            state[0] = 0.0
        while pending and pending[0] <= now:
            pending.pop(0)
            plant_input = not plant_input
    on, off = marks[-2] - marks[-3], marks[-1] - marks[-2]
    return Observed(
        max(y[0] for y in tops), min(y[0] for y in bottoms), on, off, max(y[1] for y in tops), min(y[1] for y in bottoms), settled
    )


@pytest.fixture(scope="session")
def relay_reference():
    """Give the followed loop to a test."""
    return follow_relay


PANEL = {
    "panel": {"reference": "PNL-1", "title": "Boxes", "revision": "A", "status": "for review", "date": "2026-01-01"},
    "supply": {"voltage": "400 V", "phases": "3", "frequency": "50 Hz"},
    "enclosure": {"height": "1800 mm", "width": "800 mm", "depth": "400 mm", "ambient": "5 degC to 35 degC"},
}
HEATER = {"kind": "resistive_heater", "power": "9 kW", "voltage": "400 V", "phases": "3"}
WARM = {
    "tag": "TIC-1",
    "service": "cabinet",
    "need": {"quantity": "temperature", "direction": "raise", "setpoint": "65 degC", "range": "40 degC to 80 degC", "tolerance": "1.5 K"},
    "sensor": {"kind": "pt100"},
    "element": HEATER,
}
COLD = {
    "tag": "TIC-2",
    "service": "store",
    "need": {"quantity": "temperature", "direction": "lower", "setpoint": "4 degC", "tolerance": "1 K"},
    "sensor": {"kind": "pt100"},
    "element": {
        "kind": "fixed_speed_compressor",
        "current": "8.4 A",
        "voltage": "400 V",
        "phases": "3",
        "min_run": "180 s",
        "min_rest": "120 s",
        "starts_per_hour": "10",
        "capacity": "7 kW",
    },
}


def read_loop(base, **changes):
    """Return a loop read by the real models, with sections replaced."""
    documents, problems = read_text(json.dumps({**base, **changes}), "loops/made.yml")
    assert not problems
    reading = read_loops(documents)
    assert not reading.problems, reading.problems
    return reading.loops[0].loop


def read_panel(**supply):
    """Return a panel with fields of its supply replaced."""
    panel, problems = read_model(Panel, {**PANEL, "supply": {**PANEL["supply"], **supply}})
    assert not problems, problems
    return panel


def made_axis(name, low, high, *more):
    """Return an axis of one declared field, times fields that are already declared."""
    return Axis(((Declared(name, name, float(low), float(high), "number"), *more),))


def made_box(
    *, strength, ambient, setpoint, load, loss, capacity, dead_time, lag=(0, 0), sensor_lag=(0, 0), supply=(1, 1), sign=1, rates=False
):
    """Return a box straight from pairs of numbers, each ordered as its axis asks."""
    voltage = Declared("supply", "supply", float(supply[0]), float(supply[1]), "supply")
    return Box(
        sign=sign,
        setpoint=Declared("setpoint", "setpoint", float(setpoint[0]), float(setpoint[1]), "value"),
        strength=made_axis("strength", *strength) if rates else made_axis("strength", *strength, voltage, voltage),
        ambient=None if ambient is None else Declared("ambient", "surroundings", float(ambient[0]), float(ambient[1]), "temperature"),
        heat=made_axis("load", *load),
        loss=made_axis("loss", *loss),
        capacity=made_axis("capacity", *capacity),
        whole_capacity=made_axis("capacity", *capacity),
        dead_time=made_axis("dead_time", *dead_time),
        lag=made_axis("lag", *lag),
        sensor_lag=made_axis("sensor_lag", *sensor_lag),
        phrasing=Phrasing(Unit("degC"), Unit("K")),
        form="rates" if rates else "balance",
        boost=Axis(((voltage, voltage),)) if rates else None,
    )


class Makers(NamedTuple):
    """What makes loops, panels and boxes."""

    loop: object
    panel: object
    box: object
    warm: dict
    cold: dict


@pytest.fixture(scope="session")
def make():
    """Give the makers to a test."""
    return Makers(read_loop, read_panel, made_box, WARM, COLD)
