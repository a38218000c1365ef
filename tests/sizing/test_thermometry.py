"""Reference functions against published tables, copied here with their source and standing."""

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.thermometry import couple_slope, couple_voltage, platinum_resistance, thermistor_resistance

# IEC 60751 table 1 [degC, ohm]; seen in an open reference table of platinum elements, but 25, 65 and 850 degC from memory
PLATINUM = [
    (-200, 18.52), (-50, 80.31), (0, 100.00), (25, 109.73), (65, 125.16), (100, 138.51), (200, 175.86), (400, 247.09), (600, 313.71),
    (850, 390.48),
]  # fmt: skip
# NIST ITS-90 tables (SRD 60), same as IEC 60584-1:2013 [mV]; seen, computed from the tables of an open package
COUPLES = {
    "K": (0, 1.0002, 2.6437, 4.0962, 8.1385, 16.3971, 33.2754),
    "J": (0, 1.2773, 3.3822, 5.2689, 10.7787, 21.8481, 45.4944),
    "T": (0, 0.9920, 2.6875, 4.2785, 9.2881, 20.8720, None),
    "N": (0, 0.6586, 1.7600, 2.7741, 5.9134, 12.9737, 28.4545),
    "E": (0, 1.4951, 4.0063, 6.3189, 13.4213, 28.9460, 61.0174),
    "R": (0, 0.1406, 0.3967, 0.6474, 1.4686, 3.4077, 7.9498),
    "S": (0, 0.1426, 0.3986, 0.6459, 1.4408, 3.2594, 7.3450),
    "B": (0, -0.0025, 0.0086, 0.0332, 0.1783, 0.7865, 3.1536),
}
AT = (0, 25, 65, 100, 200, 400, 800)
# further points of the printed NIST tables, from memory [mV]: they reach the pieces that the row above does not
FURTHER = [
    ("K", -200, -5.891), ("K", 1300, 52.410), ("J", -200, -7.890), ("J", 1200, 69.553), ("T", -200, -5.603), ("N", -200, -3.990),
    ("N", 1300, 47.513), ("E", -200, -8.825), ("E", 1000, 76.373), ("R", 1200, 13.228), ("R", 1700, 20.222), ("S", 1200, 11.951),
    ("S", 1700, 17.947), ("B", 1700, 12.433),
]  # fmt: skip


@pytest.mark.parametrize(("temperature", "ohm"), PLATINUM)
def test_platinum(catalogue, temperature, ohm):
    assert platinum_resistance(temperature, 100.0, catalogue) == pytest.approx(ohm, abs=0.0051)
    assert platinum_resistance(temperature, 1000.0, catalogue) == pytest.approx(10 * ohm, abs=0.051)


def test_platinum_outside(catalogue):
    assert isinstance(platinum_resistance(-201.0, 100.0, catalogue), Unsized)
    assert isinstance(platinum_resistance(851.0, 100.0, catalogue), Unsized)


CASES = [(kind, t, mv) for kind, row in COUPLES.items() for t, mv in zip(AT, row, strict=True) if mv is not None]


@pytest.mark.parametrize(("kind", "temperature", "millivolt"), CASES)
def test_couples(catalogue, kind, temperature, millivolt):
    assert couple_voltage(temperature, kind, catalogue) * 1e3 == pytest.approx(millivolt, abs=0.00006)


@pytest.mark.parametrize(("kind", "temperature", "millivolt"), FURTHER)
def test_couples_in_their_other_pieces(catalogue, kind, temperature, millivolt):
    assert couple_voltage(temperature, kind, catalogue) * 1e3 == pytest.approx(millivolt, abs=0.0006)


def test_pieces_meet(catalogue):
    """A slipped digit of any coefficient would open a step where two pieces meet; the functions are continuous within 1 uV."""
    pieces = [known.value for known in catalogue.couple_functions]
    ends = {(piece.type, piece.range.high) for piece in pieces}
    joints = [(piece.type, piece.range.low) for piece in pieces if (piece.type, piece.range.low) in ends]
    assert len(joints) == 10
    for kind, temperature in joints:
        below, above = (couple_voltage(temperature + side, kind, catalogue) for side in (-1e-6, 1e-6))
        slope = couple_slope(temperature, kind, catalogue)
        assert above - below == pytest.approx(2e-6 * slope, abs=1e-6)


@pytest.mark.parametrize("kind", COUPLES)
@pytest.mark.parametrize("temperature", [30.0, 120.0, 390.0])
def test_slope_is_the_derivative(catalogue, kind, temperature):
    step = 0.01
    difference = (couple_voltage(temperature + step, kind, catalogue) - couple_voltage(temperature - step, kind, catalogue)) / (2 * step)
    assert couple_slope(temperature, kind, catalogue) == pytest.approx(difference, rel=1e-5, abs=1e-12)


def test_couple_outside(catalogue):
    assert isinstance(couple_voltage(401.0, "T", catalogue), Unsized)
    assert isinstance(couple_slope(-1.0, "B", catalogue), Unsized)


def test_thermistor():
    """Beta 3950 K, 10 kohm: at 50 degC ln(R/R25) = 3950 (1/323.15 - 1/298.15) = -1.02493, R = 3588 ohm."""
    assert thermistor_resistance(50.0, 10e3, 3950.0) == pytest.approx(3588, abs=1)
