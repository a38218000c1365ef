"""E1: protection covers the current, and the conductor covers the protection."""

from specgen.core.say import Said, amperes, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, least, over
from specgen.rules.panel_case import PanelCase
from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import Branch, Feeder, NotFed

rule = Rule(
    code="E1", name="Protection and conductors", weight="must", scope="panel",
    cites=("IEC 60364-4-43 clause 433.1", "IEC 60204-1 table 6 and annex D"),
)  # fmt: skip


def examine(case: PanelCase) -> Finding:
    """Hold every loop's protection against its current, and its conductors against the protection."""
    fed = [(loop.tag, loop.feeder) for loop in case.fed if not isinstance(loop.feeder, NotFed)]
    if not fed:
        return rule.does_not_apply("No loop is fed from this panel.")
    broken = [f"{tag} ({why})" for tag, feeder in fed if (why := _wrong(feeder))]
    if broken:
        return rule.judge(holds=False, text="Protection or conductors fail: {which}.", which="; ".join(broken))
    unknown = [(tag, feeder) for tag, feeder in fed if isinstance(feeder, Unsized)]
    if unknown:
        needs = tuple(dict.fromkeys(f"{tag}: {field}" for tag, feeder in unknown for field in feeder.needs))
        return rule.unanswered("The current is not known of {which}.", needs, which=", ".join(tag for tag, _ in unknown))
    margins = [_margin(feeder) for _, feeder in fed if isinstance(feeder, Feeder)]
    text = "In each of {count} protected circuits the load's current is at most the protection's, and that at most the conductor's."
    circuits = sum(len(feeder.branches) for _, feeder in fed if isinstance(feeder, Feeder))
    return rule.judge(holds=True, margin=least(*margins), text=text, count=Said(float(circuits), "number"))


def examine_loop(case: Case) -> Finding:
    """Say it of one loop, by its own feeder alone."""
    feeder = case.feeder
    if isinstance(feeder, NotFed):
        return rule.does_not_apply("Nothing is fed from this panel.")
    if isinstance(feeder, Unsized):
        if feeder.needs:
            return rule.unsized(feeder)
        return rule.judge(holds=False, text="It cannot be fed: {because}.", because=feeder.because)
    branch = feeder.branches[0]
    text, words = _sentence(branch)
    if len(feeder.branches) > 1:
        text, words["circuits"] = text + ", in each of {circuits} circuits", Said(float(len(feeder.branches)), "number")
    if branch.cable is not None and branch.cable.drop is not None:
        text, words["drop"] = text + "; the cable drops {drop}", share(branch.cable.drop)
    said = {name: "is at most" if good else "is above" for name, good in zip(("first", "second"), _orders(branch), strict=True)}
    return rule.judge(holds=not _wrong(feeder), margin=_margin(feeder), text=text + ".", **words, **said)


def _sentence(branch: Branch) -> tuple[str, dict[str, Said]]:
    protection = branch.protection
    carried = max(protection.rating, protection.sized_for)
    words = {"current": amperes(protection.sized_for), "rating": amperes(protection.rating), "capacity": amperes(_capacity(branch))}
    if protection.setting is not None:
        words |= {"setting": amperes(protection.setting), "carried": amperes(carried)}
        own = "The motor's {setting}, to which the overload release is set, {first} the top of its range, {rating}; "
        return own + "what the conductors have to carry, {carried}, {second} their {capacity}", words
    # a continuous load asks for more than flows
    factor = ", the continuous factor included," if protection.sized_for > protection.design_current else ""
    own = "{current} at the supply's worse end" + factor + " {first} the protection's {rating}, "
    return own + "and that {second} the {capacity} that the conductors carry", words


def _capacity(branch: Branch) -> float:
    return min(branch.internal.capacity, branch.cable.capacity) if branch.cable is not None else branch.internal.capacity


def _orders(branch: Branch) -> tuple[bool, bool]:
    protection = branch.protection
    # of a motor starter the range is chosen by the motor's current; the continuous factor is the conductor's
    needed = protection.sized_for if protection.setting is None else branch.current
    carried = max(protection.rating, protection.sized_for)
    return at_most(needed, protection.rating), at_most(carried, _capacity(branch))


def _wrong(feeder: Feeder | Unsized) -> str:
    if isinstance(feeder, Unsized):
        return "" if feeder.needs else feeder.because
    good = all(all(_orders(branch)) for branch in feeder.branches)
    return "" if good else "its current, protection and conductors do not rise in this order"


def _margin(feeder: Feeder) -> float | None:
    found = []
    for branch in feeder.branches:
        protection = branch.protection
        needed = protection.sized_for if protection.setting is None else branch.current
        found += [over(protection.rating, needed), over(_capacity(branch), max(protection.rating, protection.sized_for))]
    return least(*found)
