"""An assessment names the tables, rules, restrictions and permits it used; a notice, those that hold now."""

from pathlib import Path

import django.contrib.postgres.fields
from django.db import migrations, models

_USES = (Path(__file__).resolve().parent / "provisions_used.sql").read_text(encoding="utf-8")


def _list_of_ids() -> django.contrib.postgres.fields.ArrayField:
    return django.contrib.postgres.fields.ArrayField(
        base_field=models.UUIDField(), blank=True, default=list, size=None
    )


class Migration(migrations.Migration):
    dependencies = [("fleet", "0008_provisions"), ("loads", "0012_self_check")]

    operations = [
        migrations.AddField(model_name="assessment", name="provisions", field=_list_of_ids()),
        migrations.AddField(model_name="stalenotice", name="provisions", field=_list_of_ids()),
        migrations.AlterField(
            model_name="stalenotice", name="changed", field=models.CharField(max_length=120)
        ),
        migrations.RemoveConstraint(model_name="stalenotice", name="stale_notice_is_given_once"),
        migrations.AddConstraint(
            model_name="stalenotice",
            constraint=models.UniqueConstraint(
                fields=("load", "loading_basis", "empty_weight", "provisions"),
                name="stale_notice_is_given_once",
                nulls_distinct=False,
            ),
        ),
        migrations.RunSQL(_USES, migrations.RunSQL.noop),
    ]
