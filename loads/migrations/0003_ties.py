"""What must always hold between the rows of a load, and the pairs of states: ties.sql says both."""

from pathlib import Path

from django.db import migrations

_HERE = Path(__file__).resolve().parent


class Migration(migrations.Migration):
    dependencies = [("loads", "0002_what_holds")]

    operations = [
        migrations.RunSQL(
            (_HERE / "ties.sql").read_text(encoding="utf-8"),
            (_HERE / "ties_undone.sql").read_text(encoding="utf-8"),
        )
    ]
