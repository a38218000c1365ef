"""Protection by hand: the next preferred rating, the curve that holds the inrush, the range that holds a motor."""

import pytest

from specgen.model.traits import Traits, traits_of
from specgen.sizing.candidate import Unsized
from specgen.sizing.connection import Connection
from specgen.sizing.current import LoadCurrent, load_current
from specgen.sizing.protection import next_rating, protection_for

FED = Connection("three_phase", 400.0, 440.0, 360.0)
HEATER = Traits(resistive_power=True)


def protected(catalogue, current, *, category="AC-1", traits=HEATER, basis="iec", inrush=None, solid=False, units=1):
    load = LoadCurrent(current, current, FED, category, "AC-51", inrush)
    return protection_for(load, units, traits, basis, catalogue, solid_state=solid)


def test_six_kilowatts(catalogue, loop, panel):
    """6000/(sqrt3 400) = 8.66 A: 10 A, and with 125 percent 10.83 A: 13 A of IEC 60898, 15 A of NFPA 70 240.6."""
    load = load_current(loop().element, panel(supply={"tolerance": "0.001 percent"}), catalogue)
    traits = traits_of(loop().element)
    iec, american = (protection_for(load, 1, traits, basis, catalogue, solid_state=False) for basis in ("iec", "north_america"))
    assert iec.sized_for == pytest.approx(8.660254, rel=1e-4)
    assert (iec.kind, iec.rating, iec.curve) == ("circuit_breaker", 10.0, "B")
    assert american.sized_for == pytest.approx(10.8253, rel=1e-4)
    assert next_rating(10.8253, "iec", catalogue)[0] == 13.0
    assert (american.rating, american.curve) == (15.0, None)


@pytest.mark.parametrize(
    ("current", "kind", "rating"),
    [(0.4, "circuit_breaker", 1), (16.0, "circuit_breaker", 16), (16.01, "circuit_breaker", 20), (125.0, "circuit_breaker", 125),
     (126.0, "fuse", 160), (600.0, "fuse", 630)],
)  # fmt: skip
def test_series(catalogue, current, kind, rating):
    found = protected(catalogue, current)
    assert (found.kind, found.rating) == (kind, rating)


def test_nothing_is_large_enough(catalogue):
    motor = Traits(motor=True)
    for found in (protected(catalogue, 631.0), protected(catalogue, 130.0, solid=True), protected(catalogue, 101.0, traits=motor)):
        assert isinstance(found, Unsized)
        assert not found.needs
    assert isinstance(protected(catalogue, 0.05, traits=motor), Unsized)
    assert isinstance(next_rating(700.0, "iec", catalogue), Unsized)


@pytest.mark.parametrize(
    ("current", "category", "traits", "inrush", "rating", "curve"),
    [
        pytest.param(9.0, "AC-1", HEATER, None, 10, "B", id="a resistance"),
        pytest.param(9.0, "AC-1", Traits(analogue_input=True), None, 10, "C", id="a drive"),
        pytest.param(9.0, "AC-15", Traits(coil=True), None, 10, "C", id="a coil"),
        pytest.param(9.0, "AC-6a", HEATER, None, 10, "D", id="a transformer"),
        pytest.param(9.0, "AC-5b", HEATER, 90.0, 10, "D", id="lamps of ten times: 100 A are held"),
        pytest.param(9.0, "AC-5b", HEATER, 108.0, 13, "D", id="of twelve times: 130 A"),
        pytest.param(9.0, "AC-1", HEATER, 40.0, 10, "C", id="40 A is above 3 and below 5 times 10 A"),
    ],
)
def test_curve(catalogue, current, category, traits, inrush, rating, curve):
    """IEC 60898-1: B holds 3, C 5, D 10 times its rating; which for what is common practice."""
    found = protected(catalogue, current, category=category, traits=traits, inrush=inrush)
    assert (found.rating, found.curve) == (rating, curve)


def test_motor(catalogue):
    """8.4 A lies in 6.3 to 10 A; it is set to the name-plate and the conductor carries 10 A, or 125 percent where that is more."""
    found = protected(catalogue, 8.4, category="AC-3", traits=Traits(motor=True), basis="north_america")
    assert (found.kind, found.rating, found.setting, found.setting_range) == ("motor_starter", 10.0, 8.4, (6.3, 10.0))
    assert found.sized_for == pytest.approx(10.5)
    assert found.assumptions


def test_semiconductor_fuse(catalogue):
    found = protected(catalogue, 11.9, solid=True)
    assert (found.kind, found.rating, found.let_through) == ("semiconductor_fuse", 16.0, 90.0)


def test_one_of_several_units(catalogue):
    assert protected(catalogue, 30.0, units=3).design_current == pytest.approx(10.0)
    assert protected(catalogue, 30.0, inrush=120.0, units=3).curve == "C"
