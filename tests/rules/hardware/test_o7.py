"""O7: suppression of coils."""

from specgen.sizing.device import Suppressor


def test_each_coil_is_named_with_what_is_fitted(make, device):
    diode = Suppressor("the coil of K1", "diode with Zener diode", "it lets go in time")
    fitted = (diode, Suppressor("the element", "varistor", "small coil"))
    answer = make.ask("O7", make.case("heater", "on_off", device_choice=device(suppressors=fitted)))
    assert answer.outcome == "holds"
    assert answer.text == (
        "Fitted at the coil: diode with Zener diode across the coil of K1: it lets go in time; varistor across the element: small coil."
    )


def test_without_a_coil_nothing_is_fitted(make, device):
    assert make.ask("O7", make.case("heater", "on_off", "ssr", device_choice=device())).outcome == "does_not_apply"
