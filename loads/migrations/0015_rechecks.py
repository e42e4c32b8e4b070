"""Rechecks, what came of them, and the flags they leave; the list of their work is exempt from guard."""

import django.contrib.postgres.fields
import django.db.models.deletion
from django.conf import settings
from django.db import migrations, models

# table, name, columns, target table, target columns
TIES = [
    (
        "loads_recheck",
        "recheck_is_of_an_aircraft_of_the_operator",
        "aircraft_id, operator_id",
        "fleet_aircraft",
        "id, operator_id",
    ),
    (
        "loads_recheck",
        "recheck_names_an_empty_weight_of_the_aircraft",
        "empty_weight_id, aircraft_id",
        "fleet_emptyweight",
        "id, aircraft_id",
    ),
    (
        "loads_recheck",
        "recheck_names_a_loading_basis_of_the_aircraft",
        "loading_basis_id, aircraft_id",
        "fleet_loadingbasis",
        "id, aircraft_id",
    ),
    (
        "loads_recheck",
        "recheck_names_a_table_of_the_operator",
        "standard_weights_id, operator_id",
        "fleet_provision",
        "id, operator_id",
    ),
    (
        "loads_recheck",
        "recheck_is_asked_by_one_of_the_operator",
        "asked_by_id, operator_id",
        "fleet_person",
        "id, operator_id",
    ),
    (
        "loads_recheckresult",
        "recheck_result_is_of_the_operator",
        "recheck_id, operator_id",
        "loads_recheck",
        "id, operator_id",
    ),
    (
        "loads_loadflag",
        "load_flag_is_of_its_loads_operator",
        "load_id, operator_id",
        "loads_load",
        "id, operator_id",
    ),
    (
        "loads_loadflag",
        "load_flag_is_of_its_rechecks_operator",
        "recheck_id, operator_id",
        "loads_recheck",
        "id, operator_id",
    ),
    (
        "loads_loadflag",
        "load_flag_is_of_its_loads_assessment",
        "assessment_id, load_id, operator_id",
        "loads_assessment",
        "id, load_id, operator_id",
    ),
]
GUARDS = [
    "'loads_recheck', key => '{id}', mode => 'append', operator => 'operator_id'",
    "'loads_recheckresult', key => '{recheck_id}', mode => 'append', operator => 'operator_id'",
    "'loads_loadflag', key => '{id}', mode => 'append', operator => 'operator_id'",
]
EXEMPT = [
    "'loads_recheckpart', 'a list of work that can be done again; what came of it is witnessed in its result', 'SELECT, INSERT, UPDATE'",
    "'loads_recheckedload', 'derived from loads and versions, and can be again; the result holds its digest', 'SELECT, INSERT, DELETE'",
]


def _tie(table: str, name: str, columns: str, target: str, keys: str) -> migrations.RunSQL:
    return migrations.RunSQL(
        f"ALTER TABLE {table} ADD CONSTRAINT {name} FOREIGN KEY ({columns}) REFERENCES {target} ({keys})",
        f"ALTER TABLE {table} DROP CONSTRAINT {name}",
    )


class Migration(migrations.Migration):
    dependencies = [
        ("fleet", "0008_provisions"),
        ("loads", "0014_indexes_that_find_nothing"),
        migrations.swappable_dependency(settings.AUTH_USER_MODEL),
    ]

    operations = [
        migrations.CreateModel(
            name="Recheck",
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
                ("since", models.DateTimeField(null=True)),
                ("until", models.DateTimeField(null=True)),
                ("reason", models.CharField(blank=True, max_length=500)),
                ("engine", models.CharField(max_length=20)),
                ("asked_at", models.DateTimeField()),
                ("act", models.UUIDField()),
                (
                    "aircraft",
                    models.ForeignKey(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to="fleet.aircraft",
                    ),
                ),
                (
                    "asked_by",
                    models.ForeignKey(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "empty_weight",
                    models.ForeignKey(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to="fleet.emptyweight",
                    ),
                ),
                (
                    "loading_basis",
                    models.ForeignKey(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to="fleet.loadingbasis",
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "standard_weights",
                    models.ForeignKey(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to="fleet.provision",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="LoadFlag",
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
                ("now", models.CharField(max_length=12)),
                ("limit", models.CharField(blank=True, max_length=300)),
                ("excess", models.CharField(blank=True, max_length=500)),
                ("flagged_at", models.DateTimeField()),
                (
                    "assessment",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="+", to="loads.assessment"
                    ),
                ),
                (
                    "load",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="flags", to="loads.load"
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "recheck",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="flags", to="loads.recheck"
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="RecheckedLoad",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("part", models.PositiveIntegerField()),
                ("verdict", models.CharField(max_length=12)),
                ("now", models.CharField(max_length=12)),
                ("code", models.CharField(blank=True, max_length=120)),
                ("limit", models.CharField(blank=True, max_length=300)),
                ("excess", models.CharField(blank=True, max_length=500)),
                (
                    "assessment",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="+", to="loads.assessment"
                    ),
                ),
                (
                    "load",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="+", to="loads.load"
                    ),
                ),
                (
                    "recheck",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="rows", to="loads.recheck"
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="RecheckPart",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("number", models.PositiveIntegerField()),
                (
                    "loads",
                    django.contrib.postgres.fields.ArrayField(base_field=models.UUIDField(), size=None),
                ),
                ("done_at", models.DateTimeField(null=True)),
                ("same", models.PositiveIntegerField(default=0)),
                ("changed", models.PositiveIntegerField(default=0)),
                ("not_computed", models.PositiveIntegerField(default=0)),
                ("other_fit", models.PositiveIntegerField(default=0)),
                ("gone", models.PositiveIntegerField(default=0)),
                ("exactly", models.PositiveIntegerField(default=0)),
                (
                    "recheck",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="parts", to="loads.recheck"
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="RecheckResult",
            fields=[
                (
                    "recheck",
                    models.OneToOneField(
                        on_delete=django.db.models.deletion.PROTECT,
                        primary_key=True,
                        related_name="result",
                        serialize=False,
                        to="loads.recheck",
                    ),
                ),
                ("loads", models.PositiveIntegerField()),
                ("same", models.PositiveIntegerField()),
                ("changed", models.PositiveIntegerField()),
                ("not_computed", models.PositiveIntegerField()),
                ("other_fit", models.PositiveIntegerField()),
                ("gone", models.PositiveIntegerField()),
                ("flagged", models.PositiveIntegerField()),
                ("table_digest", models.CharField(max_length=64)),
                ("finished_at", models.DateTimeField()),
                ("act", models.UUIDField()),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
            ],
        ),
        migrations.AddIndex(
            model_name="recheck",
            index=models.Index(fields=["operator", "-asked_at"], name="recheck_lately"),
        ),
        migrations.AddConstraint(
            model_name="recheck",
            constraint=models.UniqueConstraint(fields=("id", "operator"), name="recheck_is_of_one_operator"),
        ),
        migrations.AddConstraint(
            model_name="recheck",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    ("aircraft__isnull", False),
                    models.Q(("empty_weight__isnull", True), ("loading_basis__isnull", True)),
                    _connector="OR",
                ),
                name="recheck_against_an_aircrafts_version_names_the_aircraft",
            ),
        ),
        migrations.AddConstraint(
            model_name="recheck",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    ("since__isnull", True),
                    ("until__isnull", True),
                    ("until__gt", models.F("since")),
                    _connector="OR",
                ),
                name="recheck_ends_after_it_begins",
            ),
        ),
        migrations.AddConstraint(
            model_name="loadflag",
            constraint=models.UniqueConstraint(
                fields=("load", "recheck"), name="load_is_flagged_once_a_recheck"
            ),
        ),
        migrations.AddConstraint(
            model_name="loadflag",
            constraint=models.CheckConstraint(
                condition=models.Q(("now__in", ["outside", "unresolved"])),
                name="load_flag_says_what_is_wrong",
            ),
        ),
        migrations.AddConstraint(
            model_name="recheckedload",
            constraint=models.UniqueConstraint(
                fields=("recheck", "load"), name="rechecked_load_is_listed_once"
            ),
        ),
        migrations.AddConstraint(
            model_name="recheckpart",
            constraint=models.UniqueConstraint(
                fields=("recheck", "number"), name="recheck_part_is_planned_once"
            ),
        ),
        *(_tie(*tie) for tie in TIES),
        *(migrations.RunSQL(f"SELECT guard_table({guard})", migrations.RunSQL.noop) for guard in GUARDS),
        *(migrations.RunSQL(f"SELECT exempt_table({exempt})", migrations.RunSQL.noop) for exempt in EXEMPT),
    ]
