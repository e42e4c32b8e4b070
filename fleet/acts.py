"""The acts of the fleet room: the permission, the word in the trail and the label in logs, at once."""

from records.kind import Kind

ENTER_OPERATOR = Kind("enter-operator", "entered an operator")
ENTER_PERSON = Kind("enter-person", "entered a person")
GRANT_DUTY = Kind("grant-duty", "granted a duty")
END_DUTY = Kind("end-duty", "ended a duty")
CHANGE_PASSWORD = Kind("change-password", "changed a password")
CHANGE_MAIL = Kind("change-mail", "changed a mail address")
LET_CHOOSE_PASSWORD = Kind("let-choose-password", "made a link to choose a new password")
ISSUE_TOKEN = Kind("issue-token", "issued a token")
REVOKE_TOKEN = Kind("revoke-token", "revoked a token")
ROTATE_TOKEN = Kind("rotate-token", "made a new secret for a token")
DEACTIVATE_PERSON = Kind("deactivate-person", "deactivated a person")
END_SESSIONS = Kind("end-sessions", "ended all sessions")
ENTER_AIRCRAFT = Kind("enter-aircraft", "entered an aircraft")
ENTER_LOADING_BASIS = Kind("enter-loading-basis", "entered a loading basis")
APPROVE_LOADING_BASIS = Kind("approve-loading-basis", "approved a loading basis")
ENTER_EMPTY_WEIGHT = Kind("enter-empty-weight", "entered an empty weight")
APPROVE_EMPTY_WEIGHT = Kind("approve-empty-weight", "approved an empty weight")
CHANGE_SETTINGS = Kind("change-settings", "changed the operator's settings")
ENTER_STANDARD_WEIGHTS = Kind("enter-standard-weights", "entered a table of standard weights")
APPROVE_STANDARD_WEIGHTS = Kind("approve-standard-weights", "approved a table of standard weights")
ENTER_RULES = Kind("enter-rules", "entered a set of rules")
APPROVE_RULES = Kind("approve-rules", "approved a set of rules")
ENTER_RESTRICTION = Kind("enter-restriction", "entered a restriction")
LIFT_RESTRICTION = Kind("lift-restriction", "lifted a restriction")
ENTER_PERMIT = Kind("enter-permit", "entered a permit")
APPROVE_PERMIT = Kind("approve-permit", "approved a permit")
END_PERMIT = Kind("end-permit", "ended a permit")
TELL_FALLING_DUE = Kind("tell-falling-due", "told that something falls due")

KINDS = (
    ENTER_OPERATOR,
    ENTER_PERSON,
    GRANT_DUTY,
    END_DUTY,
    CHANGE_PASSWORD,
    CHANGE_MAIL,
    LET_CHOOSE_PASSWORD,
    ISSUE_TOKEN,
    REVOKE_TOKEN,
    ROTATE_TOKEN,
    DEACTIVATE_PERSON,
    END_SESSIONS,
    ENTER_AIRCRAFT,
    ENTER_LOADING_BASIS,
    APPROVE_LOADING_BASIS,
    ENTER_EMPTY_WEIGHT,
    APPROVE_EMPTY_WEIGHT,
    CHANGE_SETTINGS,
    ENTER_STANDARD_WEIGHTS,
    APPROVE_STANDARD_WEIGHTS,
    ENTER_RULES,
    APPROVE_RULES,
    ENTER_RESTRICTION,
    LIFT_RESTRICTION,
    ENTER_PERMIT,
    APPROVE_PERMIT,
    END_PERMIT,
    TELL_FALLING_DUE,
)
