"""Findings that differ only in their place become one, and its place names them all in short."""

from collections.abc import Collection, Iterable, Sequence
from dataclasses import replace

from fabgen.design.findings import Finding

SHORTEST_RUN = 3


def merged(findings: Iterable[Finding], order: Sequence[str]) -> list[Finding]:
    """One finding in place of several that say the same about different places.

    Args:
        findings: in any order.
        order: names of the elements in order of station, for runs such as `D3…D9`.

    Returns:
        The findings in order of their first place.
    """
    places: dict[Finding, list[str]] = {}
    for finding in findings:
        places.setdefault(replace(finding, where=""), []).append(finding.where)
    return [replace(finding, where=names(order, where)) for finding, where in places.items()]


def names(order: Sequence[str], chosen: Collection[str]) -> str:
    """Names in short: runs of neighbours as `D3…D9`, then what is no name of the order, as it is.

    Args:
        order: all names.
        chosen: those to print.
    """
    runs: list[list[str]] = []
    follows = False
    for name in order:
        if name in chosen:
            if follows:
                runs[-1].append(name)
            else:
                runs.append([name])
        follows = name in chosen
    texts = [f"{run[0]}…{run[-1]}" if len(run) >= SHORTEST_RUN else ", ".join(run) for run in runs]
    known = set(order)
    return ", ".join([*texts, *dict.fromkeys(name for name in chosen if name not in known)])
