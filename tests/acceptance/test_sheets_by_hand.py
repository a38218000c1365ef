"""Three sheets worked by hand: every figure of the record again from first principles, the worst case by brute force over a dense grid."""

from math import exp, hypot, log

import numpy as np
import pytest

GRID = 4001
CLOSE = 1e-3
HOURS = 16 * 250  # the panel's default duty

COLD = """tag: TIC-1
service: Cold room
need: {quantity: temperature, direction: lower, setpoint: 6 degC, range: 4 degC to 8 degC, tolerance: 4 K, stability: relaxed}
plant: {response: {change: 25 K, time_constant: 60 min, dead_time: 40 s, rest_value: 14 degC to 20 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K}
element: {kind: fixed_speed_compressor, current: 5 A, voltage: 400 V, phases: 3, min_run: 180 s, min_rest: 180 s, starts_per_hour: 6}
limits: {consequence: product, on_sensor_fault: off, after_power_return: resume, danger_low: -2 degC, spoils_high: 12 degC}
"""
OVEN = """tag: TIC-2
service: Oven
need: {quantity: temperature, direction: raise, setpoint: 80 degC, range: 60 degC to 90 degC, tolerance: 2.5 K}
plant: {response: {change: 150 K, time_constant: 30 min, dead_time: 30 s, rest_value: 15 degC to 25 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: [airflow]}
limits: {danger_high: 130 degC, consequence: product, on_sensor_fault: off, after_power_return: resume, spoils_high: 100 degC}
choose: {%s}
"""


def error_of(at):
    """Return the measuring error: class A (IEC 60751), the typical input of the catalogue, half a step."""
    return hypot(0.15 + 0.002 * abs(at), 0.3 + 0.001 * abs(at), 0.05)


def agree(row, **expected):
    for name, value in expected.items():
        assert row[name] == pytest.approx(value, rel=CLOSE, abs=1e-9), name


class Cold:
    """The cold room mirrored: what cools counts upwards from the setpoint."""

    tau, theta, change = 3600.0, 40.0, 25.0

    def __init__(self):
        # gap from setpoint up to where it rests: only that matters, and it runs from 14 - 8 to 20 - 4
        self.gap = np.linspace(14 - 8, 20 - 4, GRID)
        self.rise = self.change - self.gap

    def cycle(self, d):
        high, low = d / 2, -d / 2
        q = 1 - exp(-self.theta / self.tau)
        peak = high + (self.rise - high) * q
        trough = low - (low + self.gap) * q
        on = self.theta + self.tau * np.log(1 + (high - trough) / (self.rise - high))
        off = self.theta + self.tau * np.log(1 + (peak - low) / (low + self.gap))
        return peak, trough, on, off

    def least(self, keeps):
        """Return the least differential that keeps something over the whole grid, by halving."""
        narrow, wide = 1e-6, 10.0
        for _ in range(60):
            middle = (narrow + wide) / 2
            narrow, wide = (narrow, middle) if keeps(middle) else (middle, wide)
        return wide


def test_an_on_off_sheet(make):
    row, room = make.record(COLD), Cold()
    assert (row["mode"], row["output"]["device"], row["action"], row["verdict"]) == ("on_off", "contactor", "direct", "meets")
    settings, predicted = row["settings"], row["predicted"]
    error = error_of(8)
    agree(predicted, measuring_error=error)

    # the window: D1 and D2, starts (D3), life (D5), least run and rest (D6) against the tolerance (D4)
    lasts = predicted["contact_life"] * predicted["operations_per_year"]  # operations, from the device's data
    least = max(
        0.1, 2 * 0.1,
        room.least(lambda d: (room.cycle(d)[2] + room.cycle(d)[3]).min() >= 3600 / 6),
        room.least(lambda d: (room.cycle(d)[2] + room.cycle(d)[3]).min() >= 3600 * 10 * HOURS / lasts),
        room.least(lambda d: room.cycle(d)[2].min() >= 180),
        room.least(lambda d: room.cycle(d)[3].min() >= 180),
    )  # fmt: skip
    most = room.least(lambda d: max(room.cycle(d)[0].max(), -room.cycle(d)[1].min()) > 4 - error)
    chosen = 0.2 * round((least * most) ** 0.5 / 0.2)
    assert least < chosen < most
    agree(settings, differential=chosen, minimum_on=180, minimum_off=180)
    assert settings["placement"] == "centred"

    peak, trough, on, off = room.cycle(chosen)
    period = (on + off).min()
    agree(
        predicted, above=-trough.min(), below=peak.max(), swing=(peak - trough).max(), switch_on=6 + chosen / 2, switch_off=6 - chosen / 2,
        period=period, starts_per_hour=3600 / period, shortest_on=on.min(), shortest_off=off.min(),
        operations_per_year=3600 / period * HOURS, duty_low=6 / 25, duty_high=16 / 25,
    )  # fmt: skip
    # from the warmest rest to the near edge of the band at the lowest setpoint
    agree(predicted, time_to_band=40 + 3600 * log(25 / (25 - (20 - 4 - 4))))

    stuck_on, stuck_off = row["faults"]["stuck_on"], row["faults"]["stuck_off"]
    coldest, warmest = 4 - peak.max(), 8 - trough.min()
    agree(stuck_on, settles_at=14 - 25, time_to_danger=3600 * log((coldest + 11) / (-2 + 11)))
    agree(stuck_off, settles_at=20, time_to_spoil=3600 * log((20 - warmest) / (20 - 12)))
    assert "time_to_danger" not in stuck_off
    assert {(p["at"], p["unit"]) for p in row["inject"]} == {(-2, "ohm"), (4, "ohm"), (6, "ohm"), (8, "ohm")}


class Oven:
    """The oven over setpoint, rest value and the square of the supply."""

    tau, theta = 1800.0, 30.0

    def __init__(self):
        axes = np.meshgrid(150 * np.linspace(0.9, 1.1, 101) ** 2, np.linspace(60 - 25, 90 - 15, 1001))
        self.span, self.gap = (axis.ravel() for axis in axes)
        self.duty = self.gap / self.span

    def ripple(self, cycle):
        """Return how far the value leaves its mean above and below."""
        x, a = self.duty, cycle / self.tau
        peak = self.span * (1 - np.exp(-x * a)) / (1 - exp(-a))
        trough = peak * np.exp(-(1 - x) * a)
        mean = self.span * x
        return peak - mean, mean - trough


def test_a_time_proportioned_sheet(make):
    row, oven = make.record(OVEN % "mode: time_proportioned, output: contactor, because: Worked by hand."), Oven()
    assert (row["mode"], row["output"]["device"]) == ("time_proportioned", "contactor")
    assert (row["action"], row["verdict"]) == ("reverse", "deviates")
    settings, predicted = row["settings"], row["predicted"]
    low, high = 35 / (150 * 1.21), 75 / (150 * 0.81)
    agree(predicted, duty_low=low, duty_high=high, measuring_error=error_of(90))

    # C8: half of the delay, half a scan of 0.25 s in it, over the highest duty; C1: a quarter of the tolerance
    delay = 30 + 0.125
    longest = delay / 2 / max(high, 0.5)
    series = (1, 2, 3, 5, 8, 10, 15, 20, 30, 45, 60, 90, 120, 180, 240, 300)
    allowed = [t for t in series if t <= longest and max(side.max() for side in oven.ripple(t)) <= 0.25 * 2.5]
    cycle = allowed[-1]
    agree(settings, cycle_time=cycle)
    above, below = oven.ripple(cycle)
    agree(predicted, above=above.max(), below=below.max(), swing=(above + below).max())
    agree(predicted, shortest_on=min(low, 0.05) * cycle, shortest_off=0.05 * cycle, operations_per_year=HOURS * 3600 / cycle)

    # SIMC at the steepest case: +10 percent supply
    effective = delay + cycle * max(high, 0.5)
    agree(settings, proportional_band=150 * 1.21 / 1800 * 2 * effective, integral_time=min(1800, 8 * effective))

    stuck = row["faults"]["stuck_on"]
    hottest = 90 + max(above.max(), predicted["overshoot"])
    end = 25 + 150 * 1.21
    agree(stuck, settles_at=end, time_to_danger=1800 * log((end - hottest) / (end - 130)),
          time_to_spoil=1800 * log((end - hottest) / (end - 100)))  # fmt: skip
    agree(row["faults"]["stuck_off"], settles_at=15)
    # the limiter's own sensor: at least 20 s behind a value that rises from its set value towards the end
    limiter = row["limiter"]
    agree(limiter, sensor_lag=20, acts_at=limiter["set"] + 20 * (end - limiter["set"]) / 1800)
    assert hottest < limiter["set"] < limiter["acts_at"] < 130


def test_start_up_of_the_time_proportioned_sheet(make):
    """The latched loop in steps of a hundredth of a second, from rest; the controller does not integrate at an end of its output."""
    row = make.record(OVEN % "mode: time_proportioned, output: contactor, because: Worked by hand.")
    settings = row["settings"]
    gain, reset, cycle = 1 / settings["proportional_band"], settings["integral_time"], settings["cycle_time"]
    reach = []
    for span, rest, setpoint in ((150 * 0.81, 15.0, 90.0), (150 * 1.21, 25.0, 60.0)):
        value, integral, duty = rest, 0.0, 0.0
        step, delay = 0.05, 30.125
        pipe, outside, highest = [0.0] * round(delay / step), 0.0, rest
        decay = exp(-step / 1800)
        for index in range(round(6000 / step)):
            now = index * step
            if index % round(cycle / step) == 0:
                wanted = gain * (setpoint - value) + integral
                duty = min(max(wanted, 0.0), 1.0)
                if wanted == duty:
                    integral += gain / reset * (setpoint - value) * cycle
            place = index % len(pipe)
            arrived, pipe[place] = pipe[place], 1.0 if now % cycle < duty * cycle else 0.0
            end = rest + span * arrived
            value = end + (value - end) * decay
            highest = max(highest, value)
            outside = now if abs(value - setpoint) > 2.5 else outside
        reach.append((outside, highest - setpoint))
    assert row["predicted"]["time_to_band"] == pytest.approx(max(time for time, _ in reach), rel=0.02)
    assert row["predicted"]["overshoot"] == pytest.approx(max(0.0, *(over for _, over in reach)), abs=0.1)


def test_an_analogue_sheet(make):
    """Margins by a dense walk along the frequency axis, at the steepest and the laziest supply."""
    row = make.record(OVEN % "mode: analogue, output: power_controller, because: Worked by hand.")
    settings, predicted = row["settings"], row["predicted"]
    assert (row["mode"], row["verdict"], settings["signal"]) == ("analogue", "meets", "4-20 mA")
    delay = 30 + 0.125
    agree(settings, proportional_band=150 * 1.21 / 1800 * 2 * delay, integral_time=8 * delay)
    w = np.geomspace(1e-5, 0.2, 2_000_001)
    s = 1j * w
    margins = []
    for supply in (0.81, 1.21):
        controller = (1 + 1 / (settings["integral_time"] * s)) / settings["proportional_band"]
        loop = controller * 150 * supply / (1800 * s + 1) * np.exp(-delay * s)
        phase = np.unwrap(np.angle(loop))
        crossing = np.argmax(phase < -np.pi)
        unity = np.argmax(np.abs(loop) < 1)
        margins.append((1 / abs(loop[crossing]), 180 + np.degrees(phase[unity]), np.abs(1 / (1 + loop)).max()))
    agree(predicted, gain_margin=min(m[0] for m in margins), phase_margin=min(m[1] for m in margins),
          peak_sensitivity=max(m[2] for m in margins))  # fmt: skip
