"""What holds of one row by itself: keys, checks and one index."""

import django.db.models.expressions
from django.db import migrations, models


class Migration(migrations.Migration):
    dependencies = [("loads", "0001_rows")]

    operations = [
        migrations.AddIndex(
            model_name="load",
            index=models.Index(fields=["operator", "departure", "id"], name="load_by_departure"),
        ),
        migrations.AddConstraint(
            model_name="load",
            constraint=models.UniqueConstraint(fields=("id", "operator"), name="load_is_of_one_operator"),
        ),
        migrations.AddConstraint(
            model_name="load",
            constraint=models.UniqueConstraint(fields=("id", "pilot"), name="load_has_one_pilot"),
        ),
        migrations.AddConstraint(
            model_name="load",
            constraint=models.CheckConstraint(
                condition=models.Q(("replaces", models.F("id")), _negated=True),
                name="load_does_not_replace_itself",
            ),
        ),
        migrations.AddConstraint(
            model_name="assessment",
            constraint=models.UniqueConstraint(
                fields=("load", "number"), name="assessment_number_is_taken_once"
            ),
        ),
        migrations.AddConstraint(
            model_name="assessment",
            constraint=models.UniqueConstraint(
                fields=("id", "load", "operator"), name="assessment_is_of_one_load"
            ),
        ),
        migrations.AddConstraint(
            model_name="assessment",
            constraint=models.UniqueConstraint(
                fields=("id", "load", "digest", "verdict"), name="assessment_can_be_signed"
            ),
        ),
        migrations.AddConstraint(
            model_name="assessment",
            constraint=models.CheckConstraint(
                condition=models.Q(("verdict__in", ["within", "outside", "unresolved"])),
                name="assessment_verdict_is_known",
            ),
        ),
        migrations.AddConstraint(
            model_name="assessment",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("verdict__in", ["within", "outside"]), _negated=True),
                    models.Q(("empty_weight__isnull", False), ("loading_basis__isnull", False)),
                    _connector="OR",
                ),
                name="assessment_without_its_versions_is_unresolved",
            ),
        ),
        migrations.AddConstraint(
            model_name="assessment",
            constraint=models.CheckConstraint(
                condition=models.Q(("digest__regex", "^[0-9a-f]{64}$")), name="assessment_digest_is_a_digest"
            ),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.UniqueConstraint(fields=("load", "number"), name="step_number_is_taken_once"),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.UniqueConstraint(
                fields=("load", "number", "after"), name="step_can_be_followed"
            ),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.UniqueConstraint(
                fields=("load", "number", "assessment"), name="step_has_one_assessment"
            ),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.UniqueConstraint(
                fields=("id", "load", "assessment", "person", "operator", "after"), name="step_can_be_signed"
            ),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.UniqueConstraint(
                condition=models.Q(("after", "open")),
                fields=("assessment",),
                name="step_brings_an_assessment_once",
            ),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("after", "open"), ("before", ""), ("number", 1), ("previous__isnull", True)),
                    models.Q(
                        ("number__gt", 1),
                        (
                            "previous",
                            django.db.models.expressions.CombinedExpression(
                                models.F("number"), "-", models.Value(1)
                            ),
                        ),
                    ),
                    _connector="OR",
                ),
                name="step_follows_the_one_before",
            ),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("after__in", ["prepared", "loaded", "accepted"]), _negated=True),
                    ("person__isnull", False),
                    _connector="OR",
                ),
                name="step_that_is_signed_has_a_person",
            ),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("after", "withdrawn"), _negated=True),
                    models.Q(("reason", ""), _negated=True),
                    _connector="OR",
                ),
                name="step_of_withdrawal_has_a_reason",
            ),
        ),
        migrations.AddConstraint(
            model_name="step",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("after", "departed"), ("departed_at__isnull", False)),
                    models.Q(models.Q(("after", "departed"), _negated=True), ("departed_at__isnull", True)),
                    _connector="OR",
                ),
                name="step_of_departure_has_a_time",
            ),
        ),
        migrations.AddConstraint(
            model_name="signature",
            constraint=models.CheckConstraint(
                condition=models.Q(("meaning__in", ["prepared", "loaded", "accepted"])),
                name="signature_meaning_is_known",
            ),
        ),
        migrations.AddConstraint(
            model_name="signature",
            constraint=models.CheckConstraint(
                condition=models.Q(("means__in", ["session", "token"])), name="signature_means_is_known"
            ),
        ),
        migrations.AddConstraint(
            model_name="signature",
            constraint=models.CheckConstraint(
                condition=models.Q(("statement", ""), _negated=True), name="signature_says_what_was_signed"
            ),
        ),
        migrations.AddConstraint(
            model_name="paper",
            constraint=models.UniqueConstraint(
                fields=("operator", "number"), name="paper_number_is_taken_once"
            ),
        ),
        migrations.AddConstraint(
            model_name="paper",
            constraint=models.UniqueConstraint(fields=("load", "operator"), name="paper_is_of_one_operator"),
        ),
        migrations.AddConstraint(
            model_name="paper",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("number", 1), ("previous__isnull", True)),
                    models.Q(
                        ("number__gt", 1),
                        (
                            "previous",
                            django.db.models.expressions.CombinedExpression(
                                models.F("number"), "-", models.Value(1)
                            ),
                        ),
                    ),
                    _connector="OR",
                ),
                name="paper_numbers_have_no_gaps",
            ),
        ),
    ]
