"""All rules, one after the other, over the arranged design."""

from collections.abc import Iterator

from fabgen import registry
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def judge(arranged: Arranged) -> Iterator[Finding]:
    """Every finding of every rule in `check/rules`, in the rules' alphabetical order.

    Args:
        arranged: the arranged design.
    """
    for rule in registry.entries("check/rules"):
        yield from rule.function("findings")(arranged)
