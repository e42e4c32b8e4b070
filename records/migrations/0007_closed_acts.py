"""An act that is closed takes no more rows, also while it waits for its seal (see records/sql/seal.sql)."""

from pathlib import Path

from django.db import migrations

SQL = Path(__file__).resolve().parent.parent / "sql"


class Migration(migrations.Migration):
    dependencies = [("records", "0006_access_log")]

    operations = [
        migrations.RunSQL((SQL / f"{name}.sql").read_text(encoding="utf-8"), migrations.RunSQL.noop)
        for name in ("act", "witness", "seal")
    ]
