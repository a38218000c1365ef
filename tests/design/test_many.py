import os
import pickle
from dataclasses import replace

import pytest

from specgen.design import cache as cache_module
from specgen.design import many
from specgen.design.cache import ENDING, FOLDER, Cache, digest, user_folder
from specgen.design.many import Task, WorkerEndedError, decide_all
from specgen.design.project import load_design
from specgen.design.record import dump, record_of

PANEL = """panel: {reference: PNL-1, title: Test panel, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz, prospective_fault_current: 6 kA}
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
"""
VALVE = """tag: TIC-1
service: Heat exchanger
need: {quantity: temperature, direction: raise, setpoint: 55 degC, tolerance: 2 K}
plant: {response: {change: 60 K, time_constant: 10 min, dead_time: 20 s, rest_value: 20 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K, lag: 5 s}
element: {kind: modulating_valve, signal: 4-20 mA, stroke_time: 30 s, burden: 250 ohm}
limits: {danger_high: 90 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""
SAME = "tag: TIC-2\nservice: Second heat exchanger\nsame_as: TIC-1\nneed: {tolerance: 3 K}\n"
OTHER = VALVE.replace("TIC-1", "TIC-3").replace("55 degC", "50 degC")


@pytest.fixture(autouse=True)
def own_key(monkeypatch, tmp_path_factory):
    """Keep the key of these tests out of the user's own cache folder."""
    home = tmp_path_factory.mktemp("user")
    monkeypatch.setenv("XDG_CACHE_HOME", str(home))
    monkeypatch.setenv("LOCALAPPDATA", str(home))
    monkeypatch.setattr("pathlib.Path.home", lambda: home)
    return home


@pytest.fixture
def project(tmp_path):
    (tmp_path / "loops").mkdir()
    (tmp_path / "loops" / "panel.yml").write_text(PANEL)
    write(tmp_path)
    return tmp_path


def write(project, valve=VALVE, same=SAME, other=OTHER):
    (project / "loops" / "a.yml").write_text(f"{valve}---\n{same}---\n{other}")


@pytest.fixture
def counted(monkeypatch):
    """Count the loops that are decided."""
    tags = []
    deciding = many.decide

    def decide(read, panel, catalogue):
        tags.append(read.loop.tag)
        return deciding(read, panel, catalogue)

    monkeypatch.setattr(many, "decide", decide)

    def run(project):
        tags.clear()
        load_design(project, remember=True)
        return sorted(tags)

    return run


def entries(project):
    return sorted((project / FOLDER).glob(f"*{ENDING}"))


def test_the_second_run_decides_nothing_and_gives_the_same_record(project, counted):
    assert counted(project) == ["TIC-1", "TIC-2", "TIC-3"]
    assert counted(project) == []
    remembered, anew = load_design(project, remember=True), load_design(project)
    assert dump(record_of(remembered)) == dump(record_of(anew))


def test_one_edit_decides_one_loop(project, counted):
    counted(project)
    write(project, other=OTHER.replace("tolerance: 2 K", "tolerance: 2.5 K"))
    assert counted(project) == ["TIC-3"]


def test_an_edited_base_decides_its_dependents(project, counted):
    counted(project)
    write(project, valve=VALVE.replace("dead_time: 20 s", "dead_time: 21 s"))
    assert counted(project) == ["TIC-1", "TIC-2"]


def test_the_written_form_and_a_default_written_out_count(project, counted):
    counted(project)
    write(project, other=OTHER.replace("time_constant: 10 min", "time_constant: 600 s"))
    assert counted(project) == ["TIC-3"]
    write(project, other=OTHER.replace("tolerance: 2 K", "tolerance: 2 K, stability: steady").replace("10 min", "600 s"))
    assert counted(project) == ["TIC-3"]


def test_a_moved_loop_is_remembered_with_its_new_place(project, counted):
    counted(project)
    (project / "loops" / "a.yml").write_text("---\n".join((f"# a line more\n\n{VALVE}", SAME, OTHER)))
    assert counted(project) == []
    first = next(loop for loop in load_design(project, remember=True).loops if loop.tag == "TIC-1")
    assert first.read.line == 3


@pytest.mark.parametrize("change", ["panel", "devices", "code", "firmness"])
def test_whatever_else_changes_decides_all(project, counted, monkeypatch, change):
    counted(project)
    if change == "panel":
        (project / "loops" / "panel.yml").write_text(PANEL + "house: {contact_life: 12 year}\n")
    elif change == "devices":
        (project / "loops" / "devices.yml").write_text("# none yet\nrelays: []\n")
    elif change == "code":
        monkeypatch.setattr(cache_module, "digest_of_program", lambda: "another")
    else:
        deciding = many.Task.decided
        monkeypatch.setattr(many.Task, "decided", lambda task, read: deciding(replace(task, firmness=False), read))
        load_design(project, firmness=True, remember=True)
        assert len(entries(project)) == 6
        return
    assert counted(project) == ["TIC-1", "TIC-2", "TIC-3"]


@pytest.mark.parametrize(
    "damage", [lambda raw: raw[:0], lambda raw: raw[:100], lambda raw: raw[:-1] + b"x", lambda raw: bytes(32) + raw[32:]]
)
def test_a_damaged_entry_is_decided_anew(project, counted, damage):
    counted(project)
    for path in entries(project):
        path.write_bytes(damage(path.read_bytes()))
    assert counted(project) == ["TIC-1", "TIC-2", "TIC-3"]
    assert counted(project) == []


class Hostile:
    """What runs a command as soon as it is unpickled."""

    def __init__(self, mark):
        self.mark = mark

    def __reduce__(self):
        return os.mkdir, (str(self.mark),)


def test_an_entry_that_somebody_else_made_is_not_opened(project, counted, tmp_path, own_key):
    counted(project)
    key = next(own_key.rglob("key"))
    mark = tmp_path / "opened"
    key.write_bytes(b"s" * 32)  # somebody else's user folder
    foreign = Cache(project, load_design(project).panel, b"", firmness=False)
    for path in entries(project):
        content = cache_module.zlib.compress(pickle.dumps(Hostile(mark)))
        path.write_bytes(cache_module._seal(content, path.name, foreign._key) + content)
    key.write_bytes(b"o" * 32)
    assert counted(project) == ["TIC-1", "TIC-2", "TIC-3"]
    assert not mark.exists()


def test_an_entry_under_another_name_is_not_taken(project, counted):
    counted(project)
    first, second, third = entries(project)
    first.write_bytes(second.read_bytes())
    third.write_bytes(second.read_bytes())
    assert len(counted(project)) == 2


def test_nothing_is_remembered_without_a_key_or_a_folder(project, counted, own_key):
    (own_key / "specgen").write_text("no folder")
    for folder in (own_key / ".cache", own_key / "Library"):
        folder.write_text("no folder")
    assert len(counted(project)) == 3
    assert len(counted(project)) == 3
    assert not (project / FOLDER).exists()


def test_a_file_in_the_place_of_the_folder_is_no_matter(project, counted):
    (project / FOLDER).write_text("mine")
    assert len(counted(project)) == 3
    assert (project / FOLDER).read_text() == "mine"


def test_a_folder_that_is_a_link_is_left_alone(project, counted, tmp_path):
    elsewhere = tmp_path / "elsewhere"
    elsewhere.mkdir()
    (project / FOLDER).symlink_to(elsewhere)
    assert len(counted(project)) == 3
    assert list(elsewhere.iterdir()) == []


def test_the_oldest_entries_are_dropped_when_all_are_too_large(project, counted, monkeypatch):
    counted(project)
    sizes = [path.stat().st_size for path in entries(project)]
    for age, path in enumerate(entries(project)):
        os.utime(path, (1000 + age, 1000 + age))
    oldest = entries(project)[0]
    stray = project / FOLDER / "notes.txt"
    stray.write_text("not ours")
    monkeypatch.setattr(cache_module, "MOST", sum(sizes) + 10)
    write(project, other=OTHER.replace("tolerance: 2 K", "tolerance: 2.2 K"), valve="", same="")
    counted(project)
    assert not oldest.exists()
    assert stray.exists()


def test_nothing_half_written_is_left(project, counted, monkeypatch):
    def full(*_):
        raise OSError(28, "no space left")

    monkeypatch.setattr("pathlib.Path.replace", full)
    counted(project)
    assert [path.name for path in (project / FOLDER).iterdir()] in ([], [".gitignore"]) if (project / FOLDER).exists() else True


def test_the_digest_is_of_every_field(project):
    loops = [loop.read for loop in load_design(project).loops]
    assert len({digest(read, "") for read in loops}) == 3
    assert digest(loops[0], "") != digest(loops[0], "x")


def test_where_the_key_stands():
    assert user_folder({"LOCALAPPDATA": "C:/Users/a"}, "win32").as_posix() == "C:/Users/a/specgen"
    assert user_folder({"XDG_CACHE_HOME": "relative"}, "linux").name == "specgen"


def test_several_processes_give_what_one_gives(project, monkeypatch):
    monkeypatch.setattr(many, "PAYS_FROM", 2)
    monkeypatch.setattr(many, "CHUNK", 1)
    seen = []
    over = load_design(project, lambda done, of: seen.append((done, of)), workers=2)
    assert dump(record_of(over)) == dump(record_of(load_design(project)))
    assert seen == [(0, 3), (1, 3), (2, 3), (3, 3)]
    assert all(loop.read.spans for loop in over.loops)


class Ends:
    """Ends the process that it is handed to."""

    def __reduce__(self):
        return os._exit, (3,)


@pytest.mark.parametrize(("catalogue", "error"), [(Ends(), WorkerEndedError), (None, AttributeError)])
def test_a_process_that_ends_and_an_error_in_one_end_the_run(project, monkeypatch, catalogue, error):
    monkeypatch.setattr(many, "PAYS_FROM", 2)
    monkeypatch.setattr(many, "CHUNK", 1)
    design = load_design(project)
    with pytest.raises(error):
        decide_all([loop.read for loop in design.loops], Task(design.panel, catalogue), workers=2)


def test_few_loops_are_decided_in_this_process():
    assert many._workers(many.PAYS_FROM - 1, 8) == 1
    assert many._workers(100, 8) == 8
    assert many._workers(10_000, 500) == many.MOST_WORKERS
