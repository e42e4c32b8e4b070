"""What was told to fall due, once for each thing, its date and each threshold."""

import django.db.models.deletion
from django.db import migrations, models

TIE = """
ALTER TABLE fleet_duenotice ADD CONSTRAINT due_notice_is_of_the_aircrafts_operator
    FOREIGN KEY (aircraft_id, operator_id) REFERENCES fleet_aircraft (id, operator_id)
"""
NO_TIE = "ALTER TABLE fleet_duenotice DROP CONSTRAINT due_notice_is_of_the_aircrafts_operator"
GUARD = "SELECT guard_table('fleet_duenotice', key => '{id}', mode => 'append', operator => 'operator_id')"


class Migration(migrations.Migration):
    dependencies = [
        ("records", "0002_the_door"),
        ("fleet", "0008_provisions"),
    ]

    operations = [
        migrations.CreateModel(
            name="DueNotice",
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
                ("about", models.CharField(max_length=400)),
                ("what", models.CharField(max_length=400)),
                ("lapses", models.DateTimeField()),
                ("threshold_days", models.PositiveSmallIntegerField()),
                ("mail_addresses", models.PositiveSmallIntegerField()),
                ("told_at", models.DateTimeField()),
                ("act", models.UUIDField()),
                (
                    "aircraft",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="due_notices",
                        to="fleet.aircraft",
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="+", to="fleet.operator"
                    ),
                ),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(
                        fields=("aircraft", "about", "lapses", "threshold_days"),
                        name="due_notice_is_given_once",
                    )
                ],
            },
        ),
        migrations.RunSQL(TIE, NO_TIE),
        migrations.RunSQL(GUARD, migrations.RunSQL.noop),
    ]
