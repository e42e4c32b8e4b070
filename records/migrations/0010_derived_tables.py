"""Tables derived from guarded ones: kept by triggers, written by nobody, compared by reconciliation."""

from pathlib import Path

from django.db import migrations, models

SQL = Path(__file__).resolve().parent.parent / "sql"
_MODES = ["append", "close-once", "edit", "exempt", "trail"]
_NAME = "guarded_table_mode_is_known"


def _known(modes: list[str]) -> models.CheckConstraint:
    return models.CheckConstraint(condition=models.Q(mode__in=modes), name=_NAME)


class Migration(migrations.Migration):
    dependencies = [("records", "0009_trail_read_by_its_parts")]

    operations = [
        migrations.AddField("guardedtable", "derived_by", models.TextField(blank=True, db_default="")),
        migrations.RemoveConstraint("guardedtable", _NAME),
        migrations.AddConstraint("guardedtable", _known([*_MODES, "derived"])),
        *(
            migrations.RunSQL((SQL / f"{name}.sql").read_text(encoding="utf-8"), migrations.RunSQL.noop)
            for name in ("derive", "rights")
        ),
    ]
