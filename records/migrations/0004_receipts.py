"""Answers kept for repeated requests."""

from django.db import migrations, models


class Migration(migrations.Migration):
    dependencies = [("records", "0003_documents_and_outbox")]

    operations = [
        migrations.CreateModel(
            name="Receipt",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("actor", models.CharField(max_length=60)),
                ("key", models.CharField(max_length=120)),
                ("request_digest", models.CharField(max_length=64)),
                ("status", models.PositiveSmallIntegerField()),
                ("headers", models.JSONField()),
                ("body", models.BinaryField()),
                ("answered_at", models.DateTimeField()),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(
                        fields=("actor", "key"), name="receipt_key_is_used_once_per_actor"
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("status__gte", 200), ("status__lt", 300)),
                        name="receipt_is_of_a_success",
                    ),
                ],
                "indexes": [models.Index(fields=["answered_at"], name="receipt_by_age")],
            },
        ),
        migrations.RunSQL(
            "SELECT exempt_table('records_receipt', "
            "'it repeats an answer for seven days and changes nothing; the act it answers for is witnessed', "
            "'SELECT, INSERT, DELETE')",
            migrations.RunSQL.noop,
        ),
    ]
