"""What holds of last-minute changes, notes and notices (late_changes.sql says it), and their guards."""

from pathlib import Path

from django.db import migrations, models
from django.db.models import Case, F, Q, When

_HERE = Path(__file__).resolve().parent
_BROUGHT = "assessment_is_brought_by_a_step"
GUARDS = [
    # Lines and document name people: the trail keeps salted digests.
    "'loads_latechange', key => '{step_id}', mode => 'append', operator => 'operator_id', personal => '{lines,body}'",
    "'loads_filedissue', key => '{change_id}', mode => 'append', operator => 'operator_id'",
    "'loads_note', key => '{id}', mode => 'append', operator => 'operator_id', personal => '{text}'",
    "'loads_stalenotice', key => '{id}', mode => 'append', operator => 'operator_id'",
]


def _text(name: str) -> str:
    return (_HERE / name).read_text(encoding="utf-8")


def _as_it_was(function: str) -> str:
    """Return the function as the tables had it before, for the way back."""
    text = _text("ties.sql")
    begin = text.index(f"CREATE FUNCTION {function}()")
    end = text.index("END $$;", begin) + len("END $$;")
    return "\n" + text[begin:end].replace("CREATE FUNCTION", "CREATE OR REPLACE FUNCTION", 1)


class Migration(migrations.Migration):
    dependencies = [("loads", "0006_late_changes")]

    operations = [
        migrations.AddConstraint(
            model_name="step",
            constraint=models.UniqueConstraint(
                condition=Q(before="accepted", after="accepted"),
                fields=("assessment",),
                name="step_of_a_late_change_brings_an_assessment_once",
            ),
        ),
        migrations.RunSQL(
            _text("late_changes.sql"),
            _text("late_changes_undone.sql") + _as_it_was("step_is_backed") + _as_it_was(_BROUGHT),
            # The database alters the expression in place; Django itself could only drop the column.
            state_operations=[
                migrations.AlterField(
                    model_name="step",
                    name="carried",
                    field=models.GeneratedField(
                        db_persist=True,
                        expression=Case(
                            When(
                                ~Q(after="open") & ~Q(before="accepted", after="accepted"),
                                then=F("assessment"),
                            )
                        ),
                        output_field=models.UUIDField(null=True),
                    ),
                )
            ],
        ),
        *(migrations.RunSQL(f"SELECT guard_table({guard})", migrations.RunSQL.noop) for guard in GUARDS),
    ]
