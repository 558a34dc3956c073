"""All rules, one after the other, over the arranged design."""

from collections.abc import Iterator

from fabgen import registry
from fabgen.check.where import merged
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def judge(arranged: Arranged) -> Iterator[Finding]:
    """Every finding of every rule in `check/rules`, in the rules' alphabetical order; equal ones told once.

    Args:
        arranged: the arranged design.
    """
    found = [finding for rule in registry.entries("check/rules") for finding in rule.function("findings")(arranged)]
    yield from merged(found, [element.id for element in arranged.design.elements])
