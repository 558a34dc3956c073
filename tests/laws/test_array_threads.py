"""Small solves stay on one thread where that can be set, and come out the same where it cannot."""

import numpy as np
import pytest

from fabgen.physics import blas_threads


def test_one_thread_inside_the_context() -> None:
    threadpoolctl = pytest.importorskip("threadpoolctl", reason="threadpoolctl is not installed")
    with blas_threads.one_blas_thread():
        pools = [pool for pool in threadpoolctl.threadpool_info() if pool["user_api"] == "blas"]
        assert pools
        assert {pool["num_threads"] for pool in pools} == {1}


def test_without_the_package_nothing_is_set(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(blas_threads, "_controller", lambda: None)
    with blas_threads.one_blas_thread():
        assert np.linalg.solve(np.array([[2.0]]), np.array([4.0])) == pytest.approx([2.0])
