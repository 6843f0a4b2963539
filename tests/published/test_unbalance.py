"""Unbalance of voltage and current, and its effect, against published values (NEMA MG 1, IEC 61000-4-30)."""

from __future__ import annotations

from audit.engineering.negative_sequence import open_phase_sequence_current_a
from audit.engineering.unbalance import deviation_from_mean_pct, negative_sequence_share_pct
from audit.engineering.unbalance_effect import (
    negative_sequence_current_pct,
    unbalance_derating_by_heating_ratio,
    unbalance_derating_ratio,
)

VALUES = "06-voltage-and-unbalance"
FORMULAS = {
    "deviation from the mean (%)": deviation_from_mean_pct,
    "negative over positive sequence (%)": negative_sequence_share_pct,
    "derating by the curve": unbalance_derating_ratio,
    "derating by heating": unbalance_derating_by_heating_ratio,
    "I2/I1 with one phase open": lambda **lines: negative_sequence_share_pct(**lines) / 100,
    "I1 and I2 with one phase open over line current": open_phase_sequence_current_a,
    "negative-sequence current from voltage (% of full load)": negative_sequence_current_pct,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
