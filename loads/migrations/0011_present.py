"""What stands now, one row a load, kept by a trigger on steps and compared by reconciliation.

Measured with `tests/bench/stored_loads.py`: without it a list by state took 67 times as long with a hundred
times the loads.
"""

from pathlib import Path

from django.db import migrations, models
from django.db.models import PROTECT, Q

_HERE = Path(__file__).resolve().parent
_DERIVED = (_HERE / "present_derived.sql").read_text(encoding="utf-8")
_COLUMNS = (
    "load_id, operator_id, aircraft_id, departure, step_id, number, state, assessment_id, verdict, rejected"
)
_BECAUSE = "derived from load, steps and assessments; reconciliation compares it"
_UNDONE = "DROP TRIGGER step_moves_present ON loads_step; DROP FUNCTION step_moves_present();"


def _pointer(to: str) -> models.ForeignKey:
    return models.ForeignKey(to, on_delete=PROTECT, related_name="+", db_constraint=False, db_index=False)


class Migration(migrations.Migration):
    dependencies = [("loads", "0010_found_by_reference"), ("records", "0010_derived_tables")]

    operations = [
        migrations.CreateModel(
            name="Present",
            fields=[
                (
                    "load",
                    models.OneToOneField(
                        "loads.load",
                        on_delete=PROTECT,
                        primary_key=True,
                        serialize=False,
                        related_name="present",
                        db_constraint=False,
                    ),
                ),
                ("departure", models.DateTimeField()),
                ("number", models.PositiveIntegerField()),
                ("state", models.CharField(max_length=12)),
                ("verdict", models.CharField(max_length=12)),
                ("rejected", models.BooleanField()),
                ("aircraft", _pointer("fleet.aircraft")),
                ("assessment", _pointer("loads.assessment")),
                ("operator", _pointer("fleet.operator")),
                ("step", _pointer("loads.step")),
            ],
            options={
                "indexes": [
                    models.Index(fields=["operator", "departure", "load"], name="present_by_departure"),
                    models.Index(fields=["aircraft", "departure", "load"], name="present_by_aircraft"),
                    models.Index(fields=["operator", "state", "departure", "load"], name="present_by_state"),
                    models.Index(
                        fields=["operator", "verdict", "departure", "load"],
                        condition=Q(verdict__in=["outside", "unresolved"]),
                        name="present_outside",
                    ),
                    models.Index(
                        fields=["operator", "departure", "load"],
                        condition=Q(rejected=True),
                        name="present_rejected",
                    ),
                ],
            },
        ),
        migrations.RunSQL((_HERE / "present.sql").read_text(encoding="utf-8"), _UNDONE),
        migrations.RunSQL(f"INSERT INTO loads_present ({_COLUMNS}) {_DERIVED}", migrations.RunSQL.noop),
        migrations.RunSQL(
            [("SELECT derive_table('loads_present', '{load_id}', %s, %s)", [_DERIVED, _BECAUSE])],
            migrations.RunSQL.noop,
        ),
    ]
