"""Shop aids that a design needs and that are no part of the array."""

from fabgen.design.arranged import Parameters
from fabgen.frozen import frozen


@frozen
class Fixture:
    """One printed shop aid.

    Attributes:
        part: file in `model/parts`.
        parameters: its keyword arguments, sorted by name.
        label: what to call it, ASCII, unique.
        quantity: how many to print.
        purpose: what it is for, one line.
        needs: number and name of what is bought for one of them.
        use: how it is used, in sentences.
    """

    part: str
    parameters: Parameters
    label: str
    quantity: int
    purpose: str
    needs: tuple[tuple[int, str], ...]
    use: str
