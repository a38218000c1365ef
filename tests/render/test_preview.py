"""The preview: renewed on save, problems shown in the page, never dying of them."""

import socket
import threading
import time
import urllib.request

import pytest

from specgen.render import preview
from specgen.render.preview import Renewal, serve
from specgen.render.site import SiteError


def free_port():
    with socket.socket() as found:
        found.bind(("127.0.0.1", 0))
        return found.getsockname()[1]


@pytest.fixture
def served(project, monkeypatch):
    """Serve the project in a thread and say how often it was built."""
    kept, builds, addresses = [], [], []
    whole = preview.LiveReloadServer

    def made(**arguments):
        kept.append(whole(**arguments, polling_interval=0.1))
        return kept[0]

    monkeypatch.setattr(preview, "LiveReloadServer", made)
    thread = threading.Thread(
        target=serve, args=(project, free_port(), lambda design, _: builds.append(len(design.loops)), addresses.append), daemon=True
    )
    thread.start()
    wait(lambda: addresses)

    def page(path):
        with urllib.request.urlopen(f"{addresses[0]}{path}", timeout=30) as answer:  # noqa: S310  our own address
            return answer.read().decode()

    wait(kept[0].serve_thread.is_alive)
    yield page, builds
    kept[0].shutdown()
    thread.join(10)
    assert not thread.is_alive()


def wait(until, seconds=40.0):
    end = time.monotonic() + seconds
    while not until():
        assert time.monotonic() < end, "it never came"
        time.sleep(0.05)


def test_a_saved_file_renews_the_page_and_a_problem_is_shown_in_it(project, served):
    page, builds = served
    assert "Second cabinet" in page("loops/TIC-3.html")
    hot = project / "loops" / "hot.yml"
    text = hot.read_text(encoding="utf-8")
    hot.write_text(text.replace("Second cabinet", "Another cabinet"), encoding="utf-8")
    wait(lambda: len(builds) > 1)
    assert "Another cabinet" in page("loops/TIC-3.html")
    hot.write_text(text.replace("tolerance: 0.6 K", "tolerance: 0.6"), encoding="utf-8")
    wait(lambda: len(builds) > 2)
    assert "loops/hot.yml:" in page("index.html")
    assert "TIC-3" in page("loops.html")  # as missing, in the notice
    config = (project / "mkdocs.yml").read_text(encoding="utf-8")
    (project / "mkdocs.yml").write_text("docs_dir: [\n", encoding="utf-8")
    wait(lambda: "Not renewed:" in page("index.html"))
    (project / "mkdocs.yml").write_text(config, encoding="utf-8")
    wait(lambda: "Not renewed:" not in page("index.html"))
    assert not (project / "site").exists()


def test_the_shown_page_reloads_itself(served):
    page, _ = served
    assert "livereload" in page("index.html")


def test_a_project_that_cannot_be_built_once_is_said(project):
    (project / "mkdocs.yml").unlink()
    with pytest.raises(SiteError, match=r"mkdocs\.yml is missing"):
        serve(project, free_port(), lambda *_: None, lambda _: None)


def test_a_taken_port_is_said(project):
    with socket.socket() as taken:
        taken.bind(("127.0.0.1", 0))
        taken.listen()
        with pytest.raises(SiteError, match="--port"):
            serve(project, taken.getsockname()[1], lambda *_: None, lambda _: None)


def test_a_fault_of_specgen_does_not_end_it(project, tmp_path, monkeypatch, capsys):
    def fails(*_, **__):
        raise ZeroDivisionError("unseen")

    monkeypatch.setattr(preview, "load_design", fails)
    renewal = Renewal(project, tmp_path / "site", lambda *_: None)
    renewal()
    assert "unseen" in renewal.trouble
    assert "ZeroDivisionError" in capsys.readouterr().err
    assert renewal.marked(b"<body>x</body>").startswith(b"<body><div")
