"""The rows of the loads room."""

from loads.models.assessment import Assessment
from loads.models.declaration import Declaration
from loads.models.late_change import FiledIssue, LateChange
from loads.models.leg import Leg
from loads.models.load import Load
from loads.models.note import Note
from loads.models.paper import FiledPaper, Paper
from loads.models.present import Present
from loads.models.recheck import LoadFlag, Recheck, RecheckedLoad, RecheckPart, RecheckResult
from loads.models.remark import Remark
from loads.models.self_check import SelfCheck
from loads.models.signature import Signature
from loads.models.stale_notice import StaleNotice
from loads.models.step import AllowedStep, Step

__all__ = [
    "AllowedStep",
    "Assessment",
    "Declaration",
    "FiledIssue",
    "FiledPaper",
    "LateChange",
    "Leg",
    "Load",
    "LoadFlag",
    "Note",
    "Paper",
    "Present",
    "Recheck",
    "RecheckPart",
    "RecheckResult",
    "RecheckedLoad",
    "Remark",
    "SelfCheck",
    "Signature",
    "StaleNotice",
    "Step",
]
