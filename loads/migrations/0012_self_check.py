"""Self-checks are filed: rows are only added."""

from django.db import migrations, models

GUARD = "SELECT guard_table('loads_selfcheck', key => '{id}', mode => 'append', operator => 'chain')"


class Migration(migrations.Migration):
    dependencies = [("loads", "0011_present"), ("records", "0002_the_door")]

    operations = [
        migrations.CreateModel(
            name="SelfCheck",
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
                ("chain", models.CharField(max_length=40)),
                ("cause", models.CharField(max_length=12)),
                ("engine", models.CharField(max_length=20)),
                ("references", models.CharField(max_length=64)),
                ("passed", models.BooleanField()),
                ("document", models.TextField()),
                ("checked_at", models.DateTimeField()),
                ("act", models.UUIDField()),
            ],
            options={
                "indexes": [models.Index(fields=["chain", "-checked_at"], name="self_check_lately")],
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(("cause__in", ["start", "daily", "asked", "overdue"])),
                        name="self_check_cause_is_known",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("references__regex", "^[0-9a-f]{64}$")),
                        name="self_check_names_its_references",
                    ),
                ],
            },
        ),
        migrations.RunSQL(GUARD, migrations.RunSQL.noop),
    ]
