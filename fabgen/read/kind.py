"""What every field shares: how it reads a node of the tree, refuses it, and leaves what it notices."""

from abc import ABC, abstractmethod
from typing import Any, NamedTuple, NoReturn

from pydantic_core import PydanticCustomError, ValidationError
from pydantic_core.core_schema import ValidationInfo

from fabgen.errors import Place
from fabgen.read.yaml_tree import Node, Scalar, Seq


class OtherUnit(NamedTuple):
    """A length that is only likely in the other unit."""

    key: str
    place: Place
    number: str
    read_mm: float
    other_mm: float
    other_unit: str

    @property
    def meant(self) -> str:
        """The number in the other unit, with its millimetres where that is inches."""
        return f"{self.number} mm" if self.other_unit == "mm" else f"{self.number} in ({self.other_mm:.4g} mm)"


class Broken(NamedTuple):
    """A section, row or value of the top level that did not validate, with pydantic's reasons."""

    node: Node
    field: str
    error: ValidationError


class Context:
    """What fields need to know about their file, and where they leave what they notice.

    Attributes:
        unit: of bare lengths: `mm`, `in`, or None when the file does not say.
        other_unit: lengths that are only likely in the other unit.
        broken: sections and rows that did not validate, with the reasons.
    """

    def __init__(self, unit: str | None) -> None:
        self.unit = unit
        self.other_unit: list[OtherUnit] = []
        self.broken: list[Broken] = []


def refuse(code: str, message: str, fix: str) -> NoReturn:
    """Refuse a value.

    Args:
        code: the D code.
        message: what is wrong; the key is put in front of it.
        fix: the cheapest way out, with an example.

    Raises:
        PydanticCustomError: always.
    """
    raise PydanticCustomError("fabgen", "{message}", {"code": code, "message": message, "fix": fix})


def scalar_of(value: Any, example: str) -> Scalar:
    """The scalar that a field takes.

    Raises:
        PydanticCustomError: it is a list, a mapping, or nothing.
    """
    if isinstance(value, Scalar):
        if value.empty:
            refuse("D07", "has no value", f"for example {example}")
        return value
    refuse("D08", f"takes one value, not a {'list' if isinstance(value, Seq) else 'mapping'}", f"for example {example}")


class Kind(ABC):
    """Base of the kinds of value: how one is read, and what may be written for it.

    Plain classes, because these are made at every start of the program and a dataclass costs a millisecond each.

    Attributes:
        example: as a user would write it.
    """

    example: str

    @abstractmethod
    def read(self, value: Any, info: ValidationInfo) -> Any:
        """The value in force, from a node of the tree."""

    @abstractmethod
    def schema(self) -> dict[str, Any]:
        """The JSON Schema of what may be written."""
