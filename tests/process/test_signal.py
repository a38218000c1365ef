"""Standard signals against published and arithmetic rows."""

from math import inf

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.process.signal import SIGNALS, loop_burden, namur_state, quarters, voltage_load


@pytest.mark.parametrize(
    ("name", "value", "percent"),
    [
        *(
            ("4-20 mA", milli / 1e3, percent)
            for milli, percent in [(4, 0), (8, 25), (12, 50), (20, 100), (3.8, -1.25), (20.5, 103.125), (3.6, -2.5), (21, 106.25)]
        ),
        ("0-20 mA", 0.010, 50),
        ("0-20 mA", 0.005, 25),
        ("2-10 V", 4.0, 25),
        ("1-5 V", 3.0, 50),
        ("0-5 V", 1.25, 25),
    ],
)
def test_rows(name, value, percent):
    assert SIGNALS[name].share(value) == pytest.approx(percent / 100)
    assert SIGNALS[name].at(percent / 100) == pytest.approx(value)
    assert SIGNALS[name].at(1 - percent / 100, is_reversed=True) == pytest.approx(value)


def test_quarters_reversed():
    """Reversed 4-20 mA: nothing is 20 mA, full action 4 mA."""
    found = quarters(SIGNALS["4-20 mA"], is_reversed=True)
    assert [share for share, _ in found] == [0, 0.25, 0.5, 0.75, 1]
    assert [current for _, current in found] == pytest.approx([0.020, 0.016, 0.012, 0.008, 0.004])


@given(st.sampled_from(sorted(SIGNALS)), st.floats(-0.1, 1.1), st.booleans())
def test_share_undoes_at(name, share, is_reversed):
    signal = SIGNALS[name]
    assert signal.share(signal.at(share, is_reversed=is_reversed), is_reversed=is_reversed) == pytest.approx(share, abs=1e-12)


def test_live_zero():
    assert {name for name, signal in SIGNALS.items() if signal.is_live_zero} == {"4-20 mA", "2-10 V", "1-5 V"}


@pytest.mark.parametrize(
    ("milli", "state"),
    [
        (0, "failed_low"),
        (3.6, "failed_low"),
        (3.61, "not_a_measurement"),
        (3.79, "not_a_measurement"),
        (3.8, "valid"),
        (12, "valid"),
        (20.5, "valid"),
        (20.6, "not_a_measurement"),
        (20.99, "not_a_measurement"),
        (21.0, "failed_high"),
        (23, "failed_high"),
    ],
)
def test_namur_ne_43(milli, state):
    """NAMUR NE 43: measurement 3.8 to 20.5 mA, failure 3.6 mA and below, 21 mA and above (seen in an article on it)."""
    assert namur_state(milli * 1e-3) == state


@pytest.mark.parametrize(
    ("inputs", "cable", "total", "holds", "volts"),
    [
        pytest.param((250,), 0, 250, True, 5, id="250 ohm is 1-5 V"),
        pytest.param((250, 250), 0, 500, True, 10, id="two in series, at the limit"),
        pytest.param((250, 250), 1.7, 501.7, False, 10.034, id="the cable tips it"),
    ],
)
def test_burden(inputs, cable, total, holds, volts):
    found = loop_burden(inputs, allowed=500, cable=cable)
    assert found.total == pytest.approx(total)
    assert found.holds is holds
    assert found.voltage == pytest.approx(volts)
    assert found.margin == pytest.approx(500 / total)


def test_a_loop_without_burden_has_an_endless_margin():
    assert loop_burden((), allowed=500).margin == inf


def test_voltage_inputs_lie_in_parallel():
    """10 k, 10 k and 5 k: 2.5 k."""
    assert voltage_load((10e3, 10e3, 5e3)) == pytest.approx(2500)
    assert voltage_load(()) == inf


def test_what_is_no_loop_is_refused():
    with pytest.raises(ValueError, match="current signal"):
        loop_burden((250,), 500, signal=SIGNALS["0-10 V"])
    with pytest.raises(ValueError, match="zero or more"):
        loop_burden((-250,), 500)
    with pytest.raises(ValueError, match="above zero"):
        voltage_load((0.0,))
