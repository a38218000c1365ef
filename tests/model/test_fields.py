"""How plain texts become flags, counts, numbers and quantities."""

import pytest
from pydantic import TypeAdapter, ValidationError

from specgen.core.quantity import Quantity, Range
from specgen.model.fields import Count, Flag, Number, Power, PowerRange, Share, Text, Time, Written, shown


def read(kind, text, **context):
    return TypeAdapter(kind).validate_python(text, context=context)


def fault(kind, text, **context):
    with pytest.raises(ValidationError) as caught:
        read(kind, text, **context)
    return caught.value.errors()[0]["ctx"]


@pytest.mark.parametrize(("text", "value"), [("yes", True), ("On", True), ("TRUE", True), ("no", False), ("off", False), ("False", False)])
def test_flags(text, value):
    assert read(Flag, text) is value


@pytest.mark.parametrize("text", ["", "y", "1", "maybe", "ja"])
def test_no_flags(text):
    assert fault(Flag, text)["code"] == "F103"


@pytest.mark.parametrize(("text", "value"), [("3", 3), (" 012 ", 12), ("0", 0)])
def test_counts(text, value):
    assert read(Count, text) == value


@pytest.mark.parametrize("text", ["-1", "1.0", "1e3", "three", "", "1_000", "٣", "1234567890", "0x10"])
def test_no_counts(text):
    assert fault(Count, text)["code"] == "F104"


@pytest.mark.parametrize(("text", "value"), [("1.0e6", 1e6), ("10e6", 1e7), ("50", 50.0), ("2.5E-3", 2.5e-3)])
def test_numbers(text, value):
    number = read(Number, text)
    assert (float(number), number.text) == (value, text)


@pytest.mark.parametrize("text", ["0", "1e999", "-5", "nan", "inf", "1,5", "50 s", "1" * 41])
def test_no_numbers(text):
    assert fault(Number, text)["code"] == "F104"


def test_a_decimal_comma_in_a_plain_number_is_answered_with_a_point():
    assert fault(Number, "1,5")["hint"] == "write 1.5"


@pytest.mark.parametrize("given", [["a"], {"a": "b"}, None, 3.5])
@pytest.mark.parametrize("kind", [Flag, Count, Text, Power])
def test_no_single_value(kind, given):
    assert fault(kind, given)["code"] == "F106"


def test_braces_in_a_text_of_the_users_are_only_text():
    assert "{0.__class__}" in fault(Flag, "{0.__class__}")["text"]


def test_texts():
    assert read(Text, "  a  ") == "a"
    assert fault(Text, "x" * 2001)["code"] == "F105"


def test_quantities_keep_their_text():
    power = read(Power, "6 kW")
    assert (float(power), power.text) == (6000.0, "6 kW")
    assert read(PowerRange, "4 to 6 kW") == Range(4000.0, 6000.0, "4 to 6 kW")
    assert read(Power, power) is power


def test_values_of_a_model_in_a_program_are_taken_as_they_are():
    assert read(Time, Quantity(5.0, "5 s")) == 5.0


def test_a_share_is_at_most_the_whole():
    assert float(read(Share, "100 percent")) == 1.0
    assert fault(Share, "100.1 percent")["code"] == "F115"


def test_the_loops_own_dimension_comes_with_the_context():
    field = Written("difference_of_value", sign="positive")
    assert float(field.read("20 kPa", {"difference_of_value": "pressure_difference"})) == 20000.0
    assert field.example({"difference_of_value": "pressure_difference"}).endswith("bar")


def test_a_flow_may_be_of_volume_or_of_mass():
    field = Written("flow", may_range=True, sign="positive")
    assert field.read("3.6 m3/h", {}).low == pytest.approx(1e-3)
    assert field.read("3.6 kg/h", {}).low == pytest.approx(1e-3)


def test_texts_are_shortened_and_cleaned_for_messages():
    assert shown("a\x07b") == "a?b"
    assert shown("x" * 50) == "x" * 37 + "..."
