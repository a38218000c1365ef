"""Where a modulating valve works: opening at the lowest and highest duty, its steepest part, the least flow it can control.

Full output is the valve fully open, and ``flow`` is what then passes. The declared pressures stand before and behind the whole
path of valve and pipes, so that the open valve takes the share ``N = (Kv/Kvs)^2`` of their difference, with ``Kv`` what the flow
would need over all of it: that share is its authority.
"""

from dataclasses import dataclass
from math import sqrt

from specgen.core.figure import Figure
from specgen.model.element import ModulatingValve
from specgen.model.loop import Loop
from specgen.process.box import Box
from specgen.process.valve_characteristic import Characteristic, inherent, opening, steepest_gain
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.valve_flow import NeededKv, needed_kv

RANGEABILITY = 50.0  # usual of an equal-percentage trim (seen in a trade page on characteristics); taken for both where none is declared
TRAVEL = "inverse of the installed characteristic, constant total difference and square-law pipes"
AUTHORITIES = 9  # tried over its range, evenly in its logarithm
FORMS = {"linear": "φ = h", "equal_percentage": "φ = R^(h − 1)"}


@dataclass(frozen=True, slots=True)
class ValveSizing:
    """How a valve is used.

    ``opening_low`` and ``opening_high`` are travels at the lowest and highest duty: above 1 where the valve is too small, None for the
    low one where the mildest case needs no flow, None for both without a characteristic. ``is_installed`` tells whether the pipes are in
    them. ``lowest_flow`` is the least share of the full flow that the trim can control; ``gain_factor`` how much steeper than on
    average the valve acts at its steepest between the two openings, 1 at least. ``kv`` is needed by the full flow [m3/h],
    ``authority`` the highest over the declared ranges. ``open_points`` say what could not be computed.
    """

    opening_low: float | None
    opening_high: float | None
    is_installed: bool
    lowest_flow: float | None
    gain_factor: float
    kv: float | None = None
    authority: float | None = None
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    open_points: tuple[Unsized, ...] = ()


def valve_sizing(loop: Loop, box: Box) -> ValveSizing | None:
    """Size a loop's modulating valve.

    Parameters
    ----------
    loop : Loop
        The loop; None is returned where its element is no modulating valve.
    box : Box
        Its plant over the declared ranges, which gives the duties.

    Returns
    -------
    ValveSizing or None
        What the declared fields allow: without kvs, flow and pressures the openings are those of the inherent characteristic.

    References
    ----------
    IEC 60534-2-1 (Kv), IEC 60534-2-4 (characteristics); authority by constant total pressure difference (algebra).
    """
    element = loop.element
    if not isinstance(element, ModulatingValve):
        return None
    needed = needed_kv(element)
    points: list[Unsized] = [needed] if isinstance(needed, Unsized) else []
    if element.kvs is None:
        points.append(Unsized("the valve's Kvs is not declared", ("element.kvs",)))
    kv = None if isinstance(needed, Unsized) else needed.high
    sized = () if isinstance(needed, Unsized) else needed.figures
    assumed = () if isinstance(needed, Unsized) else needed.assumptions
    if element.characteristic is None:
        points.append(Unsized("the valve's characteristic is not declared", ("element.characteristic",)))
        even = Assumption("element.characteristic", "the same gain over the whole travel", "not declared; a valve is steeper somewhere")
        return ValveSizing(
            None, None, is_installed=False, lowest_flow=None, gain_factor=1.0, kv=kv, figures=sized, assumptions=(*assumed, even),
            open_points=tuple(points),
        )  # fmt: skip
    works = _Works(element.characteristic, _rangeability(element), *_authority(element, needed))
    return _used(element, box, works, (kv, sized, assumed, tuple(points)))


@dataclass(frozen=True, slots=True)
class _Works:
    """A trim in its pipes: ``least`` and ``most`` are the ends of ``(Kv/Kvs)^2``, above 1 where the valve is too small."""

    form: Characteristic
    rangeability: float
    least: float
    most: float
    is_known: bool

    def travel(self, duty: float, share: float) -> float:
        """Return the travel that passes a share of the full flow."""
        if share <= 1:
            return opening(duty, share, self.form, self.rangeability)
        # the whole difference lies over the valve, and is still not enough at full flow
        return opening(duty * sqrt(share), 1.0, self.form, self.rangeability)

    def lowest(self) -> float:
        """Return the share of the full flow at the least flow coefficient that the trim can control; most where the authority is low."""
        phi = 1 / self.rangeability
        authority = min(self.least, 1.0)
        return phi / sqrt((1 - authority) * phi * phi + authority)

    def steepest(self, low: float, high: float) -> tuple[float, float]:
        """Return the steepest gain between the travels at two duties over the range of authority, and where it is."""
        found = []
        for i in range(AUTHORITIES):
            share = min(self.least * (self.most / self.least) ** (i / (AUTHORITIES - 1)), 1.0)
            ends = [min(max(self.travel(duty, share), 0.0), 1.0) if duty > 0 else 0.0 for duty in (low, high)]
            found.append(steepest_gain(ends[0], ends[1], share, self.form, self.rangeability))
        return max(found)


def _rangeability(element: ModulatingValve) -> float:
    return RANGEABILITY if element.rangeability is None else float(element.rangeability)


def _authority(element: ModulatingValve, needed: NeededKv | Unsized) -> tuple[float, float, bool]:
    """Return least and most of ``(Kv/Kvs)^2``; 1 where the pipes are not known."""
    if isinstance(needed, Unsized) or element.kvs is None:
        return 1.0, 1.0, False
    return (needed.low / element.kvs.high) ** 2, (needed.high / element.kvs.low) ** 2, True


_Known = tuple[float | None, tuple[Figure, ...], tuple[Assumption, ...], tuple[Unsized, ...]]


def _used(element: ModulatingValve, box: Box, works: _Works, known: _Known) -> ValveSizing:
    kv, sized, assumed, points = known
    (least, mildest), (most, hardest) = box.duty_low, box.duty_high
    low, high = min(least, 1.0), min(most, 1.0)  # beyond full output is rule M9's matter
    figures, assumptions = [*sized], [*assumed]
    if element.rangeability is None:
        assumptions.append(Assumption("element.rangeability", f"{RANGEABILITY:g}", "not declared: the usual one"))
    if works.is_known:
        told = "before and behind valve and pipes together, so that the open valve takes (Kv/Kvs)² of their difference"
        assumptions.append(Assumption("element.inlet_pressure, element.outlet_pressure", told, "full output is the open valve"))
        assert element.kvs is not None  # noqa: S101  known with it only
        given = {"Kv": (kv or 0.0, "kv"), "Kvs": (element.kvs.low, "kv")}
        figures.append(Figure("N", "authority, the most of the declared ranges", "(Kv/Kvs)²", works.most, "number", "definition", given))
    else:
        alone = "all of the pressure difference over the valve"
        assumptions.append(Assumption("element.kvs, element.flow and pressures", alone, "not all declared: the characteristic alone"))
    authority = works.most if works.is_known else None
    if high <= 0:
        resting = Unsized("no case of the loop needs any flow")
        return ValveSizing(
            None, None, is_installed=works.is_known, lowest_flow=works.lowest(), gain_factor=1.0, kv=kv, authority=authority,
            figures=tuple(figures), assumptions=tuple(assumptions), open_points=(*points, resting),
        )  # fmt: skip
    openings = [works.travel(low, works.least) if low > 0 else None, works.travel(high, works.most)]
    cases = ((openings[0], "lowest", low, works.least, box.text(mildest)), (openings[1], "highest", high, works.most, box.text(hardest)))
    for travel, name, duty, share, case in cases:
        if travel is not None:
            figures += _opening(element, works, (travel, name, duty, share), case)
    gain, at = works.steepest(max(low, 0.0), high)
    factor = max(gain, 1.0)
    # the load acts by the mean gain, so that a part flatter than the mean gives no right to a higher gain of the controller
    bottom = {"R": (works.rangeability, "number"), "N": (min(works.least, 1.0), "number")}
    figures += [
        Figure("q_min", "least flow that the trim can control, of the full flow", "φ = 1/R in the pipes", works.lowest(), "fraction",
               TRAVEL, bottom),
        Figure("dq/dh", "steepest installed gain between the two openings; 1 is the mean", "N φ'/((1 − N) φ² + N)^(3/2)", gain, "number",
               TRAVEL, {"h": (at, "fraction")}),
    ]  # fmt: skip
    return ValveSizing(
        openings[0], openings[1], is_installed=works.is_known, lowest_flow=works.lowest(), gain_factor=factor, kv=kv, authority=authority,
        figures=tuple(figures), assumptions=tuple(assumptions), open_points=points,
    )  # fmt: skip


def _opening(element: ModulatingValve, works: _Works, used: tuple[float, str, float, float], case: str) -> list[Figure]:
    travel, name, duty, share = used
    given = {"q": (duty, "fraction"), "N": (min(share, 1.0), "number"), "R": (works.rangeability, "number")}
    if works.form == "linear":
        del given["R"]
    made = []
    if works.is_known and element.kvs is not None and 0 <= travel <= 1:
        phi = inherent(travel, works.form, works.rangeability)
        kvs = element.kvs.high if name == "lowest" else element.kvs.low
        kv = {"φ": (phi, "number"), "Kvs": (kvs, "kv")}
        made.append(Figure("Kv", f"flow coefficient at the {name} duty", "φ Kvs", phi * kvs, "kv", TRAVEL, kv, case))
    formula = f"{FORMS[works.form]} solved for h, φ = √(N/(1/q² − 1 + N))"
    made.append(Figure("h", f"opening at the {name} duty", formula, travel, "fraction", TRAVEL, given, case))
    return made
