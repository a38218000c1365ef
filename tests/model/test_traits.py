"""Traits of the kinds of element, held against the words of the rule book."""

import pytest

from specgen.model.traits import TRAITS, traits_of

HEATERS = {"resistive_heater", "infrared_lamp_heater", "silicon_carbide_heater", "molybdenum_disilicide_heater", "transformer_fed_heater"}
# M8 names them: transformer-fed, silicon carbide, molybdenum disilicide and lamp loads
WHOLE = HEATERS - {"resistive_heater"}
# M2: modulating valve, variable-speed drive, modulating burner
ANALOGUE = {"modulating_valve", "variable_speed_compressor", "variable_speed_fan", "variable_speed_pump", "gas_burner modulating"}
# M7: direct-on-line fan, pump, on-off burner
RUNS_WHOLE = {"fan", "pump", "gas_burner on_off", "gas_burner high_low"}
MOTORS = {"fan", "pump", "fixed_speed_compressor"}


def having(trait):
    return {kind for kind, traits in TRAITS.items() if getattr(traits, trait)}


@pytest.mark.parametrize(
    ("trait", "kinds"),
    [
        ("not_burst_fired", WHOLE),
        ("electric_heat", HEATERS),
        ("resistive_power", HEATERS),
        ("analogue_input", ANALOGUE),
        ("runs_whole", RUNS_WHOLE),
        ("starts_limited", {"fixed_speed_compressor"}),
        ("motor", MOTORS),
        ("travels", {"three_point_valve"}),
        ("coil", {"solenoid_valve"}),
        ("valve", {"modulating_valve", "three_point_valve", "solenoid_valve"}),
        ("burner", {"gas_burner on_off", "gas_burner high_low", "gas_burner modulating"}),
        ("staged", {"gas_burner high_low"}),
        ("heats", HEATERS | {"gas_burner on_off", "gas_burner high_low", "gas_burner modulating"}),
        ("may_refrigerate", {"fixed_speed_compressor", "variable_speed_compressor"}),
    ],
)
def test_traits(trait, kinds):
    assert having(trait) == kinds


def test_a_burners_traits_follow_its_stages(one):
    heater = "{kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3}"
    burner = one(swap={heater: "{kind: gas_burner, stages: high_low}"}).loop.element
    assert traits_of(burner) is TRAITS["gas_burner high_low"]
