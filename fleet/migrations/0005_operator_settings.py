"""Versioned settings of operators: rows are only added, within the operator, by one of its people."""

import django.contrib.postgres.fields
import django.db.models.deletion
from django.conf import settings
from django.db import migrations, models

TIE = """
ALTER TABLE fleet_operatorsettings ADD CONSTRAINT settings_are_changed_within_the_operator
    FOREIGN KEY (entered_by_id, operator_id) REFERENCES fleet_person (id, operator_id)
"""
NO_TIE = "ALTER TABLE fleet_operatorsettings DROP CONSTRAINT settings_are_changed_within_the_operator"
GUARD = """
SELECT guard_table('fleet_operatorsettings', key => '{id}', mode => 'append', operator => 'operator_id',
                   personal => '{operations_mail}')
"""


class Migration(migrations.Migration):
    dependencies = [
        ("fleet", "0004_guards"),
        ("records", "0002_the_door"),
    ]

    operations = [
        migrations.CreateModel(
            name="OperatorSettings",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("number", models.PositiveIntegerField()),
                ("true_from", models.DateTimeField()),
                ("known_from", models.DateTimeField()),
                ("reason", models.CharField(max_length=400)),
                ("last_minute_weight", models.CharField(blank=True, max_length=12)),
                ("last_minute_unit", models.CharField(blank=True, max_length=2)),
                ("last_minute_persons", models.PositiveSmallIntegerField(null=True)),
                ("weighing_threshold_percent", models.CharField(blank=True, max_length=8)),
                (
                    "operations_mail",
                    django.contrib.postgres.fields.ArrayField(
                        base_field=models.CharField(max_length=254), blank=True, size=None
                    ),
                ),
                ("salt", models.BinaryField()),
                ("prepare_and_accept_by_one", models.BooleanField()),
                ("estimates_may_be_signed", models.BooleanField()),
                ("rule_set", models.CharField(max_length=20)),
                ("procedure", models.CharField(max_length=200)),
                ("weight_method", models.CharField(max_length=200)),
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
                        related_name="settings",
                        to="fleet.operator",
                    ),
                ),
            ],
            options={
                "indexes": [
                    models.Index(fields=["operator", "-true_from", "-number"], name="settings_by_beginning")
                ],
                "constraints": [
                    models.UniqueConstraint(
                        fields=("operator", "number"), name="settings_number_is_taken_once"
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("number__gte", 1)), name="settings_count_from_one"
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("reason", ""), _negated=True), name="settings_say_why"
                    ),
                    models.CheckConstraint(
                        condition=models.Q(
                            models.Q(
                                ("last_minute_persons__isnull", True),
                                ("last_minute_unit", ""),
                                ("last_minute_weight", ""),
                            ),
                            models.Q(
                                ("last_minute_persons__isnull", False),
                                ("last_minute_unit__in", ["kg", "lb"]),
                                ("last_minute_weight__regex", "^(0|[1-9][0-9]{0,5})(\\.[0-9]{1,3})?$"),
                            ),
                            _connector="OR",
                        ),
                        name="settings_bound_has_weight_unit_and_persons",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(
                            ("weighing_threshold_percent__regex", "^$|^(0|[1-9][0-9]?)(\\.[0-9]{1,3})?$")
                        ),
                        name="settings_threshold_is_a_percentage",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("rule_set__in", ["US", "EU-UK"])),
                        name="settings_rule_set_is_known",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(
                            models.Q(("procedure", ""), _negated=True),
                            models.Q(("weight_method", ""), _negated=True),
                        ),
                        name="settings_name_procedure_and_method",
                    ),
                ],
            },
        ),
        migrations.RunSQL(TIE, NO_TIE),
        migrations.RunSQL(GUARD, migrations.RunSQL.noop),
    ]
