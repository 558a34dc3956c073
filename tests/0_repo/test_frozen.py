"""Records are frozen, compared by value, and dataclasses to everybody else."""

import copy
import dataclasses

import pytest

from fabgen.frozen import frozen


@frozen
class Point:
    """A point."""

    x: float
    y: float = 2.0

    @property
    def sum(self) -> float:
        return self.x + self.y


@frozen
class Named(Point):
    """A point with a name, which must not be empty."""

    name: str = "origin"

    def __post_init__(self) -> None:
        if not self.name:
            raise ValueError("a name is not empty")


@frozen
class Single:
    """One field."""

    only: tuple[int, ...]


def test_made_by_position_and_by_name_with_defaults() -> None:
    assert (Point(1.0).x, Point(1.0).y, Point(y=3.0, x=1.0).sum) == (1.0, 2.0, 4.0)
    with pytest.raises(TypeError):
        Point()
    with pytest.raises(TypeError):
        Point(1.0, 2.0, 3.0)
    with pytest.raises(TypeError):
        Point(1.0, z=3.0)


def test_compared_and_hashed_by_value_within_one_class() -> None:
    assert Point(1.0) == Point(1.0, 2.0)
    assert Point(1.0) != Point(2.0)
    assert Point(1.0, 2.0) != Named(1.0, 2.0)
    assert len({Point(1.0), Point(1.0), Point(2.0), Single((1,)), Single((1,))}) == 3


def test_frozen_and_slotted() -> None:
    point = Point(1.0)
    with pytest.raises(dataclasses.FrozenInstanceError):
        point.x = 5.0
    with pytest.raises(dataclasses.FrozenInstanceError):
        del point.x
    assert not hasattr(point, "__dict__")


def test_a_dataclass_to_replace_fields_and_asdict() -> None:
    assert dataclasses.replace(Named(1.0), name="here") == Named(1.0, 2.0, "here")
    assert [field.name for field in dataclasses.fields(Named)] == ["x", "y", "name"]
    assert dataclasses.asdict(Point(1.0)) == {"x": 1.0, "y": 2.0}
    assert repr(Named(1.0)) == "Named(x=1.0, y=2.0, name='origin')"
    match Point(3.0):
        case Point(x=found):
            assert found == 3.0


def test_what_is_checked_after_making_is_checked() -> None:
    with pytest.raises(ValueError, match="not empty"):
        Named(1.0, name="")
    with pytest.raises(ValueError, match="not empty"):
        dataclasses.replace(Named(1.0), name="")


def test_copies_are_equal() -> None:
    assert copy.deepcopy(Single((1, 2))) == Single((1, 2))
    assert copy.copy(Named(1.0, name="here")) == Named(1.0, 2.0, "here")
