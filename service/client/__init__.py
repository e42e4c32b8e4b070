"""A small client of Tarebook's API for Python 3.11 and newer, on the standard library alone.

Nothing in this folder imports anything of the service: copy it into your own program, as `service/client`.

    with_token = Tarebook("http://127.0.0.1:8000", token)
    load = with_token.submit(document)
    if load.verdict != "within":
        print([check.what_next for check in load.failed])
"""

from service.client.events import Message, MessageRefused, read_message
from service.client.exchange import Patience
from service.client.late import LatePreview, Note
from service.client.people import Person, Settings, Token, Who
from service.client.problems import (
    AnswerUnusable,
    Fault,
    Invalid,
    MovedOn,
    NotAllowed,
    NotKnown,
    NotSignedIn,
    Refused,
    ServerFailed,
    StateNotSent,
    StepRefused,
    TarebookError,
    TooLarge,
    TooSoon,
    Unanswered,
    Unreadable,
)
from service.client.provisions import Provision, Provisions
from service.client.rechecks import Recheck, RecheckedFlight
from service.client.remedies import Remedies, Remedy
from service.client.shapes import (
    Aircraft,
    Assessment,
    Check,
    Delivery,
    EmptyWeights,
    Load,
    LoadLine,
    ManifestNumber,
    Paper,
    Subscription,
    Version,
)
from service.client.tarebook import Tarebook
from service.client.trail import Act, Entry

__all__ = (
    "Act",
    "Aircraft",
    "AnswerUnusable",
    "Assessment",
    "Check",
    "Delivery",
    "EmptyWeights",
    "Entry",
    "Fault",
    "Invalid",
    "LatePreview",
    "Load",
    "LoadLine",
    "ManifestNumber",
    "Message",
    "MessageRefused",
    "MovedOn",
    "NotAllowed",
    "NotKnown",
    "NotSignedIn",
    "Note",
    "Paper",
    "Patience",
    "Person",
    "Provision",
    "Provisions",
    "Recheck",
    "RecheckedFlight",
    "Refused",
    "Remedies",
    "Remedy",
    "ServerFailed",
    "Settings",
    "StateNotSent",
    "StepRefused",
    "Subscription",
    "Tarebook",
    "TarebookError",
    "Token",
    "TooLarge",
    "TooSoon",
    "Unanswered",
    "Unreadable",
    "Version",
    "Who",
    "read_message",
)
