"""Each constraint of the room, broken below the models: the database itself refuses, by name."""

from datetime import UTC, datetime, timedelta
from typing import Any

import pytest
from django.db import IntegrityError, ProgrammingError, connection, transaction

from fleet import acts
from fleet.actions.change_settings import change_settings
from fleet.actions.enter_aircraft import enter_aircraft
from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.actions.enter_loading_basis import enter_loading_basis
from fleet.entering import NewAircraft
from fleet.models import Aircraft, Approval, EmptyWeight, LoadingBasis, Standing
from fleet.settings_reading import read_settings
from records.act import act
from records.guard.refusals import FixedForGood
from tests.cast import actor, cast, strangers
from tests.fleet.constraint_rows import (
    OPEN,
    SOON,
    Scene,
    aircraft,
    approval,
    basis,
    duty,
    person,
    rotation,
    settings,
    standing,
    token,
    weight,
    weight_approval,
)
from tests.fleet.provision_rows import PROVISION_BREAKS, PROVISION_PAIRS, PROVISION_TARGETS
from tests.makers import basis_document, empty_weight_document, make_aircraft, make_basis, make_empty_weight

pytestmark = pytest.mark.django_db


@pytest.fixture
def scene() -> Scene:
    people, others = cast(), strangers()
    aircraft, sister = make_aircraft(people), make_aircraft(people, "Q9-SIS")
    theirs = enter_aircraft(
        actor(others.manager), NewAircraft("Q9-KTB", "Fenlark 9", "9-1", "aeroplane", 2, 4)
    )
    approved_basis, approved_weight = make_basis(people, aircraft), make_empty_weight(people, aircraft)
    change_settings(actor(people.manager), read_settings({"reason": "first"}), seen="0")
    return Scene(
        people=people,
        others=others,
        aircraft=aircraft,
        sister=sister,
        their_aircraft=theirs,
        basis=enter_loading_basis(actor(people.maintenance), aircraft, basis_document()),
        weight=enter_empty_weight(actor(people.maintenance), aircraft, empty_weight_document()),
        approved_basis=approved_basis,
        approved_weight=approved_weight,
    )


def insert(scene: Scene, table: str, row: dict[str, Any]) -> None:
    """Write one row in plain SQL, inside an act of the operator."""
    columns = ", ".join(row)
    with (
        act(acts.ENTER_AIRCRAFT, by=actor(scene.people.manager), about="test:constraints"),
        connection.cursor() as cursor,
    ):
        cursor.execute(
            f"INSERT INTO {table} ({columns}) VALUES ({', '.join(['%s'] * len(row))})",  # our own names
            list(row.values()),
        )


BREAKS: dict[str, tuple[str, Any]] = {
    "approval_is_by_a_second_person": (
        "approval",
        lambda s: approval(s, approved_by_id=s.people.maintenance.id),
    ),
    "approval_is_of_one_version": ("approval", lambda s: approval(s, loading_basis_id=None)),
    "approval_names_the_author_of_the_basis": (
        "approval",
        lambda s: approval(s, entered_by_id=s.people.pilot.id),
    ),
    "approval_names_the_author_of_the_weight": (
        "approval",
        lambda s: weight_approval(s, entered_by_id=s.people.pilot.id),
    ),
    "approval_is_of_a_basis_of_this_aircraft": (
        "approval",
        lambda s: approval(s, aircraft_id=s.sister.id),
    ),
    "approval_is_of_a_weight_of_this_aircraft": (
        "approval",
        lambda s: weight_approval(s, aircraft_id=s.sister.id),
    ),
    "approval_holds_from_when_the_weight_says": ("approval", lambda s: weight_approval(s, true_from=SOON)),
    "approval_is_given_within_the_operator": (
        "approval",
        lambda s: approval(s, approved_by_id=s.others.manager.id),
    ),
    "approval_is_of_the_aircrafts_operator": (
        "approval",
        lambda s: approval(s, aircraft_id=s.their_aircraft.id),
    ),
    "fleet_approval_loading_basis_id_key": (
        "approval",
        lambda s: approval(s, loading_basis_id=s.approved_basis.id),
    ),
    "fleet_approval_empty_weight_id_key": (
        "approval",
        lambda s: weight_approval(s, empty_weight_id=s.approved_weight.id),
    ),
    "standing_basis_is_approved": (
        "standing",
        lambda s: standing(s, kind="loading basis", fit="", version=s.basis.id),
    ),
    "standing_basis_is_of_this_aircraft": (
        "standing",
        lambda s: standing(
            s, kind="loading basis", fit="", version=s.approved_basis.id, aircraft_id=s.sister.id
        ),
    ),
    "standing_weight_is_approved": ("standing", lambda s: standing(s, version=s.weight.id)),
    "standing_weight_is_of_this_aircraft_and_fit": ("standing", lambda s: standing(s, fit="skis")),
    "standing_is_of_the_aircrafts_operator": (
        "standing",
        lambda s: standing(s, aircraft_id=s.their_aircraft.id),
    ),
    "standing_kind_is_known": ("standing", lambda s: standing(s, kind="configuration")),
    "standing_names_a_fit_for_empty_weights_only": ("standing", lambda s: standing(s, fit="")),
    "standing_is_valid_for_some_time": ("standing", lambda s: standing(s, valid="empty")),
    "standing_is_known_for_some_time": ("standing", lambda s: standing(s, known="(,)")),
    "standing_has_one_version_at_any_moment": (
        "standing",
        lambda s: standing(s, valid=OPEN, known="[2099-01-01,)"),
    ),
    "loading_basis_revision_is_taken_once": ("loadingbasis", lambda s: basis(s, revision=1)),
    "loading_basis_counts_from_one": ("loadingbasis", lambda s: basis(s, revision=0)),
    "loading_basis_digest_is_sha256": ("loadingbasis", lambda s: basis(s, digest="0" * 63)),
    "loading_basis_is_of_the_aircrafts_operator": (
        "loadingbasis",
        lambda s: basis(s, aircraft_id=s.their_aircraft.id),
    ),
    "loading_basis_is_entered_within_the_operator": (
        "loadingbasis",
        lambda s: basis(s, entered_by_id=s.others.manager.id),
    ),
    "empty_weight_digest_is_sha256": ("emptyweight", lambda s: weight(s, digest="G" * 64)),
    "empty_weight_names_its_fit": ("emptyweight", lambda s: weight(s, fit="")),
    "empty_weight_is_of_the_aircrafts_operator": (
        "emptyweight",
        lambda s: weight(s, aircraft_id=s.their_aircraft.id),
    ),
    "empty_weight_is_entered_within_the_operator": (
        "emptyweight",
        lambda s: weight(s, entered_by_id=s.others.manager.id),
    ),
    "aircraft_registration_is_taken_once": ("aircraft", lambda s: aircraft(s, registration="Q9-KTB")),
    "aircraft_registration_is_plain": ("aircraft", lambda s: aircraft(s, registration="q9 ktb")),
    "aircraft_serial_is_taken_once": ("aircraft", lambda s: aircraft(s, serial_number="9-Q9-KTB")),
    "aircraft_category_is_known": ("aircraft", lambda s: aircraft(s, category="balloon")),
    "person_login_is_taken_once": ("person", lambda s: person(s, login=s.others.pilot.login)),
    "person_login_is_plain": ("person", lambda s: person(s, login="New Person")),
    "duty_role_is_known": ("duty", lambda s: duty(s, role="owner")),
    "duty_is_of_the_persons_operator": ("duty", lambda s: duty(s, person_id=s.others.pilot.id)),
    "token_is_of_the_persons_operator": ("token", lambda s: token(s, person_id=s.others.pilot.id)),
    "token_expires_after_it_is_issued": ("token", lambda s: token(s, expires_at=SOON)),
    "token_lives_a_year_at_most": ("token", lambda s: token(s, expires_at=SOON + timedelta(days=366))),
    "rotation_is_of_the_tokens_operator": (
        "rotation",
        lambda s: rotation(s, s.others.pilot),
    ),
    "rotation_number_is_taken_once": ("rotation", lambda s: rotation(s, number=1)),
    "rotation_counts_from_one": ("rotation", lambda s: rotation(s, number=0)),
    "rotation_lives_a_year_at_most": (
        "rotation",
        lambda s: rotation(s, expires_at=SOON + timedelta(days=366)),
    ),
    "rotation_overlaps_a_month_at_most": (
        "rotation",
        lambda s: rotation(s, previous_ends_at=SOON + timedelta(days=31)),
    ),
    "settings_number_is_taken_once": ("operatorsettings", lambda s: settings(s, number=1)),
    "settings_count_from_one": ("operatorsettings", lambda s: settings(s, number=0)),
    "settings_say_why": ("operatorsettings", lambda s: settings(s, reason="")),
    "settings_bound_has_weight_unit_and_persons": (
        "operatorsettings",
        lambda s: settings(s, last_minute_unit=""),
    ),
    "settings_threshold_is_a_percentage": (
        "operatorsettings",
        lambda s: settings(s, weighing_threshold_percent="1e1"),
    ),
    "settings_rule_set_is_known": ("operatorsettings", lambda s: settings(s, rule_set="MARS")),
    "settings_name_procedure_and_method": ("operatorsettings", lambda s: settings(s, procedure="")),
    "settings_are_changed_within_the_operator": (
        "operatorsettings",
        lambda s: settings(s, entered_by_id=s.others.manager.id),
    ),
}
BREAKS |= PROVISION_BREAKS
# Unique keys that only serve as the target of a tie: their first column is the key of the table already.
TARGETS = {
    "aircraft_is_of_one_operator",
    "person_is_of_one_operator",
    "token_is_of_one_operator",
    "loading_basis_has_one_author",
    "loading_basis_is_of_one_aircraft",
    "empty_weight_has_one_author",
    "empty_weight_has_one_beginning",
    "empty_weight_is_of_one_fit",
    "empty_weight_is_of_one_aircraft",
}
# Broken by the house only, which enters operators; see test_enter_operator.py.
OF_OPERATORS = {
    "operator_code_is_plain",
    "operator_code_is_not_the_house_chain",
    "operator_rule_set_is_known",
}


@pytest.mark.parametrize("name", sorted(BREAKS))
def test_the_database_refuses_what_breaks(name: str, scene: Scene) -> None:
    table, row = BREAKS[name]

    with pytest.raises(IntegrityError) as refused:
        insert(scene, f"fleet_{table}", row(scene))

    assert refused.value.__cause__.diag.constraint_name == name  # type: ignore[union-attr] # psycopg gives it


def test_every_constraint_named_in_words_is_tested() -> None:
    with connection.cursor() as cursor:
        cursor.execute(
            "SELECT conname FROM pg_constraint WHERE conrelid::regclass::text LIKE 'fleet\\_%%'"
            " AND conname NOT LIKE 'fleet\\_%%' AND contype IN ('c', 'f', 'u', 'x')"
        )
        named = {name for (name,) in cursor.fetchall()}

    known = {*BREAKS} | TARGETS | OF_OPERATORS | PROVISION_TARGETS | PROVISION_PAIRS
    assert named == {name for name in known if not name.startswith("fleet_")}


@pytest.mark.parametrize("model", [Aircraft, LoadingBasis, EmptyWeight, Approval])
def test_the_service_role_cannot_change_or_delete_a_version(model: Any, scene: Scene) -> None:
    for statement in (
        f"UPDATE {model._meta.db_table} SET operator_id = operator_id",  # our own names
        f"DELETE FROM {model._meta.db_table}",  # our own names
        f"TRUNCATE {model._meta.db_table} CASCADE",
    ):
        with (
            pytest.raises(ProgrammingError, match="permission denied"),
            transaction.atomic(),
            connection.cursor() as cursor,
        ):
            cursor.execute(statement)


def test_what_stands_can_be_closed_once_on_the_known_clock_and_never_again(scene: Scene) -> None:
    row = Standing.objects.filter(kind="loading basis").get()
    by = actor(scene.people.manager)

    with act(acts.ENTER_AIRCRAFT, by=by, about="test:closing"):
        Standing.objects.filter(id=row.id).update(known=(row.known.lower, datetime(2099, 1, 1, tzinfo=UTC)))

    with pytest.raises(FixedForGood), act(acts.ENTER_AIRCRAFT, by=by, about="test:closing"):
        Standing.objects.filter(id=row.id).update(known=(row.known.lower, datetime(2099, 2, 1, tzinfo=UTC)))


def test_when_a_version_is_valid_is_never_changed(scene: Scene) -> None:
    row = Standing.objects.filter(kind="loading basis").get()

    with (
        pytest.raises(ProgrammingError, match="permission denied"),
        act(acts.ENTER_AIRCRAFT, by=actor(scene.people.manager), about="test:closing"),
    ):
        Standing.objects.filter(id=row.id).update(valid=(SOON, None))
