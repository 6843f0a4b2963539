"""Full-load currents and code letters against published values (NFPA 70 tables 430.250 and 430.7(B))."""

from __future__ import annotations

import numpy as np

from audit.engineering.code_letter import (
    LETTERS,
    letter_code,
    letter_code_from_current,
    letter_greatest_kva_per_hp,
    letter_least_kva_per_hp,
    locked_rotor_from_letter_greatest_a,
    locked_rotor_from_letter_least_a,
    locked_rotor_kva_per_hp,
)
from audit.engineering.nema_tables import table_full_load_current_a
from audit.engineering.unit_factors import KW_PER_HP

VALUES = "04-full-load-currents-and-code-letters"


def kva_per_hp_of_current(locked_rotor_a: float, power_hp: float, voltage_v: float, letter: str) -> np.ndarray:
    found = letter_code_from_current(locked_rotor_a, power_hp * KW_PER_HP, voltage_v)
    assert LETTERS[int(found)] == letter
    return locked_rotor_kva_per_hp(locked_rotor_a, power_hp * KW_PER_HP, voltage_v)


FORMULAS = {
    "full-load current of the table (A)": lambda power_hp, voltage_v: table_full_load_current_a(
        power_hp * KW_PER_HP, voltage_v
    ),
    "code letter, from (kVA/hp)": lambda letter: letter_least_kva_per_hp(letter_code(letter)),
    "code letter, to (kVA/hp)": lambda letter: letter_greatest_kva_per_hp(letter_code(letter)),
    "locked-rotor current of a letter, least (A)": lambda letter, power_hp, voltage_v: locked_rotor_from_letter_least_a(
        letter_code(letter), power_hp * KW_PER_HP, voltage_v
    ),
    "locked-rotor current of a letter, greatest (A)": lambda letter, power_hp, voltage_v: (
        locked_rotor_from_letter_greatest_a(letter_code(letter), power_hp * KW_PER_HP, voltage_v)
    ),
    "kVA per hp of a current": kva_per_hp_of_current,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
