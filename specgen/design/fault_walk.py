"""What happens when something fails, fault by fault: where the value goes, how fast, what stops it, and what the operator sees."""

from dataclasses import dataclass, field
from typing import Literal

from specgen.core.say import Said, of_change, of_value, seconds
from specgen.design.designation import designation
from specgen.design.types import DecidedLoop
from specgen.model.sensor import ResistanceSensor, Thermistor, Thermocouple
from specgen.rules.base import Case
from specgen.rules.hazard import GOES, POSITION_OF, lost_positions
from specgen.sizing.candidate import Unsized
from specgen.sizing.faults import Stuck
from specgen.sizing.limiter import SWITCHES, LimiterDesign

Fault = Literal["stuck_on", "stuck_off", "sensor_open", "sensor_short", "out_of_medium", "frozen", "supply_lost", "supply_back"]
TITLES: dict[Fault, str] = {
    "stuck_on": "Output stuck on",
    "stuck_off": "Output stuck off",
    "sensor_open": "Sensor open",
    "sensor_short": "Sensor shorted",
    "out_of_medium": "Sensor out of the medium",
    "frozen": "Reading frozen",
    "supply_lost": "Supply lost",
    "supply_back": "Supply back",
}
ABSOLUTE_ZERO = -273.15  # degC
LIVE_ZERO = ("4-20 mA", "2-10 V", "1-5 V")
_STICKS = {
    "contactor": "A contact of the contactor welds",
    "relay": "A contact of the relay welds",
    "ssr": "The solid-state switch fails closed, as it usually does",
    "power_controller": "The power controller fails fully on, as it usually does",
    "signal": "The signal stays at full output",
    "relay_pair": "The relay that drives towards more output welds",
}
_OPENS = {
    "contactor": "The contactor no longer closes",
    "relay": "The relay no longer closes",
    "ssr": "The solid-state switch no longer conducts",
    "power_controller": "The power controller gives nothing",
    "signal": "The signal stays at no output",
    "relay_pair": "The relay that drives towards less output welds",
}


@dataclass(frozen=True, slots=True)
class FaultOutcome:
    """One fault with its paragraph; ``words`` fill the braces of ``text``."""

    fault: Fault
    text: str
    words: dict[str, Said | str] = field(default_factory=dict)

    @property
    def title(self) -> str:
        """Return what the fault is called."""
        return TITLES[self.fault]


def fault_walk(decided: DecidedLoop) -> tuple[FaultOutcome, ...]:
    """Walk a decided loop through every fault.

    Returns
    -------
    tuple of FaultOutcome
        One an entry of `TITLES`, in that order; where a plant or a declaration is missing the paragraph says so.
    """
    case = decided.decision.chosen.case
    return (
        _stuck_on(decided, case),
        _stuck_off(decided, case),
        FaultOutcome("sensor_open", _sensor_open(case), _fault_words(case)),
        FaultOutcome("sensor_short", _sensor_short(case), _fault_words(case)),
        FaultOutcome("out_of_medium", _out_of_medium(case, decided.limiter)),
        FaultOutcome("frozen", _frozen(case)),
        FaultOutcome("supply_lost", _supply_lost(case)),
        _supply_back(decided, case),
    )


def _stuck_on(decided: DecidedLoop, case: Case) -> FaultOutcome:
    words: dict[str, Said | str] = {}
    start = _STICKS[case.candidate.device]
    if isinstance(case.faults, Unsized):
        text = f"{start}: where the value goes is not known, because {case.faults.because}."
    else:
        text = f"{start}: the value {_course(case, case.faults.on, on=True, words=words)}."
    limiter = decided.limiter
    text += " " + (_stopped(decided, limiter, words) if limiter is not None else _nothing(case, on=True))
    side = case.loop.alarms.high if case.loop.raises else case.loop.alarms.low
    seen = "the controller asks for no output while the value goes on"
    if side is not None:
        seen += ", past the alarm at {alarm}"
        words["alarm"] = of_value(side)
    return FaultOutcome("stuck_on", f"{text} What the operator sees: {seen}.", words)


def _stuck_off(decided: DecidedLoop, case: Case) -> FaultOutcome:
    words: dict[str, Said | str] = {}
    start = _OPENS[case.candidate.device]
    if isinstance(case.faults, Unsized):
        text = f"{start}: where the value goes is not known, because {case.faults.because}."
    else:
        text = f"{start}: the value {_course(case, case.faults.off, on=False, words=words)}."
    alarm = decided.safety.alarm if decided.safety is not None else None
    if alarm is None:
        text += " " + _nothing(case, on=False)
    elif alarm.set is None or alarm.acts_at is None:
        text += " No alarm can be set that comes after normal running and before the danger: rule S1 holds nothing here."
    else:
        words |= {"set": of_value(alarm.set), "acts": of_value(alarm.acts_at), "short": of_change(alarm.window.short(alarm.acts_at))}
        sensor, lamp = designation(decided.tag, "B3"), designation(decided.tag, "P1")
        text += f" The alarm {sensor} set at {{set}} comes at a true value of {{acts}}, {{short}} short of the danger, and shows at {lamp}"
        text += "; it is independent of the loop and stops nothing by itself: somebody has to come."
        if alarm.consequence in ("injury", "fire"):
            text += f" At stake is {alarm.consequence}: whether an alarm is enough, the risk assessment decides."
    side = case.loop.alarms.low if case.loop.raises else case.loop.alarms.high
    seen = "the controller asks for full output while the value goes the other way"
    if side is not None and alarm is None:
        seen += ", past the alarm at {alarm}"
        words["alarm"] = of_value(side)
    return FaultOutcome("stuck_off", f"{text} What the operator sees: {seen}.", words)


def _course(case: Case, stuck: Stuck, *, on: bool, words: dict[str, Said | str]) -> str:
    """Say where the value ends, against danger and spoiling, and how soon."""
    upwards = on == case.loop.raises
    limits = case.loop.limits
    danger, spoils = (limits.danger_high, limits.spoils_high) if upwards else (limits.danger_low, limits.spoils_low)
    if stuck.settles_at is None:
        said = "runs on without settling"
    elif case.loop.need.quantity == "temperature" and stuck.settles_at < ABSOLUTE_ZERO:
        said = "runs on farther than the plant as declared can be followed"
    else:
        said, words["end"] = "settles at {end}", of_value(stuck.settles_at)
    if danger is not None:
        words["danger"] = of_value(danger)
        said += ", past the danger at {danger}" if stuck.passes else ", short of the danger at {danger}"
        if stuck.passes and stuck.time_to_danger is not None:
            words["soon"] = seconds(stuck.time_to_danger)
            said += ", which it reaches {soon} after the worst peak of normal running"
    else:
        said += f"; no danger is declared on the {'high' if upwards else 'low'} side"
    if spoils is not None and stuck.time_to_spoil is not None:
        words |= {"spoils": of_value(spoils), "spoilt": seconds(stuck.time_to_spoil)}
        said += "; the product spoils at {spoils}, at the earliest after {spoilt}"
    return said


def _stopped(decided: DecidedLoop, limiter: LimiterDesign, words: dict[str, Said | str]) -> str:
    names = {product: designation(decided.tag, product) for product in ("F2", "Q2", "B2", "S2")}
    if limiter.set is None:
        return f"Normal running leaves the limiter {names['F2']} no set value short of the danger: nothing stops it in time (rule S1)."
    words["limit"] = of_value(limiter.set)
    said = f"The limiter {names['F2']} with its own sensor {names['B2']} is set at {{limit}}"
    if limiter.acts_at is not None:
        words |= {"limit_acts": of_value(limiter.acts_at), "limit_lag": seconds(limiter.sensor_lag)}
        said += " and acts at a true value of {limit_acts} through its sensor's lag of {limit_lag}"
    if limiter.short_of_danger is not None:
        words["left"] = of_change(abs(limiter.short_of_danger))
        said += ", {left} " + ("short of" if limiter.short_of_danger > 0 else "past") + " the danger"
    said += f". It opens {names['Q2']} ({SWITCHES[limiter.switch]})"
    if limiter.peaks_at is not None:
        words["peak"] = of_value(limiter.peaks_at)
        said += "; dead time and what is stored carry the value on to {peak}"
        if limiter.coasts_past:
            said += ", past the danger: the limiter acts in time and is still too late for what follows"
    again = f"until somebody resets it at {names['S2']}" if limiter.resets == "manual" else "until the value returns: it resets by itself"
    return f"{said}. It stays off {again}."


def _nothing(case: Case, *, on: bool) -> str:
    """Say why nothing independent stands against a stuck output."""
    upwards = on == case.loop.raises
    danger = case.loop.limits.danger_high if upwards else case.loop.limits.danger_low
    if isinstance(case.faults, Unsized):
        return "Whether something independent is needed is open (rule S1)."
    if danger is None:
        return "Nothing independent stands against it: a danger that is not declared is not looked at."
    return "The value stays short of the danger in the worst declared case; nothing independent stops it."


def _fault_words(case: Case) -> dict[str, Said | str]:
    return {"reason": case.loop.limits.on_sensor_fault_because or ""}


def _on_fault(case: Case) -> str:
    """Say what the declared output on sensor fault leads to."""
    declared = case.loop.limits.on_sensor_fault
    if declared is None:
        return "what the output then does is not declared (limits.on_sensor_fault): it can go either way"
    reason = " ({reason})" if case.loop.limits.on_sensor_fault_because else ""
    return {
        "off": f"the output goes off, as declared{reason}, and the value goes where an output stuck off takes it",
        "full": f"the output goes to full, as declared{reason}, and the value goes where an output stuck on takes it",
        "hold": f"the output stays where it was, as declared{reason}, and the value follows the load",
    }[declared]


_SEES = "What the operator sees: the controller's sensor alarm"
_UNSEEN = "What the operator sees: nothing but a reading that does not fit the plant"


def _sensor_open(case: Case) -> str:
    sensor = case.loop.sensor
    if isinstance(sensor, ResistanceSensor):
        return f"The reading runs past the top of the range and the controller knows it for a fault: {_on_fault(case)}. {_SEES}."
    if isinstance(sensor, Thermistor):
        return f"The reading runs past the cold end and the controller knows it for a fault: {_on_fault(case)}. {_SEES}."
    if isinstance(sensor, Thermocouple):
        return f"The input's own current drives the reading up-scale and the controller knows it for a fault: {_on_fault(case)}. {_SEES}."
    if sensor.signal is None:
        return f"Without sensor.signal nobody can say whether a broken wire is seen (rule I4); where it is, {_on_fault(case)}. {_UNSEEN}."
    if sensor.signal in LIVE_ZERO:
        return f"The signal falls below its live zero and the controller knows it for a fault: {_on_fault(case)}. {_SEES}."
    return f"The signal falls to zero and looks like the low end of the range: {_reads_low(case)}. {_UNSEEN}."


def _sensor_short(case: Case) -> str:
    sensor = case.loop.sensor
    if isinstance(sensor, ResistanceSensor):
        return f"The reading runs past the bottom of the range and the controller knows it for a fault: {_on_fault(case)}. {_SEES}."
    if isinstance(sensor, Thermistor):
        return f"The reading runs past the hot end and the controller knows it for a fault: {_on_fault(case)}. {_SEES}."
    if isinstance(sensor, Thermocouple):
        where = "A short makes a new junction where the wires touch: the reading is the temperature there, and no controller can tell"
        return f"{where}. Where that is colder than the medium, {_reads_low(case)}. {_UNSEEN}."
    if sensor.signal is None:
        return f"Without sensor.signal nobody can say whether a short is seen (rule I4); where it is, {_on_fault(case)}. {_UNSEEN}."
    if sensor.signal.endswith("mA"):
        shorted = "A short of the transmitter takes the current past the top of the range, one across the input takes it to zero"
        if sensor.signal in LIVE_ZERO:
            return f"{shorted}; the controller knows both for a fault: {_on_fault(case)}. {_SEES}."
        return f"{shorted}; the second looks like the low end: {_reads_low(case)}. {_UNSEEN}."
    if sensor.signal in LIVE_ZERO:
        return f"The voltage falls below its live zero and the controller knows it for a fault: {_on_fault(case)}. {_SEES}."
    return f"The voltage falls to zero and looks like the low end of the range: {_reads_low(case)}. {_UNSEEN}."


def _reads_low(case: Case) -> str:
    if case.loop.raises:
        return "the output goes to full and stays there, and the value goes where an output stuck on takes it"
    return "the output goes off and stays there, and the value goes where an output stuck off takes it"


def _out_of_medium(case: Case, limiter: LimiterDesign | None) -> str:
    where = {
        "temperature": "The sensor reads the surroundings",
        "humidity": "The sensor reads the surroundings",
    }.get(case.loop.need.quantity, "The sensor is cut off from the medium and its reading falls to the low end")
    at_rest = case.loop.need.quantity in ("temperature", "humidity")
    # surroundings lie where the value rests without output, so that the loop drives against them
    full = at_rest or case.loop.raises
    goes = "stuck on" if full else "stuck off"
    ended = ""
    if full and limiter is not None and limiter.set is not None:
        ended = "; the limiter's own sensor, which has to sit elsewhere in the medium, ends it"
    elif full:
        ended = "; nothing else measures it"
    text = f"{where}: no controller knows that for a fault. The output goes {'to full' if full else 'off'} and the value goes where an "
    return f"{text}output {goes} takes it{ended}. What the operator sees: full or no output that does not move the reading."


def _frozen(case: Case) -> str:
    proportional = case.candidate.mode != "on_off"
    drifts = "integral action takes the output to one end" if proportional else "the output stays as it is, on or off, without end"
    return (
        f"The last reading stays: {drifts}. Frozen short of the setpoint the value goes where an output stuck on takes it, "
        "frozen past it where one stuck off does. No controller knows that for a fault; only what is independent of this sensor ends it. "
        "What the operator sees: a reading that does not move at all, not even by its noise."
    )


def _supply_lost(case: Case) -> str:
    positions = lost_positions(case)
    if case.traits.valve:
        supply = {name: position for name, position in positions.items() if name != "element.on_signal_loss"}
        position = next(iter(supply.values()))
        if position is None:
            return f"Where the valve goes without supply is not declared ({', '.join(supply)}): it can go either way. Nothing shows."
        effect = {
            "close": "where an output stuck off takes it", "open": "where an output stuck on takes it", "hold": "where the load takes it",
        }[position]  # fmt: skip
        safe = case.loop.limits.on_sensor_fault
        against = "" if safe is None or POSITION_OF[safe] == position else ", which is not the state declared for a lost measurement"
        return f"The valve {GOES[position]}{against}; the value goes {effect}. What the operator sees: a dark panel."
    return (
        "The element loses its power and the value goes where an output stuck off takes it. Contactors drop, the chain opens, "
        "pumps and fans stop too: what still glows or still flows is not carried away. What the operator sees: a dark panel."
    )


def _supply_back(decided: DecidedLoop, case: Case) -> FaultOutcome:
    own, house = case.loop.limits.after_power_return, case.panel.house.after_power_return
    does = own or house
    who = "as declared" if own is not None else "by the house's rule"
    words: dict[str, Said | str] = {}
    if does == "off":
        text = f"The loop stays off until somebody starts it, {who}."
    elif does == "resume":
        text = f"The loop resumes by itself, {who}: whoever is inside or at the machine is not warned."
    elif case.loop.limits.consequence in ("injury", "fire"):
        text = "What the loop does is not declared and has to be (rule S4)."
    else:
        text = "The loop is taken to resume by itself, since nothing is declared: whoever is inside or at the machine is not warned."
    rest = getattr(case.loop.element, "min_rest", None)
    if rest is not None and does != "off":
        words["rest"] = seconds(float(rest))
        text += " The machine's least rest of {rest} counts from the return."
    limiter = decided.limiter
    if limiter is not None and limiter.resets == "manual":
        text += f" A limiter that had acted stays open until {designation(decided.tag, 'S2')} is pressed: the loss of supply is no reset."
    return FaultOutcome("supply_back", f"{text} What the operator sees: the loop's state on the controller.", words)
