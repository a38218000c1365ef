"""``choose``: what it takes, what it sets aside, and what of it is of no use."""

import pytest

CONTACTOR = "\nchoose: {mode: time_proportioned, output: contactor%s}\n"


def outcome(row, code):
    return next(r for r in row["rules"] if r["rule"] == code)["outcome"]


def test_the_rules_own_choice_is_confirmed(make):
    free = make.record(make.steady)
    confirmed = make.record(make.steady + f"choose: {{mode: {free['mode']}, output: {free['output']['device']}}}\n")
    assert confirmed["because"] == free["because"]
    for key in ("verdict", "mode", "output", "settings", "predicted", "rules"):
        assert confirmed[key] == free[key], key


def test_mode_alone_is_enough(make):
    free = make.record(make.steady)
    made = make.record(make.steady + "choose: {mode: analogue}\n")
    assert (free["mode"], made["mode"], made["output"]["device"]) == ("time_proportioned", "analogue", "power_controller")
    assert made["verdict"] == "meets"
    assert made["because"].startswith("the designer chose it; the rules alone would take time-proportioned through a solid-state switch")
    ended = {(a["mode"], a["device"]): a["ruled_out_by"] for a in made["alternatives"]}
    assert ended["time_proportioned", "ssr"] == ["M13"]


def test_output_alone_takes_the_best_mode_for_it(make):
    made = make.record(make.relaxed + "choose: {output: ssr}\n")
    assert (made["mode"], made["output"]["device"]) == ("on_off", "ssr")


def test_a_recommendation_is_not_set_aside_without_a_reason(make):
    none, problems = make.decided(make.steady + CONTACTOR % "")
    assert none is None
    assert [p.code for p in problems] == ["L302"]
    assert "rule C3" in problems[0].text
    assert (problems[0].span.file, problems[0].span.line) == ("loops/loop.yml", 9)


def test_a_reason_makes_it_a_deviation(make):
    made = make.record(make.steady + CONTACTOR % ", because: Site keeps contactors only.")
    assert made["verdict"] == "deviates"
    assert made["because"] == "Site keeps contactors only."
    assert outcome(made, "C3") == "overridden"
    assert outcome(make.record(make.steady), "C3") == "holds"


def test_a_reason_never_overrides_a_must(make):
    made = make.record(make.compressor + "choose: {mode: time_proportioned, cycle_time: 200 s, because: Asked for.}\n")
    assert made["verdict"] == "held"
    assert outcome(made, "M1") == "broken"


def test_what_the_rules_would_break_too_is_not_set_aside(make):
    """A loop whose best candidate breaks a recommendation: choosing that very candidate needs no reason."""
    text = make.steady.replace("noise: 0.1 K", "noise: 0.1 K, lag: 30 min")  # I3: the lag is half of the time constant
    free = make.record(text)
    assert outcome(free, "I3") == "broken"
    confirmed = make.record(text + f"choose: {{mode: {free['mode']}, output: {free['output']['device']}}}\n")
    assert (confirmed["verdict"], outcome(confirmed, "I3")) == (free["verdict"], "broken")


@pytest.mark.parametrize(
    ("pair", "broken"),
    [
        ("mode: analogue, output: contactor", "M3"),
        ("mode: on_off, output: power_controller", "M3"),
        ("mode: three_point, output: ssr", "M4"),
    ],
)
def test_a_pair_that_nobody_wires_is_held_against_the_rules(make, pair, broken):
    made = make.record(make.steady + f"choose: {{{pair}, because: Test.}}\n")
    assert made["verdict"] == "held"
    assert outcome(made, broken) == "broken"


def test_a_relay_named_for_a_motor_is_held(make):
    made = make.record(make.compressor + "choose: {mode: on_off, output: relay}\n")
    assert made["verdict"] == "held"
    assert outcome(made, "O1") == "broken"


def test_an_output_alone_that_nobody_would_wire_is_a_problem(make):
    none, problems = make.decided(make.compressor + "choose: {output: relay}\n")
    assert none is None
    assert [p.code for p in problems] == ["L301"]


@pytest.mark.parametrize(
    ("setting", "key", "value"),
    [("cycle_time: 45 s", "cycle_time", 45.0), ("proportional_band: 8 K", "proportional_band", 8.0),
     ("integral_time: 10 min", "integral_time", 600.0), ("derivative_time: 20 s", "derivative_time", 20.0)],
)  # fmt: skip
def test_a_setting_takes_the_place_of_the_computed_one(make, setting, key, value):
    made = make.record(make.steady + f"choose: {{{setting}, because: Tried on site.}}\n")
    assert made["mode"] == "time_proportioned"
    assert made["settings"][key] == pytest.approx(value)


def test_a_differential_is_whole(make):
    made = make.record(make.relaxed + "choose: {differential: 0.4 K}\n")
    assert made["settings"]["differential"] == pytest.approx(0.4)
    assert (made["predicted"]["switch_on"], made["predicted"]["switch_off"]) == (pytest.approx(59.8), pytest.approx(60.2))


@pytest.mark.parametrize(("placement", "on", "off"), [("below", 59.6, 60.0), ("above", 60.0, 60.4)])
def test_a_placement_moves_the_points(make, placement, on, off):
    made = make.record(make.relaxed + f"choose: {{mode: on_off, differential: 0.4 K, placement: {placement}, because: As before.}}\n")
    assert (made["predicted"]["switch_on"], made["predicted"]["switch_off"]) == (pytest.approx(on), pytest.approx(off))


@pytest.mark.parametrize(("placement", "on", "off"), [("centred", 6.0, 4.0), ("below", 5.0, 3.0), ("above", 7.0, 5.0)])
def test_placement_is_on_the_values_own_scale_where_it_falls(make, placement, on, off):
    made = make.record(make.compressor + f"choose: {{differential: 2 K, placement: {placement}, because: As before.}}\n")
    assert (made["predicted"]["switch_on"], made["predicted"]["switch_off"]) == (pytest.approx(on), pytest.approx(off))


def test_a_setting_that_the_mode_has_not_is_named(make):
    made = make.record(make.compressor + "choose: {cycle_time: 200 s}\n")
    assert made["mode"] == "on_off"
    assert [a["value"] for a in made["assumptions"] if a["field"] == "choose.cycle_time"] == ["not used"]
    said = next(r["text"] for r in made["rules"] if r["rule"] == "M1").replace("\u202f", " ")
    assert said.startswith("10 s on at 5 percent of a 200 s cycle is shorter than the least run of 180 s")


def test_a_cycle_time_alone_is_that_of_a_proportioned_output(make):
    made = make.record(make.steady + "choose: {cycle_time: 30 s, because: Quiet nights.}\n")
    assert (made["mode"], made["settings"]["cycle_time"]) == ("time_proportioned", 30.0)
