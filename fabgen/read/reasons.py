"""Where values come from that the design file leaves out: filled in and explained in one step."""

from typing import TypeVar

T = TypeVar("T")

PRACTICE = "default, common practice"


class Reasons:
    """Why each value that the file leaves out is what it is, by its path in the file, such as `boom.corner_radius`."""

    def __init__(self) -> None:
        self.by_path: dict[str, str] = {}

    def pick(self, path: str, stated: T | None, default: T, reason: str = PRACTICE) -> T:
        """The stated value, else the default with its reason noted.

        Args:
            path: keys from the top of the file, joined by points.
            stated: what the file says; None when it says nothing.
            default: what holds then.
            reason: one short line, as `check --show` prints it.
        """
        if stated is not None:
            return stated
        self.by_path[path] = reason
        return default
