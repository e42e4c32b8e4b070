"""The trail is read newest first: whole, by who acted, by what was done."""

from django.db import migrations, models

INDEXES = {
    "act_by_chain": ["chain", "id"],
    "act_by_actor": ["chain", "actor_key", "id"],
    "act_by_kind": ["chain", "kind", "id"],
}


class Migration(migrations.Migration):
    dependencies = [("records", "0008_verified")]

    operations = [
        migrations.AddIndex(model_name="act", index=models.Index(fields=fields, name=name))
        for name, fields in INDEXES.items()
    ]
