"""Which acts the roles allow, over all rooms, and what no integration may, whatever it is given."""

import fleet.acts
import fleet.duties
import loads.acts
import loads.duties
import records.acts
from service import allowed

ALL = {kind.name for kind in (*fleet.acts.KINDS, *loads.acts.KINDS, *records.acts.WEBHOOK_KINDS)}


def test_every_act_that_a_role_allows_is_an_act():
    for role in fleet.duties.ROLES:
        assert allowed.to_person([role]) <= ALL | allowed.READS


def test_what_people_do_can_be_done_by_some_role():
    # Operators are entered at set-up; the worker files manifests and rechecks, tells of stale loads and
    # of what falls due; people do the rest.
    somebody = allowed.to_person(fleet.duties.ROLES)
    workers = {"file-manifest", "finish-recheck", "tell-stale-load", "tell-falling-due"}

    assert ALL - somebody == {"enter-operator"} | workers


def test_no_role_reads_nothing_and_an_unknown_role_is_none():
    assert allowed.to_person([]) == frozenset()
    assert allowed.to_person(["emperor"]) == frozenset()
    assert allowed.to_person(["auditor"]) >= {"read"}


def test_an_integration_does_nothing_that_needs_a_person_even_with_every_role_and_scope():
    acts = allowed.to_token(fleet.duties.ROLES, ALL | {"read", "sign"}, integration=True)

    assert acts == {
        "read",
        "submit-load",
        "revise-load",
        "assess-load",
        "withdraw-load",
        "depart-load",
        "enter-aircraft",
        "enter-loading-basis",
        "enter-empty-weight",
        "enter-restriction",
        "enter-permit",
        "end-permit",
        "subscribe-webhook",
        "rotate-webhook-secret",
        "resume-webhook",
        "replay-webhook",
        "end-webhook",
    }
    assert allowed.grantable(fleet.duties.ROLES, integration=True) == acts


def test_the_scope_sign_is_to_be_had_by_who_signs_and_is_no_act():
    assert "sign" in allowed.grantable(["pilot"], integration=False)
    assert "sign" not in allowed.grantable(["auditor"], integration=False)
    assert "sign" not in allowed.to_token(["pilot"], ["sign", "accept-load"], integration=False)


def test_a_token_makes_no_token_and_takes_nobodys_session_or_password():
    session_only = {"issue-token", "rotate-token", "change-password", "end-sessions"}

    assert session_only <= allowed.to_person(["pilot"])
    assert not session_only & allowed.to_token(["pilot"], ALL, integration=False)
    assert not session_only & allowed.grantable(fleet.duties.ROLES, integration=False)


def test_people_and_the_log_of_sign_ins_are_looked_at_by_manager_and_auditor_only():
    private = {"read-people", "read-access-log"}

    seen = {role for role in fleet.duties.ROLES if allowed.to_person([role]) & private}

    assert seen == {"operations manager", "auditor"}
    assert not allowed.grantable(["auditor"], integration=True) & private
