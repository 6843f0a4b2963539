"""Functions over child rows: where a member is missing, an extreme over all is missing too."""

from __future__ import annotations

import numpy as np
import pytest

from audit.expression.rows import beside_greatest, beside_least, greatest, greatest_of_all, least_of_all

PARENT = np.array([0, 0, 1, 1, -1])
CURRENT = np.array([600.0, 400.0, 300.0, np.nan, 9000.0])
TIME = np.array([5.0, 9.0, 2.0, 3.0, 99.0])


def test_an_extreme_over_all_is_missing_where_a_member_is_missing() -> None:
    result, deciding = greatest_of_all([CURRENT], PARENT, 3)
    assert result.tolist() == pytest.approx([600.0, np.nan, np.nan], nan_ok=True)
    assert deciding.tolist() == [0, -1, -1]
    assert least_of_all([CURRENT], PARENT, 3)[0].tolist() == pytest.approx([400.0, np.nan, np.nan], nan_ok=True)


def test_an_extreme_of_what_is_known_passes_over_missing_members() -> None:
    assert greatest([CURRENT], PARENT, 3)[0].tolist() == pytest.approx([600.0, 300.0, np.nan], nan_ok=True)


def test_beside_the_extreme_stands_the_value_of_the_same_row() -> None:
    assert beside_greatest([CURRENT, TIME], PARENT, 3)[0].tolist() == pytest.approx([5.0, np.nan, np.nan], nan_ok=True)
    assert beside_least([CURRENT, TIME], PARENT, 3)[0].tolist() == pytest.approx([9.0, np.nan, np.nan], nan_ok=True)
