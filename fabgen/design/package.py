"""What a package is made of before it is written."""

from collections.abc import Callable

from fabgen.frozen import frozen

Say = Callable[[str], None]
"""Takes one line of progress."""


@frozen
class PackageFile:
    """One file of a package.

    Attributes:
        path: below the package folder, with forward slashes.
        data: its bytes.
        purpose: what it is for, one line, for the manifest.
    """

    path: str
    data: bytes
    purpose: str
