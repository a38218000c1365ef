"""Protection of a circuit: the smallest preferred rating that carries the load, of the kind the load and its device ask for."""

from dataclasses import dataclass
from typing import Literal

from specgen.catalogue.load import Catalogue
from specgen.catalogue.table import Known, Row
from specgen.catalogue.wiring import Basis, ProtectiveDevice, TripCurve
from specgen.core.figure import Figure
from specgen.model.traits import Traits
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.current import LoadCurrent

ProtectionKind = Literal["circuit_breaker", "fuse", "motor_starter", "semiconductor_fuse"]
CLOSE = 1e-9  # a current on a preferred rating by construction differs from it by rounding only
_TRANSFORMER_LIKE = ("AC-6a", "AC-5b")
_COILS = ("AC-15", "DC-13")


@dataclass(frozen=True, slots=True)
class Protection:
    """The protective device of one circuit.

    ``rating`` [A] is what the conductor has to carry: of a motor starter the top of its setting range, ``setting`` [A]
    then being where it is set. ``sized_for`` [A] is the design current times the continuous factor. ``let_through``
    [A2 s] is a semiconductor fuse's total.
    """

    kind: ProtectionKind
    rating: float
    design_current: float
    sized_for: float
    curve: str | None = None
    setting: float | None = None
    setting_range: tuple[float, float] | None = None
    let_through: float | None = None
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    rows: tuple[Row, ...] = ()


def protection_for(
    load: LoadCurrent, units: float, traits: Traits, basis: Basis, catalogue: Catalogue, *, solid_state: bool
) -> Protection | Unsized:
    r"""Choose the protection of a circuit that feeds some of a load's equal units.

    Parameters
    ----------
    load : LoadCurrent
        Line current at the supply's worse end, of all units [A].
    units : float
        Units in all over the units of this circuit: its share of the current is one in ``units``.
    traits : Traits
        What the element is.
    basis : {"iec", "north_america"}
        Which series and factors count.
    catalogue : Catalogue
        Preferred ratings.
    solid_state : bool
        Whether a semiconductor stands in the circuit.

    Returns
    -------
    Protection or Unsized
        Unsized, without needs, where no preferred rating is large enough.

    Notes
    -----
    :math:`I_n \ge k I_b` with the continuous factor k of the code basis. A motor takes a starter whose setting range holds
    its rated current; a semiconductor takes a full-range fuse of the same rule, which protects the conductor too.
    A breaker's curve is the first that holds the inrush.

    References
    ----------
    IEC 60364-4-43 clause 433.1; NFPA 70 clause 210.20(A); curves of IEC 60898-1; which curve for what: common practice.
    """
    current = load.current / units
    factor = catalogue.wiring.figure(f"continuous/{basis}")
    k = float(factor.value.quantity)
    if traits.motor:
        return _starter(current, k, catalogue)
    given = {"k": (k, "fraction"), "I_b": (current, "current")}
    sized_for = k * current
    needed = Figure("k I_b", "current that protection and conductor are chosen for", "k I_b", sized_for, "current", factor.row.cited, given)
    if solid_state:
        return _semiconductor(current, sized_for, needed, factor.row, catalogue)
    inrush = (load.inrush or 0.0) / units
    if basis == "north_america":
        return _series("inverse_time", current, sized_for, needed, factor.row, catalogue)
    breaker = _breaker(load, traits, current, inrush, sized_for, needed, factor.row, catalogue)
    return _series("fuse", current, sized_for, needed, factor.row, catalogue) if isinstance(breaker, Unsized) else breaker


def _breaker(
    load: LoadCurrent, traits: Traits, current: float, inrush: float, sized_for: float, needed: Figure, factor: Row, catalogue: Catalogue
) -> Protection | Unsized:
    curves = _curves(load, traits, catalogue)
    for listed in catalogue.wiring.preferred("breaker"):
        rating = float(listed.value.rating)
        if rating < sized_for * (1 - CLOSE):
            continue
        for curve in curves:
            if inrush <= float(curve.value.holds) * rating:
                given = {"k I_b": (sized_for, "current")}
                name = f"rated current of the circuit breaker, curve {curve.value.curve}"
                figure = Figure("I_n", name, "least of the series >= k I_b", rating, "current", listed.row.cited, given)
                return Protection("circuit_breaker", rating, current, sized_for, curve.value.curve, figures=(needed, figure),
                                  rows=(factor, listed.row, curve.row))  # fmt: skip
    return Unsized(f"no circuit breaker carries {sized_for:.3g} A")


def _curves(load: LoadCurrent, traits: Traits, catalogue: Catalogue) -> tuple[Known[TripCurve], ...]:
    """Return the curves worth trying: from B for plain resistance, C for coils and drives, D for transformers and lamps."""
    first = 0 if traits.resistive_power else 1
    if load.category in _TRANSFORMER_LIKE:
        first = 2
    elif load.category in _COILS:
        first = 1
    return catalogue.wiring.curves[first:]


def _series(
    device: Literal["fuse", "inverse_time"], current: float, sized_for: float, needed: Figure, factor: Row, catalogue: Catalogue
) -> Protection | Unsized:
    series = catalogue.wiring.preferred(device)
    for listed in series:
        rating = float(listed.value.rating)
        if rating >= sized_for * (1 - CLOSE):
            given = {"k I_b": (sized_for, "current")}
            kind: ProtectionKind = "fuse" if device == "fuse" else "circuit_breaker"
            name = "rated current of the fuse gG" if device == "fuse" else "rated current of the inverse-time circuit breaker"
            figure = Figure("I_n", name, "least of the series >= k I_b", rating, "current", listed.row.cited, given)
            return Protection(kind, rating, current, sized_for, "gG" if device == "fuse" else None, figures=(needed, figure),
                              rows=(factor, listed.row))  # fmt: skip
    return Unsized(f"{sized_for:.3g} A is above the largest protective rating listed, {float(series[-1].value.rating):g} A")


def _starter(current: float, k: float, catalogue: Catalogue) -> Protection | Unsized:
    if current < catalogue.wiring.starters[0].value.lowest:
        return Unsized(f"{current:.3g} A is below the smallest setting of a motor protective breaker listed")
    for listed in catalogue.wiring.starters:
        low, high = float(listed.value.lowest), float(listed.value.highest)
        if current <= high * (1 + CLOSE):
            given = {"I_b": (current, "current")}
            figures = (
                Figure("I_n", "top of the setting range of the motor protective breaker", "least of the series >= I_b", high, "current",
                       listed.row.cited, given),
                Figure("I_r", "setting of the overload release", "I_b", current, "current", "name-plate current of the motor", given),
            )  # fmt: skip
            why = f"setting range {low:g} A to {high:g} A is typical; the conductor carries its top"
            assumed = Assumption("motor protective breaker", f"{low:g} A to {high:g} A", why)
            return Protection("motor_starter", high, current, k * current, None, current, (low, high), figures=figures,
                              assumptions=(assumed,), rows=(listed.row,))  # fmt: skip
    return Unsized(f"{current:.3g} A is above the largest motor starter listed")


def _semiconductor(current: float, sized_for: float, needed: Figure, factor: Row, catalogue: Catalogue) -> Protection | Unsized:
    for listed in catalogue.wiring.semiconductor_fuses:
        rating, through = float(listed.value.rating), float(listed.value.let_through)
        if rating >= sized_for * (1 - CLOSE):
            given = {"k I_b": (sized_for, "current")}
            figures = (
                needed,
                Figure("I_n", "rated current of the semiconductor fuse gR", "least of the series >= k I_b", rating, "current",
                       listed.row.cited, given),
                Figure("I²t", "total let-through of the fuse", "of its rating", through, "i2t", listed.row.cited,
                       {"I_n": (rating, "current")}),
            )  # fmt: skip
            assumed = Assumption(f"semiconductor fuse gR {rating:g} A", f"{through:g} A² s", "typical; the maker's curve replaces it")
            return Protection("semiconductor_fuse", rating, current, sized_for, "gR", let_through=through, figures=figures,
                              assumptions=(assumed,), rows=(factor, listed.row))  # fmt: skip
    return Unsized(f"no semiconductor fuse is listed for {sized_for:.3g} A")


def next_rating(needed: float, basis: Basis, catalogue: Catalogue) -> tuple[float, Row] | Unsized:
    """Return the least preferred rating that is at least ``needed`` [A]: breakers, above them fuses gG.

    Examples
    --------
    >>> from specgen.catalogue.load import load_catalogue
    >>> next_rating(64.0, "iec", load_catalogue())[0], next_rating(161.0, "iec", load_catalogue())[0]
    (80.0, 200.0)
    """
    kinds: tuple[ProtectiveDevice, ...] = ("inverse_time",) if basis == "north_america" else ("breaker", "fuse")
    for kind in kinds:
        for listed in catalogue.wiring.preferred(kind):
            if float(listed.value.rating) >= needed * (1 - CLOSE):
                return float(listed.value.rating), listed.row
    return Unsized(f"{needed:.3g} A is above the largest protective rating listed")
