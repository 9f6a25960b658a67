"""Stage 5, planning: which relation gives which unknown, or exactly what is missing."""

from .advice import closing_inputs
from .coupled import Field, Loop
from .problem import CourseInstance, Instance, Member, Place, Problem, RegimeInstance, state_problem
from .routes import Routes
from .search import Edge, Reach, reach

__all__ = [
    "CourseInstance",
    "Edge",
    "Field",
    "Instance",
    "Loop",
    "Member",
    "Place",
    "Problem",
    "Reach",
    "RegimeInstance",
    "Routes",
    "closing_inputs",
    "reach",
    "state_problem",
]
