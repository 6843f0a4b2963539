"""The audits that the proofs share."""

from __future__ import annotations

import pytest

from tests.proofs.fleets import Audits


@pytest.fixture(scope="session")
def audits(tmp_path_factory: pytest.TempPathFactory) -> Audits:
    """Give the audits of all fleets, each made when first asked for."""
    return Audits(tmp_path_factory.mktemp("proofs"))
