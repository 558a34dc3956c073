"""Keeps the linear algebra of small systems on one thread.

Waking further threads costs more than a 50 x 50 system takes. Where the package threadpoolctl is installed the limit is
set around each solve; elsewhere OPENBLAS_NUM_THREADS=1 in the environment does it. Results do not depend on it.
"""

from collections.abc import Iterator
from contextlib import contextmanager
from functools import lru_cache
from importlib import import_module
from importlib.util import find_spec
from typing import Any


@lru_cache(maxsize=1)
def _controller() -> Any:
    if find_spec("threadpoolctl") is None:
        return None
    return import_module("threadpoolctl").ThreadpoolController()


@contextmanager
def one_blas_thread() -> Iterator[None]:
    """Context in which BLAS uses one thread, where that can be set."""
    controller = _controller()
    if controller is None:
        yield
        return
    with controller.limit(limits=1, user_api="blas"):
        yield
