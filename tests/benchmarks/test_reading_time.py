"""How long reading takes: against libyaml's loader on the same text, and how it grows with hostile files."""

import gc
import importlib.util
import time
from pathlib import Path

import pytest
import yaml

from specgen.core.quantity import parse_range
from specgen.source import read_bytes

pytestmark = pytest.mark.benchmark

LOOP = """---
tag: TIC-{number}
service: Drying cabinet {number}, air
area: Drying
need:
  quantity: temperature
  direction: raise
  setpoint: 65 degC
  range: 40 degC to 80 degC
  tolerance: {{above: 2 K, below: 0.5 K}}
plant:
  balance:
    bodies:
      - {{what: air, mass: 60 kg, specific_heat: 0.6 kJ/(kg K), follows: fast}}
      - {{what: herbs, mass: 0 kg to 140 kg, specific_heat: 3 kJ/(kg K), follows: slow}}
    surfaces:
      - {{what: panels, area: 14 m2, u_value: 1.1 W/(m2 K)}}
    surroundings: 8 degC to 30 degC
    load: 0 kW to 3.5 kW        # against the element
    dead_time: 25 s
sensor: {{kind: pt100, class: A, wires: 3, step: 0.1 K, noise: 0.1 K, lag: 8 s}}
element: {{kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3}}
cable: {{length: 25 m, method: B2, grouped: 3, ambient: 40 degC}}
"""


def best_of(times, work):
    """Return the shortest of several runs [s], without the collector's pauses in them."""
    taken = []
    gc.disable()
    for _ in range(times):
        start = time.perf_counter()
        work()
        taken.append(time.perf_counter() - start)
    gc.enable()
    return min(taken)


def test_reading_600_loops_against_libyaml():
    raw = "".join(LOOP.format(number=number) for number in range(600)).encode()
    reference = best_of(5, lambda: list(yaml.load_all(raw, yaml.CSafeLoader)))
    ours = best_of(5, lambda: read_bytes(raw, "loops/many.yml"))
    print(f"\n{len(raw) // 1024} KiB: libyaml's loader {reference * 1e3:.0f} ms, ours {ours * 1e3:.0f} ms, ratio {ours / reference:.2f}")
    assert ours < 1.6 * reference


def test_60000_quantities():
    texts = [f"{number}.{number % 7} degC to 95 degC" for number in range(60)]
    taken = best_of(3, lambda: [parse_range(text, "temperature") for _ in range(1000) for text in texts])
    print(f"\n60,000 ranges: {taken * 1e3:.0f} ms, {taken / 60_000 * 1e6:.1f} microseconds each")
    assert taken < 1


def hostile():
    """Take the texts of the test that reads them small."""
    path = Path(__file__).parent.parent / "source" / "test_any_input.py"
    spec = importlib.util.spec_from_file_location("any_input", path)
    module = importlib.util.module_from_spec(spec)
    spec.loader.exec_module(module)
    return module


ANY_INPUT = hostile()


@pytest.mark.parametrize("name", ANY_INPUT.HARD)
def test_a_mebibyte_grows_no_faster_than_a_quarter_of_it(name):
    """Linear growth is 4, quadratic 16."""
    whole = best_of(2, lambda: read_bytes(ANY_INPUT.filled(name, 2**20).encode(), "a.yml"))
    quarter = best_of(2, lambda: read_bytes(ANY_INPUT.filled(name, 2**18).encode(), "a.yml"))
    print(f"\n{name}: {whole:.3f} s, {whole / quarter:.1f} times a quarter")
    assert whole < 0.3 or whole < 10 * quarter
