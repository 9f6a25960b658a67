"""Stage 5, planning: which relation gives which unknown, or exactly what is missing."""

from .advice import closing_inputs
from .coupled import Loop, loops
from .problem import Instance, Member, Place, Problem, RegimeInstance, state_problem
from .search import Edge, Reach, reach

__all__ = [
    "Edge",
    "Instance",
    "Loop",
    "Member",
    "Place",
    "Problem",
    "Reach",
    "RegimeInstance",
    "closing_inputs",
    "loops",
    "reach",
    "state_problem",
]
