"""Stage 7, record: the frozen outcome of a calculation; its digest is what people sign."""

from .canonical import digest_of, read_record, record_bytes
from .context import (
    AssumptionRecord,
    FieldRecord,
    LegRecord,
    ReferenceRecord,
    StationRecord,
)
from .model import (
    SCHEMA,
    ConsistencyRecord,
    CriterionRecord,
    InputRecord,
    Record,
    RelationRecord,
    ResultRecord,
    SourceRecord,
)
from .step_model import (
    AlternativeRecord,
    HalvingRecord,
    LimitRecord,
    MemberRecord,
    MoveRecord,
    Operand,
    RegimeTest,
    RegimeUse,
    RootRecord,
    StepRecord,
)

__all__ = [
    "SCHEMA",
    "AlternativeRecord",
    "AssumptionRecord",
    "ConsistencyRecord",
    "CriterionRecord",
    "FieldRecord",
    "HalvingRecord",
    "InputRecord",
    "LegRecord",
    "LimitRecord",
    "MemberRecord",
    "MoveRecord",
    "Operand",
    "Record",
    "ReferenceRecord",
    "RegimeTest",
    "RegimeUse",
    "RelationRecord",
    "ResultRecord",
    "RootRecord",
    "SourceRecord",
    "StationRecord",
    "StepRecord",
    "digest_of",
    "read_record",
    "record_bytes",
]
