"""Pieces on bars: everything fits, and `proven` is only said when it is true."""

import itertools
import sys

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fabgen.arrange.bars import plan
from fabgen.design.arranged import Cut
from fabgen.design.design import Shop


def shop(rod_stock_mm: float = 2000.0) -> Shop:
    return Shop("m", 0.0, 0.5, 1.5, 5.0, rod_stock_mm, 6000.0, "metric", "A4", 0.1)


def cut(name: str, length_mm: float) -> Cut:
    return Cut(name, name, "rod", 4.0, "EN AW-6060 T66", length_mm, 0.0, 0.0, 0.0, 0.5)


def fewest(sizes: tuple[float, ...], room: float) -> int:
    """Brute force: the fewest bars, by trying every assignment."""
    for bars in range(1, len(sizes) + 1):
        for assignment in itertools.product(range(bars), repeat=len(sizes)):
            loads = [0.0] * bars
            for size, bar in zip(sizes, assignment, strict=True):
                loads[bar] += size
            if max(loads) <= room + 1e-9:
                return bars
    return 0


def test_kerf_and_end_trim_are_counted() -> None:
    """Two pieces of 996.75 and one cut between them fill 1995 mm: 5 of trim, 2 × 996.75, 1.5 of kerf, exactly 2000."""
    assert len(plan([cut("a", 996.75), cut("b", 996.75)], shop()).bars) == 1
    assert len(plan([cut("a", 996.75), cut("b", 996.76)], shop()).bars) == 2


def test_a_piece_longer_than_a_bar_is_on_no_bar() -> None:
    found = plan([cut("long", 2100.0), cut("short", 100.0)], shop())
    assert found.bar_of("long") == ""
    assert found.bar_of("short") == "rod 4 EN AW-6060 T66 #1"


@settings(max_examples=60)
@given(st.lists(st.floats(100.0, 900.0), min_size=1, max_size=6))
def test_the_plan_is_valid_and_as_short_as_brute_force(lengths: list[float]) -> None:
    cuts = [cut(f"p{k}", length) for k, length in enumerate(lengths)]
    found = plan(cuts, shop(1000.0))
    for bar in found.bars:
        used = 5.0 + sum(length for _, length in bar.pieces) + 1.5 * (len(bar.pieces) - 1)
        assert used <= 1000.0 + 1e-6
    assert sorted(name for bar in found.bars for name, _ in bar.pieces) == sorted(c.piece for c in cuts)
    best = fewest(tuple(length + 1.5 for length in lengths), 1000.0 - 5.0 + 1.5)
    assert found.proven
    assert len(found.bars) == best


def test_best_fit_alone_would_take_one_bar_more() -> None:
    """A known case where the longest first leaves a bar too many; the solver finds two and says proven."""
    lengths = [360.0, 360.0, 270.0, 270.0, 180.0, 500.0]
    cuts = [cut(f"p{k}", length) for k, length in enumerate(lengths)]
    found = plan(cuts, shop(1000.0))
    best = fewest(tuple(length + 1.5 for length in lengths), 996.5)
    assert (len(found.bars), found.proven) == (best, True)


@pytest.mark.parametrize("pieces", [25, 60])
def test_many_pieces_are_nested_to_the_bound(pieces: int) -> None:
    cuts = [cut(f"p{k}", 270.0 + k) for k in range(pieces)]
    found = plan(cuts, shop(3000.0))
    assert sum(len(bar.pieces) for bar in found.bars) == pieces


def test_long_pieces_are_proven_by_counting_what_fits_beside_them(monkeypatch: pytest.MonkeyPatch) -> None:
    """Beside 700 no 400 fits into 1000: three bars and one more, though 2900 mm of metal would go into three."""
    monkeypatch.setitem(sys.modules, "fabgen.arrange.bars_proof", None)
    cuts = [cut(f"p{k}", length) for k, length in enumerate([700.0] * 3 + [400.0] * 2)]
    found = plan(cuts, shop(1000.0))
    assert (len(found.bars), found.proven) == (4, True)
