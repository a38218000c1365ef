"""Flow coefficient Kv of a control valve by IEC 60534-2-1, for liquids, gases and steam."""

from dataclasses import dataclass
from math import exp

KELVIN = 273.15
NORMAL_VOLUME = 22.413969
"""Volume of a kilomole of gas at 0 degC and 101325 Pa, CODATA [m3/kmol]."""

WATER_CRITICAL_PRESSURE = 22.064e6
"""Critical pressure of water, IAPWS (from memory) [Pa]."""
WATER_CRITICAL_TEMPERATURE = 647.096
"""Critical temperature of water, IAPWS (from memory) [K]."""


@dataclass(frozen=True, slots=True)
class Gas:
    """A gas or vapour, as the sizing needs it.

    Parameters
    ----------
    molar_mass : float
        Molar mass [kg/kmol].
    heat_ratio : float
        Ratio of specific heats [1].
    """

    molar_mass: float
    heat_ratio: float


GASES = {"air": Gas(28.96, 1.40), "steam": Gas(18.015, 1.31), "natural gas": Gas(17.0, 1.31)}
"""Usual media, values from memory; natural gas as mostly methane."""


@dataclass(frozen=True, slots=True)
class Trim:
    """What the valve's make and pipes contribute; the defaults are typical of a globe valve, flow to open (from memory).

    Parameters
    ----------
    recovery : float
        Liquid pressure recovery factor FL [1].
    style : float
        Valve style modifier Fd [1].
    choke_ratio : float
        Pressure difference ratio xT at which gas flow chokes [1].
    size, inlet_pipe, outlet_pipe : float or None
        Diameters of valve and pipes; all or none. Without them flow is taken as turbulent and without fittings [m].
    """

    recovery: float = 0.9
    style: float = 0.46
    choke_ratio: float = 0.72
    size: float | None = None
    inlet_pipe: float | None = None
    outlet_pipe: float | None = None

    def __post_init__(self) -> None:
        """Refuse some diameters without the others."""
        known = [diameter is not None for diameter in (self.size, self.inlet_pipe, self.outlet_pipe)]
        if any(known) and not all(known):
            raise ValueError("diameters of valve, inlet and outlet pipe belong together")


GLOBE = Trim()
"""A globe valve without fittings."""


@dataclass(frozen=True, slots=True)
class FlowCoefficient:
    """Flow coefficient that a flow asks for.

    Parameters
    ----------
    kv : float
        Flow of water at 1 bar that the valve would pass [m3/h].
    choked : bool
        Whether the flow is choked: a lower outlet pressure would not increase it.
    laminar : bool
        Whether the flow is not turbulent.
    """

    kv: float
    choked: bool
    laminar: bool


class NoPressureDropError(ValueError):
    """The outlet pressure is not below the inlet pressure, or either is no absolute pressure."""


def kv_liquid(
    flow: float,
    density: float,
    inlet: float,
    outlet: float,
    vapour_pressure: float,
    critical_pressure: float = WATER_CRITICAL_PRESSURE,
    viscosity: float = 1e-3,
    trim: Trim = GLOBE,
) -> FlowCoefficient:
    """Size a valve for a liquid.

    Parameters
    ----------
    flow : float
        Volume flow [m3/s].
    density : float
        Density at the inlet [kg/m3].
    inlet, outlet : float
        Absolute pressures before and behind the valve [Pa].
    vapour_pressure, critical_pressure : float
        Vapour pressure at the inlet's temperature, critical pressure; both absolute [Pa].
    viscosity : float
        Dynamic viscosity; matters only where the trim has diameters [Pa s].
    trim : Trim
        Factors of the valve's make.

    Returns
    -------
    FlowCoefficient
        Kv, and whether the flow is choked or laminar.

    Raises
    ------
    NoPressureDropError
        No drop in pressure, or an inlet that boils.

    References
    ----------
    IEC 60534-2-1 through the ``fluids`` library; its annex examples 1 and 2 are the tests.

    Examples
    --------
    360 m3/h at 965.4 kg/m3 over 4.6 bar, by hand ``360 sqrt(0.9654/4.6) = 164.9``:

    >>> round(kv_liquid(0.1, 965.4, 680e3, 220e3, vapour_pressure=70.1e3).kv)
    165
    """
    from fluids.control_valve import size_control_valve_l  # noqa: PLC0415 - its import takes longer than a loop's decision

    _check_drop(flow, inlet, outlet)
    if vapour_pressure >= inlet:
        raise NoPressureDropError(f"the liquid boils before the valve: vapour pressure {vapour_pressure:.4g} Pa at {inlet:.4g} Pa")
    found = size_control_valve_l(
        rho=density, Psat=vapour_pressure, Pc=critical_pressure, mu=viscosity, P1=inlet, P2=outlet, Q=flow,
        D1=trim.inlet_pipe, D2=trim.outlet_pipe, d=trim.size, FL=trim.recovery, Fd=trim.style, full_output=True,
    )  # fmt: skip
    return _read(found)


def kv_gas(
    flow: float,
    gas: Gas,
    temperature: float,
    inlet: float,
    outlet: float,
    compressibility: float = 1.0,
    viscosity: float = 1.5e-5,
    trim: Trim = GLOBE,
) -> FlowCoefficient:
    """Size a valve for a gas or for steam.

    Parameters
    ----------
    flow : float
        Mass flow [kg/s].
    gas : Gas
        Molar mass and ratio of specific heats.
    temperature : float
        Temperature at the inlet [degC].
    inlet, outlet : float
        Absolute pressures before and behind the valve [Pa].
    compressibility : float
        Z at the inlet; 1 errs towards the larger valve for steam [1].
    viscosity : float
        Dynamic viscosity; matters only where the trim has diameters [Pa s].
    trim : Trim
        Factors of the valve's make.

    Returns
    -------
    FlowCoefficient
        Kv, and whether the flow is choked or laminar.

    Raises
    ------
    NoPressureDropError
        No drop in pressure.

    References
    ----------
    IEC 60534-2-1 through the ``fluids`` library; its annex examples 3 and 4 are the tests.

    Examples
    --------
    >>> found = kv_gas(0.1, GASES["steam"], temperature=160, inlet=6e5, outlet=2e5)
    >>> round(found.kv, 1), found.choked
    (4.9, False)
    """
    from fluids.control_valve import size_control_valve_g  # noqa: PLC0415 - its import takes longer than a loop's decision

    _check_drop(flow, inlet, outlet)
    found = size_control_valve_g(
        T=temperature + KELVIN, MW=gas.molar_mass, mu=viscosity, gamma=gas.heat_ratio, Z=compressibility, P1=inlet, P2=outlet,
        Q=flow / gas.molar_mass * NORMAL_VOLUME, D1=trim.inlet_pipe, D2=trim.outlet_pipe, d=trim.size, FL=trim.recovery,
        Fd=trim.style, xT=trim.choke_ratio, full_output=True,
    )  # fmt: skip
    return _read(found)


def _read(found: object) -> FlowCoefficient:
    """Return what the library says under its full output."""
    if not isinstance(found, dict):
        raise TypeError("the sizing library gave no full output")
    return FlowCoefficient(float(found["Kv"]), bool(found["choked"]), bool(found["laminar"]))


def _check_drop(flow: float, inlet: float, outlet: float) -> None:
    """Refuse what has no flow coefficient."""
    if flow <= 0:
        raise ValueError("a valve is sized for a flow above zero")
    if not 0 < outlet < inlet:
        raise NoPressureDropError(f"no drop from {inlet:.4g} Pa to {outlet:.4g} Pa absolute")


def water_vapour_pressure(temperature: float) -> float:
    """Vapour pressure of water.

    Parameters
    ----------
    temperature : float
        Temperature, 0 degC to 370 degC [degC].

    Returns
    -------
    float
        Absolute pressure [Pa].

    Raises
    ------
    ValueError
        A temperature outside the range.

    References
    ----------
    Wagner & Pruss, J. Phys. Chem. Ref. Data 31 (2002) 387, eq. 2.5 (from memory; checked against two steam table values).

    Examples
    --------
    >>> round(water_vapour_pressure(100.0) / 1000, 1)
    101.4
    """
    if not 0 <= temperature <= 370:  # noqa: PLR2004 - range of the equation, just short of the critical point
        raise ValueError(f"{temperature} degC lies outside 0 degC to 370 degC")
    kelvin = temperature + KELVIN
    v = 1 - kelvin / WATER_CRITICAL_TEMPERATURE
    terms = ((-7.85951783, 1.0), (1.84408259, 1.5), (-11.7866497, 3.0), (22.6807411, 3.5), (-15.9618719, 4.0), (1.80122502, 7.5))
    return WATER_CRITICAL_PRESSURE * exp(WATER_CRITICAL_TEMPERATURE / kelvin * sum(a * v**power for a, power in terms))
