"""A load may name the load of the leg before it."""

from pathlib import Path

import django.db.models.deletion
from django.db import migrations, models

_TIES = (Path(__file__).resolve().parent / "legs.sql").read_text(encoding="utf-8")
_NO_TIES = """
DROP TRIGGER leg_follows_the_flight_before ON loads_leg;
DROP FUNCTION leg_follows_the_flight_before();
ALTER TABLE loads_leg DROP CONSTRAINT leg_is_of_its_loads_operator;
ALTER TABLE loads_leg DROP CONSTRAINT leg_follows_one_of_its_operator;
"""
_GUARD = "SELECT guard_table('loads_leg', key => '{load_id}', mode => 'append', operator => 'operator_id')"


class Migration(migrations.Migration):
    dependencies = [("loads", "0015_rechecks")]

    operations = [
        migrations.CreateModel(
            name="Leg",
            fields=[
                (
                    "load",
                    models.OneToOneField(
                        on_delete=django.db.models.deletion.PROTECT,
                        primary_key=True,
                        related_name="before",
                        serialize=False,
                        to="loads.load",
                    ),
                ),
                (
                    "follows",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="next_legs",
                        to="loads.load",
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(
                        db_index=False, on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"
                    ),
                ),
            ],
        ),
        migrations.AddConstraint(
            model_name="leg",
            constraint=models.CheckConstraint(
                condition=models.Q(("follows", models.F("load")), _negated=True),
                name="leg_does_not_follow_itself",
            ),
        ),
        migrations.RunSQL(_TIES, _NO_TIES),
        migrations.RunSQL(_GUARD, migrations.RunSQL.noop),
    ]
