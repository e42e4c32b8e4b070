"""The acts of the loads room: the permission, the word in the trail and the label in logs, at once."""

from records.kind import Kind

SUBMIT_LOAD = Kind("submit-load", "submitted a load")
REVISE_LOAD = Kind("revise-load", "replaced a load by a revision")
ASSESS_LOAD = Kind("assess-load", "assessed a load again")
PREPARE_LOAD = Kind("prepare-load", "signed a load as prepared")
ACCEPT_LOAD = Kind("accept-load", "accepted a load")
WITHDRAW_LOAD = Kind("withdraw-load", "withdrew a load")
DEPART_LOAD = Kind("depart-load", "reported a load as departed")
FILE_MANIFEST = Kind("file-manifest", "filed a manifest")

KINDS = (
    SUBMIT_LOAD,
    REVISE_LOAD,
    ASSESS_LOAD,
    PREPARE_LOAD,
    ACCEPT_LOAD,
    WITHDRAW_LOAD,
    DEPART_LOAD,
    FILE_MANIFEST,
)
