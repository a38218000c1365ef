"""Which conductors each loop's load stands on: as written, else chosen to balance."""

from collections.abc import Sequence

from specgen.core.say import Said, amperes
from specgen.design.panel.balance import Movable, balance, load_on
from specgen.design.panel.lines import Lines, Place
from specgen.design.panel.types import Moved, Placed
from specgen.design.types import DecidedLoop, Missing
from specgen.sizing.feeder import Feeder

Placing = tuple[tuple[Placed, ...], tuple[Moved, ...], tuple[Missing, ...]]


def place_loads(loops: Sequence[DecidedLoop], lines: Lines) -> Placing:
    """Place every load that the mains feed.

    Parameters
    ----------
    loops : sequence of DecidedLoop
        In any order.
    lines : Lines
        The supply's conductors.

    Returns
    -------
    tuple of Placed, tuple of Moved, tuple of Missing
        By tag; the loops that balancing put elsewhere than their turn; and what is written but does not fit.
    """
    fed = sorted(((loop, loop.decision.chosen.case.feeder) for loop in loops), key=lambda pair: pair[0].tag)
    standing: dict[str, tuple[Place, bool]] = {}
    movable: list[Movable] = []
    unfit: list[Missing] = []
    currents: dict[str, float] = {}
    for loop, feeder in fed:
        places = lines.places(feeder.load.connection.way) if isinstance(feeder, Feeder) else ()
        if not places or not isinstance(feeder, Feeder):
            continue
        currents[loop.tag] = feeder.load.current
        written = next((place for place in places if "-".join(place) == loop.loop.phases_on), None)
        if loop.loop.phases_on is not None and written is None:
            fitting = ", ".join("-".join(place) for place in places)
            unfit.append(Missing(f"{loop.tag}: phases_on", (), f"{loop.loop.phases_on} does not fit the load's voltage; {fitting} would"))
        if written is not None or len(places) == 1:
            standing[loop.tag] = (written or places[0], written is not None)
        else:
            movable.append(Movable(loop.tag, places, feeder.load.current))
    fixed = [sum((load_on(lines, place, currents[tag])[line] for tag, (place, _) in standing.items()), 0j) for line in lines.lines]
    chosen = balance(movable, fixed, lines)
    standing |= {load.tag: (place, False) for load, place in zip(movable, chosen.places, strict=True)}
    standing_loops = [(loop, feeder) for loop, feeder in fed if loop.tag in standing and isinstance(feeder, Feeder)]
    placed = tuple(_placed(loop, feeder, *standing[loop.tag]) for loop, feeder in standing_loops)
    moved = []
    for number, (load, place) in enumerate(zip(movable, chosen.places, strict=True)):
        turn = load.places[number % len(load.places)]
        if place != turn:
            told = "In turn it would stand on {turn}, and the largest line current be {in_turn}; as all are placed it is {largest}."
            words: dict[str, Said | str] = {"turn": "-".join(turn), "in_turn": amperes(chosen.in_turn), "largest": amperes(chosen.largest)}
            moved.append(Moved(load.tag, "-".join(place), "-".join(turn), told, words))
    return placed, tuple(moved), tuple(unfit)


def _placed(loop: DecidedLoop, feeder: Feeder, place: Place, written: bool) -> Placed:  # noqa: FBT001  one of the two that standing holds
    case = loop.decision.chosen.case
    resistive = loop.traits.resistive_power
    throttled = case.candidate.device == "power_controller" and loop.traits.not_burst_fired
    rectifier = loop.traits.analogue_input and not loop.traits.burner
    return Placed(loop.tag, place, feeder.load.current, written, resistive and not throttled, throttled or rectifier)
