"""Stuck outputs, limiters and cold starts by hand and against the differential equation."""

from math import exp, inf, log

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from specgen.process.box_of import box_of
from specgen.process.fault_cases import limiter_case, settles_at, time_to_reach, warm_up
from specgen.process.faults import coasts_to, limiter_acts_at, warm_up_time

PLANT = {
    "balance": {
        "bodies": [
            {"what": "air", "mass": "60 kg", "specific_heat": "0.6 kJ/(kg K)", "follows": "fast"},
            {"what": "herbs", "mass": "0 kg to 20 kg", "specific_heat": "3 kJ/(kg K)", "follows": "slow"},
        ],
        "loss": "60 W/K to 100 W/K",
        "surroundings": "8 degC to 30 degC",
        "load": "0 W to 500 W",
        "dead_time": "25 s",
        "lag": "40 s",
    }
}


def cabinet(make):
    return box_of(make.loop(make.warm, plant=PLANT), make.panel())


def test_settling_by_hand(make):
    """Stuck on at 1.21 x 9 kW, 60 W/K and 30 degC; stuck off with 500 W at 60 W/K and 8 degC."""
    box = cabinet(make)
    assert settles_at(box, "on", "highest").value == pytest.approx(30 + 10890 / 60)
    assert settles_at(box, "off", "lowest").value == pytest.approx(8 - 500 / 60)
    assert settles_at(box, "off", "highest").value == pytest.approx(30)
    assert "supply +10" in settles_at(box, "on", "highest").text


def test_time_to_danger_by_hand(make):
    """From 83 to 95 on the way to 211.5 with 36 kJ/K and 60 W/K: the earliest case."""
    found = time_to_reach(cabinet(make), "on", 83, 95)
    assert found.value == pytest.approx(600 * log((211.5 - 83) / (211.5 - 95)))
    assert time_to_reach(cabinet(make), "on", 83, 215).value == inf


def test_time_down_by_hand(make):
    """From 40 down to 35 in 8 degC with 500 W of load: the larger loss is the faster; without slow bodies and with them alike."""
    end = 8 - 500 / 100
    found = time_to_reach(cabinet(make), "off", 40, 35)
    assert found.value == pytest.approx(360 * log((40 - end) / (35 - end)))
    assert found.value <= time_to_reach(cabinet(make), "off", 40, 35, whole=True).value


def test_rates_say_when_and_not_where(make):
    """Distance over speed; the danger counts as reached."""
    plant = {"rates": {"with_output": "2 K/min to 3 K/min", "without_output": "0.4 K/min to 0.9 K/min", "dead_time": "25 s"}}
    box = box_of(make.loop(make.warm, plant=plant), make.panel())
    assert settles_at(box, "on", "highest") is None
    fastest = (1.21 * (3 + 0.9) - 0.9) / 60
    assert time_to_reach(box, "on", 66, 95).value == pytest.approx(29 / fastest)
    assert time_to_reach(box, "off", 64, 40).value == pytest.approx(24 / (0.9 / 60))
    assert warm_up(box, 1.0) is None


def test_cooler_stuck_on_goes_down(make):
    form = {"heat_capacity": "600 kJ/K", "loss": "60 W/K", "surroundings": "25 degC to 35 degC", "load": "1 kW", "dead_time": "60 s"}
    plant = {"balance": form}
    box = box_of(make.loop(make.cold, plant=plant), make.panel())
    low = 25 + 1000 / 60 - 7000 / 60
    assert settles_at(box, "on", "lowest").value == pytest.approx(low)
    assert time_to_reach(box, "on", 3, 2).value == pytest.approx(10000 * log((3 - low) / (2 - low)))
    assert settles_at(box, "off", "highest").value == pytest.approx(35 + 1000 / 60)


def test_limiter_by_hand(make):
    """At 88 degC on the way to 211.5 with 600 s: 0.2058 K/s, seen 20 s late."""
    found = limiter_case(cabinet(make), 88, 20)
    assert found.acts_at == pytest.approx(88 + 20 * (211.5 - 88) / 600, rel=1e-6)
    assert found.peaks_at > found.acts_at


@settings(max_examples=25, deadline=None)
@given(tau=st.floats(100, 2000), lag=st.floats(0.05, 0.5), end=st.floats(120, 400))
def test_limiter_against_the_differential_equation(tau, lag, end):
    """A sensor that was level with the value long before trails it as the formula says; where its lag nears tau, by less."""
    sensor_lag, start, at = lag * tau, -2000.0, 88.0
    done = solve_ivp(
        lambda _t, y: [(end - y[0]) / tau, (y[0] - y[1]) / sensor_lag], (0, 50 * tau), [start, start], rtol=1e-10, atol=1e-9,
        events=lambda _t, y: y[1] - at,
    )  # fmt: skip
    seen = done.y_events[0][0][0]
    wanted = limiter_acts_at(at, (end - at) / tau, sensor_lag)
    assert seen <= wanted * (1 + 1e-6)
    if lag < 0.2:
        assert seen == pytest.approx(wanted, rel=2e-2)


@pytest.mark.parametrize(("tau", "lag", "theta"), [(600, 40, 30), (600, 0, 30), (600, 600, 0), (inf, 40, 30), (inf, 0, 30)])
def test_coasting_against_the_differential_equation(tau, lag, theta):
    end, rest = (160, 20) if tau < inf else (0.2, -0.05)

    def right(_t, y, off):
        drive = y[0] if lag else (rest if off else end)
        return [((rest if off else end) - y[0]) / lag if lag else 0.0, (drive - y[1]) / tau if tau < inf else drive]

    def turn(_t, y):
        return right(_t, y, off=True)[1]

    first = solve_ivp(lambda t, y: right(t, y, off=False), (0, max(theta, 1e-9)), [end, 90], rtol=1e-10, atol=1e-10)
    second = solve_ivp(lambda t, y: right(t, y, off=True), (0, 3000), first.y[:, -1], rtol=1e-10, atol=1e-10, events=turn)
    tops = [first.y[1, -1], second.y[1, 0], *(y[1] for y in second.y_events[0])]
    assert coasts_to(90, end, rest, tau, theta, lag) == pytest.approx(max(tops), rel=1e-7)


@settings(max_examples=25, deadline=None)
@given(
    tau=st.floats(100, 3000),
    lag=st.one_of(st.just(0.0), st.floats(0.05, 1)),
    theta=st.floats(0, 100),
    end=st.floats(70, 300),
    rest=st.floats(-20, 18),
)
def test_warm_up_against_the_differential_equation(tau, lag, theta, end, rest):
    lag *= tau

    def right(_t, y):
        drive = y[0] if lag else end
        return [(end - y[0]) / lag if lag else 0.0, (drive - y[1]) / tau]

    begin = rest + (20 - rest) * exp(-theta / tau)
    done = solve_ivp(right, (0, 100 * tau), [rest, begin], rtol=1e-10, atol=1e-10, events=lambda _t, y: y[1] - 64)
    wanted = theta + done.t_events[0][0]
    assert warm_up_time(20, 64, end, rest, (tau, lag), theta) == pytest.approx(wanted, rel=1e-6)


def test_warm_up_of_a_box(make):
    """Lowest supply 7.29 kW less 500 W at 100 W/K ends at 75.9: 80 less 1.5 is not reached, 80 less 10 is."""
    box = cabinet(make)
    assert warm_up(box, 1.5).value == inf
    found = warm_up(box, 10)
    tau = (36000 + 60000) / 100
    least = 25 + tau * log((75.9 - 8) / (75.9 - 70))
    assert least < found.value < least + 3 * 40
    assert found.text.startswith("supply \u221210")


@pytest.mark.parametrize(("start", "expected"), [(64.0, 0.0), (63.99, None)])
def test_already_warm(start, expected):
    found = warm_up_time(start, 64, 160, 20, (600.0,), 0.0)
    assert found == expected if expected is not None else 0 < found < 1
