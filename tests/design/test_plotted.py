"""Start-ups, trade-off and stuck output of decided loops of every kind: what is plotted is what the sheet states."""

import importlib.util
import pickle
from itertools import pairwise
from math import inf, isfinite
from pathlib import Path

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.decide import decide
from specgen.design.start_ups import start_ups
from specgen.design.stuck_on import stuck_on
from specgen.design.trade_off import differentials, trade_off
from specgen.model.loop import Choose
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.sizing.candidate import Unsized
from specgen.sizing.on_off import on_off_settings
from specgen.sizing.settings import OnOffSettings, ProportionedSettings
from specgen.sizing.time_proportioned import proportioned_settings
from specgen.source.read import read_text

_spec = importlib.util.spec_from_file_location("make_loops", Path(__file__).parents[1] / "benchmarks" / "make_loops.py")
make_loops = importlib.util.module_from_spec(_spec)
_spec.loader.exec_module(make_loops)

PANEL = read_model(Panel, read_text(make_loops.PANEL, "loops/panel.yml")[0][0].data)[0]
SUDDEN = """tag: TIC-9
service: Cabinet
need: {quantity: temperature, direction: raise, setpoint: 65 degC, range: 40 degC to 80 degC, tolerance: 1.5 K, sudden_load: 0.3 kW}
plant:
  balance:
    bodies: [{what: air, mass: 60 kg, specific_heat: 0.6 kJ/(kg K), follows: fast}]
    surfaces: [{what: panels, area: 60 m2, u_value: 1 W/(m2 K)}]
    surroundings: 8 degC to 30 degC
    load: 0.2 kW to 1 kW
    dead_time: 25 s
sensor: {kind: pt100, class: A, wires: 3, step: 0.1 K, noise: 0.1 K, lag: 8 s}
element: {kind: resistive_heater, power: 7.5 kW, voltage: 400 V, phases: 3, needs: [airflow], fill: mineral_insulated}
limits: {danger_high: 95 degC, consequence: fire, on_sensor_fault: off, after_power_return: off}
"""


def decide_text(text):
    loop, problems = decide(read_loops(read_text(text, "loops/a.yml")[0]).loops[0], PANEL, load_catalogue(None))
    assert not problems
    return loop


@pytest.fixture(scope="module")
def loops():
    """Return two loops of each kind, and one with a sudden load."""
    texts = [make_loops.loop_text(number, 7) for number in range(2 * len(make_loops.MAKERS))]
    return [decide_text(text) for text in (*texts, SUDDEN)]


def case_of(loop):
    return loop.decision.chosen.case


def drawn(loops, make):
    found = [(loop, make(loop)) for loop in loops]
    return [(loop, one) for loop, one in found if not isinstance(one, Unsized)]


def test_each_start_is_the_one_whose_figures_stand_on_the_sheet(loops):
    made = drawn(loops, lambda loop: start_ups(case_of(loop)))
    assert len(made) > len(loops) / 2
    assert {case_of(loop).candidate.mode for loop, _ in made} == {"on_off", "time_proportioned", "analogue", "three_point"}
    for loop, starts in made:
        settings = case_of(loop).settings
        last = (starts.slow or starts.lively).in_band
        if isinstance(settings, OnOffSettings):
            assert last == settings.warm_up
        else:
            assert starts.lively.highest == settings.tuning.overshoot
            assert last == settings.tuning.time_to_band


def test_a_start_enters_the_band_when_it_is_said_to_and_peaks_where_it_is_marked(loops):
    for loop, starts in drawn(loops, lambda loop: start_ups(case_of(loop))):
        for start in (starts.lively, starts.slow):
            if start is None:
                continue
            course = dict(zip(start.course.times, start.course.values, strict=True))
            assert list(start.course.times) == sorted(start.course.times), loop.tag
            if start.in_band is not None and start.every_body:
                edge = -starts.band.below
                before = max(t for t in course if t < start.in_band * (1 - 1e-9))
                after = min(t for t in course if t >= start.in_band * (1 - 1e-9))
                assert course[before] < edge <= course[after] + 1e-6 * starts.band.below, loop.tag
            elif start.in_band is not None:
                assert all(
                    -starts.band.below * 1.001 <= v + start.ripple and v <= starts.band.above * 1.001
                    for t, v in course.items() if t > start.in_band * (1 + 1e-9)
                ), loop.tag  # fmt: skip
            if start.highest:
                assert max(start.course.values) + start.ripple == pytest.approx(start.highest, rel=0.02, abs=1e-3), loop.tag


def test_a_coldest_case_that_full_output_does_not_bring_into_the_band_is_drawn_without_a_time():
    """60 W/K from 65 degC down to 8 with 1 kW of load takes 4.4 kW, at 80 degC 5.3 kW; 5 kW at -10 % supply is 4.05 kW."""
    loop = decide_text(SUDDEN.replace("power: 7.5 kW", "power: 5 kW"))
    starts = start_ups(case_of(loop))
    assert case_of(loop).settings.tuning.time_to_band is None
    assert starts.slow.in_band is None
    assert max(starts.slow.course.values) < -starts.band.below


def test_loops_without_plant_or_rest_say_why(loops):
    assert all(found.because for loop in loops for found in (start_ups(case_of(loop)),) if isinstance(found, Unsized))
    text = SUDDEN.split("plant:", 1)[0] + "sensor:" + SUDDEN.split("sensor:", 1)[1]
    bare = decide_text(text)
    for found in (start_ups(case_of(bare)), trade_off(case_of(bare)), stuck_on(bare)):
        assert isinstance(found, Unsized)
        assert "plant" in found.because


def test_the_choice_stands_with_the_figures_of_the_record(loops):
    made = drawn(loops, lambda loop: trade_off(case_of(loop)))
    assert {trade.setting for _, trade in made} == {"differential", "cycle time"}
    for loop, trade in made:
        case, chosen = case_of(loop), trade.choice
        settings, error = case.settings, case.error.root_sum
        if isinstance(settings, OnOffSettings):
            assert chosen.at == settings.differential
            assert chosen.above == settings.enforced.above.value + error
            assert chosen.below == settings.enforced.below.value + error
            assert chosen.operations_per_hour == settings.starts_per_hour
        else:
            load = settings.tuning.load_deviation or 0.0
            assert chosen.at == settings.cycle_time
            assert chosen.above == settings.ripple.above.value + (error + load)
            assert chosen.pulse == settings.shortest_on
        assert chosen.life == settings.contact_life


def chosen_with(case, **wish):
    """Size the chosen device anew with another setting."""
    own = case.loop.choose or Choose.model_construct(**dict.fromkeys(Choose.model_fields))
    loop = case.loop.model_copy(update={"choose": own.model_copy(update=wish)})
    if isinstance(case.settings, OnOffSettings):
        return on_off_settings(loop, case.panel, case.box, case.device, case.error)
    return proportioned_settings(case.candidate, loop, case.panel, case.box, case.device, case.error)


def test_every_setting_that_the_rules_allow_reads_as_if_it_had_been_chosen(loops):
    """The held cases are the worst ones: within 1 percent of sizing anew, at both ends of the window and outside it."""
    looked = 0
    for loop, trade in drawn(loops, lambda loop: trade_off(case_of(loop))):
        case = case_of(loop)
        if trade.window is None:
            continue
        for point in (trade.points[0], trade.points[len(trade.points) // 2], trade.points[-1]):
            looked += 1
            if trade.setting == "differential":
                sized = chosen_with(case, differential=point.at, placement=case.settings.placement)
                above, below, pulse = sized.enforced.above.value, sized.enforced.below.value, sized.natural.shortest_on.value
                assert point.operations_per_hour == pytest.approx(sized.starts_per_hour, rel=0.01), (loop.tag, point.at)
            else:
                sized = chosen_with(case, cycle_time=point.at)
                assert isinstance(sized, ProportionedSettings)
                load = sized.tuning.load_deviation or 0.0
                above, below, pulse = sized.ripple.above.value + load, sized.ripple.below.value + load, sized.shortest_on
            assert point.above == pytest.approx(above + case.error.root_sum, rel=0.01), (loop.tag, point.at)
            assert point.below == pytest.approx(below + case.error.root_sum, rel=0.01), (loop.tag, point.at)
            assert point.pulse == pytest.approx(pulse, rel=0.01), (loop.tag, point.at)
            if sized.contact_life is not None and isfinite(sized.contact_life):
                assert point.life == pytest.approx(sized.contact_life, rel=0.01)
    assert looked > 12


def test_a_wider_setting_never_switches_faster_and_wears_less(loops):
    for loop, trade in drawn(loops, lambda loop: trade_off(case_of(loop))):
        assert 5 <= len(trade.points) <= 17, loop.tag
        for narrow, wide in pairwise(trade.points):
            assert narrow.at < wide.at
            assert wide.operations_per_hour <= narrow.operations_per_hour * (1 + 1e-3), loop.tag
            if narrow.life is not None:
                assert wide.life >= narrow.life * (1 - 1e-3)


def test_what_counts_as_within_keeps_window_and_tolerance(loops):
    for _, trade in drawn(loops, lambda loop: trade_off(case_of(loop))):
        for point in trade.points:
            if point.within:
                assert trade.least * 0.999 <= point.at <= trade.most * 1.001
                assert point.above <= trade.allowed_above * 1.003
                assert point.below <= trade.allowed_below * 1.003


@pytest.mark.parametrize(
    ("chosen", "least", "most", "step"),
    [(1.2, 0.68, 1.98, 0.2), (0.1, 0.05, inf, 0.1), (3.8, 3.8, 0.0, 0.2), (118000.0, 110000.0, 126000.0, 1000.0)],
)
def test_differentials_are_on_the_step_few_and_hold_the_chosen(chosen, least, most, step):
    found = differentials(chosen, least, most, step)
    assert chosen in found
    assert len(found) <= 16
    assert list(found) == sorted(set(found))
    assert all(abs(value / step - round(value / step)) < 1e-6 for value in found)
    assert found[0] <= max(step, min(end for end in (chosen, least, most) if 0 < end < inf))


def test_a_stuck_output_reaches_the_danger_when_the_sheet_says(loops):
    made = drawn(loops, stuck_on)
    assert any(stuck.outward < 0 for _, stuck in made)
    for loop, stuck in made:
        course = dict(zip(stuck.course.times, stuck.course.values, strict=True))
        assert course[0.0] == pytest.approx(stuck.start)
        assert stuck.danger_time == case_of(loop).faults.on.time_to_danger
        if stuck.danger_time is not None:
            assert course[stuck.danger_time] == pytest.approx(stuck.danger, abs=1e-6 * abs(stuck.danger))
        if stuck.stopped is not None:
            stopped, up = stuck.stopped, stuck.outward
            assert (stopped.set, stopped.acts_at, stopped.peaks_at) == (loop.limiter.set, loop.limiter.acts_at, loop.limiter.peaks_at)
            assert stopped.before.values[-1] == pytest.approx(stopped.acts_at)
            assert stopped.after.values[0] == pytest.approx(stopped.acts_at)
            assert max(up * v for v in stopped.after.values) == pytest.approx(up * stopped.peaks_at, rel=1e-6)


def test_a_remembered_decision_is_plotted_the_same(loops):
    for loop in loops[:13]:
        again = pickle.loads(pickle.dumps(loop))  # noqa: S301  made a line before
        assert start_ups(case_of(again)) == start_ups(case_of(loop))
        assert trade_off(case_of(again)) == trade_off(case_of(loop))
        assert stuck_on(again) == stuck_on(loop)
