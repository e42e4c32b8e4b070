"""The rows of the loads room."""

from loads.models.assessment import Assessment
from loads.models.declaration import Declaration
from loads.models.load import Load
from loads.models.paper import FiledPaper, Paper
from loads.models.signature import Signature
from loads.models.step import AllowedStep, Step

__all__ = ["AllowedStep", "Assessment", "Declaration", "FiledPaper", "Load", "Paper", "Signature", "Step"]
