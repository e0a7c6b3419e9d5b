import sys
from pathlib import Path

import pytest

import zeotrope

sys.path.insert(0, str(Path(__file__).resolve().parents[1] / "tools"))


@pytest.fixture(scope="session")
def catalogue() -> zeotrope.Catalogue:
    return zeotrope.Catalogue()
