"""The demo panel: every loop decided as an engineer would decide it by hand, for the reasons written beside it."""

from functools import cache
from math import exp, inf, log
from pathlib import Path

import pytest

from specgen.design.project import load_design
from specgen.model.traits import TRAITS
from specgen.process.box import Unmodelled
from specgen.sizing.settings import OnOffSettings, ProportionedSettings

ROOT = Path(__file__).parents[2]


@cache
def design():
    return load_design(ROOT)


def loop(tag):
    return next(decided for decided in design().loops if decided.tag == tag)


# What is expected and why; rules in brackets. Worked out by hand before the program could run.
EXPECTED = {
    "TIC-101": ("time_proportioned", "ssr", "meets"),  # 25 s at 0.24 K/s is 6 K of 1.5 K [M5]; a contactor's cycle would be 10 s [C3]
    "TIC-102": ("time_proportioned", "ssr", "meets"),  # as TIC-101
    "TIC-103": ("analogue", "signal", "meets"),  # burner with an input [M2]
    "TIC-104": ("analogue", "power_controller", "meets"),  # lamps [M8]
    "MIC-105": ("analogue", "signal", "meets"),  # fan on a drive [M2]
    "TIC-106": ("on_off", "contactor", "meets"),  # fan on the mains [M7]
    "TIC-201": ("time_proportioned", "ssr", "meets"),  # 45 s at 0.023 K/s and 12 s of sensor lag with 0.5 K of error is over 1.6 K [M5]
    "TIC-202": ("time_proportioned", "contactor", "deviates"),  # the designer keeps a contactor that wears out in a year [C3]
    "TIC-203": ("analogue", "signal", "meets"),  # valve with an input [M2]
    "FIC-204": ("analogue", "signal", "deviates"),  # pump on a drive that holds its speed when the measurement fails [A4]
    "LIC-205": ("on_off", "contactor", "meets"),  # pump on the mains [M7]
    "TIC-301": ("three_point", "relay_pair", "meets"),  # valve that travels [M4]
    "TIC-302": ("on_off", "relay", "meets"),  # relaxed, and on-off fits [M6]; 24 V d.c. coil: no contactor, no a.c. solid state
    "TIC-303": ("analogue", "power_controller", "meets"),  # transformer [M8]
    "TIC-304": ("analogue", "signal", "meets"),  # steam valve with an input [M2]
    "TIC-305": ("analogue", "power_controller", "open"),  # no plant
    "TIC-306": ("time_proportioned", "contactor", "meets"),  # steady [M6]; 120 s lasts ten years of one shift [C3, C8]
    "TIC-401": ("on_off", "contactor", "meets"),  # compressor [M1]
    "TIC-402": ("on_off", "relay", "meets"),  # relaxed, and on-off fits [M6]; 9.6 A is within a 16 A relay
    "TIC-403": ("analogue", "signal", "meets"),  # compressor on a drive [M2]
    "TIC-501": ("on_off", "relay", "meets"),  # two-stage burner [M7, M11]; its control circuit is within a relay
    "PIC-502": ("on_off", "relay", "meets"),  # burner [M7]; its control circuit of 2 A is within a 16 A relay
    "PIC-503": ("on_off", "contactor", "meets"),  # compressor [M1]
    "LIC-504": ("on_off", "relay", "meets"),  # as TIC-302
    "TIC-601": ("analogue", "power_controller", "meets"),  # silicon carbide [M8]
    "TIC-602": ("analogue", "power_controller", "meets"),  # molybdenum disilicide [M8]
    "TIC-603": ("on_off", "relay", "meets"),  # relaxed, and on-off fits [M6]
}


def test_the_whole_demo_is_read():
    assert not design().problems
    assert {decided.tag for decided in design().loops} == set(EXPECTED)


@pytest.mark.parametrize("tag", EXPECTED)
def test_decided_as_by_hand(tag):
    decided = loop(tag)
    candidate = decided.decision.chosen.case.candidate
    assert (candidate.mode, candidate.device, decided.verdict) == EXPECTED[tag]


def test_it_shows_every_kind_of_element_form_and_quantity():
    loops = [decided.loop for decided in design().loops]
    kinds = {f"{one.element.kind} {stages}" if (stages := getattr(one.element, "stages", None)) else one.element.kind for one in loops}
    assert kinds == set(TRAITS)
    assert {one.plant.form if one.plant else None for one in loops} == {"balance", "response", "rates", None}
    assert {one.need.quantity for one in loops} == {"temperature", "humidity", "pressure", "level", "flow"}
    assert len({decided.read.file for decided in design().loops}) >= 4
    bodies = [one.acts_on for one in loops if one.acts_on]
    assert len(bodies) > len(set(bodies))
    assert any(decided.read.inherited for decided in design().loops)


def test_what_is_open_is_only_the_loop_without_a_plant():
    decided = loop("TIC-305")
    missing = {missing.field for missing in decided.missing if missing.settles}
    assert "plant" in missing
    assert all(field == "plant" or field.startswith("sensor.") for field in missing)


def test_only_what_the_designer_wanted_is_overridden():
    overridden = {decided.tag: {f.rule for f in decided.findings if f.outcome == "overridden"} for decided in design().loops}
    assert {tag for tag, rules in overridden.items() if rules} == {"TIC-202"}
    assert "C3" in overridden["TIC-202"]
    broken = {(d.tag, f.rule) for d in design().loops for f in d.findings if f.outcome == "broken" and f.weight == "should"}
    assert broken == {("FIC-204", "A4")}


# Duty at both ends by hand: 0.81 and 1.21 are the squares of 90 and 110 percent of the supply. A heater rated at 230 V stands between a
# line and the neutral of 400 V, which is 230.94 V.
TO_NEUTRAL = (400 / 3**0.5 / 230) ** 2
DUTIES = {
    "TIC-101": ((60.4 * (40 - 30) + 200) / (1.21 * 7500), (60.4 * (80 - 8) + 1000) / (0.81 * 7500)),
    "TIC-102": ((60.4 * (35 - 30) + 200) / (1.21 * 6000), (60.4 * (60 - 8) + 1000) / (0.81 * 6000)),
    "TIC-103": ((60 - 30) / 110, (80 - 8) / 110),
    "TIC-104": ((50 - 35) / (1.21 * 90), (60 - 15) / (0.81 * 90)),
    "MIC-105": ((66 - 55) / 35, (82 - 55) / 35),
    "TIC-106": ((31 - 30) / 9, (36 - 30) / 9),
    "TIC-201": ((144 * (90 - 30) + 500) / (1.21 * 24000), (144 * (97 - 15) + 2000) / (0.81 * 24000)),
    "TIC-203": ((58 - 32) / 60, (75 - 32) / 60),
    "FIC-204": (8 / 18, 15 / 18),
    "LIC-205": (1 / (1 + 6), 3 / (3 + 3)),
    "TIC-301": ((50 - 25) / 60, (60 - 15) / 60),
    "TIC-302": ((24 - 18) / 20, (30 - 18) / 20),
    "TIC-303": ((55 - 30) / (1.21 * 120), (65 - 10) / (0.81 * 120)),
    "TIC-304": ((65 - 25) / 90, (75 - 15) / 90),
    "TIC-306": ((90 * (40 - 28) + 200) / (1.21 * 9000), (90 * (50 - 12) + 1000) / (0.81 * 9000)),
    "TIC-401": ((120 * (10 - 5) + 300) / 7000, (120 * (32 - 5) + 800) / 7000),
    "TIC-402": ((40 * (1 + 6)) / (1.21 * TO_NEUTRAL * 2000), (40 * (1 + 18) + 300) / (0.81 * TO_NEUTRAL * 2000)),
    "TIC-403": ((10 + 2) / 30, (22 + 2) / 30),
    "TIC-501": (500 * (80 - 30) / 200e3, 2400 * (80 - 15) / 200e3),
    "PIC-502": (0.1 / 0.3, 0.2 / 0.3),
    "PIC-503": (0.1 / 0.5, 0.37 / 0.5),
    "LIC-504": (0.1 / 0.9, 0.4 / 0.8),
    "TIC-601": ((550 - 28) / (1.21 * 900), (650 - 18) / (0.81 * 900)),
    "TIC-602": (12 / (1.21 * 37), 20 / (0.81 * 35)),
    "TIC-603": (10 * (35 - 25) / (1.21 * TO_NEUTRAL * 600), (10 * (35 - 18) + 100) / (0.81 * TO_NEUTRAL * 600)),
}


@pytest.mark.parametrize("tag", DUTIES)
def test_duty_at_both_ends(tag):
    box = loop(tag).box
    assert not isinstance(box, Unmodelled)
    low, high = DUTIES[tag]
    assert box.duty_low[0] == pytest.approx(low, rel=1e-6)
    assert box.duty_high[0] == pytest.approx(high, rel=1e-6)
    assert 0.04 < low < high < 0.91


def cycle(rise, fall, tau, theta, d):
    """Limit cycle about the setpoint with a centred differential: up, down, time on, time off (methods, section 3)."""
    if tau == inf:
        up, down = d / 2 + rise * theta, d / 2 + fall * theta
        return up, down, (up + down) / rise, (up + down) / fall
    q = 1 - exp(-theta / tau)
    up, down = d / 2 + (rise - d / 2) * q, d / 2 + (fall - d / 2) * q
    return up, down, theta + tau * log(1 + (d / 2 + down) / (rise - d / 2)), theta + tau * log(1 + (d / 2 + up) / (fall - d / 2))


# Where switching is fastest, by hand: rise, fall [K or share or Pa], tau, theta of the case with the output on half of the time
# (of a rates plant: both rates at their largest). The sensor's lag is counted as dead time, which is right to a few percent.
FASTEST = {
    "TIC-106": (4.5, 4.5, 1500, 60 + 40, 10),
    "LIC-205": (0.06 / 60, 0.03 / 60, inf, 2 + 1, 10),
    "TIC-401": (7000 / 120 / 2, 7000 / 120 / 2, 7500, 40 + 30, 6),
    "TIC-501": (200e3 / 500 / 2, 200e3 / 500 / 2, 5.445e6 / 500, 30 + 15, 6),
    "PIC-502": (0.2e5 / 60, 0.2e5 / 60, inf, 5 + 0.5, 10),
    "PIC-503": (0.4e5 / 60, 0.37e5 / 60, inf, 1 + 0.5, 10),
}


@pytest.mark.parametrize("tag", FASTEST)
def test_starts_of_machines_by_hand(tag):
    settings = loop(tag).decision.chosen.case.settings
    assert isinstance(settings, OnOffSettings)
    rise, fall, tau, theta, allowed = FASTEST[tag]
    _, _, on, off = cycle(rise, fall, tau, theta, settings.differential)
    by_hand = 3600 / (on + off)
    assert settings.enforced.starts_per_hour.value == pytest.approx(by_hand, rel=0.05)
    assert settings.starts_per_hour <= allowed


def test_operations_a_year_of_the_macerating_vessel():
    """A cycle of 120 s over 8 h on 250 days: 60 000 makes and breaks a year; ten years are 600 000."""
    settings = loop("TIC-306").decision.chosen.case.settings
    assert isinstance(settings, ProportionedSettings)
    assert settings.cycle_time == 120
    assert settings.operations_per_year == pytest.approx(8 * 3600 * 250 / 120)
    assert settings.contact_life > 10


def test_heat_and_cold_in_one_room_are_never_on_together():
    """By hand: cooling ends above 5 - 1.5 degC and frost heating below 1 + 1.1 degC, so at least a kelvin lies between them."""
    cooling, heating = (loop(tag).decision.chosen.case.settings for tag in ("TIC-401", "TIC-402"))
    lowest = 5 - cooling.enforced.below.value
    highest = 1 + heating.enforced.above.value
    assert lowest - highest > 1


def test_limiters_are_clear_of_running_and_short_of_danger():
    for decided in design().loops:
        limiter = decided.loop.limits.limiter
        if limiter is not None:
            finding = next(f for f in decided.findings if f.rule == "S1")
            assert finding.outcome == "holds", decided.tag
