"""A check whose comparison is with NULL is not broken: a later step or number names the one before it."""

from django.db import migrations, models
from django.db.models import F, Q

_LATER = Q(number__gt=1, previous__isnull=False, previous=F("number") - 1)


class Migration(migrations.Migration):
    dependencies = [("loads", "0008_second_person")]

    operations = [
        migrations.RemoveConstraint("step", "step_follows_the_one_before"),
        migrations.AddConstraint(
            "step",
            models.CheckConstraint(
                condition=Q(number=1, previous__isnull=True, before="", after="open") | _LATER,
                name="step_follows_the_one_before",
            ),
        ),
        migrations.RemoveConstraint("paper", "paper_numbers_have_no_gaps"),
        migrations.AddConstraint(
            "paper",
            models.CheckConstraint(
                condition=Q(number=1, previous__isnull=True) | _LATER, name="paper_numbers_have_no_gaps"
            ),
        ),
    ]
