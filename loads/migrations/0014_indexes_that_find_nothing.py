"""Indexes that find nothing another one does not find, or that nobody asks: each cost every submission a write.

Of an operator's loads all are of one operator; those of a load are found by its key with the number.
"""

from django.db import migrations, models
from django.db.models import PROTECT

_OPERATORS_OWN = ("load", "declaration", "assessment", "step", "signature", "paper", "filedpaper")


def _pointer(to: str, **more: object) -> models.ForeignKey:
    return models.ForeignKey(to, on_delete=PROTECT, db_index=False, **more)


class Migration(migrations.Migration):
    dependencies = [("loads", "0013_provisions_used")]

    operations = [
        migrations.RemoveIndex("assessment", "assessment_rejected"),
        *(migrations.AlterField(name, "operator", _pointer("fleet.operator")) for name in _OPERATORS_OWN),
        migrations.AlterField("load", "pilot", _pointer("fleet.person", null=True, related_name="+")),
        migrations.AlterField("assessment", "load", _pointer("loads.load", related_name="assessments")),
        migrations.AlterField("step", "load", _pointer("loads.load", related_name="steps")),
        migrations.AlterField("step", "person", _pointer("fleet.person", null=True)),
        migrations.AlterField("signature", "person", _pointer("fleet.person")),
    ]
