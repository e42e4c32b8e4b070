"""How far the trail was verified in the background: a note, exempt from the trail."""

from django.db import migrations, models


class Migration(migrations.Migration):
    dependencies = [("records", "0007_closed_acts")]

    operations = [
        migrations.CreateModel(
            name="Verified",
            fields=[
                ("chain", models.CharField(max_length=40, primary_key=True, serialize=False)),
                ("position", models.BigIntegerField()),
                ("digest", models.CharField(blank=True, max_length=64)),
                ("at", models.DateTimeField()),
                ("broken", models.CharField(blank=True, max_length=300)),
            ],
        ),
        migrations.RunSQL(
            "SELECT exempt_table('records_verified', 'how far the scheduler followed the trail: a note for monitors, "
            "which verify never reads', 'SELECT, INSERT, UPDATE')",
            migrations.RunSQL.noop,
        ),
    ]
