"""Filed documents under guard, and the list of promised work."""

import django.db.models.functions.text
from django.db import migrations, models


class Migration(migrations.Migration):
    dependencies = [
        ("records", "0002_the_door"),
    ]

    operations = [
        migrations.CreateModel(
            name="Document",
            fields=[
                ("digest", models.CharField(max_length=64, primary_key=True, serialize=False)),
                ("operator_id", models.CharField(max_length=40)),
                ("about", models.CharField(max_length=120)),
                ("title", models.CharField(max_length=200)),
                ("media_type", models.CharField(max_length=60)),
                ("size", models.PositiveIntegerField()),
                ("renderer", models.CharField(max_length=300)),
                ("body", models.BinaryField()),
                ("salt", models.BinaryField()),
                ("filed_at", models.DateTimeField()),
            ],
            options={
                "indexes": [models.Index(fields=["about"], name="document_by_about")],
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(
                            ("body", models.Value(b"", models.BinaryField())),
                            (
                                "digest",
                                models.Func(
                                    models.F("body"),
                                    output_field=models.CharField(),
                                    template="encode(sha256(%(expressions)s), 'hex')",
                                ),
                            ),
                            _connector="OR",
                        ),
                        name="document_digest_fits_its_body",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(
                            ("body", models.Value(b"", models.BinaryField())),
                            ("size", django.db.models.functions.text.Length("body")),
                            _connector="OR",
                        ),
                        name="document_size_fits_its_body",
                    ),
                ],
            },
        ),
        migrations.CreateModel(
            name="Outbox",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("task", models.CharField(max_length=80)),
                ("key", models.CharField(max_length=120)),
                ("operator_id", models.CharField(max_length=40)),
                ("act", models.UUIDField()),
                ("put_at", models.DateTimeField()),
                ("tries", models.PositiveIntegerField(default=0)),
                ("last_problem", models.CharField(blank=True, max_length=300)),
                ("try_after", models.DateTimeField()),
                ("done_at", models.DateTimeField(null=True)),
            ],
            options={
                "indexes": [
                    models.Index(
                        condition=models.Q(("done_at__isnull", True)),
                        fields=["try_after"],
                        name="outbox_not_done",
                    )
                ],
                "constraints": [
                    models.UniqueConstraint(fields=("task", "key"), name="outbox_task_is_promised_once")
                ],
            },
        ),
        migrations.RunSQL(
            # The paper names people: the trail keeps a salted digest of it, so that it can be destroyed.
            "SELECT guard_table('records_document', key => '{digest}', mode => 'append', "
            "operator => 'operator_id', personal => '{body}')",
            migrations.RunSQL.noop,
        ),
        migrations.RunSQL(
            "SELECT exempt_table('records_outbox', 'a list of promised work; what the work changes is "
            "witnessed by its own act', 'SELECT, INSERT, UPDATE')",
            migrations.RunSQL.noop,
        ),
    ]
