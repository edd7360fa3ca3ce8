"""What every test run shares: one thread for linear algebra, and a folder of its own for kept wall answers."""

from __future__ import annotations

import os
from collections.abc import Iterator

import pytest

os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")  # before numpy is imported: more threads are slower here


@pytest.fixture(scope="session", autouse=True)
def own_cache(tmp_path_factory: pytest.TempPathFactory) -> Iterator[None]:
    """Kept answers of walls go to a folder of this run, never to the user's own."""
    with pytest.MonkeyPatch.context() as patch:
        patch.setenv("SCATTERBAY_CACHE", str(tmp_path_factory.mktemp("walls")))
        yield
