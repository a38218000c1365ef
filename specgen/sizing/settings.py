"""What is entered at the controller for each mode, with the limits it was chosen between and what it predicts."""

from dataclasses import dataclass
from typing import TYPE_CHECKING, Literal

from specgen.core.figure import Figure
from specgen.sizing.candidate import Assumption

if TYPE_CHECKING:
    from specgen.process.on_off import OnOffPrediction
    from specgen.process.time_proportioned import RipplePrediction
    from specgen.sizing.valve_sizing import ValveSizing

Placement = Literal["centred", "below", "above"]


@dataclass(frozen=True, slots=True)
class Bound:
    """A limit on a differential or cycle time: the rule that sets it, the number, and the words for it."""

    rule: str
    limit: float
    words: str


@dataclass(frozen=True, slots=True)
class OnOffSettings:
    """On-off: the whole distance between the switch points [in the loop's quantity] and where they lie.

    ``least`` and ``most`` are what the rules allow (``most`` infinite where nothing bounds it); ``least_bounds`` has
    one bound for each of D1, D2, D3, D5, D6 that could be computed, ``most_bound`` is D4's. ``warm_up`` [s] is the longest way
    from the coldest rest to the band, None where the plant cannot say where it rests. ``natural`` is predicted
    without the least times, ``enforced`` with them (the same object where they do not bind).
    """

    differential: float
    placement: Placement
    switch_on: float
    switch_off: float
    least: float
    most: float
    least_bounds: tuple[Bound, ...]
    most_bound: Bound | None
    natural: "OnOffPrediction"
    enforced: "OnOffPrediction"
    starts_per_hour: float
    operations_per_year: float
    contact_life: float | None
    weakest: str
    chosen_by: Literal["computed", "choose"]
    warm_up: float | None = None
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()


@dataclass(frozen=True, slots=True)
class Tuning:
    """Starting values in the ideal form ``Kc(1 + 1/(Ti s) + Td s)``; gain as output share per loop quantity.

    ``effective_delay`` and ``delay_without_cycle`` in s. Margins are the worst over the cases, of the loop with the
    charged delay and of the latched loop itself; ``stable`` tells whether the latched loop is stable at 10 %, 90 % and
    over the declared duties. ``load_deviation`` is simulated, present where a sudden load is declared; ``overshoot`` and
    ``time_to_band`` [s] are simulated from rest, None where the plant cannot say where it rests.
    """

    gain: float
    proportional_band: float
    integral_time: float
    derivative_time: float
    effective_delay: float
    delay_without_cycle: float
    gain_margin: float
    phase_margin: float
    peak_sensitivity: float
    stable: bool
    load_deviation: float | None
    overshoot: float | None
    time_to_band: float | None
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()


@dataclass(frozen=True, slots=True)
class ProportionedSettings:
    """Time-proportioned: cycle time [s], what bounds it, the ripple it leaves and the tuning that includes its delay.

    ``least_bounds`` by C3, C4 and C7, ``most_bounds`` by C1, C2 and C8; ``shortest_on`` and ``shortest_off`` at the
    widest of the declared duties and 5 and 95 percent.
    """

    cycle_time: float
    least: float
    most: float
    least_bounds: tuple[Bound, ...]
    most_bounds: tuple[Bound, ...]
    ripple: "RipplePrediction"
    lowest_duty: float
    highest_duty: float
    shortest_on: float
    shortest_off: float
    least_pulse: float
    operations_per_year: float
    contact_life: float | None
    weakest: str
    tuning: Tuning
    chosen_by: Literal["computed", "choose"]
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()


@dataclass(frozen=True, slots=True)
class ContinuousSettings:
    """Analogue: the signal and the tuning; where a modulating valve takes it, how the valve is used.

    ``opening_low`` and ``opening_high`` are travels of that valve at the lowest and highest duty [1], None where they could not be
    computed or the valve shuts; ``lowest_flow`` is the least share of the full flow it can control.
    """

    signal: str
    tuning: Tuning
    duty_low: float
    duty_high: float
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    valve: "ValveSizing | None" = None

    @property
    def opening_low(self) -> float | None:
        """Return the valve's opening at the lowest duty."""
        return self.valve.opening_low if self.valve is not None else None

    @property
    def opening_high(self) -> float | None:
        """Return the valve's opening at the highest duty."""
        return self.valve.opening_high if self.valve is not None else None

    @property
    def lowest_flow(self) -> float | None:
        """Return the least share of the full flow that the valve can control."""
        return self.valve.lowest_flow if self.valve is not None else None


@dataclass(frozen=True, slots=True)
class ThreePointSettings:
    """Three-point: neutral zone [in the loop's quantity], travel of the shortest pulse [0..1] and the tuning.

    ``pulses_per_hour`` [1/h] and ``motor_share`` (of the time) are what the actuator works where the load sweeps its declared range
    there and back once an hour.
    """

    neutral_zone: float
    travel_step: float
    tuning: Tuning
    duty_low: float
    duty_high: float
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    pulses_per_hour: float | None = None
    motor_share: float | None = None


Settings = OnOffSettings | ProportionedSettings | ContinuousSettings | ThreePointSettings
