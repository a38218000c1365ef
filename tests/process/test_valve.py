"""Flow coefficients against the annex examples of IEC 60534-2-1, the hand formulas and the steam tables."""

from math import sqrt

import pytest

from specgen.process.valve import GASES, Gas, NoPressureDropError, Trim, kv_gas, kv_liquid, water_vapour_pressure

# IEC 60534-2-1 / ISA-75.01.01-2007 annex examples, seen in the documentation of the fluids package 1.3.1
WATER = {"density": 965.4, "inlet": 680e3, "outlet": 220e3, "vapour_pressure": 70.1e3, "critical_pressure": 22120e3, "viscosity": 3.1472e-4}


@pytest.mark.parametrize(
    ("trim", "kv", "choked"),
    [
        pytest.param(Trim(0.9, 0.46, 0.7, 0.15, 0.15, 0.15), 164.9955, False, id="example 1, globe"),
        pytest.param(Trim(0.6, 0.98, 0.7, 0.1, 0.1, 0.1), 238.0582, True, id="example 2, segmented ball, choked"),
    ],
)
def test_annex_examples_for_a_liquid(trim, kv, choked):
    found = kv_liquid(0.1, trim=trim, **WATER)
    assert found.kv == pytest.approx(kv, rel=0.002)
    assert (found.choked, found.laminar) == (choked, False)


def test_annex_example_3_gas_with_fittings():
    """3800 m3/h of CO2 at 0 degC and 1 atm: 1.055556 m3/s of 44.01 kg over 22.414 m3."""
    trim = Trim(0.85, 0.42, 0.60, size=0.05, inlet_pipe=0.08, outlet_pipe=0.10)
    flow = 1.055556 / 22.41397 * 44.01
    found = kv_gas(flow, Gas(44.01, 1.30), 433 - 273.15, 680e3, 310e3, compressibility=0.988, viscosity=1.4665e-4, trim=trim)
    assert found.kv == pytest.approx(72.5866, rel=0.002)
    assert not found.choked


def test_annex_example_4_small_flow_is_laminar():
    """The library itself comes within 3 % of the standard here: its algorithm differs."""
    trim = Trim(0.98, 0.07, 0.8, 0.015, 0.015, 0.015)
    flow = 1.277778e-4 / 22.41397 * 39.95
    found = kv_gas(flow, Gas(39.95, 1.67), 320 - 273.15, 280e3, 130e3, viscosity=5.625e-5, trim=trim)
    assert found.kv == pytest.approx(0.0164988, rel=0.002)
    assert found.laminar


def test_turbulent_liquid_by_hand():
    """``Kv = Q sqrt(G/dp)``: 360 m3/h, G 0.9654, 4.6 bar: 164.92. The library's own water is 999.1 kg/m3."""
    assert kv_liquid(0.1, **WATER).kv == pytest.approx(360 * sqrt(0.9654 / 4.6), rel=0.002)
    assert kv_liquid(6.3 / 3600, 998.2, 3e5, 2e5, 2339).kv == pytest.approx(6.3, rel=0.002)


def test_choked_liquid_by_hand():
    """FF 0.96 - 0.28 sqrt(70.1/22120) = 0.94424; dp_max = 0.36 (680 - FF 70.1) kPa = 2.2097 bar: Kv 237.95."""
    found = kv_liquid(0.1, trim=Trim(recovery=0.6), **WATER)
    ff = 0.96 - 0.28 * sqrt(70.1 / 22120)
    assert found.kv == pytest.approx(360 * sqrt(0.9654 / (0.36 * (6.8 - ff * 0.701))), rel=0.002)
    assert found.choked


def test_steam_by_the_mass_flow_equation():
    """``W = 31.6 Kv Y sqrt(x p1 rho1)`` (kg/h, bar), Y = 1 - x/(3 F xT); rho1 from the gas equation with Z = 1."""
    flow, inlet, outlet, temperature = 0.1, 6e5, 2.4e5, 160.0
    steam = GASES["steam"]
    x = (inlet - outlet) / inlet
    expansion = 1 - x / (3 * steam.heat_ratio / 1.4 * 0.72)
    density = inlet * steam.molar_mass / (8314.46 * (temperature + 273.15))
    expected = flow * 3600 / (31.6 * expansion * sqrt(x * inlet / 1e5 * density))
    found = kv_gas(flow, steam, temperature, inlet, outlet)
    assert found.kv == pytest.approx(expected, rel=0.004)
    assert not found.choked
    # x beyond F xT = 0.674 passes no more
    choked = kv_gas(flow, steam, temperature, inlet, 1.5e5)
    assert choked.choked
    assert choked.kv == pytest.approx(kv_gas(flow, steam, temperature, inlet, 0.5e5).kv, rel=1e-9)


@pytest.mark.parametrize(
    ("temperature", "pressure"), [(0.01, 611.66), (20, 2339.3), (50, 12352), (100, 101418), (150, 476160), (200, 1554900), (300, 8587900)]
)
def test_vapour_pressure_of_water(temperature, pressure):
    """IAPWS saturation table (from memory)."""
    assert water_vapour_pressure(temperature) == pytest.approx(pressure, rel=1e-4)


@pytest.mark.parametrize("temperature", [-1, 371, 900])
def test_vapour_pressure_outside_its_range(temperature):
    with pytest.raises(ValueError, match="outside"):
        water_vapour_pressure(temperature)


@pytest.mark.parametrize(("inlet", "outlet"), [(2e5, 2e5), (2e5, 3e5), (2e5, 0), (2e5, -1e5)])
def test_no_drop_has_no_coefficient(inlet, outlet):
    with pytest.raises(NoPressureDropError, match="no drop"):
        kv_liquid(0.001, 998, inlet, outlet, 2339)
    with pytest.raises(NoPressureDropError, match="no drop"):
        kv_gas(0.001, GASES["air"], 20, inlet, outlet)


def test_boiling_inlet_and_no_flow_are_refused():
    with pytest.raises(NoPressureDropError, match="boils"):
        kv_liquid(0.001, 958, 1.2e5, 1e5, vapour_pressure=1.3e5)
    with pytest.raises(ValueError, match="flow above zero"):
        kv_liquid(0.0, 998, 3e5, 2e5, 2339)


def test_diameters_belong_together():
    with pytest.raises(ValueError, match="belong together"):
        Trim(size=0.05)
