"""Ties between rows that the model layer cannot state: foreign keys over several columns, all checked at once.

Each says in its name what holds. They need the unique keys of the rows they point at, which the models declare.
"""

from django.db import migrations

# table, name, columns, target table, target columns
TIES = [
    # What a row names is of the row's own operator.
    (
        "fleet_duty",
        "duty_is_of_the_persons_operator",
        "person_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
    (
        "fleet_token",
        "token_is_of_the_persons_operator",
        "person_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
    (
        "fleet_loadingbasis",
        "loading_basis_is_of_the_aircrafts_operator",
        "aircraft_id, operator_id",
        "fleet_aircraft",
        "id, operator_id",
    ),
    (
        "fleet_loadingbasis",
        "loading_basis_is_entered_within_the_operator",
        "entered_by_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
    (
        "fleet_emptyweight",
        "empty_weight_is_of_the_aircrafts_operator",
        "aircraft_id, operator_id",
        "fleet_aircraft",
        "id, operator_id",
    ),
    (
        "fleet_emptyweight",
        "empty_weight_is_entered_within_the_operator",
        "entered_by_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
    (
        "fleet_approval",
        "approval_is_of_the_aircrafts_operator",
        "aircraft_id, operator_id",
        "fleet_aircraft",
        "id, operator_id",
    ),
    (
        "fleet_approval",
        "approval_is_given_within_the_operator",
        "approved_by_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
    (
        "fleet_standing",
        "standing_is_of_the_aircrafts_operator",
        "aircraft_id, operator_id",
        "fleet_aircraft",
        "id, operator_id",
    ),
    # An approval repeats its version's aircraft, author and beginning, and repeats them truly.
    (
        "fleet_approval",
        "approval_is_of_a_basis_of_this_aircraft",
        "loading_basis_id, aircraft_id",
        "fleet_loadingbasis",
        "id, aircraft_id",
    ),
    (
        "fleet_approval",
        "approval_names_the_author_of_the_basis",
        "loading_basis_id, entered_by_id",
        "fleet_loadingbasis",
        "id, entered_by_id",
    ),
    (
        "fleet_approval",
        "approval_is_of_a_weight_of_this_aircraft",
        "empty_weight_id, aircraft_id",
        "fleet_emptyweight",
        "id, aircraft_id",
    ),
    (
        "fleet_approval",
        "approval_names_the_author_of_the_weight",
        "empty_weight_id, entered_by_id",
        "fleet_emptyweight",
        "id, entered_by_id",
    ),
    (
        "fleet_approval",
        "approval_holds_from_when_the_weight_says",
        "empty_weight_id, true_from",
        "fleet_emptyweight",
        "id, true_from",
    ),
    # Only what was approved stands, for the aircraft and base fit it is of.
    ("fleet_standing", "standing_basis_is_approved", "of_basis", "fleet_approval", "loading_basis_id"),
    (
        "fleet_standing",
        "standing_basis_is_of_this_aircraft",
        "of_basis, aircraft_id",
        "fleet_loadingbasis",
        "id, aircraft_id",
    ),
    ("fleet_standing", "standing_weight_is_approved", "of_weight", "fleet_approval", "empty_weight_id"),
    (
        "fleet_standing",
        "standing_weight_is_of_this_aircraft_and_fit",
        "of_weight, aircraft_id, fit",
        "fleet_emptyweight",
        "id, aircraft_id, fit",
    ),
]

# `version` points into one of two tables; each of these two is the version where it is of that kind, else NULL.
POINTERS = """
ALTER TABLE fleet_standing
    ADD COLUMN of_basis uuid GENERATED ALWAYS AS (CASE WHEN kind = 'loading basis' THEN version END) STORED,
    ADD COLUMN of_weight uuid GENERATED ALWAYS AS (CASE WHEN kind = 'empty weight' THEN version END) STORED
"""
NO_POINTERS = "ALTER TABLE fleet_standing DROP COLUMN of_basis, DROP COLUMN of_weight"


def tie(table: str, name: str, columns: str, target: str, targets: str) -> migrations.RunSQL:
    """This function will make the operation that adds one foreign key, and drops it on the way back."""
    return migrations.RunSQL(
        f"ALTER TABLE {table} ADD CONSTRAINT {name} FOREIGN KEY ({columns}) REFERENCES {target} ({targets})",
        f"ALTER TABLE {table} DROP CONSTRAINT {name}",
    )


class Migration(migrations.Migration):
    dependencies = [("fleet", "0002_versions")]

    operations = [migrations.RunSQL(POINTERS, NO_POINTERS), *(tie(*row) for row in TIES)]
