"""The Basis: formulas that give their result from what was put in, and the plant at both ends of its duty."""

from math import log, sqrt

import pytest


def figures(row, symbol):
    return [figure for figure in row["basis"] if figure["symbol"] == symbol]


def test_the_plant_at_both_ends(make):
    row = make.record(make.compressor)
    low, high = figures(row, "x")
    assert (low["result"], high["result"]) == (pytest.approx(10 / 30), pytest.approx(17 / 30))
    assert low["formula"] == "(setpoint − y_off)/(y_on − y_off)"
    assert [f["result"] for f in figures(row, "y_off")[:2]] == [pytest.approx(15), pytest.approx(22)]
    assert [f["result"] for f in figures(row, "y_on")[:2]] == [pytest.approx(-15), pytest.approx(-8)]
    assert "rest value 22.0" in high["case"].replace("\u202f", " ")
    assert {f["result"] for f in figures(row, "τ")} == {3600}
    assert {f["unit"] for f in figures(row, "K")} == {"K"}


def test_a_balance_is_named_as_one(make):
    text = make.steady.replace(
        "plant: {response: {change: 100 K, time_constant: 60 min, dead_time: 60 s, rest_value: 20 degC}}",
        "plant: {balance: {heat_capacity: 400 kJ/K, loss: 100 W/K, surroundings: 10 degC to 20 degC, load: 0.5 kW, dead_time: 60 s}}",
    )
    row = make.record(text)
    tau = figures(row, "τ")[0]
    assert (tau["formula"], tau["result"], tau["unit"]) == ("C/UA, bodies that follow fast", pytest.approx(4000), "s")
    assert figures(row, "x")[1]["result"] == pytest.approx((60 - (10 - 5)) / (9000 * 0.81 / 100))
    assert figures(row, "x")[0]["result"] == pytest.approx((60 - (20 - 5)) / (9000 * 1.21 / 100))


def test_a_duty_outside_0_to_1_is_said(make):
    row = make.record(make.relaxed.replace("change: 100 K", "change: 45 K"))
    assert row["verdict"] == "held"
    assert row["predicted"]["duty_high"] == 1
    assert figures(row, "x")[1]["result"] == pytest.approx(40 / (45 * 0.81))
    assert "M9" in [r["rule"] for r in row["rules"] if r["outcome"] == "broken"]


def test_the_window_of_the_differential(make):
    row = make.record(make.relaxed)
    least, most, chosen = (figures(row, symbol)[0] for symbol in ("d_min", "d_max", "d"))
    assert least["formula"].startswith("max(d_D")
    assert max(f["result"] for f in row["basis"] if f["symbol"].startswith("d_D")) == least["result"]
    exact = sqrt(least["result"] * most["result"])
    assert abs(chosen["result"] - exact) <= 0.1 + 1e-9 or chosen["result"] == pytest.approx(0.2)
    assert chosen["result"] == row["settings"]["differential"]


def test_the_window_of_the_cycle(make):
    row = make.record(make.steady + "choose: {output: contactor, because: Shown.}\n")
    bounds = {f["symbol"]: f["result"] for f in row["basis"] if f["symbol"].startswith("T_")}
    assert {"T_min,C3", "T_min,C4", "T_max,C1", "T_max,C8"} <= set(bounds)
    assert row["settings"]["cycle_time"] <= min(value for name, value in bounds.items() if name.startswith("T_max"))


def test_what_was_put_in_is_written_with_units(make):
    row = make.record(make.relaxed)
    number = figures(row, "n_op")[0]
    assert number["with"] == "N = 13.22272 1/h, hours a year = 4000"
    life = figures(row, "L")[0]
    assert life["formula"] == "operations/n_op"
    assert life["result"] == row["predicted"]["contact_life"]


def test_the_first_rise_by_its_formula(make):
    row = make.record(make.relaxed)
    rise = figures(row, "t_b")[0]
    assert rise["formula"].startswith("θ + τ ln((y_on − y_cold)/(y_on − y_near))")
    assert rise["result"] == pytest.approx(60 + 3600 * log(81 / (81 - 38)))


def test_no_figure_stands_twice(make):
    for text in (make.steady, make.relaxed, make.compressor):
        seen = [(f["symbol"], f["formula"], f["with"], f["result"], f["case"], f["source"]) for f in make.record(text)["basis"]]
        twice = {line for line in seen if seen.count(line) > 1}
        assert not twice


def test_a_formula_can_be_worked_again_from_the_record(make):
    """Kc, the band and the effective delay from nothing but the texts of the record."""
    row = make.record(make.steady + "choose: {output: contactor, because: Shown.}\n")
    given = {f["symbol"]: dict(part.split(" = ") for part in f["with"].split(", ")) for f in row["basis"] if f["with"]}
    number = {symbol: {name: float(text.split()[0]) for name, text in parts.items()} for symbol, parts in given.items()}
    assert given["k1"]["k'"].endswith(" K/s")
    result = {f["symbol"]: f["result"] for f in row["basis"]}
    assert result["θe"] == pytest.approx(sum(number["θe"].values()), rel=1e-6)
    assert result["Kc"] == pytest.approx(1 / (number["Kc"]["k1"] * 2 * number["Kc"]["θe"]), rel=1e-6)
    assert row["settings"]["proportional_band"] == pytest.approx(1 / number["Xp"]["Kc"], rel=1e-6)
    assert result["n_op"] == pytest.approx(3600 * number["n_op"]["h"] / number["n_op"]["T"], rel=1e-6)
