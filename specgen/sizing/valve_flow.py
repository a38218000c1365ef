"""The flow coefficient that a declared flow asks of a valve over the declared pressures, by medium."""

from dataclasses import dataclass

from specgen.core.figure import Figure
from specgen.core.quantity import Range, is_a
from specgen.model.element import ModulatingValve
from specgen.process.valve import GASES, KELVIN, Gas, NoPressureDropError, kv_gas, kv_liquid, water_vapour_pressure
from specgen.sizing.candidate import Assumption, Unsized

ATMOSPHERE = 101325.0
"""Standard atmosphere, added to a gauge pressure [Pa]."""
GAS_CONSTANT = 8314.46
"""Molar gas constant, CODATA [J/(kmol K)]."""
ROOM = 20.0
COLD_WATER = 998.0
IEC = "IEC 60534-2-1, turbulent flow without fittings, globe valve (by the fluids library)"
_GASES = {"steam": "steam", "air": "air", "gas": "natural gas"}
_LIQUIDS = ("water", "brine", "oil")


@dataclass(frozen=True, slots=True)
class NeededKv:
    """Kv that the full flow asks for over the whole pressure difference, at the least and the most of the declared ranges [m3/h]."""

    low: float
    high: float
    choked: bool
    figures: tuple[Figure, ...]
    assumptions: tuple[Assumption, ...]


@dataclass(frozen=True, slots=True)
class _Corner:
    """One end of the declared ranges: flow as declared, density [kg/m3] or None, absolute pressures [Pa], temperature [degC]."""

    flow: float
    density: float | None
    inlet: float
    outlet: float
    temperature: float


def needed_kv(element: ModulatingValve) -> NeededKv | Unsized:
    """Return the flow coefficient that the declared flow at full output asks for.

    Parameters
    ----------
    element : ModulatingValve
        Its flow, pressures and medium; a range counts with the end that asks for most, and with the other for the least.

    Returns
    -------
    NeededKv or Unsized
        Unsized where a field is missing, there is no drop in pressure, or the liquid boils before the valve.

    References
    ----------
    IEC 60534-2-1; gauge pressures are taken over the standard atmosphere.
    """
    given = (("flow", element.flow), ("inlet_pressure", element.inlet_pressure), ("outlet_pressure", element.outlet_pressure))
    missing = tuple(f"element.{name}" for name, value in (*given, ("medium", element.medium)) if value is None)
    if element.flow is None or element.inlet_pressure is None or element.outlet_pressure is None or element.medium is None:
        return Unsized("what flows through the valve is not declared", missing)
    warm = element.medium_temperature
    assumed: list[Assumption] = []
    if warm is None and element.medium in _GASES:
        return Unsized("the medium's temperature is not declared", ("element.medium_temperature",))
    if warm is None:
        why = "not declared; it counts only where the liquid is near boiling"
        assumed.append(Assumption("element.medium_temperature", f"{ROOM:g} °C", why))
        warm = Range(ROOM, ROOM, f"{ROOM:g} degC")
    density = _density(element, assumed)
    if isinstance(density, Unsized):
        return density
    lightest, heaviest = (None, None) if density is None else (density.low, density.high)
    absolute = [Range(p.low + ATMOSPHERE, p.high + ATMOSPHERE) for p in (element.inlet_pressure, element.outlet_pressure)]
    # Kv goes with the root of the density for a volume, against it for a mass
    mass = is_a(element.flow.text, "flow_mass")
    hard, easy = (lightest, heaviest) if mass else (heaviest, lightest)
    # hot is light and near boiling; of a gas by volume whose own law gives the density the cold one is heavy
    cold_is_hard = element.medium in _GASES and not mass
    for_most, for_least = (warm.low, warm.high) if cold_is_hard else (warm.high, warm.low)
    most = _Corner(element.flow.high, hard, absolute[0].low, absolute[1].high, for_most)
    least = _Corner(element.flow.low, easy, absolute[0].high, absolute[1].low, for_least)
    try:
        high, choked = _kv(element, most)
        low, _ = _kv(element, least)
    except (NoPressureDropError, ValueError) as error:
        return Unsized(str(error), ("element.inlet_pressure", "element.outlet_pressure"))
    return NeededKv(min(low, high), high, choked, (_figure(element, most, high, choked=choked),), tuple(assumed))


def _density(element: ModulatingValve, assumed: list[Assumption]) -> Range | Unsized | None:
    """Return the density at the inlet; None where a gas' own law gives it."""
    if element.density is not None:
        return element.density
    if element.medium == "water":
        assumed.append(Assumption("element.density", f"{COLD_WATER:g} kg/m³", "not declared: cold water"))
        return Range(COLD_WATER, COLD_WATER)
    if element.medium in _LIQUIDS:
        return Unsized("the liquid's density is not declared", ("element.density",))
    assumed.append(Assumption("element.density", "ideal gas", "not declared; errs towards the larger valve for steam"))
    return None


def _kv(element: ModulatingValve, at: _Corner) -> tuple[float, bool]:
    assert element.flow is not None  # noqa: S101  asked for before
    mass = is_a(element.flow.text, "flow_mass")
    if element.medium in _LIQUIDS:
        assert at.density is not None  # noqa: S101  a liquid has one by now
        # brine boils later than water, oil later still: water's vapour pressure is the safe side for the first, none for the second
        boils = 0.0 if element.medium == "oil" else water_vapour_pressure(at.temperature) if at.temperature > 0 else 0.0
        found = kv_liquid(at.flow / at.density if mass else at.flow, at.density, at.inlet, at.outlet, boils)
        return found.kv, found.choked
    gas = GASES[_GASES[str(element.medium)]]
    ideal = _ideal_density(gas, at)
    real = ideal if at.density is None else at.density
    found = kv_gas(at.flow if mass else at.flow * real, gas, at.temperature, at.inlet, at.outlet, compressibility=ideal / real)
    return found.kv, found.choked


def _ideal_density(gas: Gas, at: _Corner) -> float:
    """Return ``p M/(R T)`` at the inlet [kg/m3]."""
    return at.inlet * gas.molar_mass / (GAS_CONSTANT * (at.temperature + KELVIN))


def _figure(element: ModulatingValve, at: _Corner, kv: float, *, choked: bool) -> Figure:
    assert element.flow is not None  # noqa: S101  asked for before
    flow = "kg/s" if is_a(element.flow.text, "flow_mass") else "m³/s"
    given = {"Q": (at.flow, flow), "p1": (at.inlet, "pressure"), "p2": (at.outlet, "pressure"), "t": (at.temperature, "temperature")}
    if at.density is not None:
        given["ρ1"] = (at.density, "density")
    liquid = element.medium in _LIQUIDS
    formula = "Q √(ρ1/1000)/√(p1 − p2) in m³/h and bar, choking counted" if liquid else "expansion by Y, choking counted"
    case = "most flow over the least pressure difference; absolute pressures" + ("; the flow is choked" if choked else "")
    return Figure("Kv", "flow coefficient that the full flow needs over the whole pressure difference", formula, kv, "kv", IEC, given, case)
