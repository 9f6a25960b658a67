"""What the check of one part of a record came to."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Finding:
    """What the check of one part came to.

    Attributes:
        part: such as ``step 3`` or ``input 1``.
        key: the variable.
        verdict: ``passed``, ``failed`` or ``not possible``.
        reason: what was compared, and by how much it differs.
    """

    part: str
    key: str
    verdict: str
    reason: str
