"""The schema beside the demo designs, which their first line names for an editor."""

import json
from pathlib import Path

import pytest

from fabgen.read.schema import schema

DESIGNS = Path(__file__).parents[2] / "designs"


def test_the_schema_beside_the_designs_is_the_programs_own() -> None:
    """Write it anew with `fabgen schema > designs/design.schema.json` when the grammar changes."""
    assert json.loads((DESIGNS / "design.schema.json").read_text(encoding="utf-8")) == schema()


@pytest.mark.parametrize("design", sorted(DESIGNS.glob("*.yaml")), ids=lambda path: path.stem)
def test_every_demo_design_names_it_in_its_first_line(design: Path) -> None:
    first = design.read_text(encoding="utf-8").splitlines()[0]
    assert first == "# yaml-language-server: $schema=design.schema.json"
