"""Slips that would explain why a number is not the one expected: a unit, a decimal place, a transformer's side."""

from __future__ import annotations

from audit.findings.handover.written import WrittenSetting

_FACTORS = (
    (10.0, "a decimal place"),
    (100.0, "per cent for a multiple, or two decimal places"),
    (1000.0, "milli for the whole unit, or a thousands separator"),
    (60.0, "minutes for seconds"),
    (50.0, "cycles at 50 Hz for seconds"),
    (60.0, "cycles at 60 Hz for seconds"),
)
NEAR = 2e-3


def likely_slip(typed: float, expected: float, written: WrittenSetting) -> str:
    """Say which slip would make the typed number the expected one, or nothing.

    Both numbers are in the export's unit. A secondary value typed for a primary one, or the other way round,
    differs by the ratio that the export's own value shows.
    """
    if expected != expected or typed != typed or expected == 0 or typed == 0:
        return ""
    factors = list(_FACTORS)
    if written.factor == written.factor and abs(written.factor - 1) > 0.01 and written.base:
        factors.append((written.factor, "a primary for a secondary value or multiple, or the other way round"))
    for factor, says in factors:
        for turned in (factor, 1 / factor):
            if abs(typed * turned - expected) <= max(NEAR * abs(expected), 1e-9):
                return f"{typed:g} times {turned:g} would be {expected:g}: {says}?"
    return ""
