"""The plots of a sheet that are computed when it is written: start-up, trade-off and output stuck on, or why there is none."""

from specgen.design.start_ups import start_ups
from specgen.design.stuck_on import stuck_on
from specgen.design.trade_off import trade_off
from specgen.design.types import DecidedLoop
from specgen.process.box import Box
from specgen.sizing.candidate import Unsized
from specgen.view.cells import says
from specgen.view.shapes import Sentence, Shape
from specgen.view.start_up_plot import start_up_drawing
from specgen.view.stuck_plot import stuck_drawing
from specgen.view.trade_off_plot import trade_of, trade_off_drawing, trade_off_table
from specgen.view.writer import Writer


def expected_plots(writer: Writer, decided: DecidedLoop) -> tuple[Shape, ...]:
    """Return the start-up, and the trade-off with its figures as a table; for each that there is not, a sentence why."""
    case = decided.decision.chosen.case
    starts, trade = start_ups(case), trade_off(case)
    blocks: list[Shape] = []
    if isinstance(starts, Unsized) or not isinstance(case.box, Box):
        because = starts.because if isinstance(starts, Unsized) else "no plant is declared"
        blocks.append(_none("start-up", because))
    else:
        blocks.append(start_up_drawing(writer, starts, case.box.sign))
    if isinstance(trade, Unsized):
        blocks.append(_none("trade-off", trade.because))
    else:
        seen = trade_of(writer, trade)
        blocks += [trade_off_drawing(seen), trade_off_table(seen)]
    return tuple(blocks)


def stuck_plot(writer: Writer, decided: DecidedLoop) -> tuple[Shape, ...]:
    """Return the course of an output stuck on, or a sentence why none is drawn."""
    stuck = stuck_on(decided)
    if isinstance(stuck, Unsized):
        return (_none("course of the output stuck on", stuck.because),)
    quantity = decided.loop.need.quantity
    return (stuck_drawing(writer, stuck, "value" if quantity == "other" else quantity),)


def _none(what: str, because: str) -> Sentence:
    return Sentence(says(f"No {what} is drawn: {because}."), quiet=True)
