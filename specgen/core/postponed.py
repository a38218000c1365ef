"""Fields of a frozen dataclass that are computed when they are first asked for."""

from collections.abc import Callable, Mapping
from typing import Self


class Postponed:
    """Mixed in ahead of a frozen dataclass with slots; the subclass adds the slot ``_later``.

    Nobody who reads the object can tell it from one whose fields were all given. What a field's computing raises is raised to whoever
    asks for it, so that errors which belong to the making are to be met before. Copies with ``dataclasses.replace`` and pickled ones
    hold every field.

    Examples
    --------
    >>> from dataclasses import dataclass
    >>> @dataclass(frozen=True, slots=True)
    ... class Square:
    ...     side: float
    ...     area: float
    >>> class LateSquare(Postponed, Square):
    ...     __slots__ = ("_later",)
    >>> made = LateSquare.after({"side": 3.0}, lambda name: 9.0)
    >>> made.side, made.area, made
    (3.0, 9.0, LateSquare(side=3.0, area=9.0))
    """

    __slots__ = ()

    @classmethod
    def after(cls, known: Mapping[str, object], later: Callable[[str], object]) -> Self:
        """Return an object of which only the fields given are there; ``later`` computes another by its name."""
        made = object.__new__(cls)
        for name, value in known.items():
            object.__setattr__(made, name, value)
        object.__setattr__(made, "_later", later)
        return made

    def __getattr__(self, name: str) -> object:
        """Compute a field that is not there yet."""
        if name.startswith("_"):
            raise AttributeError(name)
        later: Callable[[str], object] = object.__getattribute__(self, "_later")
        value = later(name)
        object.__setattr__(self, name, value)
        return value
