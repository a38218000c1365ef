"""Conductors by hand: capacity times factors, the next size where the drop asks for it."""

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.conductor import Duty, Installed, conductor_for
from specgen.sizing.connection import Connection

THREE = Connection("three_phase", 400.0, 440.0, 360.0)
NEUTRAL = Connection("line_to_neutral", 230.94, 254.0, 207.8)
CONTROL = Connection("control", 24.0, 24.0, 24.0, "dc")


def chosen(catalogue, carry, method, ambient, circuits, *, current=None, fed=THREE, length=None, most=0.05, resistive=True, behind=None):
    duty = Duty(carry if current is None else current, carry, carry if behind is None else behind, fed, resistive, most)
    return conductor_for(duty, Installed(method, ambient, circuits, length), "cable", catalogue)


@pytest.mark.parametrize(
    ("method", "ambient", "circuits", "size", "capacity"),
    [
        pytest.param("B2", 40.0, 4, 2.5, 17.4 * 1.00 * 0.65, id="2.5 mm2, B2, 40 degC, 4 circuits: 11.31 A"),
        pytest.param("C", 50.0, 1, 2.5, 21 * 0.82, id="2.5 mm2, C, 50 degC, single: 17.22 A"),
        pytest.param("B2", 40.0, 3, 2.5, 17.4 * 0.65, id="3 circuits count as 4"),
        pytest.param("B2", 37.0, 1, 2.5, 17.4 * 1.00, id="37 degC counts as 40"),
        pytest.param("E", 10.0, 1, 2.5, 22 * 1.15, id="nothing is gained below 30 degC"),
        pytest.param("B1", 45.0, 1, 2.5, 18.3 * 0.91, id="inside an enclosure"),
        pytest.param("B2", 40.0, 12, 2.5, 17.4 * 0.45, id="beyond the table of nine"),
        pytest.param("awg", 30.0, 1, 3.31, 25.0, id="12 AWG"),
        pytest.param("awg", 45.0, 2, 3.31, 25 * 0.82 * 0.80, id="12 AWG, 45 degC, six conductors"),
    ],
)
def test_capacity(catalogue, method, ambient, circuits, size, capacity):
    """Rows of IEC 60204-1 table 6 and annex D, and of NFPA 70 310.16; a hair more takes the next size."""
    exact = chosen(catalogue, capacity, method, ambient, circuits, behind=1.0)
    assert exact.size * 1e6 == pytest.approx(size)
    assert exact.capacity == pytest.approx(capacity)
    assert chosen(catalogue, capacity * 1.001, method, ambient, circuits, behind=1.0).size > exact.size * 1.2


def test_the_drop_asks_for_more(catalogue):
    """10 A, 400 V three-phase, 120 m: 1.5 mm2 drops sqrt3 120 10 (0.0225/1.5)/400 = 7.8 %, 2.5 mm2 4.68 %."""
    short, long = chosen(catalogue, 10.0, "C", 40.0, 1, length=5.0), chosen(catalogue, 10.0, "C", 40.0, 1, length=120.0)
    assert short.size * 1e6 == pytest.approx(1.5)
    assert long.size * 1e6 == pytest.approx(2.5)
    assert long.drop == pytest.approx(3**0.5 * 120 * 10 * 0.0225 / 2.5 / 400)
    assert chosen(catalogue, 10.0, "C", 40.0, 1, length=120.0, most=0.04).size * 1e6 == pytest.approx(4.0)


def test_a_single_phase_drop_goes_there_and_back(catalogue):
    found = chosen(catalogue, 10.0, "C", 40.0, 1, fed=NEUTRAL, length=20.0)
    assert found.drop == pytest.approx(2 * 20 * 10 * 0.0225 / 1.5 / 230.94)
    worst = chosen(catalogue, 10.0, "C", 40.0, 1, fed=NEUTRAL, length=20.0, resistive=False)
    # at the worst angle the impedance counts: 15 and 0.08 milliohm a metre
    assert worst.drop == pytest.approx(2 * 20 * 10 * (0.015**2 + 0.00008**2) ** 0.5 / 230.94)


def test_least_sizes(catalogue):
    assert chosen(catalogue, 1.0, "C", 30.0, 1).size * 1e6 == pytest.approx(1.5)
    assert chosen(catalogue, 1.0, "C", 30.0, 1, fed=CONTROL).size * 1e6 == pytest.approx(0.75)


def test_small_gauges_have_a_largest_protection(catalogue):
    """NFPA 70 240.4(D): 14, 12, 10 AWG behind 15, 20, 30 A, though they carry 20, 25, 35 A."""
    found = {rating: chosen(catalogue, rating, "awg", 30.0, 1).gauge for rating in (15.0, 20.0, 25.0, 30.0, 35.0)}
    assert found == {15.0: "14 AWG", 20.0: "12 AWG", 25.0: "10 AWG", 30.0: "10 AWG", 35.0: "8 AWG"}


@pytest.mark.parametrize(
    ("carry", "ambient", "circuits", "length", "words"),
    [
        (400.0, 40.0, 1, None, "no conductor listed carries"),
        (10.0, 65.0, 1, None, "65 °C"),
        (10.0, 40.0, 30, None, "30 circuits"),
        (10.0, 40.0, 1, 100000.0, "drop stays above"),
    ],
)
def test_what_no_conductor_does(catalogue, carry, ambient, circuits, length, words):
    found = chosen(catalogue, carry, "B2", ambient, circuits, length=length)
    assert isinstance(found, Unsized)
    assert words in found.because
    assert not found.needs


def test_figures_name_their_rows(catalogue):
    found = chosen(catalogue, 10.0, "B2", 40.0, 2, length=10.0)
    assert [row.id for row in found.rows] == [
        "conductors/B2/1.5", "ambient_factors/40", "grouping_factors/B2/2", "wiring/resistance", "wiring/reactance"
    ]  # fmt: skip
    assert "IEC 60204-1 table 6:2016" in found.figures[0].source
