"""S1: where a stuck output passes a danger, something independent stops it."""

from specgen.core.say import Said, of_value
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.hazard import Room, heating, rooms
from specgen.rules.margin import least, over
from specgen.sizing.candidate import Unsized
from specgen.sizing.faults import Faults, Stuck

rule = Rule(code="S1", name="Something independent stops it", weight="must")


def applies(case: Case) -> bool:
    """Ask it where a danger is declared, and of everything that heats."""
    limits = case.loop.limits
    return heating(case) or limits.danger_high is not None or limits.danger_low is not None


def examine(case: Case) -> Finding:
    """Ask for a limiter (own sensor, own switching device, manual reset) against stuck on, an alarm against stuck off, and room."""
    limits = case.loop.limits
    if heating(case) and limits.danger_high is None:
        return rule.unanswered("The element heats, and what must never be passed is not declared.", ("limits.danger_high",))
    if isinstance(case.faults, Unsized):
        return rule.unsized(case.faults)
    on, off = case.faults.on, case.faults.off
    if not on.passes and not off.passes:
        words: dict[str, Said] = {}
        text = f"Stuck on the value {_ends('on', on, words)}, stuck off it {_ends('off', off, words)}: neither passes a declared danger."
        return rule.judge(holds=True, margin=_clear(case, case.faults), text=text, **words)
    on_rooms, off_rooms = rooms(case, "on", on), rooms(case, "off", off)
    parts, words, holds = [], {}, True
    for state, stuck, found in (("on", on, on_rooms), ("off", off, off_rooms)):
        for room in found:
            answer, good = _answer(case, state, room, words)
            holds = holds and good
            parts.append(f"Stuck {state} the value {_ends(state, stuck, words)}, past the danger at {{{state}_danger}}. {answer}")
    return rule.judge(holds=holds, margin=least(*(room.margin for room in on_rooms + off_rooms)), text=" ".join(parts), **words)


def _ends(state: str, stuck: Stuck, words: dict[str, Said]) -> str:
    if stuck.settles_at is None:
        return "runs on without settling"
    words[f"{state}_end"] = of_value(stuck.settles_at)
    return f"settles at {{{state}_end}}"


def _answer(case: Case, state: str, room: Room, words: dict[str, Said]) -> tuple[str, bool]:
    words |= {f"{state}_{name}": said for name, said in room.words.items()}
    if not room.open and state == "off":
        # an alarm calls somebody and stops nothing: that it comes late is said, and no setting would mend it
        said = f"An alarm independent of the loop is part of it, though it comes late: normal running reaches {{{state}_running}}, and "
        return said + f"through a sensor lag of {{{state}_lag}} only a set value of {{{state}_latest}} would be early enough.", True
    if not room.open:
        said = f"Normal running reaches {{{state}_running}}, and through a sensor lag of {{{state}_lag}} the latest set value is "
        return said + f"{{{state}_latest}}: nothing independent has room.", False
    between = f"between {{{state}_running}}, the end of normal running, and {{{state}_latest}}, for a sensor lag of {{{state}_lag}}"
    if state == "off":
        return _alarm(case, room, between, words), True
    limiter = case.loop.limits.limiter
    if limiter is None:
        own = "An independent limiter with its own sensor, its own switching device and manual reset is part of the loop, set "
        return own + between + ".", True
    words |= {"set": of_value(limiter.set), "acts": of_value(room.reached(limiter.set))}
    if limiter.resets != "manual":
        return "The limiter at {set} resets by itself; it has to stay off until somebody resets it.", False
    said = "The limiter at {set} acts at a true value of {acts} through its sensor lag of {on_lag}; normal running ends at {on_running}"
    good = room.holds(limiter.set)
    return said + ("." if good else ": that is not between normal running and the danger."), good


def _alarm(case: Case, room: Room, between: str, words: dict[str, Said]) -> str:
    alarms, consequence = case.loop.alarms, case.loop.limits.consequence
    stake = f"; at stake: {consequence}" if consequence else ""
    declared = alarms.high if room.outward > 0 else alarms.low
    if declared is None or not room.holds(declared):
        return f"An alarm independent of the loop is part of it, set {between}{stake}."
    words["alarm"] = of_value(declared)
    return f"The alarm at {{alarm}} lies {between}; it is independent of the loop{stake}."


def _clear(case: Case, faults: Faults) -> float | None:
    """Return distance to the danger over distance to where the value ends, the smaller of all that can be told."""
    limits, setpoints = case.loop.limits, case.loop.need.setpoints
    found: list[float | None] = []
    for stuck in (faults.on, faults.off):
        if stuck.settles_at is None:
            continue
        if limits.danger_high is not None and stuck.settles_at > setpoints.high:
            found.append(over(limits.danger_high - setpoints.high, stuck.settles_at - setpoints.high))
        if limits.danger_low is not None and stuck.settles_at < setpoints.low:
            found.append(over(setpoints.low - limits.danger_low, setpoints.low - stuck.settles_at))
    return least(*found)
