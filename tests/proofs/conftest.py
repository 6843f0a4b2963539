"""The audits that the proofs share."""

from __future__ import annotations

import pytest

from tests.proofs.fleets import Audits


@pytest.fixture(scope="session")
def audits(tmp_path_factory: pytest.TempPathFactory) -> Audits:
    """Give the audits of all fleets, each made when first asked for."""
    return Audits(tmp_path_factory.mktemp("proofs"))


def pytest_configure(config: pytest.Config) -> None:
    """Make the mark of facts without a source known."""
    config.addinivalue_line("markers", "common_practice: a fact of the trade, for which no source is claimed")
