"""The signal at the quarters of the output, straight and reversed; 4-20 mA by the published rows 4, 8, 12, 16, 20 mA."""

from types import SimpleNamespace

import pytest

from specgen.sizing.signal_table import signal_table


def loop(**element):
    return SimpleNamespace(element=SimpleNamespace(**element))


@pytest.mark.parametrize(
    ("on_loss", "milliampere"),
    [("close", [4, 8, 12, 16, 20]), ("hold", [4, 8, 12, 16, 20]), ("open", [20, 16, 12, 8, 4]), (None, [4, 8, 12, 16, 20])],
)
def test_a_current(on_loss, milliampere):
    table = signal_table(loop(on_signal_loss=on_loss), "4-20 mA")
    assert [value * 1000 for _, value in table.rows] == pytest.approx(milliampere)
    assert [output for output, _ in table.rows] == [0, 0.25, 0.5, 0.75, 1]
    assert table.is_reversed == (on_loss == "open")
    assert table.because


def test_a_voltage_of_what_is_no_valve():
    table = signal_table(loop(), "2-10 V")
    assert [value for _, value in table.rows] == pytest.approx([2, 4, 6, 8, 10])
    assert {figure.dimension for figure in table.figures} == {"voltage"}
    assert [figure.value for figure in table.figures] == [value for _, value in table.rows]
