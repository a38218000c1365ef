"""Fields that are computed when they are first asked for."""

import pickle
from dataclasses import dataclass, replace

import pytest

from specgen.core.postponed import Postponed


@dataclass(frozen=True, slots=True)
class Square:
    side: float
    area: float


class LateSquare(Postponed, Square):
    __slots__ = ("_later",)


def late(asked):
    def later(name):
        asked.append(name)
        return 9.0

    return LateSquare.after({"side": 3.0}, later)


def test_computed_once_and_only_when_asked_for():
    asked = []
    made = late(asked)
    assert made.side == 3.0
    assert asked == []
    assert (made.area, made.area) == (9.0, 9.0)
    assert asked == ["area"]


def test_copies_and_pickles_hold_every_field():
    for copy in (pickle.loads(pickle.dumps(late([]))), replace(late([]), side=3.0)):  # noqa: S301  what was just dumped
        assert (copy.side, copy.area) == (3.0, 9.0)
        with pytest.raises(AttributeError):
            copy.__getattr__("_later")


def test_an_error_is_raised_to_who_asks():
    def later(name):
        raise ValueError(name)

    made = LateSquare.after({"side": 3.0}, later)
    with pytest.raises(ValueError, match="area"):
        _ = made.area
