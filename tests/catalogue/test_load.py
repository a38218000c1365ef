"""The catalogue: packaged values are plausible, the shop's devices take their place."""

import importlib.resources
import re
from itertools import pairwise

import pytest

from specgen.catalogue.load import load_catalogue, read_devices
from specgen.model.devices import Devices
from specgen.source.read import read_table

# IEC 60751 tolerance classes +-(a + b|t|); A, B seen in two open tables, AA and C as resistor classes
PLATINUM = {"AA": (0.10, 0.0017), "A": (0.15, 0.0020), "B": (0.30, 0.0050), "C": (0.60, 0.0100)}
# IEC 60584-1:2013 (IEC 584-2:1982), seen in two open tables: type and class to (a, b)
COUPLES = {
    ("K", "1"): (1.5, 0.004), ("K", "2"): (2.5, 0.0075), ("K", "3"): (2.5, 0.015), ("N", "1"): (1.5, 0.004), ("N", "2"): (2.5, 0.0075),
    ("N", "3"): (2.5, 0.015), ("J", "1"): (1.5, 0.004), ("J", "2"): (2.5, 0.0075), ("E", "1"): (1.5, 0.004), ("E", "2"): (2.5, 0.0075),
    ("E", "3"): (2.5, 0.015), ("T", "1"): (0.5, 0.004), ("T", "2"): (1.0, 0.0075), ("T", "3"): (1.0, 0.015), ("R", "1"): (1.0, 0.003),
    ("S", "1"): (1.0, 0.003), ("R", "2"): (1.5, 0.0025), ("S", "2"): (1.5, 0.0025), ("B", "2"): (None, 0.0025), ("B", "3"): (4.0, 0.005),
}  # fmt: skip


@pytest.fixture(scope="module")
def catalogue():
    return load_catalogue()


def test_tolerance_classes_are_the_published_ones(catalogue):
    assert {k.value.class_: (float(k.value.a), float(k.value.b)) for k in catalogue.platinum_classes} == PLATINUM
    rows = [known.value for known in catalogue.couple_classes]
    assert {(row.type, row.class_): (None if row.a is None else float(row.a), float(row.b)) for row in rows} == COUPLES
    assert {k.value.class_ for k in catalogue.platinum_ranges} == set(PLATINUM)


def test_contactors_rise_class_by_class(catalogue):
    for kind in ("dc", "ac"):
        row = [c for c in catalogue.contactors if c.coil.kind == kind]
        assert [float(c.motor_current) for c in row] == [9, 12, 18, 25, 32, 40, 50, 65, 80]
        for a, b in pairwise(row):
            assert a.resistive_current < b.resistive_current
            assert a.loss_per_pole <= b.loss_per_pole
            assert a.coil.power <= b.coil.power


def test_contactors_are_plausible(catalogue):
    """Common practice, no source: AC-1 at most 2.5 times AC-3; 2 to 3 W a pole around 30 A; inrush about ten times holding."""
    for c in catalogue.contactors:
        assert 1.2 <= c.resistive_current / c.motor_current <= 2.5
        assert max(c.electrical_life, key=lambda p: p.current).current == c.resistive_current
        assert max(c.motor_life, key=lambda p: p.current).current == c.motor_current
        assert all(p.operations <= c.mechanical_life for p in (*c.electrical_life, *c.motor_life))
        assert 0.02 <= c.loss_per_pole / c.resistive_current <= 0.12
        if c.coil.inrush is not None:
            assert 7 <= c.coil.inrush / c.coil.power <= 15


@pytest.mark.parametrize("kind", ["contactors", "relays"])
def test_halving_the_current_gives_two_to_five_times_the_life(catalogue, kind):
    """Common practice, no source: about three to five times; the packaged points stay below."""
    for device in getattr(catalogue, kind):
        ordered = sorted(device.electrical_life, key=lambda p: p.current)
        for low, high in pairwise(ordered):
            assert 1 <= low.operations / high.operations <= (high.current / low.current) ** 2.33


def test_solid_state_lose_about_a_watt_an_ampere(catalogue):
    """Seen in two open articles: about 1 W, at most 1.5 W an ampere and pole, with a sine's mean 2 sqrt2/pi and r I^2."""
    for s in catalogue.ssrs:
        loss = s.on_drop * 2 * 2**0.5 / 3.14159265 * s.current + s.slope_resistance * s.current**2
        assert 0.9 <= loss / s.current <= 1.5
        assert s.switched_poles <= s.poles
        # the junction stays below its limit on some heat sink at 45 degC
        assert 45 + loss * (s.junction_to_case + s.case_to_sink) < s.highest_junction


def test_no_row_names_a_maker(catalogue):
    for device in (*catalogue.contactors, *catalogue.relays, *catalogue.ssrs, *catalogue.power_controllers):
        assert re.fullmatch(r"(contactor class|plug-in relay|solid-state switch|power controller) [\w ,.-]+", device.name)


def test_names_are_unique(catalogue):
    names = [d.name for d in (*catalogue.contactors, *catalogue.relays, *catalogue.ssrs, *catalogue.power_controllers)]
    assert len(names) == len(set(names))
    assert catalogue.device(names[3]).name == names[3]
    assert catalogue.device("4-20 mA signal") is None


def test_typical_devices_stand_as_typical(catalogue):
    kinds = ("contactors", "relays", "ssrs", "power_controllers", "controller_outputs")
    standing = {row.standing for row in catalogue.rows if row.id.split("/")[0] in kinds}
    assert standing == {"typical: common practice"}


RELAY = """relays:
  - name: shop relay
    resistive_current: 8 A
    electrical_life: [{current: 8 A, operations: 1e5}]
    mechanical_life: 1e7
    operations_per_hour: 600
    pull_in: 10 ms
    drop_out: 5 ms
    coil: {voltage: 24 V, power: 0.4 W}
"""


def test_shop_takes_the_place_of_its_class_alone(catalogue):
    document, problems = read_table(RELAY, "devices.yml")
    assert not problems
    devices, problems = read_devices(document)
    assert not problems
    mine = load_catalogue(devices)
    assert [relay.name for relay in mine.relays] == ["shop relay"]
    assert mine.contactors == catalogue.contactors
    assert (mine.is_typical("relays"), mine.is_typical("contactors")) == (False, True)
    assert load_catalogue(devices) is mine
    assert load_catalogue(Devices()) == catalogue


def broken(text):
    document, _ = read_table(text, "devices.yml")
    devices, problems = read_devices(document)
    assert devices is None
    return [problem.line() for problem in problems]


def test_problems_have_their_place():
    found = broken("relays:\n  - {name: R, resistive_current: 8 bar}\n")
    assert any(line.startswith("devices.yml:2:") and "Q107" in line for line in found)
    assert any("'mechanical_life' is missing" in line for line in found)


LONG = (
    "{{name: {name}, resistive_current: 8 A, motor_current: 4 A, electrical_life: [{{current: 8 A, operations: 1e5}}],"
    " mechanical_life: 1e7, operations_per_hour: 600, pull_in: 10 ms, drop_out: 5 ms, loss_per_pole: 1 W,"
    " coil: {{voltage: 24 V, power: 3 W}}{more}}}"
)


def test_names_written_twice():
    found = broken("contactors:\n  - " + LONG.format(name="K", more="") + "\n  - " + LONG.format(name="k", more="") + "\n")
    assert found == ["devices.yml:3:12: error F181: the name 'k' is already taken"]


def test_motor_life_must_fall():
    more = ", motor_life: [{current: 4 A, operations: 2e6}, {current: 2 A, operations: 1e6}]"
    assert "F180" in broken("contactors:\n  - " + LONG.format(name="K", more=more) + "\n")[0]


def test_unsound_document_gives_no_devices():
    document, problems = read_table("relays: []\nrelays: []\n", "devices.yml")
    assert problems
    assert read_devices(document)[0] is None


def test_data_is_packaged():
    assert importlib.resources.files("specgen.catalogue").joinpath("data", "contactors.yml").is_file()
