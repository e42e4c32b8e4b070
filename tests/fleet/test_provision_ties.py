"""Ties of what an operator lays down that take more than one row to break."""

from typing import Any

import pytest
from django.db import IntegrityError

from fleet.actions.enter_standard_weights import enter_standard_weights
from fleet.models import Provision
from tests.cast import actor
from tests.fleet.constraint_rows import Scene
from tests.fleet.provision_rows import due_notice, provision, provision_approval, provision_end
from tests.fleet.test_constraints import insert, scene
from tests.pure.loads.standards import seasonal_document

pytestmark = pytest.mark.django_db
__all__ = ["scene"]


def refused_by(scene: Scene, table: str, row: dict[str, Any]) -> str:
    with pytest.raises(IntegrityError) as refused:
        insert(scene, f"fleet_{table}", row)
    return str(refused.value.__cause__.diag.constraint_name)  # type: ignore[union-attr] # psycopg gives it


def test_a_notice_is_given_once(scene: Scene) -> None:  # the fixture of the other module
    insert(scene, "fleet_duenotice", due_notice(scene))

    assert refused_by(scene, "duenotice", due_notice(scene)) == "due_notice_is_given_once"


def test_a_number_of_the_operators_is_taken_once(scene: Scene) -> None:  # as above
    enter_standard_weights(actor(scene.people.manager), seasonal_document())
    again = provision(scene, aircraft_id=None, kind="standard weights", number=1)

    assert refused_by(scene, "provision", again) == "provision_number_is_taken_once"


def theirs(scene: Scene) -> Provision:  # as above
    return enter_standard_weights(actor(scene.others.manager), seasonal_document())


def test_another_operators_version_is_neither_approved_nor_ended(scene: Scene) -> None:  # as above
    other = theirs(scene)
    author = {"entered_by_id": scene.others.manager.id}
    of = {"of": other.id, "kind": "standard weights", **author}

    assert refused_by(scene, "provisionapproval", provision_approval(scene, **of)) == (
        "provision_approval_is_of_the_operator"
    )
    ending = provision_end(scene, of=other.id, kind="permit", **author)
    assert refused_by(scene, "provisionend", ending) in {
        "provision_end_is_of_the_operator",
        "provision_end_names_the_kind",
    }
