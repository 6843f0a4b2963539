"""Current transformers against published values (IEEE C57.13, IEEE C37.110, IEC 61869-2)."""

from __future__ import annotations

import pytest

from audit.engineering.ct_accuracy import (
    actual_accuracy_limit_ratio,
    class_voltage_v,
    ct_offset_voltage_v,
    ct_secondary_voltage_v,
    greatest_unsaturated_multiple,
    offset_saturation_multiple,
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
from tests.published.rows import Row, cases_of, unclaimed, value_of

NAME = "11-current-transformers"


def saturation_criterion(class_voltage_v, ct_secondary_a, **circuit):
    standard = standard_burden_ohm(class_voltage_v, ct_secondary_a)
    return offset_saturation_multiple(standard_burden_ohm=standard, **circuit)


def greatest_multiple(class_voltage_v, ct_secondary_a, **circuit):
    standard = standard_burden_ohm(class_voltage_v, ct_secondary_a)
    return greatest_unsaturated_multiple(standard_burden_ohm=standard, **circuit)


FORMULAS = {
    "standard burden of a C class (ohm)": standard_burden_ohm,
    "standard burden (VA)": rated_burden_va,
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


@pytest.mark.parametrize("row", cases_of(NAME, FORMULAS))
def test_published_value_is_reproduced(row: Row):
    assert value_of(row, FORMULAS) == row.allowed()


def test_every_row_is_claimed():
    assert unclaimed(NAME, FORMULAS) == set()


@pytest.mark.parametrize("row", cases_of(NAME, {"standard burden of a C class (ohm)": None}))
def test_class_voltage_is_the_inverse_of_the_standard_burden(row: Row):
    inputs = row.arguments()
    assert class_voltage_v(float(row.expected), inputs["ct_secondary_a"]).item() == inputs["class_voltage_v"]


@pytest.mark.parametrize("row", cases_of(NAME, {"standard burden (VA)": None}))
def test_burden_in_ohm_is_the_inverse_of_the_burden_in_va(row: Row):
    inputs = row.arguments()
    burden = rated_burden_ohm(float(row.expected), inputs["ct_secondary_a"]).item()
    assert burden == pytest.approx(inputs["burden_ohm"], rel=1e-12)
