"""Building blocks of the models: how a field's text becomes a quantity, a flag, a count or a word."""

import math
import re
from collections.abc import Callable
from dataclasses import dataclass
from typing import Annotated, Any, Literal

from pydantic import BaseModel, ConfigDict, GetCoreSchemaHandler, GetJsonSchemaHandler
from pydantic_core import CoreSchema, PydanticCustomError, core_schema

from specgen.core.dimension import DIMENSIONS, Dimension
from specgen.core.quantity import Quantity, QuantityError, Range, parse_quantity, parse_range

Sign = Literal["any", "not_negative", "positive"]
_EXAMPLE_OF = {"value": "temperature", "difference_of_value": "difference", "rate_of_value": "rate_of_temperature", "flow": "flow_volume"}
WRONG_DIMENSION = "Q107"
FLOWS = ("flow_volume", "flow_mass")
LOOP_DIMENSIONS = ("value", "difference_of_value", "rate_of_value")
MOST_TEXT = 2000
LONGEST_NUMBER = 40
MOST_DIGITS = 9
WORDS_OF_LOOP = {
    "value": "the loop's quantity",
    "difference_of_value": "a difference of the loop's quantity",
    "rate_of_value": "a rate of change of the loop's quantity",
}
# what an editor can tell without knowing units: a number, and something behind it that is no number
_WITH_UNIT = r"^\s*[-+\u2212]?[0-9]+(\.[0-9]+)?([eE][-+\u2212]?[0-9]+)?\s*[^\s0-9.,].*$"
_ONE_WITH_UNIT = r"^(?!.*\sto\s)" + _WITH_UNIT[1:]
_PLAIN_NUMBER = re.compile(r"[0-9]+(\.[0-9]+)?([eE][-+]?[0-9]{1,3})?\Z")


class Model(BaseModel):
    """Base of every model: frozen, unknown keys refused."""

    model_config = ConfigDict(frozen=True, extra="forbid", arbitrary_types_allowed=True, revalidate_instances="never")


def problem(code: str, text: str, hint: str = "", at: tuple[str | int, ...] = ()) -> PydanticCustomError:
    """Make an error that the reader turns into a diagnostic; ``at`` is a path below the model that raises it."""
    # pydantic formats the message with its context: braces of the user's own text must not count
    return PydanticCustomError("specgen", "{text}", {"code": code, "text": text, "hint": hint, "at": at})


def _of_text(read: Callable[[str, dict[str, Any]], Any], types: type | tuple[type, ...], schema: dict[str, Any]) -> type[Any]:
    class Reader:
        @staticmethod
        def __get_pydantic_core_schema__(_source: object, _handler: GetCoreSchemaHandler) -> CoreSchema:
            def check(given: object, info: core_schema.ValidationInfo) -> object:
                if isinstance(given, str):
                    return read(given.strip(), info.context or {})
                if isinstance(given, types):
                    return given
                raise problem("F106", "a single value is expected here, not a list or a section", schema.get("description", ""))

            return core_schema.with_info_plain_validator_function(check)

        @staticmethod
        def __get_pydantic_json_schema__(_core: CoreSchema, _handler: GetJsonSchemaHandler) -> dict[str, Any]:
            return dict(schema)

    return Reader


@dataclass(frozen=True, slots=True)
class Written:
    """Metadata of a quantity field: its dimension, whether a range may stand there, and its sign.

    ``dimension`` is a name of ``specgen.core.dimension`` or one of ``LOOP_DIMENSIONS``, which stand for the
    dimension of the loop's own measured value, a difference of it, or its rate of change. ``most`` is the largest
    number that can be meant, in base units.
    """

    dimension: str
    may_range: bool = False
    sign: Sign | None = None
    most: float | None = None

    def read(self, given: object, context: dict[str, Any]) -> Quantity | Range:
        """Turn the text into a quantity, or raise the field's error."""
        if isinstance(given, Range if self.may_range else Quantity):
            return given
        example = self.example(context)
        if not isinstance(given, str):
            raise problem("F106", "a quantity is expected here, not a list or a section", f"for example {example}")
        dimension = context.get(self.dimension, self.dimension)
        if dimension in LOOP_DIMENSIONS:
            raise problem("F110", "cannot be read until need.quantity and need.setpoint are right")
        read = parse_range if self.may_range else parse_quantity
        first: QuantityError | None = None
        for name in FLOWS if dimension == "flow" else (dimension,):
            try:
                found = read(given, name, sign=self.sign)
            except QuantityError as error:
                first = first or error
                continue
            return self._within(found, given)
        assert first is not None  # noqa: S101  at least one dimension was tried
        because = context.get("because", "") if self.dimension in LOOP_DIMENSIONS and first.code == WRONG_DIMENSION else ""
        raise problem(first.code, first.text + because, first.hint)

    def _within(self, found: Quantity | Range, given: str) -> Quantity | Range:
        if self.most is not None and (found.high if isinstance(found, Range) else found) > self.most:
            raise problem("F115", f"'{shown(given)}' is more than the whole", "100 percent is the most that can be meant")
        return found

    def example(self, context: dict[str, Any]) -> str:
        """Return an example of what may stand in the field."""
        dimension = context.get(self.dimension, self.dimension)
        if isinstance(dimension, Dimension):
            return dimension.example
        return DIMENSIONS[_EXAMPLE_OF.get(dimension, dimension)].example

    def __get_pydantic_core_schema__(self, _source: object, _handler: GetCoreSchemaHandler) -> CoreSchema:
        """Read the field's text with this dimension."""

        def check(given: object, info: core_schema.ValidationInfo) -> Quantity | Range:
            return self.read(given, info.context or {})

        return core_schema.with_info_plain_validator_function(check)

    def __get_pydantic_json_schema__(self, _core: CoreSchema, _handler: GetJsonSchemaHandler) -> dict[str, Any]:
        """Describe the field as text with a unit, so that an editor marks a number that stands alone."""
        form = "number unit, or a range: number to number unit" if self.may_range else "number unit"
        example = self.example({})
        told = f"{WORDS_OF_LOOP.get(self.dimension, self.dimension.replace('_', ' '))}: {form}; for example {example}"
        pattern = _WITH_UNIT if self.may_range else _ONE_WITH_UNIT
        return {"type": "string", "description": told, "examples": [example], "pattern": pattern}


def _read_flag(text: str, _context: dict[str, Any]) -> bool:
    lowered = text.lower()
    if lowered in ("yes", "true", "on"):
        return True
    if lowered in ("no", "false", "off"):
        return False
    raise problem("F103", f"'{shown(text)}' is neither yes nor no", "write yes or no")


def _read_count(text: str, _context: dict[str, Any]) -> int:
    if not (text.isascii() and text.isdigit() and len(text) <= MOST_DIGITS):
        raise problem("F104", f"'{shown(text)}' is no whole number", "write a plain count such as 2")
    return int(text)


def _read_number(text: str, _context: dict[str, Any]) -> Quantity:
    if len(text) > LONGEST_NUMBER or not _PLAIN_NUMBER.match(text):
        hint = f"write {text.replace(',', '.')}" if "," in text else "write a number without a unit, for example 1.0e6"
        raise problem("F104", f"'{shown(text)}' is no plain number", hint)
    number = float(text)
    if not math.isfinite(number) or number <= 0:
        raise problem("F104", f"'{shown(text)}' is no number above zero that can be computed with", "for example 1.0e6")
    return Quantity(number, text)


def _read_text(text: str, _context: dict[str, Any]) -> str:
    if not text:
        raise problem("F105", "nothing stands here", "write a text or leave the key out")
    if len(text) > MOST_TEXT:
        raise problem("F105", f"the text is {len(text)} characters long; {MOST_TEXT} are the most", "put long texts on a page of your own")
    return text


def shown(text: str, most: int = 40) -> str:
    """Shorten a text of the user's for a message."""
    clean = "".join(c if c.isprintable() else "?" for c in text)
    return clean if len(clean) <= most else clean[: most - 3] + "..."


Flag = Annotated[bool, _of_text(_read_flag, bool, {"enum": ["yes", "no"]})]
Count = Annotated[int, _of_text(_read_count, int, {"type": ["integer", "string"], "description": "a whole number"})]
Number = Annotated[Quantity, _of_text(_read_number, Quantity, {"type": ["number", "string"], "description": "a plain number"})]
Text = Annotated[str, _of_text(_read_text, str, {"type": ["string", "number"], "description": "text"})]

# quantities of one number
Temperature = Annotated[Quantity, Written("temperature")]
Difference = Annotated[Quantity, Written("difference", sign="positive")]
Time = Annotated[Quantity, Written("time", sign="positive")]
TimeOrNone = Annotated[Quantity, Written("time", sign="not_negative")]
Power = Annotated[Quantity, Written("power", sign="positive")]
Voltage = Annotated[Quantity, Written("voltage", sign="positive")]
Current = Annotated[Quantity, Written("current", sign="positive")]
Resistance = Annotated[Quantity, Written("resistance", sign="positive")]
Length = Annotated[Quantity, Written("length", sign="positive")]
Fraction = Annotated[Quantity, Written("fraction", sign="positive")]
Share = Annotated[Quantity, Written("fraction", sign="positive", most=1.0)]
FractionOrNone = Annotated[Quantity, Written("fraction", sign="not_negative")]
# in the loop's own quantity
Value = Annotated[Quantity, Written("value")]
Change = Annotated[Quantity, Written("difference_of_value", sign="positive")]
# what may be a range
ValueRange = Annotated[Range, Written("value", may_range=True)]
ChangeRange = Annotated[Range, Written("difference_of_value", may_range=True, sign="positive")]
RateRange = Annotated[Range, Written("rate_of_value", may_range=True, sign="positive")]
TimeRange = Annotated[Range, Written("time", may_range=True, sign="positive")]
TimeRangeOrNone = Annotated[Range, Written("time", may_range=True, sign="not_negative")]
PowerRange = Annotated[Range, Written("power", may_range=True, sign="positive")]
PressureRange = Annotated[Range, Written("pressure", may_range=True)]
TemperatureRange = Annotated[Range, Written("temperature", may_range=True)]
