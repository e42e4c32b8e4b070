"""The acts of the loads room: the permission, the word in the trail and the label in logs, at once."""

from records.kind import Kind

SUBMIT_LOAD = Kind("submit-load", "submitted a load")
REVISE_LOAD = Kind("revise-load", "replaced a load by a revision")
ASSESS_LOAD = Kind("assess-load", "assessed a load again")
PREPARE_LOAD = Kind("prepare-load", "signed a load as prepared")
CONFIRM_LOADING = Kind("confirm-loading", "confirmed a load as loaded")
ACCEPT_LOAD = Kind("accept-load", "accepted a load")
CHANGE_LATE = Kind("change-load-late", "changed an accepted load at the last minute")
WITHDRAW_LOAD = Kind("withdraw-load", "withdrew a load")
DEPART_LOAD = Kind("depart-load", "reported a load as departed")
REMARK_REJECT = Kind("remark-reject", "remarked on a rejected load")
WRITE_NOTE = Kind("write-note", "wrote a note after flight")
TELL_STALE = Kind("tell-stale-load", "told that an accepted load is stale")
FILE_MANIFEST = Kind("file-manifest", "filed a manifest")
RUN_SELF_CHECK = Kind("run-self-check", "had the computer prove itself")
RECHECK_LOADS = Kind("recheck-loads", "had loads computed again against a later figure")
FINISH_RECHECK = Kind("finish-recheck", "filed what loads computed again came to")

KINDS = (
    SUBMIT_LOAD,
    REVISE_LOAD,
    ASSESS_LOAD,
    PREPARE_LOAD,
    CONFIRM_LOADING,
    ACCEPT_LOAD,
    CHANGE_LATE,
    WITHDRAW_LOAD,
    DEPART_LOAD,
    REMARK_REJECT,
    WRITE_NOTE,
    TELL_STALE,
    FILE_MANIFEST,
    RUN_SELF_CHECK,
    RECHECK_LOADS,
    FINISH_RECHECK,
)
