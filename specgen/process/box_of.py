"""From a loop as declared to its worst-case box: balance, response, rates or an identified step test."""

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from math import sqrt

from specgen.core.quantity import Range
from specgen.core.say import Phrasing
from specgen.model.loop import Loop
from specgen.model.panel import Panel, Supply
from specgen.model.plant import Balance, Body, Rates
from specgen.model.traits import traits_of
from specgen.process.axis import Axis, Declared, declared, single
from specgen.process.box import Box, Unmodelled

ONE = Declared("", "", 1.0, 1.0, "number")


def box_of(loop: Loop, panel: Panel, fitted: Mapping[str, Range] | None = None) -> Box | Unmodelled:
    """Return the box of a loop's plant, or why there is none and which fields would make one.

    Parameters
    ----------
    loop, panel : Loop, Panel
        As declared; the panel gives the supply, whose tolerance moves a resistive element's power.
    fitted : mapping of str to Range or None
        An identified step test at the supply it was made at: ``change`` (size), ``time_constant``, ``dead_time``, ``rest_value`` and,
        where it has one, ``lag``.

    Returns
    -------
    Box or Unmodelled
    """
    if loop.plant is None:
        return Unmodelled("no plant is declared", ("plant",))
    made = _Making(loop, panel)
    if loop.plant.balance is not None:
        return made.balance(loop.plant.balance)
    if loop.plant.response is not None:
        r = loop.plant.response
        return made.response("plant.response", r.change, r.time_constant, r.dead_time, r.lag, r.rest_value, made.supply())
    if loop.plant.rates is not None:
        return made.rates(loop.plant.rates)
    if fitted is None:
        return Unmodelled("the recorded step test is not identified", ("plant.step_test.file",))
    test = made.supply_since_test(loop.plant.step_test.supply if loop.plant.step_test is not None else None)
    parts = (fitted["change"], fitted["time_constant"], fitted["dead_time"], fitted.get("lag"), fitted["rest_value"])
    return made.response("plant.step_test", *parts, test)


def applied_voltage(supply: Supply, rated: float, phases: int) -> float:
    """Return the supply's voltage that an element is connected to: the one nearest to its rated voltage [V].

    A three-phase element takes the voltage between lines. Others take what the system offers: between lines, line to neutral where there
    is one, half of a split supply, and the high leg's to neutral.

    Examples
    --------
    >>> from specgen.core.quantity import Quantity
    >>> supply = Supply(voltage=Quantity(400.0), phases=3, frequency=Quantity(50.0))
    >>> round(applied_voltage(supply, 230, 1), 2), applied_voltage(supply, 400, 1), applied_voltage(supply, 400, 3)
    (230.94, 400.0, 400.0)
    """
    line = float(supply.voltage)
    if phases == 3:  # noqa: PLR2004 - three phases
        return line
    system = supply.system or ("star" if supply.phases == 3 else "single")  # noqa: PLR2004 - three phases
    offered = [line]
    if system == "star" and supply.neutral:
        offered.append(line / sqrt(3))
    if system in ("split", "high_leg") and supply.neutral:
        offered.append(line / 2)
    if system == "high_leg" and supply.neutral:
        offered.append(line * sqrt(3) / 2)
    return min(offered, key=lambda v: abs(v - rated))


@dataclass(frozen=True, slots=True)
class _Making:
    loop: Loop
    panel: Panel

    @property
    def sign(self) -> int:
        return 1 if self.loop.raises else -1

    def supply(self) -> tuple[Declared, float] | None:
        """Return the supply as a share of its nominal voltage and the square of nominal over rated; None where power does not follow."""
        element = self.loop.element
        if not traits_of(element).resistive_power:
            return None
        rated = float(getattr(element, "voltage", 0.0) or 0.0)
        if rated <= 0:
            return None
        span = self.panel.supply_range
        ratio = applied_voltage(self.panel.supply, rated, getattr(element, "phases", None) or 1) / rated
        return declared("supply.tolerance", "supply", span, "supply"), ratio * ratio

    def supply_since_test(self, at_test: float | None) -> tuple[Declared, float] | None:
        """Return the supply as a share of what it was during a test; without that, the tolerance counts both ways."""
        now = self.supply()
        if now is None:
            return None
        if at_test is not None:
            element = self.loop.element
            nominal = applied_voltage(self.panel.supply, at_test, getattr(element, "phases", None) or 1)
            return now[0], (nominal / at_test) ** 2
        low, high = now[0].at_zero, now[0].at_one
        return declared("supply.tolerance", "supply since the test", Range(low / high, high / low), "supply"), 1.0

    def setpoint(self) -> Declared:
        made = declared("need.range" if self.loop.need.range else "need.setpoint", "setpoint", self.loop.need.setpoints, "value")
        return made if self.loop.raises else made.turned()

    def against(self, field: Declared) -> Declared:
        """Order surroundings or a rest value: mildest first, which is the warmest where the element raises."""
        return field.turned() if self.loop.raises else field

    def sensor_lag(self) -> Axis:
        return single("sensor.lag", "sensor lag", self.loop.sensor.lag, "time")

    def balance(self, plant: Balance) -> Box | Unmodelled:
        if self.loop.need.quantity != "temperature":
            return Unmodelled("a heat balance describes a temperature", ("plant.response", "plant.rates"))
        strength = self._power()
        if isinstance(strength, Unmodelled):
            return strength
        at = "plant.balance"
        if plant.surfaces is not None:
            loss = Axis(
                tuple(
                    (
                        declared(f"{at}.surfaces.{i}.area", f"area of {s.what}", s.area, "area"),
                        declared(f"{at}.surfaces.{i}.u_value", f"U of {s.what}", s.u_value, "u_value"),
                    )
                    for i, s in enumerate(plant.surfaces)
                )
            )
        else:
            loss = single(f"{at}.loss", "loss", plant.loss, "loss")
        ambient = plant.surroundings if loss.terms and plant.surroundings is not None else None
        return Box(
            sign=self.sign,
            setpoint=self.setpoint(),
            strength=strength,
            ambient=None if ambient is None else self.against(declared(f"{at}.surroundings", "surroundings", ambient, "temperature")),
            heat=single(f"{at}.load", "load", plant.load, "power"),
            loss=loss,
            capacity=_capacity(plant, fast_only=True),
            whole_capacity=_capacity(plant, fast_only=False),
            dead_time=single(f"{at}.dead_time", "dead time", plant.dead_time, "time"),
            lag=single(f"{at}.lag", "lag", plant.lag, "time"),
            sensor_lag=self.sensor_lag(),
            phrasing=Phrasing(self.loop.unit, self.loop.difference_unit),
            form="balance",
        )

    def response(
        self,
        at: str,
        change: Range,
        time_constant: Range,
        dead_time: Range,
        lag: Range | None,
        rest: Range,
        supply: tuple[Declared, float] | None,
    ) -> Box:
        size = declared(f"{at}.change", "change", change, "change")
        voltage, square = supply if supply is not None else (ONE, 1.0)
        tau = single(f"{at}.time_constant", "time constant", time_constant, "time")
        return Box(
            sign=self.sign,
            setpoint=self.setpoint(),
            strength=Axis(((size, voltage, voltage),), square),
            ambient=self.against(declared(f"{at}.rest_value", "rest value", rest, "value")),
            heat=Axis(),
            loss=Axis(((ONE,),)),
            capacity=tau,
            whole_capacity=tau,
            dead_time=single(f"{at}.dead_time", "dead time", dead_time, "time"),
            lag=single(f"{at}.lag", "lag", lag, "time"),
            sensor_lag=self.sensor_lag(),
            phrasing=Phrasing(self.loop.unit, self.loop.difference_unit),
            form="step_test" if at.endswith("step_test") else "response",
        )

    def rates(self, plant: Rates) -> Box:
        at = "plant.rates"
        voltage, square = self.supply() or (ONE, 1.0)
        return Box(
            sign=self.sign,
            setpoint=self.setpoint(),
            strength=single(f"{at}.with_output", "speed with output", plant.with_output, "rate_of_value"),
            ambient=None,
            heat=single(f"{at}.without_output", "speed without output", plant.without_output, "rate_of_value"),
            loss=Axis(),
            capacity=Axis(((ONE,),)),
            whole_capacity=Axis(((ONE,),)),
            dead_time=single(f"{at}.dead_time", "dead time", plant.dead_time, "time"),
            lag=single(f"{at}.lag", "lag", plant.lag, "time"),
            sensor_lag=self.sensor_lag(),
            phrasing=Phrasing(self.loop.unit, self.loop.difference_unit),
            form="rates",
            boost=Axis(((voltage, voltage),), square),
        )

    def _power(self) -> Axis | Unmodelled:
        """Return the heat that full output moves: the electrical power of a heater, the capacity of everything else."""
        element = self.loop.element
        traits = traits_of(element)
        if not traits.electric_heat:
            capacity = getattr(element, "capacity", None)
            if capacity is None:
                return Unmodelled("the heat that the element moves at full output is not declared", ("element.capacity",))
            return single("element.capacity", "capacity", capacity, "power")
        given = getattr(element, "power", None)
        if given is None:
            return Unmodelled("the element's power is not declared", ("element.power",))
        power = declared("element.power", "power", given, "power")
        supply = self.supply()
        if supply is None:
            return Axis(((power,),), float(element.count))
        voltage, square = supply
        return Axis(((power, voltage, voltage),), float(element.count) * square)


def _capacity(plant: Balance, *, fast_only: bool) -> Axis:
    """Return the heat capacity of the bodies that count."""
    if plant.bodies is None:
        return single("plant.balance.heat_capacity", "heat capacity", plant.heat_capacity, "heat_capacity")
    return Axis(tuple(_body(i, b) for i, b in _counted(plant.bodies, fast_only=fast_only)))


def _counted(bodies: Iterable[Body], *, fast_only: bool) -> list[tuple[int, Body]]:
    return [(i, b) for i, b in enumerate(bodies) if b.follows == "fast" or not fast_only]


def _body(i: int, body: Body) -> tuple[Declared, Declared]:
    at = f"plant.balance.bodies.{i}"
    return (
        declared(f"{at}.mass", f"mass of {body.what}", body.mass, "mass"),
        declared(f"{at}.specific_heat", f"specific heat of {body.what}", body.specific_heat, "specific_heat"),
    )
