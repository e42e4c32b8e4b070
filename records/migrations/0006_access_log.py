"""The log of sign-ins and of the use of tokens: written through access_note() alone, sealed by digest once a minute."""

from pathlib import Path

from django.db import migrations, models

SQL = Path(__file__).resolve().parent.parent / "sql"
_WHATS = [
    "sign-in",
    "sign-in-failed",
    "sign-out",
    "password-wrong",
    "locked-out",
    "token-used",
    "token-refused",
    "more-not-listed",
]


class Migration(migrations.Migration):
    dependencies = [("records", "0005_webhooks")]

    operations = [
        migrations.CreateModel(
            name="Access",
            fields=[
                (
                    "pk",
                    models.CompositePrimaryKey(
                        "chain", "number", blank=True, editable=False, primary_key=True, serialize=False
                    ),
                ),
                ("chain", models.TextField()),
                ("number", models.BigIntegerField()),
                ("at", models.DateTimeField()),
                ("what", models.TextField()),
                ("key", models.TextField(blank=True)),
                ("typed", models.TextField(blank=True)),
                ("origin", models.TextField(blank=True)),
                ("request", models.TextField(blank=True)),
                ("previous", models.TextField(null=True)),
                ("digest", models.TextField()),
            ],
            options={
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(("what__in", _WHATS)), name="access_what_is_known"
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("key__regex", r"^((person|token):[0-9]{1,19})?$")),
                        name="access_key_is_a_person_or_a_token",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(
                            ("typed__regex", "^([0-9a-f]{32})?$"), ("origin__regex", "^([0-9a-f]{32})?$")
                        ),
                        name="access_tells_digests_only",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("request__regex", "^[A-Za-z0-9._-]{0,64}$")),
                        name="access_request_is_plain",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(
                            models.Q(("number", 1), ("previous__isnull", True)),
                            models.Q(("number__gt", 1), ("previous__isnull", False)),
                            _connector="OR",
                        ),
                        name="access_links_to_the_one_before",
                    ),
                ],
                "indexes": [models.Index(fields=["chain", "key", "-at"], name="access_lately")],
            },
        ),
        migrations.CreateModel(
            name="AccessSeal",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("operator_id", models.CharField(max_length=40)),
                ("number", models.BigIntegerField()),
                ("digest", models.CharField(max_length=64)),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(
                        fields=("operator_id", "number"), name="access_place_is_sealed_once"
                    )
                ],
            },
        ),
        *(
            migrations.RunSQL((SQL / f"{name}.sql").read_text(encoding="utf-8"), migrations.RunSQL.noop)
            for name in ("access", "rights")
        ),
        migrations.RunSQL(
            # No act writes it, and nothing else changes it: it is guarded as the trail itself is.
            "SELECT put_refusals('records_access', '{UPDATE,DELETE,TRUNCATE}'), "
            "grant_rights('records_access', 'SELECT'), "
            "keep_definition('records_access', 'trail', '{}', '{}', '{}', '{}', '{}', '', "
            "'sign-ins, their failures and the use of tokens: strangers write it, so no act does; an act seals "
            "its last digest once a minute')",
            migrations.RunSQL.noop,
        ),
        migrations.RunSQL(
            "SELECT guard_table('records_accessseal', key => '{id}', mode => 'append', operator => 'operator_id')",
            migrations.RunSQL.noop,
        ),
    ]
