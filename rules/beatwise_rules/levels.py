"""How grave a finding is. Physics decides: what the access loses, and how much of the kernel's traffic it is."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace

from beatwise.model.finding import Facts, Finding, Level
from beatwise.model.traffic import Traffic


@dataclass(frozen=True, slots=True)
class Thresholds:
    """Where the levels begin, as shares between 0 and 1 (our own choice: half is grave, a tenth is worth a look)."""

    error_loss: float = 0.5  #: of what the access could get
    warning_loss: float = 0.1
    least_share: float = 0.01  #: of the kernel's bytes; an access that moves less is never more than a note


DEFAULTS = Thresholds()


def share_of_bytes(facts: Facts, traffic: Iterable[Traffic]) -> float | None:
    """The share of the kernel's bytes that these accesses move; None where a size is not known."""
    moved, everything = _bytes(traffic), _bytes(facts.traffic)
    if moved is None or everything is None:
        return None
    return moved / everything if everything else 0.0


def _bytes(traffic: Iterable[Traffic]) -> float | None:
    """What the accesses move together; None where a size is not known."""
    total = 0.0
    for item in traffic:
        if item.bytes_moved is None:
            return None
        total += item.bytes_moved
    return total


def level(loss_share: float, byte_share: float | None, thresholds: Thresholds = DEFAULTS) -> Level:
    """The level for a loss and a share of the kernel's bytes (None: not known, the loss alone decides).

    >>> level(0.9, 0.5), level(0.2, None), level(0.9, 0.001), level(0.05, 0.5)
    ('error', 'warning', 'note', 'note')
    """
    if byte_share is not None and byte_share < thresholds.least_share:
        return "note"
    if loss_share >= thresholds.error_loss:
        return "error"
    return "warning" if loss_share >= thresholds.warning_loss else "note"


def accesses_of(finding: Finding, facts: Facts) -> list[Traffic]:
    """The accesses that a finding speaks of: those at its place, or else all of its port."""
    at = (finding.place.file, finding.place.offset)
    here = [
        traffic
        for traffic in facts.traffic
        if (traffic.access.place.file, traffic.access.place.offset) == at
        and finding.argument in (None, traffic.access.argument)
    ]
    return here or [traffic for traffic in facts.traffic if traffic.access.interface == finding.interface]


def weighed(findings: Sequence[Finding], facts: Facts, thresholds: Thresholds = DEFAULTS) -> list[Finding]:
    """The findings with the levels that their losses call for; one without rates keeps the level its rule gave it.

    The same trouble of one argument at many places (an unrolled loop, a macro) counts with all the bytes it holds up.
    """
    everything = _bytes(facts.traffic)
    held: dict[tuple[str, str | None, str | None], float | None] = {}
    for finding in findings:
        own, key = _bytes(accesses_of(finding, facts)), (finding.rule, finding.argument, finding.interface)
        before = held.get(key, 0.0)
        held[key] = None if own is None or before is None else own + before
    result = []
    for finding in findings:
        if finding.loss_gbps is None or not finding.could_gbps:
            result.append(finding)
            continue
        own = held[finding.rule, finding.argument, finding.interface]
        share = None if own is None or everything is None else own / everything if everything else 0.0
        result.append(replace(finding, level=level(finding.loss_gbps / finding.could_gbps, share, thresholds)))
    return result
