"""Valves by hand: the textbook's Kv, authority, openings by the written-out characteristics, and what is said where fields are missing."""

from math import log, sqrt

import pytest

from specgen.core.quantity import Quantity
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.process.box_of import box_of
from specgen.sizing.candidate import Candidate, Unsized
from specgen.sizing.continuous import continuous_settings, three_point_settings
from specgen.sizing.device import DeviceChoice
from specgen.sizing.valve_flow import needed_kv
from specgen.sizing.valve_sizing import valve_sizing
from specgen.source.read import read_text

LOOP = """
tag: TIC-1
service: condenser
need: {quantity: temperature, direction: lower, setpoint: 32 degC, tolerance: 3 K}
plant: {response: {change: 60 K, time_constant: 75 s, dead_time: 6 s, rest_value: %(rest)s}}
sensor: {kind: pt100, step: 0.1 K}
element: {kind: modulating_valve, signal: 4-20 mA, stroke_time: 15 s, %(element)s}
"""
WATER = {
    "kvs": "6.3 m3/h", "characteristic": "equal_percentage", "rangeability": "50", "medium": "water", "density": "1000 kg/m3",
    "flow": "4 m3/h", "inlet_pressure": "3.5 bar", "outlet_pressure": "2 bar", "medium_temperature": "15 degC",
}  # fmt: skip
STEAM = {
    "kvs": "4 m3/h", "characteristic": "equal_percentage", "rangeability": "50", "medium": "steam", "density": "2.16 kg/m3",
    "flow": "100 kg/h", "inlet_pressure": "3 bar", "outlet_pressure": "1 bar", "medium_temperature": "143 degC",
}  # fmt: skip
PANEL = {
    "panel": {"reference": "P", "title": "V", "revision": "A", "status": "for review", "date": "2026-01-01"},
    "supply": {"voltage": "400 V", "phases": "3", "frequency": "50 Hz"},
    "enclosure": {"height": "1800 mm", "width": "800 mm", "depth": "400 mm", "ambient": "5 degC to 35 degC"},
}
# 32 degC against 58 to 74 degC at 60 K of full output: duties of 26/60 and 42/60
LOW, HIGH = 26 / 60, 42 / 60


def made(base, rest="58 degC to 74 degC", **changes):
    fields = {name: value for name, value in {**base, **changes}.items() if value is not None}
    documents, problems = read_text(LOOP % {"rest": rest, "element": ", ".join(f"{k}: {v}" for k, v in fields.items())}, "loops/v.yml")
    reading = read_loops(documents)
    assert not problems
    assert not reading.problems, [problem.line() for problem in reading.problems]
    loop = reading.loops[0].loop
    panel, faults = read_model(Panel, PANEL)
    assert not faults
    return loop, panel, box_of(loop, panel)


def sized(base, rest="58 degC to 74 degC", **changes):
    loop, _, box = made(base, rest, **changes)
    return valve_sizing(loop, box)


def kv_of(base, **changes):
    return needed_kv(made(base, **changes)[0].element)


def travel(share, authority, rangeability=50.0):
    """An equal-percentage valve in pipes, written out anew: phi = sqrt(N/(1/q^2 - 1 + N)), h = 1 + ln phi/ln R."""
    return 1 + log(sqrt(authority / (1 / share**2 - 1 + authority))) / log(rangeability)


def test_water_by_the_textbooks_formula():
    """Kv = Q sqrt(rho/1000)/sqrt(dp): 4 m3/h over 1.5 bar; the library's own density of water moves it by less than 0.1 percent."""
    assert kv_of(WATER).high == pytest.approx(4 / sqrt(1.5), rel=1e-3)


def test_a_mass_of_water_by_its_density():
    """4 t/h at 800 kg/m3 are 5 m3/h: Kv = 5 sqrt(0.8)/sqrt(1.5)."""
    found = kv_of(WATER, flow="4 t/h", density="800 kg/m3")
    assert found.high == pytest.approx(5 * sqrt(0.8 / 1.5), rel=1e-3)


def test_steam_by_hand():
    """IEC 60534-2-1 with N6 = 31.6 (kg/h, bar, kg/m3), xT 0.72, F_gamma 1.31/1.4: W = N6 Kv Y sqrt(x p1 rho1)."""
    p1, p2 = 4.01325, 2.01325
    x = (p1 - p2) / p1
    y = 1 - x / (3 * (1.31 / 1.4) * 0.72)
    assert kv_of(STEAM).high == pytest.approx(100 / (31.6 * y * sqrt(x * p1 * 2.16)), rel=2e-3)


def test_air_by_volume_is_weighed_at_the_inlet():
    """100 m3/h at 7.01325 bar and 20 degC: rho = p M/(R T); the same mass asks for the same valve."""
    cold = {"inlet_pressure": "6 bar", "outlet_pressure": "5 bar", "medium_temperature": "20 degC"}
    air = {**STEAM, **cold, "medium": "air", "density": None}
    mass = 100 * 701325 * 28.96 / (8314.46 * 293.15)
    assert kv_of(air, flow="100 m3/h").high == pytest.approx(kv_of(air, flow=f"{mass:.6f} kg/h").high, rel=1e-6)


def test_ranges_count_with_the_end_that_asks_for_most():
    """Most: 5 m3/h over 3.2 - 2 bar; least: 3 m3/h over 3.5 - 1.8 bar."""
    found = kv_of(WATER, flow="3 m3/h to 5 m3/h", inlet_pressure="3.2 bar to 3.5 bar", outlet_pressure="1.8 bar to 2 bar")
    assert found.high == pytest.approx(5 / sqrt(1.2), rel=1e-3)
    assert found.low == pytest.approx(3 / sqrt(1.7), rel=1e-3)


def test_openings_in_the_pipes():
    """Kv 4/sqrt(1.5) of Kvs 6.3: authority (3.266/6.3)^2 = 0.2688; openings by the characteristic written out."""
    valve = sized(WATER)
    authority = (4 / sqrt(1.5) / 6.3) ** 2
    assert valve.authority == pytest.approx(authority, rel=2e-3)
    assert valve.is_installed
    assert valve.opening_low == pytest.approx(travel(LOW, authority), abs=1e-3)
    assert valve.opening_high == pytest.approx(travel(HIGH, authority), abs=1e-3)
    assert not valve.open_points


def test_the_lowest_flow_in_the_pipes():
    """phi = 1/50 at the bottom: q = phi/sqrt((1 - N) phi^2 + N), nearly twice 1/50 at this authority."""
    authority = (4 / sqrt(1.5) / 6.3) ** 2
    expected = 0.02 / sqrt((1 - authority) * 0.02**2 + authority)
    assert sized(WATER).lowest_flow == pytest.approx(expected, rel=2e-3)


def test_the_steepest_part_by_differences():
    """Between the two openings the slope of q(h), taken by differences, is nowhere above the factor and reaches it."""
    valve = sized(WATER)
    n = valve.authority

    def flow(h):
        phi = 50 ** (h - 1)
        return phi / sqrt((1 - n) * phi**2 + n)

    step = 1e-6
    span = [valve.opening_low + i * (valve.opening_high - valve.opening_low) / 2000 for i in range(2001)]
    assert valve.gain_factor == pytest.approx(max((flow(h + step) - flow(h - step)) / (2 * step) for h in span), rel=1e-4)
    assert valve.gain_factor > 1.5


def test_a_valve_too_small_is_open_beyond_its_travel():
    """Kvs 2.5 of 3.266 needed: at 70 percent of the flow 2.286 over all of the difference, 91 percent of Kvs; at full flow past 1."""
    valve = sized(WATER, kvs="2.5 m3/h")
    assert valve.authority > 1
    assert valve.opening_high == pytest.approx(1 + log(HIGH * 4 / sqrt(1.5) / 2.5) / log(50), abs=1e-3)
    assert sized(WATER, kvs="2 m3/h").opening_high > 1


def test_a_linear_valve():
    """phi is the travel: sqrt(N/(1/q^2 - 1 + N)); steepest at its lowest travel."""
    valve = sized(WATER, characteristic="linear")
    n = valve.authority
    assert valve.opening_high == pytest.approx(sqrt(n / (1 / HIGH**2 - 1 + n)), abs=1e-3)
    low = sqrt(n / (1 / LOW**2 - 1 + n))
    assert valve.gain_factor == pytest.approx(n / ((1 - n) * low**2 + n) ** 1.5, rel=1e-3)


def test_without_pressures_the_characteristic_alone():
    valve = sized(WATER, inlet_pressure=None)
    assert not valve.is_installed
    assert valve.opening_high == pytest.approx(1 + log(HIGH) / log(50), abs=1e-6)
    assert {path for point in valve.open_points for path in point.needs} == {"element.inlet_pressure"}


def test_without_a_characteristic_only_the_flow_coefficient():
    valve = sized(WATER, characteristic=None)
    assert (valve.opening_low, valve.opening_high, valve.gain_factor) == (None, None, 1.0)
    assert valve.kv == pytest.approx(4 / sqrt(1.5), rel=1e-3)
    assert any("element.characteristic" in point.needs for point in valve.open_points)


def test_a_mildest_case_without_flow_shuts_the_valve():
    valve = sized(WATER, rest="30 degC to 74 degC")
    assert valve.opening_low is None
    assert valve.opening_high == pytest.approx(travel(HIGH, valve.authority), abs=1e-3)


def test_no_case_that_needs_flow():
    valve = sized(WATER, rest="20 degC to 30 degC")
    assert valve.opening_high is None
    assert valve.gain_factor == 1.0


@pytest.mark.parametrize(
    ("base", "changes", "said"),
    [
        pytest.param(WATER, {"outlet_pressure": "4 bar"}, "no drop", id="uphill"),
        pytest.param(WATER, {"medium_temperature": "160 degC"}, "boils", id="boiling: 6.2 bar of vapour pressure at 4.5 bar"),
        pytest.param(WATER, {"medium": "brine", "density": None}, "density", id="brine of unknown density"),
        pytest.param(STEAM, {"medium_temperature": None}, "temperature", id="steam of unknown temperature"),
        pytest.param(WATER, {"medium": None, "flow": None}, "not declared", id="nothing known"),
    ],
)
def test_what_has_no_flow_coefficient_says_why(base, changes, said):
    found = kv_of(base, **changes)
    assert isinstance(found, Unsized)
    assert said in found.because
    assert found.needs


def test_no_other_element_is_sized():
    loop, _, box = made(WATER)
    other = loop.model_copy(update={"element": loop.element.model_construct(kind="fan")})
    assert valve_sizing(loop, box) is not None
    assert valve_sizing(other.model_copy(update={"element": object()}), box) is None


def test_the_steepest_gain_is_in_the_starting_values():
    """SIMC: the band of a valve 1.7 times as steep is 1.7 times as wide."""
    device = DeviceChoice("signal", "", "analogue", (), 0)
    bands = {}
    for name, changes in {"steep": {}, "plain": {"characteristic": None}}.items():
        loop, panel, box = made(WATER, **changes)
        settings = continuous_settings(Candidate("analogue", "signal"), loop, panel, box, device)
        bands[name] = settings.tuning.proportional_band
        if name == "steep":
            factor = settings.valve.gain_factor
            assert settings.opening_high == settings.valve.opening_high
    assert bands["steep"] == pytest.approx(factor * bands["plain"], rel=1e-9)


def test_pulses_of_a_three_point_valve():
    """Duties 26/60 to 42/60 once an hour there and back: 2 x 0.2667 of travel in steps of 0.5/120, each 0.5 s of a motor."""
    text = LOOP.replace("modulating_valve, signal: 4-20 mA, stroke_time: 15 s", "three_point_valve, travel_time: 120 s")
    documents, _ = read_text(text % {"rest": "58 degC to 74 degC", "element": "min_pulse: 0.5 s"}, "loops/v.yml")
    loop = read_loops(documents).loops[0].loop
    panel, _ = read_model(Panel, PANEL)
    settings = three_point_settings(loop, panel, box_of(loop, panel), DeviceChoice("pair", "", "relay_pair", (), 0))
    assert settings.pulses_per_hour == pytest.approx(2 * (HIGH - LOW) * 120 / 0.5)
    assert settings.motor_share == pytest.approx(2 * (HIGH - LOW) * 120 / 3600)
    assert isinstance(loop.element.travel_time, Quantity)


def test_cold_water_is_taken_where_density_and_temperature_are_not_declared():
    """998 kg/m3: 4 sqrt(0.998/1.5); both stand among the assumptions."""
    found = kv_of(WATER, density=None, medium_temperature=None)
    assert found.high == pytest.approx(4 * sqrt(0.998 / 1.5), rel=1e-3)
    assert {assumption.field for assumption in found.assumptions} == {"element.density", "element.medium_temperature"}
