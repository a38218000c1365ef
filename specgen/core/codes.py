"""What each code of a quantity problem means, and the error that carries it."""

QUANTITY_CODES = {
    "Q101": "A quantity is expected and the value is empty, too long or no text.",
    "Q102": "A quantity starts with a number, written with digits and at most one point.",
    "Q103": "A decimal comma is refused: it is written as a point.",
    "Q104": "A number stands without its unit, also where the unit seems obvious.",
    "Q105": "The unit is not known, or written in the wrong case.",
    "Q106": "The unit is no plain product or quotient of units with small integer powers.",
    "Q107": "The unit belongs to another dimension than the field's.",
    "Q108": "The sign does not suit the field: a size cannot be negative, or cannot be zero.",
    "Q109": "The value lies below absolute zero or below vacuum.",
    "Q110": "A range is upside down: its second number is less than its first.",
    "Q111": "A range stands where one number is expected, or a range is not written out.",
    "Q112": "A number is longer than 40 characters, or too large or too small to compute with.",
    "Q113": "Digits are grouped, or written as a fraction, a time of day or a calculation.",
    "Q114": "`absolute` suits pressures only, and both ends of a range alike.",
}


class QuantityError(ValueError):
    """Text that is no quantity of the wanted dimension; ``code``, ``text`` and ``hint`` for a diagnostic."""

    def __init__(self, code: str, text: str, hint: str = "") -> None:
        super().__init__(code, text, hint)
        self.code = code
        self.text = text
        # a hint repeats what was written, which may hold anything
        self.hint = _printable(hint)

    def __str__(self) -> str:
        """Return the sentence without code and hint."""
        return self.text


def shown(text: str, longest: int = 40) -> str:
    """Quote what was written for a sentence, cut to ``longest`` and without control characters.

    Examples
    --------
    >>> shown("6 bra")
    "'6 bra'"
    """
    return "'" + _printable(text if len(text) <= longest else text[: longest - 3] + "...") + "'"


def _printable(text: str) -> str:
    return "".join(letter if letter.isprintable() else " " if letter.isspace() else "?" for letter in text)
