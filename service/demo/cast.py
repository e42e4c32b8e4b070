"""The invented operator and its invented people. Nobody and nothing here exists."""

from dataclasses import dataclass

from fleet.actions.enter_operator import NewOperator

OPERATOR = NewOperator(
    code="sallow-reach",
    name="Sallow Reach Air",
    certificate="SRA-0417 (invented)",
    base="XNAL Nalden",
    time_zone="Etc/GMT+6",
    rule_set="US",
    procedure="Operations manual, section 8 Loading, revision 5 (invented)",
    weight_method="weighed and declared weights; no average weights",
    invented=True,
)


@dataclass(frozen=True, slots=True)
class Login:
    """An invented person, the roles they hold, and for what an API token of theirs may be used."""

    login: str
    name: str
    roles: tuple[str, ...]
    scopes: tuple[str, ...] = ()


MANAGER, MAINTENANCE, APPROVER = "o.hallam", "m.ferrow", "t.lisk"
SCHEDULER = "scheduling"
PILOTS = ("r.amani", "j.corvane", "s.dulwen")

PEOPLE: tuple[Login, ...] = (
    Login(MANAGER, "O. Hallam", ("operations manager",)),
    Login(
        MAINTENANCE,
        "M. Ferrow",
        ("maintenance",),
        ("read", "enter-aircraft", "enter-loading-basis", "enter-empty-weight"),
    ),
    Login(
        APPROVER, "T. Lisk", ("records approver",), ("read", "approve-loading-basis", "approve-empty-weight")
    ),
    *(
        Login(login, name, ("pilot",), ("read", "sign", "prepare-load", "accept-load", "depart-load"))
        for login, name in zip(PILOTS, ("R. Amani", "J. Corvane", "S. Dulwen"), strict=True)
    ),
    Login("d.ness", "D. Ness", ("load preparer",)),
    Login("i.veil", "I. Veil", ("auditor",)),
    Login(SCHEDULER, "Scheduling system", ("integration",), ("read", "submit-load", "revise-load")),
)
