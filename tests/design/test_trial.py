import pytest

from specgen.design.project import load_design
from specgen.design.trial import differences, try_values
from specgen.source.folder import read_folder

PANEL = """panel: {reference: PNL-1, title: Test panel, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz, prospective_fault_current: 6 kA}
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
"""
# the hardest case of BASE needs 0.81 P > 100 W/K x 60 K + 1 kW, so that 8 kW does not reach and 10 kW does
BASE = """tag: TIC-1
service: Tank
need: {quantity: temperature, direction: raise, setpoint: 80 degC, tolerance: 3 K, overshoot: 6 K}
plant:
  balance:
    bodies: [{what: water, mass: 100 kg, specific_heat: 4 kJ/(kg K)}]
    loss: 100 W/K
    surroundings: 20 degC
    load: 1 kW
    dead_time: 20 s
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K, lag: 5 s}
element: {kind: resistive_heater, power: 10 kW, voltage: 400 V, phases: 3, needs: [level]}
limits: {danger_high: 180 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""
SAME = "---\ntag: TIC-2\nservice: Second tank\nsame_as: TIC-1\nneed: {tolerance: 4 K}\n"


@pytest.fixture
def project(tmp_path):
    loops = tmp_path / "loops"
    loops.mkdir()
    (loops / "panel.yml").write_text(PANEL)
    (loops / "a.yml").write_text(BASE + SAME)
    return tmp_path


def tried(project, *wanted, tag="TIC-1"):
    loops = load_design(project).loops
    before = next(loop for loop in loops if loop.tag == tag)
    return try_values(read_folder(project / "loops", "loops"), project / "loops", before, wanted, loops)


def changed(trial):
    return {(one.section, one.key): (one.before, one.after) for one in differences(trial)}


def test_a_smaller_heater_no_longer_reaches(project):
    found = changed(tried(project, "element.power=8 kW"))
    assert found["rules", "M9"] == ("holds", "broken")
    assert found["decision", "verdict"][1] == "held"


@pytest.mark.parametrize("path", ["plant.dead_time", "plant.balance.dead_time"])
def test_the_form_of_the_plant_may_be_left_out(project, path):
    trial = tried(project, f"{path} = 25 s")
    assert trial.after.loop.plant.balance.dead_time.low == 25.0
    assert trial.before.loop.plant.balance.dead_time.low == 20.0


def test_an_entry_of_a_list_and_a_list_itself(project):
    trial = tried(project, "plant.balance.bodies.0.mass=50 kg", "element.needs=[airflow, level]", "need.stability=relaxed")
    assert trial.after.loop.plant.balance.bodies[0].mass.high == 50.0
    assert trial.after.loop.element.needs == ("airflow", "level")
    assert trial.after.loop.need.stability == "relaxed"


def test_a_section_that_is_not_there_is_made(project):
    trial = tried(project, "choose.mode=on_off", "choose.because=a trial")
    assert trial.after.decision.chosen.case.candidate.mode == "on_off"


def test_what_a_loop_takes_from_another_is_kept(project):
    trial = tried(project, "element.power=8 kW", tag="TIC-2")
    assert trial.after.loop.need.tolerance.above == 4.0
    assert trial.after.verdict == "held"
    assert trial.after.loop.area == trial.before.loop.area


def test_nothing_changes_and_nothing_is_written(project):
    content = {path.name: path.read_bytes() for path in (project / "loops").iterdir()}
    assert changed(tried(project, "plant.dead_time=20 s")) == {}
    assert {path.name: path.read_bytes() for path in (project / "loops").iterdir()} == content


@pytest.mark.parametrize(
    ("wanted", "code", "hint"),
    [
        ("need.tolerance=1,5 K", "Q103", "write 1.5 K"),
        ("need.tolerance", "L321", "need.tolerance="),
        ("need.tolerence=1 K", "F101", "tolerance"),
        ("plant.dead_tim=2 s", "F101", "dead_time"),
        ("plant.balance.bodies.4.mass=2 kg", "L322", "0 to 0"),
        ("need.tolerance.above=1 K", "L322", "need.tolerance"),
        ("tag=TIC-9", "L322", "argument"),
        ("limits.danger_high=70 degC", "F162", "80 degC"),
        ("choose.mode=on_off", "L302", "because"),
        ("element.needs=[airflow", "", ""),
    ],
)
def test_what_cannot_be_is_a_problem_at_set(project, wanted, code, hint):
    trial = tried(project, wanted)
    assert trial.after is None
    assert trial.problems[0].span.file == "--set"
    assert trial.problems[0].code.startswith(code)
    assert hint in trial.problems[0].hint
    assert differences(trial) == ()


def test_the_problem_stands_at_the_value_that_makes_it(project):
    trial = tried(project, "plant.dead_time=30 s", "need.tolerance=2 parsec")
    assert [problem.span.line for problem in trial.problems] == [2]
