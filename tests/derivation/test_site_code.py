"""The code that a site states for all of its motors."""

import numpy as np
import pytest

from audit.derivation.register_facts import with_register_facts
from audit.expression.values import NO, UNKNOWN, YES
from audit.fleet.build import fleet_of


@pytest.mark.parametrize(("code", "expected"), [("NFPA 70", YES), ("IEC", NO), (None, UNKNOWN)])
def test_code_of_the_site_is_a_fact_of_every_motor(code: str | None, expected: int) -> None:
    fleet = fleet_of(motor=[{"motor": "P-1"}, {"motor": "P-2"}], facts={"code": code} if code else {})
    column = with_register_facts(fleet).tables["motor"].columns["site_code_is_nfpa_70"]
    assert np.array_equal(column.values, [expected, expected])
