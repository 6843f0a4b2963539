"""The catalogue, read once for all tests of the checks."""

import pytest

from audit.checks.catalogue import Catalogue, load_catalogue


@pytest.fixture(scope="session")
def catalogue() -> Catalogue:
    return load_catalogue()
