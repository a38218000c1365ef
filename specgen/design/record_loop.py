"""One loop of the record."""

from collections.abc import Mapping
from math import isfinite
from typing import Any

from specgen.core.figure import Figure
from specgen.core.quantity import Unit
from specgen.design.designation import designation
from specgen.design.rounding import in_unit, rounded
from specgen.design.types import DecidedLoop, Firm, Rejected
from specgen.process.box import Unmodelled
from specgen.rules.base import Case, Finding
from specgen.sizing.candidate import Unsized
from specgen.sizing.faults import Stuck
from specgen.sizing.limiter import LimiterDesign
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, ThreePointSettings, Tuning

DEVICE_LETTER = {"contactor": "Q1", "ssr": "Q1", "power_controller": "Q1", "relay": "K1", "relay_pair": "K1"}
PUT_IN = 7  # significant digits of what was put into a formula
Row = dict[str, Any]


class _Numbers:
    """Turns base numbers of one loop into the record's units; what is None or infinite stays away."""

    def __init__(self, value: Unit, change: Unit) -> None:
        self._value = value
        self._change = change

    def value(self, number: float | None) -> float | None:
        return None if number is None or not isfinite(number) else in_unit(number, self._value)

    def change(self, number: float | None) -> float | None:
        return None if number is None or not isfinite(number) else rounded(number * self._change.scale)

    @staticmethod
    def plain(number: float | None) -> float | None:
        return None if number is None or not isfinite(number) else rounded(number)

    def of(self, value: float, dimension: str) -> tuple[float, str]:
        """Return a number of some dimension and its unit as the record has them."""
        if dimension == "value":
            return in_unit(value, self._value), self._value.symbol
        if dimension == "change":
            return rounded(value * self._change.scale), self._change.symbol
        if dimension == "change_per_second":
            return rounded(value * self._change.scale), f"{self._change.symbol}/s"
        if dimension == "share_per_change":
            return rounded(value / self._change.scale), f"1/{self._change.symbol}"
        return rounded(value), UNITS.get(dimension, dimension)

    def put_in(self, value: float, dimension: str) -> str:
        """Write a number that was put into a formula, with digits enough to work the formula again."""
        number, unit = self.of(value, dimension)
        return f"{number:.{PUT_IN}g}" + (f" {unit}" if unit != "1" else "")


UNITS = {
    "time": "s", "fraction": "1", "number": "1", "years": "year", "per_hour": "1/h", "per_year": "1/year", "current": "A", "power": "W",
    "voltage": "V", "resistance": "ohm", "temperature": "degC", "difference": "K", "operations": "1", "degrees": "deg", "pressure": "Pa",
    "pressure_difference": "Pa", "length": "m", "area": "m2", "loss": "W/K", "heat_capacity": "J/K", "thermal_resistance": "K/W",
    "frequency": "Hz", "mass": "kg", "u_value": "W/(m2 K)", "kv": "m3/h", "i2t": "A2 s", "per_second": "1/s", "density": "kg/m3",
    "energy": "J", "specific_heat": "J/(kg K)", "flow": "m3/s", "mass_flow": "kg/s", "m³/s": "m3/s",
}  # fmt: skip


def loop_record(decided: DecidedLoop) -> Row:
    """Return one loop as plain data, as the contract of the record has it."""
    loop, case = decided.loop, decided.decision.chosen.case
    numbers = _Numbers(loop.unit, loop.difference_unit)
    row: Row = {
        "tag": decided.tag,
        "service": loop.service,
        "area": loop.area,
        "unit": loop.unit.symbol,
        "source": {"file": decided.read.file, "line": decided.read.line},
        "verdict": decided.verdict,
        "mode": case.candidate.mode,
        "action": "reverse" if loop.raises else "direct",
        "because": decided.decision.because,
        "output": _output(decided.tag, case),
        "settings": _settings(case, numbers),
        "predicted": predicted(case, numbers),
        "faults": _faults(case, numbers),
        "inject": [_injected(figure, numbers) for figure in decided.inject],
        "rules": [_rule(decided, finding) for finding in decided.findings],
        "alternatives": [_chosen(decided, numbers), *(_rejected(rejected, numbers) for rejected in decided.decision.rejected)],
        "assumptions": [{"field": a.field, "value": a.value, "why": a.why} for a in decided.assumptions],
        "firmness": [_firm(firm, numbers) for firm in decided.firmness],
        "missing": [{"field": m.field, "settles": list(m.settles), "how": m.how} for m in decided.missing],
        "basis": [_figure(figure, numbers) for figure in decided.basis if isfinite(figure.value)],
    }
    if decided.limiter is not None:
        row["limiter"] = _limiter(decided.tag, decided.limiter, numbers)
    return row


def present(row: Mapping[str, Any]) -> Row:
    """Leave out what is not there."""
    return {key: value for key, value in row.items() if value is not None}


def _output(tag: str, case: Case) -> Row:
    device = case.candidate.device
    letter = DEVICE_LETTER.get(device)
    row: Row = {"device": device, "designation": designation(tag, letter) if letter else None}
    if not isinstance(case.device, Unsized):
        row |= {"rating": case.device.rating, "current": case.device.current, "controller_output": case.device.controller_output}
        row |= {"loss": case.device.loss, "heat_sink": case.device.heat_sink}
        row = {key: rounded(value) if isinstance(value, float) else value for key, value in row.items()}
    return present(row)


def _settings(case: Case, numbers: _Numbers) -> Row:
    settings, row = case.settings, {"on_sensor_fault": case.loop.limits.on_sensor_fault}
    made: Row = dict(row)
    match settings:
        case OnOffSettings():
            made |= {
                "differential": numbers.change(settings.differential), "placement": settings.placement,
                "minimum_on": numbers.plain(settings.enforced.min_run or None),
                "minimum_off": numbers.plain(settings.enforced.min_rest or None),
            }  # fmt: skip
        case ProportionedSettings():
            made |= {"cycle_time": numbers.plain(settings.cycle_time)} | _tuning(settings.tuning, numbers)
        case ContinuousSettings():
            made |= {"signal": settings.signal} | _tuning(settings.tuning, numbers)
        case ThreePointSettings():
            made |= {"neutral_zone": numbers.change(settings.neutral_zone)} | _tuning(settings.tuning, numbers)
        case Unsized():
            pass
    return present(made)


def _tuning(tuning: Tuning, numbers: _Numbers) -> Row:
    return {
        "proportional_band": numbers.change(tuning.proportional_band), "integral_time": numbers.plain(tuning.integral_time),
        "derivative_time": numbers.plain(tuning.derivative_time or None),
    }  # fmt: skip


def predicted(case: Case, numbers: _Numbers) -> Row:
    """Return the worst-case figures of a candidate; what does not apply is absent."""
    settings, made = case.settings, {}
    match settings:
        case OnOffSettings():
            p = settings.enforced
            made = {
                "above": numbers.change(p.above.value), "below": numbers.change(p.below.value), "swing": numbers.change(p.swing.value),
                "switch_on": numbers.value(settings.switch_on), "switch_off": numbers.value(settings.switch_off),
                "period": numbers.plain(p.period), "starts_per_hour": numbers.plain(settings.starts_per_hour),
                "shortest_on": numbers.plain(settings.natural.shortest_on.value),
                "shortest_off": numbers.plain(settings.natural.shortest_off.value),
                "operations_per_year": numbers.plain(settings.operations_per_year), "contact_life": numbers.plain(settings.contact_life),
                "time_to_band": numbers.plain(settings.warm_up),
            } | _duties(case)  # fmt: skip
        case ProportionedSettings():
            r = settings.ripple
            made = {
                "above": numbers.change(r.above.value), "below": numbers.change(r.below.value), "swing": numbers.change(r.swing.value),
                "shortest_on": numbers.plain(settings.shortest_on), "shortest_off": numbers.plain(settings.shortest_off),
                "operations_per_year": numbers.plain(settings.operations_per_year), "contact_life": numbers.plain(settings.contact_life),
            } | _duties(case) | _margins(settings.tuning, numbers)  # fmt: skip
        case ContinuousSettings():
            made = _duties(case) | _margins(settings.tuning, numbers) | _openings(settings)
        case ThreePointSettings():
            made = _duties(case) | _margins(settings.tuning, numbers)
        case Unsized():
            pass
    if not isinstance(case.error, Unsized):
        made["measuring_error"] = numbers.change(case.error.root_sum)
    return present(made)


def _duties(case: Case) -> Row:
    box = case.box
    if isinstance(box, Unmodelled):
        return {}
    # a duty outside 0 to 1 is said by M9 and M10; the record's share of full output ends there
    low, high = (min(max(duty, 0.0), 1.0) for duty in (box.duty_low[0], box.duty_high[0]))
    return {"duty_low": rounded(low), "duty_high": rounded(high)}


def _openings(settings: ContinuousSettings) -> Row:
    # an opening outside 0 to 1 is a valve too small, or a flow below what it controls: V1 and V2 say so
    ends = {"opening_low": settings.opening_low, "opening_high": settings.opening_high}
    return {name: None if travel is None else rounded(min(max(travel, 0.0), 1.0)) for name, travel in ends.items()}


def _margins(tuning: Tuning, numbers: _Numbers) -> Row:
    return {
        "gain_margin": numbers.plain(tuning.gain_margin), "phase_margin": numbers.plain(tuning.phase_margin),
        "peak_sensitivity": numbers.plain(tuning.peak_sensitivity), "load_deviation": numbers.change(tuning.load_deviation),
        "overshoot": numbers.change(tuning.overshoot), "time_to_band": numbers.plain(tuning.time_to_band),
    }  # fmt: skip


def _faults(case: Case, numbers: _Numbers) -> Row:
    if isinstance(case.faults, Unsized):
        return {}
    return {"stuck_on": _stuck(case.faults.on, numbers), "stuck_off": _stuck(case.faults.off, numbers)}


def _stuck(stuck: Stuck, numbers: _Numbers) -> Row:
    return present({
        "settles_at": numbers.value(stuck.settles_at), "time_to_danger": numbers.plain(stuck.time_to_danger),
        "time_to_spoil": numbers.plain(stuck.time_to_spoil),
    })  # fmt: skip


def _limiter(tag: str, limiter: LimiterDesign, numbers: _Numbers) -> Row:
    return present({
        "set": numbers.value(limiter.set), "sensor_lag": numbers.plain(limiter.sensor_lag), "acts_at": numbers.value(limiter.acts_at),
        "designation": designation(tag, "F2"),
    })  # fmt: skip


_INJECTED = {"resistance": (1.0, "ohm"), "voltage": (1000.0, "mV"), "current": (1000.0, "mA")}


def _injected(figure: Figure, numbers: _Numbers) -> Row:
    scale, unit = _INJECTED[figure.dimension]
    return {"at": numbers.value(figure.with_["x"][0]), "value": rounded(figure.value * scale), "unit": unit}


def _rule(decided: DecidedLoop, finding: Finding) -> Row:
    return {
        "rule": finding.rule, "weight": finding.weight, "outcome": finding.outcome,
        "text": decided.phrasing.fill(finding.text, finding.words), "needs": list(finding.needs),
    }  # fmt: skip


def _chosen(decided: DecidedLoop, numbers: _Numbers) -> Row:
    case = decided.decision.chosen.case
    return {
        "mode": case.candidate.mode, "device": case.candidate.device, "chosen": True, "ruled_out_by": [],
        "predicted": predicted(case, numbers), "text": decided.decision.because,
    }  # fmt: skip


def _rejected(rejected: Rejected, numbers: _Numbers) -> Row:
    case = rejected.examined.case
    return {
        "mode": case.candidate.mode, "device": case.candidate.device, "chosen": False, "ruled_out_by": list(rejected.ruled_out_by),
        "predicted": predicted(case, numbers), "text": rejected.text,
    }  # fmt: skip


def _firm(firm: Firm, numbers: _Numbers) -> Row:
    made: Row = {"input": firm.input}
    for name, value in (("declared", firm.declared), ("below", firm.below), ("above", firm.above)):
        if value is not None:
            made[name], made["unit"] = numbers.of(value, firm.dimension)
    return made | {key: to for key, to in (("below_to", firm.below_to), ("above_to", firm.above_to)) if to}


def _figure(figure: Figure, numbers: _Numbers) -> Row:
    result, unit = numbers.of(figure.value, figure.dimension)
    put_in = ", ".join(f"{name} = {numbers.put_in(*given)}" for name, given in figure.with_.items() if isfinite(given[0]))
    return {
        "symbol": figure.symbol, "formula": figure.formula, "with": put_in, "result": result, "unit": unit, "source": figure.source,
        "case": figure.case,
    }  # fmt: skip
