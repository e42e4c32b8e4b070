"""Loads are found by their reference among years of loads: exactly, and by its beginning in any case.

Measured with `tests/bench/stored_loads.py`: without these the time grew with all that is stored.
"""

from django.db import migrations, models

# As people type it; said in SQL, since the model layer has no words for the operator class.
_TYPED = (
    "CREATE INDEX load_by_typed_reference ON loads_load "
    "(operator_id, upper(reference::text) text_pattern_ops)"
)


class Migration(migrations.Migration):
    dependencies = [("loads", "0009_previous_is_named")]

    operations = [
        migrations.AddIndex(
            "load",
            models.Index(fields=["operator", "reference", "departure", "id"], name="load_by_reference"),
        ),
        migrations.RunSQL(_TYPED, "DROP INDEX load_by_typed_reference"),
    ]
