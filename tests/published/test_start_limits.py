"""Limits of starting duty against published values (NEMA MG 1 12.54, NEMA MG 10, IEC 60034-12)."""

from __future__ import annotations

from audit.engineering.start_limits import (
    iec_external_inertia_limit_kgm2,
    least_rest_time_s,
    nema_load_inertia_limit_kgm2,
    usual_starts_per_hour,
    usual_starts_times_inertia_kgm2_per_hour,
)
from audit.engineering.unit_factors import KG_M2_PER_LB_FT2, KW_PER_HP

VALUES = "07-starts"


def inertia_limit_lb_ft2(power_hp: float, speed_rpm: float) -> float:
    return float(nema_load_inertia_limit_kgm2(power_hp * KW_PER_HP, speed_rpm)) / KG_M2_PER_LB_FT2


FORMULAS = {
    "load inertia limit, printed (lb ft2)": inertia_limit_lb_ft2,
    "load inertia limit, by formula (lb ft2)": inertia_limit_lb_ft2,
    "starts an hour (1/h)": lambda power_hp, poles, inertia_lb_ft2: usual_starts_per_hour(
        power_hp * KW_PER_HP, poles, inertia_lb_ft2 * KG_M2_PER_LB_FT2
    ),
    "starts an hour without inertia (1/h)": lambda power_hp, poles: usual_starts_per_hour(power_hp * KW_PER_HP, poles),
    "starts an hour times inertia (lb ft2/h)": lambda power_hp, poles: (
        usual_starts_times_inertia_kgm2_per_hour(power_hp * KW_PER_HP, poles) / KG_M2_PER_LB_FT2
    ),
    "rest between starts (s)": lambda power_hp, poles: least_rest_time_s(power_hp * KW_PER_HP, poles),
    "external inertia limit (kg m2)": iec_external_inertia_limit_kgm2,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
