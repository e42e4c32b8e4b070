"""The trail: acts, changes, seals, the closing table, names, and the register of tables."""

import django.contrib.postgres.fields
import django.db.models.deletion
from django.db import migrations, models


class Migration(migrations.Migration):
    initial = True

    dependencies = []

    operations = [
        migrations.CreateModel(
            name="Act",
            fields=[
                ("id", models.UUIDField(primary_key=True, serialize=False)),
                ("at", models.DateTimeField()),
                ("chain", models.TextField()),
                ("kind", models.TextField()),
                ("actor_kind", models.TextField()),
                ("actor_key", models.TextField()),
                ("name_digest", models.TextField(null=True)),
                ("capacity", models.TextField(blank=True)),
                ("about", models.TextField()),
                ("reason", models.TextField(blank=True)),
                ("caused_by", models.UUIDField(null=True)),
                ("request", models.TextField(blank=True)),
            ],
        ),
        migrations.CreateModel(
            name="Change",
            fields=[
                (
                    "pk",
                    models.CompositePrimaryKey(
                        "act_id", "id", blank=True, editable=False, primary_key=True, serialize=False
                    ),
                ),
                (
                    "act",
                    models.ForeignKey(
                        db_constraint=False,
                        db_index=False,
                        on_delete=django.db.models.deletion.DO_NOTHING,
                        related_name="changes",
                        to="records.act",
                    ),
                ),
                ("id", models.BigIntegerField()),
                ("table_name", models.TextField()),
                ("row_key", models.TextField()),
                ("operation", models.TextField()),
                ("image", models.TextField()),
            ],
        ),
        migrations.CreateModel(
            name="GuardedTable",
            fields=[
                ("name", models.TextField(primary_key=True, serialize=False)),
                ("mode", models.TextField()),
                ("key", django.contrib.postgres.fields.ArrayField(base_field=models.TextField(), size=None)),
                (
                    "personal",
                    django.contrib.postgres.fields.ArrayField(base_field=models.TextField(), size=None),
                ),
                (
                    "binary_personal",
                    django.contrib.postgres.fields.ArrayField(base_field=models.TextField(), size=None),
                ),
                (
                    "hidden",
                    django.contrib.postgres.fields.ArrayField(base_field=models.TextField(), size=None),
                ),
                (
                    "closes",
                    django.contrib.postgres.fields.ArrayField(base_field=models.TextField(), size=None),
                ),
                ("operator_column", models.TextField(blank=True)),
                ("reason", models.TextField(blank=True)),
                (
                    "triggers",
                    django.contrib.postgres.fields.ArrayField(base_field=models.TextField(), size=None),
                ),
                ("chain", models.TextField()),
            ],
            options={
                "db_table": "records_guarded_table",
            },
        ),
        migrations.CreateModel(
            name="Name",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("chain", models.TextField()),
                ("actor_key", models.TextField()),
                ("name", models.BinaryField()),
                ("salt", models.BinaryField()),
                ("digest", models.TextField()),
            ],
        ),
        migrations.CreateModel(
            name="Closing",
            fields=[
                (
                    "act",
                    models.OneToOneField(
                        db_constraint=False,
                        on_delete=django.db.models.deletion.DO_NOTHING,
                        primary_key=True,
                        related_name="+",
                        serialize=False,
                        to="records.act",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="Seal",
            fields=[
                (
                    "act",
                    models.OneToOneField(
                        db_constraint=False,
                        on_delete=django.db.models.deletion.DO_NOTHING,
                        primary_key=True,
                        related_name="seal",
                        serialize=False,
                        to="records.act",
                    ),
                ),
                ("chain", models.TextField()),
                ("position", models.BigIntegerField()),
                ("previous", models.TextField(null=True)),
                ("digest", models.TextField()),
                ("entry", models.TextField()),
            ],
        ),
        migrations.AddIndex(
            model_name="act",
            index=models.Index(fields=["about", "id"], name="act_by_about"),
        ),
        migrations.AddConstraint(
            model_name="act",
            constraint=models.CheckConstraint(
                condition=models.Q(("kind__regex", "^[a-z0-9]+(-[a-z0-9]+)+$")),
                name="act_kind_is_a_verb_and_object",
            ),
        ),
        migrations.AddConstraint(
            model_name="act",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("chain", ""), _negated=True),
                    models.Q(("about", ""), _negated=True),
                    models.Q(("actor_key", ""), _negated=True),
                ),
                name="act_says_whose_by_whom_and_about_what",
            ),
        ),
        migrations.AddConstraint(
            model_name="act",
            constraint=models.CheckConstraint(
                condition=models.Q(("actor_kind__in", ["person", "token", "service", "stranger"])),
                name="act_actor_kind_is_known",
            ),
        ),
        migrations.AddConstraint(
            model_name="guardedtable",
            constraint=models.CheckConstraint(
                condition=models.Q(("mode__in", ["append", "close-once", "edit", "exempt", "trail"])),
                name="guarded_table_mode_is_known",
            ),
        ),
        migrations.AddIndex(
            model_name="name",
            index=models.Index(fields=["actor_key", "chain"], name="name_by_bearer"),
        ),
        migrations.AddIndex(
            model_name="seal",
            index=models.Index(fields=["digest"], name="seal_by_digest"),
        ),
        migrations.AddConstraint(
            model_name="seal",
            constraint=models.UniqueConstraint(fields=("chain", "position"), name="seal_place_is_taken_once"),
        ),
        migrations.AddConstraint(
            model_name="seal",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("position", 1), ("previous__isnull", True)),
                    models.Q(("position__gt", 1), ("previous__isnull", False)),
                    _connector="OR",
                ),
                name="seal_links_to_the_one_before",
            ),
        ),
        migrations.AddIndex(
            model_name="change",
            index=models.Index(fields=["table_name", "row_key", "id"], name="change_by_row"),
        ),
        migrations.AddConstraint(
            model_name="change",
            constraint=models.CheckConstraint(
                condition=models.Q(("operation__in", ["insert", "update"])), name="change_operation_is_known"
            ),
        ),
    ]
