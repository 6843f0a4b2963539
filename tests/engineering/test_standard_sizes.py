"""Standard fuse ratings against worked examples of the handbook kind, and the edges of the list."""

import numpy as np
import pytest

from audit.engineering.standard_sizes import next_standard_fuse_a


@pytest.mark.parametrize(
    ("full_load_a", "share", "rating_a"),
    [
        # by hand from the list of NFPA 70 240.6(A): the product, then the next listed rating
        (34.0, 1.75, 60.0),  # 59.5
        (65.0, 1.75, 125.0),  # 113.75
        (52.0, 3.0, 175.0),  # 156
        (361.0, 1.75, 700.0),  # 631.75
    ],
)
def test_next_higher_rating(full_load_a: float, share: float, rating_a: float) -> None:
    assert next_standard_fuse_a(full_load_a * share).item() == rating_a


def test_a_product_that_is_a_rating_stays_there() -> None:
    # 1.75 x 40 A is 70 A, whatever the last binary digit
    assert next_standard_fuse_a(1.75 * 40).item() == 70.0
    assert next_standard_fuse_a(70.0000001).item() == 70.0
    assert next_standard_fuse_a(70.1).item() == 80.0


@pytest.mark.parametrize("current_a", [np.nan, -1.0, 6001.0])
def test_nothing_beyond_the_list(current_a: float) -> None:
    assert np.isnan(next_standard_fuse_a(current_a))


def test_never_below_the_current_and_rising() -> None:
    currents = np.linspace(0, 6000, 5001)
    ratings = next_standard_fuse_a(currents)
    assert (ratings >= currents - 0.01).all()
    assert (np.diff(ratings) >= 0).all()
