"""The rows of the fleet room."""

from fleet.models.aircraft import Aircraft
from fleet.models.approval import Approval
from fleet.models.due_notice import DueNotice
from fleet.models.duty import Duty
from fleet.models.empty_weight import EmptyWeight
from fleet.models.loading_basis import LoadingBasis
from fleet.models.operator import Operator
from fleet.models.operator_settings import OperatorSettings
from fleet.models.person import Person
from fleet.models.provision import Provision, ProvisionApproval, ProvisionEnd
from fleet.models.standing import Standing
from fleet.models.token import Rotation, Token

__all__ = [
    "Aircraft",
    "Approval",
    "DueNotice",
    "Duty",
    "EmptyWeight",
    "LoadingBasis",
    "Operator",
    "OperatorSettings",
    "Person",
    "Provision",
    "ProvisionApproval",
    "ProvisionEnd",
    "Rotation",
    "Standing",
    "Token",
]
