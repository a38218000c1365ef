"""``same_as``: what is taken over, what replaces it, and what is never taken."""

BASE = """tag: TIC-1
service: First
area: Drying
need: {quantity: temperature, direction: raise, setpoint: 65 degC, tolerance: {above: 2 K, below: 1 K}}
plant:
  response: {change: 130 K, time_constant: 20 min, dead_time: 25 s, rest_value: 8 degC to 30 degC}
sensor: {kind: pt100, class: A, wires: 4}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: [airflow, level]}
limits: {danger_high: 95 degC, consequence: fire}
choose: {mode: on_off, because: Only here.}
notes: [Only here.]
"""


def taken(reading, text):
    result, problems = reading(BASE + "---\n" + text)
    assert not problems, problems
    return next(r for r in result.loops if r.loop.tag == "TIC-2")


def test_everything_but_what_belongs_to_one_loop_alone(reading):
    read = taken(reading, "tag: TIC-2\nservice: Second\nsame_as: TIC-1\n")
    loop = read.loop
    assert (loop.area, float(loop.need.setpoint), loop.sensor.class_, float(loop.element.power.low)) == ("Drying", 65.0, "A", 6000.0)
    assert (loop.choose, loop.notes) == (None, ())
    assert ("limits", "danger_high") in read.inherited
    assert not read.written(("limits", "danger_high"))
    assert read.written(("service",))


def test_key_by_key_within_a_section(reading):
    read = taken(reading, "tag: TIC-2\nservice: Second\nsame_as: tic-1\nneed: {setpoint: 50 degC, tolerance: {above: 3 K}}\n")
    need = read.loop.need
    assert (float(need.setpoint), float(need.tolerance.above), float(need.tolerance.below)) == (50.0, 3.0, 1.0)
    assert read.written(("need", "tolerance", "above"))
    assert ("need", "tolerance", "below") in read.inherited
    assert ("need", "tolerance", "above") not in read.inherited


def test_a_list_is_replaced_whole(reading):
    assert taken(reading, "tag: TIC-2\nservice: Second\nsame_as: TIC-1\nelement: {needs: [flow]}\n").loop.element.needs == ("flow",)


def test_another_form_of_plant_replaces_the_whole_section(reading):
    rates = "plant: {rates: {with_output: 2 K/min, without_output: 1 K/min, dead_time: 5 s}}\n"
    read = taken(reading, "tag: TIC-2\nservice: Second\nsame_as: TIC-1\n" + rates)
    assert read.loop.plant.form == "rates"
    assert read.loop.plant.response is None


def test_another_kind_replaces_its_whole_section(reading):
    read = taken(
        reading,
        "tag: TIC-2\nservice: Second\nsame_as: TIC-1\nelement: {kind: modulating_valve, signal: 4-20 mA, stroke_time: 30 s}\n"
        "sensor: {kind: transmitter}\n",
    )
    assert read.loop.element.kind == "modulating_valve"
    assert read.loop.sensor.wires == 2  # the transmitter's own default, not the thermometer's 4
    assert not [path for path in read.inherited if path[0] in ("element", "sensor")]


def test_the_same_kind_written_again_replaces_nothing(reading):
    loop = taken(reading, "tag: TIC-2\nservice: Second\nsame_as: TIC-1\nelement: {kind: resistive_heater, power: 4 kW}\n").loop
    assert (float(loop.element.power.low), float(loop.element.voltage)) == (4000.0, 400.0)


def test_chains_are_followed(reading):
    result, problems = reading(
        BASE + "---\ntag: TIC-2\nservice: Second\nsame_as: TIC-1\nneed: {setpoint: 50 degC}\n"
        "---\ntag: TIC-3\nservice: Third\nsame_as: TIC-2\nelement: {power: 3 kW}\n"
    )
    assert not problems
    third = next(r.loop for r in result.loops if r.loop.tag == "TIC-3")
    assert (float(third.need.setpoint), float(third.element.power.low), float(third.element.voltage)) == (50.0, 3000.0, 400.0)


def test_a_step_test_is_not_taken_over(reading):
    text = BASE.replace(
        "  response: {change: 130 K, time_constant: 20 min, dead_time: 25 s, rest_value: 8 degC to 30 degC}\n",
        "  step_test: {file: data/a.csv, time: t_s, output: out_percent, value: pv_degC}\n",
    )
    result, problems = reading(text + "---\ntag: TIC-2\nservice: Second\nsame_as: TIC-1\n")
    assert not problems
    assert [r.loop.plant for r in result.loops if r.loop.tag == "TIC-2"] == [None]


def test_the_circle_is_shown_from_where_it_starts(reading):
    _, problems = reading("tag: A\nservice: a\nsame_as: B\n---\ntag: B\nservice: b\nsame_as: A\n")
    assert [p.text for p in problems] == ["same_as goes in a circle: A -> B -> A", "same_as goes in a circle: B -> A -> B"]


def test_a_problem_in_what_is_taken_is_shown_where_it_stands(reading):
    _, problems = reading(BASE.replace("6 kW", "6 KW") + "---\ntag: TIC-2\nservice: Second\nsame_as: TIC-1\n")
    assert [(p.span.line, p.code) for p in problems] == [(8, "Q105")]


def test_a_clash_of_own_and_taken_is_shown_at_its_own(reading):
    _, problems = reading(BASE + "---\ntag: TIC-2\nservice: Second\nsame_as: TIC-1\nneed: {setpoint: 99 degC}\n")
    assert [p.code for p in problems] == ["F162"]


def test_a_long_chain_ends(reading):
    text = BASE + "".join(f"---\ntag: T-{n}\nservice: x\nsame_as: {'TIC-1' if n == 0 else f'T-{n - 1}'}\n" for n in range(120))
    result, problems = reading(text)
    assert {p.code for p in problems} == {"L204"}
    assert any(r.loop.tag == "T-50" for r in result.loops)


def test_a_section_written_out_is_the_loops_own(reading):
    read = taken(reading, "tag: TIC-2\nservice: Second\nsame_as: TIC-1\nlimits: {danger_high: 90 degC, consequence: product}\n")
    assert not [path for path in read.inherited if path[0] == "limits"]
    assert read.written(("limits",))
    assert read.spans["limits", "danger_high"].line == 16


def test_a_section_partly_written_is_partly_taken(reading):
    read = taken(reading, "tag: TIC-2\nservice: Second\nsame_as: TIC-1\nlimits: {danger_high: 90 degC}\n")
    assert [path for path in read.inherited if path[0] == "limits"] == [("limits", "consequence")]
    assert not read.written(("limits",))
    assert read.written(("limits", "danger_high"))


def test_a_list_that_is_taken_is_a_field_with_its_items(reading):
    read = taken(reading, "tag: TIC-2\nservice: Second\nsame_as: TIC-1\n")
    assert {path for path in read.inherited if path[:2] == ("element", "needs")} == {
        ("element", "needs"), ("element", "needs", 0), ("element", "needs", 1),
    }  # fmt: skip
