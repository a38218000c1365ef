"""A relay loop followed in time with scipy, from the differential equations alone: the outside reference of the cycles."""

from typing import NamedTuple

import numpy as np
import pytest
from scipy.integrate import solve_ivp


class Observed(NamedTuple):
    """What the last followed cycle showed."""

    peak: float
    trough: float
    t_on: float
    t_off: float
    measured_peak: float
    measured_trough: float


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
    plant, high, low, min_run=0.0, min_rest=0.0, start=0.0, cycles=200, rtol=1e-10
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
                if steady and abs(on - was_on) < 1e-9 * on and abs(off - was_off) < 1e-9 * off:
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
        max(y[0] for y in tops), min(y[0] for y in bottoms), on, off, max(y[1] for y in tops), min(y[1] for y in bottoms)
    )


@pytest.fixture(scope="session")
def relay_reference():
    """Give the followed loop to a test."""
    return follow_relay
