"""Tokens limited to aircraft and to a year, later secrets of a token, and a way to end every session of a person."""

import datetime as dt

import django.contrib.postgres.fields
import django.db.models.deletion
import django.db.models.expressions
from django.db import migrations, models

TIE = """
ALTER TABLE fleet_rotation ADD CONSTRAINT rotation_is_of_the_tokens_operator
    FOREIGN KEY (token_id, operator_id) REFERENCES fleet_token (id, operator_id)
"""
NO_TIE = "ALTER TABLE fleet_rotation DROP CONSTRAINT rotation_is_of_the_tokens_operator"
GUARD = "SELECT guard_table('fleet_rotation', key => '{id}', mode => 'append', operator => 'operator_id')"


class Migration(migrations.Migration):
    dependencies = [
        ("fleet", "0005_operator_settings"),
        ("records", "0002_the_door"),
    ]

    operations = [
        migrations.CreateModel(
            name="Rotation",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("number", models.PositiveIntegerField()),
                ("digest", models.CharField(max_length=64, unique=True)),
                ("issued_at", models.DateTimeField()),
                ("expires_at", models.DateTimeField()),
                ("previous_ends_at", models.DateTimeField()),
            ],
        ),
        migrations.AddField(
            model_name="person",
            name="session_series",
            field=models.PositiveIntegerField(default=0),
        ),
        migrations.AddField(
            model_name="token",
            name="registrations",
            field=django.contrib.postgres.fields.ArrayField(
                base_field=models.CharField(max_length=12), blank=True, default=list, size=None
            ),
        ),
        migrations.AddConstraint(
            model_name="token",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    (
                        "expires_at__lte",
                        django.db.models.expressions.CombinedExpression(
                            models.F("issued_at"), "+", models.Value(dt.timedelta(days=365))
                        ),
                    )
                ),
                name="token_lives_a_year_at_most",
            ),
        ),
        migrations.AddConstraint(
            model_name="token",
            constraint=models.UniqueConstraint(fields=("id", "operator"), name="token_is_of_one_operator"),
        ),
        migrations.AddField(
            model_name="rotation",
            name="operator",
            field=models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
        ),
        migrations.AddField(
            model_name="rotation",
            name="token",
            field=models.ForeignKey(
                on_delete=django.db.models.deletion.PROTECT, related_name="rotations", to="fleet.token"
            ),
        ),
        migrations.AddConstraint(
            model_name="rotation",
            constraint=models.UniqueConstraint(
                fields=("token", "number"), name="rotation_number_is_taken_once"
            ),
        ),
        migrations.AddConstraint(
            model_name="rotation",
            constraint=models.CheckConstraint(
                condition=models.Q(("number__gte", 1)), name="rotation_counts_from_one"
            ),
        ),
        migrations.AddConstraint(
            model_name="rotation",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    ("expires_at__gt", models.F("issued_at")),
                    (
                        "expires_at__lte",
                        django.db.models.expressions.CombinedExpression(
                            models.F("issued_at"), "+", models.Value(dt.timedelta(days=365))
                        ),
                    ),
                ),
                name="rotation_lives_a_year_at_most",
            ),
        ),
        migrations.AddConstraint(
            model_name="rotation",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    ("previous_ends_at__gte", models.F("issued_at")),
                    (
                        "previous_ends_at__lte",
                        django.db.models.expressions.CombinedExpression(
                            models.F("issued_at"), "+", models.Value(dt.timedelta(days=30))
                        ),
                    ),
                ),
                name="rotation_overlaps_a_month_at_most",
            ),
        ),
        migrations.RunSQL(TIE, NO_TIE),
        migrations.RunSQL(GUARD, migrations.RunSQL.noop),
    ]
