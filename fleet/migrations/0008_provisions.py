"""Tables of standard weights, rules, restrictions and permits: versions, their approvals and their ends."""

import django.db.models.deletion
from django.conf import settings
from django.db import migrations, models

# table, name, columns, target table, target columns
TIES = [
    (
        "fleet_provision",
        "provision_is_of_the_aircrafts_operator",
        "aircraft_id, operator_id",
        "fleet_aircraft",
        "id, operator_id",
    ),
    (
        "fleet_provision",
        "provision_is_entered_within_the_operator",
        "entered_by_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
    (
        "fleet_provisionapproval",
        "provision_approval_is_of_the_operator",
        "provision_id, operator_id",
        "fleet_provision",
        "id, operator_id",
    ),
    (
        "fleet_provisionapproval",
        "provision_approval_names_the_author",
        "provision_id, entered_by_id",
        "fleet_provision",
        "id, entered_by_id",
    ),
    (
        "fleet_provisionapproval",
        "provision_approval_names_the_kind",
        "provision_id, kind",
        "fleet_provision",
        "id, kind",
    ),
    (
        "fleet_provisionapproval",
        "provision_approval_is_within_the_operator",
        "approved_by_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
    (
        "fleet_provisionend",
        "provision_end_is_of_the_operator",
        "provision_id, operator_id",
        "fleet_provision",
        "id, operator_id",
    ),
    (
        "fleet_provisionend",
        "provision_end_names_the_author",
        "provision_id, entered_by_id",
        "fleet_provision",
        "id, entered_by_id",
    ),
    (
        "fleet_provisionend",
        "provision_end_names_the_kind",
        "provision_id, kind",
        "fleet_provision",
        "id, kind",
    ),
    (
        "fleet_provisionend",
        "provision_end_is_within_the_operator",
        "ended_by_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
]
GUARDED = ("fleet_provision", "fleet_provisionapproval", "fleet_provisionend")


def tie(table: str, name: str, columns: str, target: str, targets: str) -> migrations.RunSQL:
    """This function will make the operation that adds one foreign key, and drops it on the way back."""
    return migrations.RunSQL(
        f"ALTER TABLE {table} ADD CONSTRAINT {name} FOREIGN KEY ({columns}) REFERENCES {target} ({targets})",
        f"ALTER TABLE {table} DROP CONSTRAINT {name}",
    )


def guard(table: str) -> migrations.RunSQL:
    """This function will make the operation that brings a table under guard, rows only added."""
    return migrations.RunSQL(
        f"SELECT guard_table('{table}', key => '{{id}}', mode => 'append', operator => 'operator_id')",
        migrations.RunSQL.noop,
    )


class Migration(migrations.Migration):
    dependencies = [
        ("records", "0002_the_door"),
        ("fleet", "0007_mail_of_people"),
    ]

    operations = [
        migrations.CreateModel(
            name="Provision",
            fields=[
                (
                    "id",
                    models.UUIDField(
                        db_default=models.Func(function="uuidv7", output_field=models.UUIDField()),
                        editable=False,
                        primary_key=True,
                        serialize=False,
                    ),
                ),
                ("kind", models.CharField(max_length=20)),
                ("number", models.PositiveIntegerField()),
                ("document", models.TextField()),
                ("digest", models.CharField(max_length=64)),
                ("true_from", models.DateTimeField()),
                ("true_until", models.DateTimeField(null=True)),
                ("entered_at", models.DateTimeField()),
                (
                    "aircraft",
                    models.ForeignKey(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="provisions",
                        to="fleet.aircraft",
                    ),
                ),
                (
                    "entered_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="provisions",
                        to="fleet.operator",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="ProvisionApproval",
            fields=[
                (
                    "id",
                    models.UUIDField(
                        db_default=models.Func(function="uuidv7", output_field=models.UUIDField()),
                        editable=False,
                        primary_key=True,
                        serialize=False,
                    ),
                ),
                ("kind", models.CharField(max_length=20)),
                ("known_from", models.DateTimeField()),
                (
                    "approved_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "entered_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="+", to="fleet.operator"
                    ),
                ),
                (
                    "provision",
                    models.OneToOneField(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="approval",
                        to="fleet.provision",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="ProvisionEnd",
            fields=[
                (
                    "id",
                    models.UUIDField(
                        db_default=models.Func(function="uuidv7", output_field=models.UUIDField()),
                        editable=False,
                        primary_key=True,
                        serialize=False,
                    ),
                ),
                ("kind", models.CharField(max_length=20)),
                ("true_from", models.DateTimeField()),
                ("known_from", models.DateTimeField()),
                ("reason", models.CharField(max_length=400)),
                (
                    "ended_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "entered_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="+", to="fleet.operator"
                    ),
                ),
                (
                    "provision",
                    models.OneToOneField(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="ending",
                        to="fleet.provision",
                    ),
                ),
            ],
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.UniqueConstraint(
                condition=models.Q(("aircraft__isnull", True)),
                fields=("operator", "kind", "number"),
                name="provision_number_is_taken_once",
            ),
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.UniqueConstraint(
                fields=("aircraft", "kind", "number"), name="provision_number_of_an_aircraft_is_taken_once"
            ),
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.UniqueConstraint(
                fields=("id", "operator"), name="provision_is_of_one_operator"
            ),
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.UniqueConstraint(fields=("id", "entered_by"), name="provision_has_one_author"),
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.UniqueConstraint(fields=("id", "kind"), name="provision_is_of_one_kind"),
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("aircraft__isnull", True), ("kind__in", ["standard weights", "rules"])),
                    models.Q(("aircraft__isnull", False), ("kind__in", ["restriction", "permit"])),
                    _connector="OR",
                ),
                name="provision_is_the_operators_or_one_aircrafts",
            ),
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(
                        ("kind__in", ["standard weights", "rules", "restriction"]),
                        ("true_until__isnull", True),
                    ),
                    models.Q(
                        ("kind__in", ["restriction", "permit"]),
                        ("true_until__gt", models.F("true_from")),
                        ("true_until__isnull", False),
                    ),
                    _connector="OR",
                ),
                name="provision_permit_lapses",
            ),
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.CheckConstraint(
                condition=models.Q(("digest__regex", "^[0-9a-f]{64}$")), name="provision_digest_is_sha256"
            ),
        ),
        migrations.AddConstraint(
            model_name="provision",
            constraint=models.CheckConstraint(
                condition=models.Q(("number__gte", 1)), name="provision_counts_from_one"
            ),
        ),
        migrations.AddConstraint(
            model_name="provisionapproval",
            constraint=models.CheckConstraint(
                condition=models.Q(("approved_by", models.F("entered_by")), _negated=True),
                name="provision_approval_is_by_a_second_person",
            ),
        ),
        migrations.AddConstraint(
            model_name="provisionapproval",
            constraint=models.CheckConstraint(
                condition=models.Q(("kind__in", ["standard weights", "rules", "permit"])),
                name="provision_approval_is_of_what_needs_one",
            ),
        ),
        migrations.AddConstraint(
            model_name="provisionend",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    ("kind", "permit"),
                    models.Q(
                        ("kind", "restriction"), models.Q(("ended_by", models.F("entered_by")), _negated=True)
                    ),
                    _connector="OR",
                ),
                name="provision_end_of_a_restriction_is_by_a_second_person",
            ),
        ),
        migrations.AddConstraint(
            model_name="provisionend",
            constraint=models.CheckConstraint(
                condition=models.Q(("reason", ""), _negated=True), name="provision_end_says_why"
            ),
        ),
        *(tie(*row) for row in TIES),
        *(guard(table) for table in GUARDED),
    ]
