"""Remarks on rejected loads: rows are only added, each of one operator; and the way to the rejects."""

import django.db.models.deletion
from django.conf import settings
from django.db import migrations, models

TIES = """
ALTER TABLE loads_remark ADD CONSTRAINT remark_is_of_its_loads_operator
    FOREIGN KEY (load_id, operator_id) REFERENCES loads_load (id, operator_id);
ALTER TABLE loads_remark ADD CONSTRAINT remark_is_by_one_of_the_operator
    FOREIGN KEY (person_id, operator_id) REFERENCES fleet_person (id, operator_id);
ALTER TABLE loads_remark ADD CONSTRAINT remark_hands_to_one_of_the_operator
    FOREIGN KEY (holder_id, operator_id) REFERENCES fleet_person (id, operator_id);
"""
NO_TIES = """
ALTER TABLE loads_remark DROP CONSTRAINT remark_is_of_its_loads_operator;
ALTER TABLE loads_remark DROP CONSTRAINT remark_is_by_one_of_the_operator;
ALTER TABLE loads_remark DROP CONSTRAINT remark_hands_to_one_of_the_operator;
"""
# What is said may name people.
GUARD = """
SELECT guard_table('loads_remark', key => '{id}', mode => 'append', operator => 'operator_id', personal => '{words}')
"""


class Migration(migrations.Migration):
    dependencies = [
        ("fleet", "0005_operator_settings"),
        ("loads", "0004_guards"),
        ("records", "0002_the_door"),
        migrations.swappable_dependency(settings.AUTH_USER_MODEL),
    ]

    operations = [
        migrations.CreateModel(
            name="Remark",
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
                ("number", models.PositiveIntegerField()),
                ("words", models.CharField(max_length=500)),
                ("salt", models.BinaryField()),
                ("at", models.DateTimeField()),
                (
                    "holder",
                    models.ForeignKey(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "load",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="remarks", to="loads.load"
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "person",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(fields=("load", "number"), name="remark_number_is_taken_once"),
                    models.CheckConstraint(
                        condition=models.Q(("words", ""), _negated=True), name="remark_says_something"
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("number__gte", 1)), name="remark_counts_from_one"
                    ),
                ],
            },
        ),
        migrations.AddIndex(
            model_name="assessment",
            index=models.Index(
                condition=models.Q(("verdict__in", ["outside", "unresolved"])),
                fields=["operator", "load"],
                name="assessment_rejected",
            ),
        ),
        migrations.RunSQL(TIES, NO_TIES),
        migrations.RunSQL(GUARD, migrations.RunSQL.noop),
    ]
