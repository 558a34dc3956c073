"""The lettering font as a file: DejaVu Sans, found where another library of the environment keeps it.

System fonts are never used, so the same design gives the same bytes on every machine. The font's file comes with
matplotlib, which the solid kernel's library brings along; it is found without importing it.
"""

import importlib.util
from pathlib import Path

from fabgen.errors import MachineError

FAMILY = "DejaVu Sans"
_OWNER = "matplotlib"
_FILE = Path("mpl-data", "fonts", "ttf", "DejaVuSans.ttf")


def font_file(owner: str = _OWNER) -> Path:
    """Path of the DejaVu Sans font.

    Args:
        owner: the installed package that carries the font.

    Returns:
        An existing TrueType file.

    Raises:
        MachineError: the package or the file is not there.
    """
    spec = importlib.util.find_spec(owner)
    places = list(spec.submodule_search_locations or ()) if spec else []
    for place in places:
        path = Path(place) / _FILE
        if path.is_file():
            return path
    missing = f"{owner} has no {_FILE.as_posix()}" if places else f"the package {owner} is not installed"
    raise MachineError(
        f"the font {FAMILY} for drawings is missing: {missing}",
        f"reinstall it in this environment: python -m pip install --force-reinstall {_OWNER}",
    )
