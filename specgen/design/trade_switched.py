"""An on-off loop at other differentials than the chosen one, its worst cases held."""

from contextlib import suppress

from specgen.design.trade_point import TradePoint, error_of
from specgen.process.box import Box
from specgen.process.limit_cycle import Cycle, NoCycle
from specgen.process.on_off import STARTS, Setting, switch_points
from specgen.process.plant import ProcessModel
from specgen.rules.base import Case
from specgen.sizing.contact_life import years_of_life
from specgen.sizing.settings import OnOffSettings
from specgen.sizing.wear import hours_per_year, weakest


def _worst_at(box: Box, settings: OnOffSettings, differential: float) -> list[ProcessModel]:
    whole = settings.enforced
    setting = Setting(box, settings.placement, whole.min_run, whole.min_rest, "edges")
    cycle, among = setting.cycles(differential), setting.candidates(differential)
    try:
        return [setting.worst(figure, differential, cycle, among).plant for figure in (setting.above, setting.below, STARTS)]
    except NoCycle:
        return []


class Switched:
    """The worst cases of an on-off loop, held while its differential moves; ``narrowest`` is the least it is moved to."""

    def __init__(self, case: Case, box: Box, settings: OnOffSettings, narrowest: float) -> None:
        self._case, self._box, self._settings = case, box, settings
        whole, natural = settings.enforced, settings.natural
        self._plants = tuple(dict.fromkeys(worst.plant for worst in (whole.above, whole.below, whole.swing, whole.starts_per_hour)))
        # a least time that acts on a narrow differential has worst cases of its own
        self._more = _worst_at(box, settings, narrowest) if whole.min_run > 0 or whole.min_rest > 0 else []
        self._bare = tuple(dict.fromkeys(worst.plant for worst in (natural.shortest_on, natural.shortest_off)))
        self._timed = whole.min_run > 0 or whole.min_rest > 0
        self._defrosts = settings.starts_per_hour - whole.starts_per_hour.value
        self._hours = hours_per_year(case.loop, case.panel)
        last = weakest(case.device)
        self._lasts = last.operations if last else None

    def chosen(self) -> TradePoint:
        """Return the record's own figures."""
        settings, error = self._settings, error_of(self._case)
        whole, natural = settings.enforced, settings.natural
        return TradePoint(
            settings.differential, whole.above.value + error, whole.below.value + error, whole.swing.value, natural.shortest_on.value,
            natural.shortest_off.value, settings.starts_per_hour, settings.contact_life,
            chosen=True,
        )  # fmt: skip

    def at(self, differential: float) -> TradePoint | None:
        """Return the figures at another differential; None where a worst case no longer switches."""
        settings, error = self._settings, error_of(self._case)
        high, low = switch_points(differential, settings.placement, self._box.sign)
        least = settings.enforced.min_run, settings.enforced.min_rest
        try:
            cycles = [self._cycle(plant, high, low, *least) for plant in self._plants]
            bare = [self._cycle(plant, high, low, 0.0, 0.0) for plant in self._bare] if self._timed else []
            bare += [] if self._timed else [*cycles, *(self._cycle(p, high, low, 0.0, 0.0) for p in self._bare if p not in self._plants)]
        except NoCycle:
            return None
        for plant in self._more:
            with suppress(NoCycle):
                cycles.append(self._cycle(plant, high, low, *least))
        up, down = max(0.0, *(c.peak for c in cycles)), max(0.0, *(-c.trough for c in cycles))
        above, below = (up, down) if self._box.sign > 0 else (down, up)
        starts = max(c.starts_per_hour for c in cycles) + self._defrosts
        life = None if self._lasts is None else years_of_life(self._lasts, starts * self._hours)
        return TradePoint(
            differential, above + error, below + error, max(c.swing for c in cycles), min(c.t_on for c in bare), min(c.t_off for c in bare),
            starts, life,
        )  # fmt: skip

    def _cycle(self, plant: ProcessModel, high: float, low: float, run: float, rest: float) -> Cycle:
        return plant.limit_cycle(high, low, run, rest)
