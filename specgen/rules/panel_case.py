"""What rules of scope panel are asked about: the loops' feeders, the lines' currents, the incomer, the outputs."""

from collections.abc import Mapping
from dataclasses import dataclass

from specgen.catalogue.wiring import Wiring
from specgen.model.panel import Panel
from specgen.model.traits import Traits
from specgen.sizing.candidate import Unsized
from specgen.sizing.control_supply import ControlLoad
from specgen.sizing.enclosure import Interior
from specgen.sizing.feeder import Feeder


@dataclass(frozen=True, slots=True)
class FedLoop:
    """One loop as the panel sees it: its tag, what its element is, and what feeds it."""

    tag: str
    traits: Traits
    feeder: Feeder | Unsized


@dataclass(frozen=True, slots=True)
class OutputCount:
    """Outputs of one kind: used by loops, and there on the declared controllers."""

    sort: str
    used: int
    there: int

    @property
    def spare(self) -> float:
        """Return the share of the outputs that is left free; negative where more are used than there are."""
        return (self.there - self.used) / self.there if self.there else float(-self.used)


@dataclass(frozen=True, slots=True)
class PanelCase:
    """All that is known of the panel; rules of scope panel read it and nothing else.

    ``lines`` [A] are the line conductors' currents with the declared coincidence; ``imbalance`` the difference of the
    largest and the smallest over the largest, None where there is one line or no load. ``carries`` [A] is what the
    incomer has to carry; ``incomer`` its rating [A], ``declared`` where panel.yml states it. ``interior`` is the enclosure's
    heat balance, ``control`` what the control supply carries; None where a panel is looked at without them.
    """

    panel: Panel
    fed: tuple[FedLoop, ...]
    lines: Mapping[str, float]
    imbalance: float | None
    carries: float
    incomer: float | Unsized
    declared: bool
    outputs: tuple[OutputCount, ...]
    wiring: Wiring
    interior: Interior | None = None
    control: ControlLoad | None = None
