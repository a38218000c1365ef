"""Schedules of protection and conductors, one row a device and one a run."""

from collections.abc import Iterator, Mapping, Sequence

from specgen.design.designation import designation
from specgen.design.panel.types import ConductorRow, Placed, ProtectionRow
from specgen.design.types import DecidedLoop
from specgen.sizing.conductor import Conductor
from specgen.sizing.feeder import Branch, Feeder

CONTROL = "control supply"


def numbered(letter: str, number: int) -> str:
    """Return the product aspect of a circuit's part; F2 is the limiter's, so the second circuit's protection is F3.

    Examples
    --------
    >>> [numbered("F", number) for number in range(3)], [numbered("W", number) for number in range(2)]
    (['F1', 'F3', 'F4'], ['W1', 'W2'])
    """
    if letter == "F" and number > 0:
        return f"F{number + 2}"
    return f"{letter}{number + 1}"


def load_letter(loop: DecidedLoop) -> str:
    """Return the letter of a loop's element: E for what heats by itself, M for motors and the actuators of valves."""
    return "E" if loop.traits.electric_heat or loop.traits.burner else "M"


def circuits(loops: Sequence[DecidedLoop]) -> Iterator[tuple[DecidedLoop, int, Branch]]:
    """Go through every protected circuit, by tag."""
    for loop in sorted(loops, key=lambda loop: loop.tag):
        feeder = loop.decision.chosen.case.feeder
        if isinstance(feeder, Feeder):
            for number, branch in enumerate(feeder.branches):
                yield loop, number, branch


def phases_of(loop: DecidedLoop, placed: Mapping[str, Placed]) -> str:
    """Return the conductors that feed a loop."""
    return placed[loop.tag].phases if loop.tag in placed else CONTROL


def protection_rows(loops: Sequence[DecidedLoop], placed: Mapping[str, Placed]) -> tuple[ProtectionRow, ...]:
    """Return the schedule of protection."""
    return tuple(
        ProtectionRow(
            designation=designation(loop.tag, numbered("F", number)),
            loop=loop.tag,
            kind=branch.protection.kind,
            rating=branch.protection.rating,
            design_current=branch.protection.design_current,
            curve=branch.protection.curve,
            setting=branch.protection.setting,
            setting_range=branch.protection.setting_range,
            phases=phases_of(loop, placed),
        )
        for loop, number, branch in circuits(loops)
    )


def conductor_rows(loops: Sequence[DecidedLoop], placed: Mapping[str, Placed]) -> tuple[ConductorRow, ...]:
    """Return the schedule of conductors: the wiring inside, and the cable where one is declared."""
    found = []
    for loop, number, branch in circuits(loops):
        phases = phases_of(loop, placed)
        protection, terminals = designation(loop.tag, numbered("F", number)), designation(loop.tag, "X1")
        found.append(_run(loop, branch, branch.internal, None, (protection, terminals), phases))
        if branch.cable is not None:
            cable, load = designation(loop.tag, numbered("W", number)), designation(loop.tag, numbered(load_letter(loop), number))
            found.append(_run(loop, branch, branch.cable, cable, (terminals, load), phases))
    return tuple(found)


def _run(
    loop: DecidedLoop, branch: Branch, conductor: Conductor, cable: str | None, ends: tuple[str, str], phases: str
) -> ConductorRow:
    return ConductorRow(
        loop=loop.tag, designation=cable, start=ends[0], end=ends[1], size=conductor.size, earth=conductor.earth, gauge=conductor.gauge,
        method=conductor.installed.method, length=conductor.installed.length, current=branch.current, capacity=conductor.capacity,
        protection=branch.protection.rating, drop=conductor.drop, phases=phases,
    )  # fmt: skip
