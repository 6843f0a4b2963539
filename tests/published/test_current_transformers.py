"""Current transformers against published values (IEEE C57.13, IEEE C37.110, IEC 61869-2)."""

from __future__ import annotations

from audit.engineering.ct_accuracy import (
    actual_accuracy_limit_ratio,
    ct_offset_voltage_v,
    ct_secondary_voltage_v,
    greatest_unsaturated_multiple,
    offset_saturation_multiple,
)
from audit.engineering.ct_burden import (
    class_voltage_v,
    rated_burden_ohm,
    rated_burden_va,
    standard_burden_ohm,
)
from audit.engineering.ct_false_current import (
    false_residual_a,
    false_residual_composite_a,
    false_residual_one_sided_a,
    false_residual_rms_a,
)

VALUES = "11-current-transformers"


def saturation_criterion(class_voltage_v, ct_secondary_a, **circuit):
    standard = standard_burden_ohm(class_voltage_v, ct_secondary_a)
    return offset_saturation_multiple(standard_burden_ohm=standard, **circuit)


def greatest_multiple(class_voltage_v, ct_secondary_a, **circuit):
    standard = standard_burden_ohm(class_voltage_v, ct_secondary_a)
    return greatest_unsaturated_multiple(standard_burden_ohm=standard, **circuit)


FORMULAS = {
    "standard burden of a C class (ohm)": standard_burden_ohm,
    "C class of a standard burden (V)": class_voltage_v,
    "standard burden (VA)": rated_burden_va,
    "standard burden (ohm)": rated_burden_ohm,
    "secondary voltage (V)": ct_secondary_voltage_v,
    "voltage needed by an offset current (V)": ct_offset_voltage_v,
    "saturation criterion, not above 20": saturation_criterion,
    "greatest multiple without saturation by offset": greatest_multiple,
    "actual accuracy limit factor": actual_accuracy_limit_ratio,
    "greatest false residual, errors either way": false_residual_a,
    "greatest false residual, errors one way": false_residual_one_sided_a,
    "greatest false residual, composite error": false_residual_composite_a,
    "rms false residual": false_residual_rms_a,
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))
