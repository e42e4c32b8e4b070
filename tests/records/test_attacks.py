"""Whoever alters the trail is found out, and the right entry is named."""

import os

import pytest
from django.db import DatabaseError, connections, transaction

from records.act import act
from records.reconcile import reconcile
from records.verify import altered_documents, follow_chains
from tests.records.attacks import ATTACKS, TOOLS
from tests.records.scratch import AMANI, NOTE, run

# The long form, with 60 drawn places an attack, is asked for by name.
TRIALS = 60 if os.environ.get("TAREBOOK_LONG_FORMS") == "1" else 2


@pytest.fixture(scope="module")
def a_trail_of_twelve(scratch_tables: str) -> None:
    for number in range(1, 13):
        with act(NOTE, by=AMANI, about=f"thing:{100 + number}"):
            run(
                "INSERT INTO scratch_thing (id, operator_id, what) VALUES (%s, 'kt', %s)",
                100 + number,
                f"thing {number}",
            )
            if number % 3 == 0:
                run(
                    "INSERT INTO scratch_person VALUES (%s, 'kt', 'A. Name', '', '', %s)",
                    number,
                    bytes(range(16)),
                )


def findings() -> list[tuple[str, str]]:
    """What verify finds, through the superuser's own transaction, in the order it is printed."""
    found = (*follow_chains("superuser").broken, *altered_documents("superuser"), *reconcile("superuser"))
    return [(one.where, one.what) for one in found]


def under_attack(statements: tuple[str, ...], by: str) -> list[tuple[str, str]]:
    with transaction.atomic(using="superuser"):
        with connections["superuser"].cursor() as cursor:
            cursor.execute(TOOLS)
            if by == "owner":
                cursor.execute("SET LOCAL ROLE tarebook_owner")
            for statement in statements:
                cursor.execute(statement)
            cursor.execute("RESET ROLE; SET LOCAL search_path = public; DROP SCHEMA attacker CASCADE")
        found = findings()
        transaction.set_rollback(True, using="superuser")
    return found


@pytest.mark.usefixtures("a_trail_of_twelve")
def test_before_any_attack_all_is_sound():
    assert under_attack((), "superuser") == []


@pytest.mark.usefixtures("a_trail_of_twelve")
@pytest.mark.parametrize("seed", range(TRIALS))
@pytest.mark.parametrize("attack", [one for one in ATTACKS if one.says], ids=lambda one: one.description)
def test_an_attack_is_found_and_the_right_place_is_named(attack, seed):
    attack = attack.drawn(seed)

    found = under_attack(attack.statements, attack.by)

    where, what = found[0]
    assert where.startswith(attack.names), found
    assert attack.says in what, found


@pytest.mark.usefixtures("a_trail_of_twelve")
@pytest.mark.parametrize("attack", [one for one in ATTACKS if not one.says], ids=lambda one: one.description)
def test_an_attack_that_the_guards_refuse_changes_nothing(attack):
    with pytest.raises(DatabaseError, match=attack.names):
        under_attack(attack.statements, attack.by)

    assert under_attack((), "superuser") == []
