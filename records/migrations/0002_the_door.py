"""The functions of the door, and the guards of the trail's own tables.

The functions stand in records/sql, one file a subject. A change there comes with a new migration that loads the changed file again:
each file replaces what it defines, and reconciliation compares what the database holds with the files.
"""

from pathlib import Path

from django.db import migrations

SQL = Path(__file__).resolve().parent.parent / "sql"
FUNCTIONS = ("act", "image", "witness", "seal", "guard", "rights")


class Migration(migrations.Migration):
    dependencies = (("records", "0001_initial"),)
    operations = (
        *(
            migrations.RunSQL((SQL / f"{name}.sql").read_text(encoding="utf-8"), migrations.RunSQL.noop)
            for name in FUNCTIONS
        ),
        migrations.RunSQL((SQL / "trail.sql").read_text(encoding="utf-8"), migrations.RunSQL.noop),
    )
