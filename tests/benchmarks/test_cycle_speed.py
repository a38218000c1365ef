"""How long cycles and whole on-off decisions take, against stepping the differential equation."""

import importlib.util
import time
from pathlib import Path

import pytest

from specgen.process.differential import least_differential, widest_differential
from specgen.process.on_off import predict_on_off
from specgen.process.plant import SelfRegulating

pytestmark = pytest.mark.benchmark


def helpers():
    """Load the makers and the followed loop of the process tests."""
    place = Path(__file__).parent.parent / "process" / "conftest.py"
    spec = importlib.util.spec_from_file_location("process_helpers", place)
    made = importlib.util.module_from_spec(spec)
    spec.loader.exec_module(made)
    return made


def seconds(work, runs):
    """Return the processor time of one run, the best of three rounds [s]."""
    work()
    rounds = []
    for _ in range(3):
        start = time.process_time()
        for _ in range(runs):
            work()
        rounds.append((time.process_time() - start) / runs)
    return min(rounds)


@pytest.mark.parametrize(
    ("name", "plant", "timers"),
    [
        ("one lag", SelfRegulating(95, 45, 600, 30), (0, 0)),
        ("second lag", SelfRegulating(95, 45, 600, 30, 40), (0, 0)),
        ("second lag and sensor lag", SelfRegulating(95, 45, 600, 30, 40, 20), (0, 0)),
        ("second lag, least run", SelfRegulating(95, 45, 600, 30, 40), (150, 0)),
    ],
)
def test_cycle(name, plant, timers):
    """At least a hundred times faster than ``solve_ivp`` at rtol 1e-10 over the cycles it takes to settle."""
    follow = helpers().follow_relay
    exact = seconds(lambda: plant.limit_cycle(1.0, -1.0, *timers), 500)
    stepped = seconds(lambda: follow(plant, 1.0, -1.0, *timers, start=-1.0), 1)
    print(f"\n{name}: {exact * 1e6:.1f} us, stepped {stepped * 1e3:.1f} ms, {stepped / exact:.0f} times faster")
    assert stepped / exact > 100


@pytest.mark.parametrize(("name", "lag"), [("one lag", (0, 0)), ("second lag", (40, 40))])
@pytest.mark.parametrize(("kind", "timers"), [("heater", (0, 0)), ("machine", (60, 60))])
def test_decision(name, lag, kind, timers):
    """Prediction, least and widest differential of a box with ranges of supply, setpoint, surroundings, load and loss."""
    box = helpers().made_box(
        strength=(9000, 9000), ambient=(30, 8), setpoint=(40, 80), load=(0, 3500), loss=(15, 16), capacity=(36e3, 36e3),
        dead_time=(25, 25), lag=lag, supply=(0.9, 1.1),
    )  # fmt: skip
    starts = 20 if kind == "machine" else None

    def decide():
        least_differential(box, starts_per_hour=starts, min_run=timers[0], min_rest=timers[1], switchings_per_hour=15)
        widest_differential(box, 12, 12, "centred", *timers)
        predict_on_off(box, 3.0, "centred", *timers)

    print(f"\n{kind}, {name}: whole on-off decision {seconds(decide, 10) * 1e3:.1f} ms")
