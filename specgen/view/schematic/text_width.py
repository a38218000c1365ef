"""How wide a text will be, before any browser sets it: widths of the widest of the sans-serif faces the style sheet names."""

from functools import lru_cache

# thousandths of the type size, from memory of a wide sans; narrower faces leave more room
_WIDTHS = {
    **dict.fromkeys("ijl'|", 310), **dict.fromkeys("fI.,:;!/\\-()[]t", 410), **dict.fromkeys("rsJ", 520), **dict.fromkeys(" \u202f", 320),
    **dict.fromkeys("abcdeghknopquvxyzKLFETSZ", 640), **dict.fromkeys("0123456789", 640), **dict.fromkeys("ABCPRXYV", 700),
    **dict.fromkeys("DGHNOQU", 790), **dict.fromkeys("wM=+−<>×", 870), **dict.fromkeys("mW", 990),
}  # fmt: skip
_OTHER = 800
HEIGHT = 1.2  # of the type size


@lru_cache(maxsize=8192)
def text_width(text: str, size: float) -> float:
    """Return the width of a text, rather too wide than too narrow.

    Examples
    --------
    >>> text_width("-Q1", 10) < text_width("-Q11", 10), round(text_width("110", 10), 1)
    (True, 19.2)
    """
    return sum(_WIDTHS.get(letter, _OTHER) for letter in text) * size / 1000


def wrapped(text: str, size: float, width: float, most: int) -> tuple[str, ...]:
    """Break a text into lines of a width, at most so many; what does not fit ends in an ellipsis.

    Examples
    --------
    >>> wrapped("plug-in relay, 2-pole, d.c. coil", 10, 100, 3)
    ('plug-in relay,', '2-pole, d.c. coil')
    >>> wrapped("one two three", 10, 30, 2)
    ('one', 'two…')
    """
    lines: list[str] = []
    for word in text.split(" "):
        joined = f"{lines[-1]} {word}" if lines else word
        if lines and text_width(joined, size) <= width:
            lines[-1] = joined
        else:
            lines.append(word)
    if len(lines) > most:
        lines = [*lines[: most - 1], lines[most - 1].rstrip(",") + "…"]
    return tuple(lines)
