"""Pure functions of a box that several candidates, and the variations of one loop, ask again: computed once."""

from collections import OrderedDict
from collections.abc import Callable
from functools import lru_cache, update_wrapper
from typing import Concatenate, ParamSpec, TypeVar

from specgen.process.box import Box

F = TypeVar("F")
P = ParamSpec("P")
R = TypeVar("R")
KEPT = 128  # results of each function; a few boxes with every candidate's


@lru_cache(maxsize=KEPT)
def same_box(box: Box) -> Box:
    """Return the one object that stands for every box equal to this one.

    Two variations of a loop that do not touch its plant have equal boxes; as one object they share what was computed.
    """
    return box


def remembered(function: Callable[Concatenate[F, P], R]) -> Callable[Concatenate[F, P], R]:
    """Return a pure function with a memory of its last results.

    The first argument, a box or what was made from one, and any other box are told apart by being the same object: comparing
    them field by field would cost more than is won. The memory holds them, so that their identity cannot pass to another. An
    error is not remembered.

    Examples
    --------
    >>> asked = []
    >>> def length(words: list[str], more: int) -> int:
    ...     asked.append(more)
    ...     return len(words) + more
    >>> quick, words = remembered(length), ["a", "b"]
    >>> quick(words, 1), quick(words, 1), quick(words, 2), quick(["a", "b"], 1), asked
    (3, 3, 4, 3, [1, 2, 1])
    """
    memory: OrderedDict[object, tuple[F, tuple[object, ...], R]] = OrderedDict()

    def asked(first: F, /, *args: P.args, **kwargs: P.kwargs) -> R:
        key = (id(first), *(id(arg) if isinstance(arg, Box) else arg for arg in args), *kwargs.items())
        known = memory.get(key)
        if known is not None:
            memory.move_to_end(key)
            return known[2]
        result = function(first, *args, **kwargs)
        memory[key] = (first, args, result)
        if len(memory) > KEPT:
            memory.popitem(last=False)
        return result

    update_wrapper(asked, function)
    return asked


def remembered_for(parts: Callable[P, tuple[object, ...]]) -> Callable[[Callable[P, R]], Callable[P, R]]:
    """Return what gives a pure function a memory of its last results, told apart by the parts of its arguments that it looks at.

    Parts are told apart by being the same objects, strings by what they say: variations of one loop share every part that is not
    varied, and to compare them would cost more than is won. The memory holds the parts, so that their identity cannot pass to another.

    Examples
    --------
    >>> asked = []
    >>> @remembered_for(lambda words, more: (words,))
    ... def length(words: list[str], more: str) -> int:
    ...     asked.append(more)
    ...     return len(words)
    >>> words = ["a", "b"]
    >>> length(words, "x"), length(words, "y"), length(["a", "b"], "z"), asked
    (2, 2, 2, ['x', 'z'])
    """

    def with_memory(function: Callable[P, R]) -> Callable[P, R]:
        memory: OrderedDict[object, tuple[tuple[object, ...], R]] = OrderedDict()

        def asked(*args: P.args, **kwargs: P.kwargs) -> R:
            held = parts(*args, **kwargs)
            key = tuple([part if isinstance(part, str) else id(part) for part in held])
            known = memory.get(key)
            if known is not None:
                memory.move_to_end(key)
                return known[1]
            result = function(*args, **kwargs)
            memory[key] = (held, result)
            if len(memory) > KEPT:
                memory.popitem(last=False)
            return result

        update_wrapper(asked, function)
        return asked

    return with_memory
