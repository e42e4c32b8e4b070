"""The tables of the loads room."""

import django.db.models.deletion
import django.db.models.expressions
from django.conf import settings
from django.db import migrations, models


class Migration(migrations.Migration):
    initial = True

    dependencies = [
        ("fleet", "0004_guards"),
        ("records", "0002_the_door"),
        migrations.swappable_dependency(settings.AUTH_USER_MODEL),
    ]

    operations = [
        migrations.CreateModel(
            name="Load",
            fields=[
                (
                    "id",
                    models.UUIDField(
                        db_default=models.Func(function="uuidv7", output_field=models.UUIDField()),
                        editable=False,
                        primary_key=True,
                        serialize=False,
                    ),
                ),
                ("configuration", models.CharField(max_length=64)),
                ("reference", models.CharField(max_length=64)),
                ("leg", models.PositiveSmallIntegerField(default=1)),
                ("departure", models.DateTimeField()),
                ("departure_text", models.CharField(max_length=64)),
                ("origin", models.CharField(max_length=80)),
                ("destination", models.CharField(max_length=80)),
                ("operation", models.CharField(max_length=80)),
                ("submitted_at", models.DateTimeField()),
                (
                    "aircraft",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="loads", to="fleet.aircraft"
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "pilot",
                    models.ForeignKey(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "replaces",
                    models.OneToOneField(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="replaced_by",
                        to="loads.load",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="AllowedStep",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("before", models.CharField(max_length=12)),
                ("after", models.CharField(max_length=12)),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(fields=("before", "after"), name="allowed_step_is_listed_once")
                ],
            },
        ),
        migrations.CreateModel(
            name="Paper",
            fields=[
                (
                    "load",
                    models.OneToOneField(
                        on_delete=django.db.models.deletion.PROTECT,
                        primary_key=True,
                        related_name="paper",
                        serialize=False,
                        to="loads.load",
                    ),
                ),
                ("number", models.PositiveIntegerField()),
                ("previous", models.PositiveIntegerField(null=True)),
                ("act", models.UUIDField()),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
            ],
        ),
        migrations.CreateModel(
            name="Assessment",
            fields=[
                (
                    "id",
                    models.UUIDField(
                        db_default=models.Func(function="uuidv7", output_field=models.UUIDField()),
                        editable=False,
                        primary_key=True,
                        serialize=False,
                    ),
                ),
                ("number", models.PositiveIntegerField()),
                ("verdict", models.CharField(max_length=12)),
                ("result", models.TextField()),
                ("digest", models.CharField(max_length=64)),
                ("engine", models.CharField(max_length=20)),
                ("assessed_at", models.DateTimeField()),
                (
                    "empty_weight",
                    models.ForeignKey(
                        null=True, on_delete=django.db.models.deletion.PROTECT, to="fleet.emptyweight"
                    ),
                ),
                (
                    "loading_basis",
                    models.ForeignKey(
                        null=True, on_delete=django.db.models.deletion.PROTECT, to="fleet.loadingbasis"
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "load",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="assessments",
                        to="loads.load",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="Step",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("number", models.PositiveIntegerField()),
                ("before", models.CharField(blank=True, max_length=12)),
                ("after", models.CharField(max_length=12)),
                ("previous", models.PositiveIntegerField(null=True)),
                ("reason", models.CharField(blank=True, max_length=500)),
                ("at", models.DateTimeField()),
                ("departed_at", models.DateTimeField(null=True)),
                ("act", models.UUIDField()),
                (
                    "carried",
                    models.GeneratedField(
                        db_persist=True,
                        expression=models.Case(
                            models.When(
                                models.Q(("after", "open"), _negated=True), then=models.F("assessment")
                            )
                        ),
                        output_field=models.UUIDField(null=True),
                    ),
                ),
                (
                    "acceptor",
                    models.GeneratedField(
                        db_persist=True,
                        expression=models.Case(models.When(after="accepted", then=models.F("person"))),
                        output_field=models.BigIntegerField(null=True),
                    ),
                ),
                (
                    "assessment",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="loads.assessment"),
                ),
                (
                    "load",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, related_name="steps", to="loads.load"
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "person",
                    models.ForeignKey(
                        null=True, on_delete=django.db.models.deletion.PROTECT, to=settings.AUTH_USER_MODEL
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="Signature",
            fields=[
                (
                    "id",
                    models.UUIDField(
                        db_default=models.Func(function="uuidv7", output_field=models.UUIDField()),
                        editable=False,
                        primary_key=True,
                        serialize=False,
                    ),
                ),
                ("meaning", models.CharField(max_length=20)),
                ("capacity", models.CharField(max_length=60)),
                ("statement", models.TextField()),
                ("digest", models.CharField(max_length=64)),
                ("name", models.BinaryField()),
                ("salt", models.BinaryField()),
                ("signed_at", models.DateTimeField()),
                ("signed_from", models.CharField(blank=True, max_length=60)),
                ("means", models.CharField(max_length=20)),
                (
                    "signable",
                    models.GeneratedField(
                        db_persist=True,
                        expression=models.Value("within"),
                        output_field=models.CharField(max_length=12),
                    ),
                ),
                (
                    "assessment",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="loads.assessment"),
                ),
                (
                    "load",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="signatures",
                        to="loads.load",
                    ),
                ),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "person",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, to=settings.AUTH_USER_MODEL
                    ),
                ),
                ("step", models.OneToOneField(on_delete=django.db.models.deletion.PROTECT, to="loads.step")),
            ],
        ),
        migrations.CreateModel(
            name="Declaration",
            fields=[
                (
                    "load",
                    models.OneToOneField(
                        on_delete=django.db.models.deletion.PROTECT,
                        primary_key=True,
                        related_name="declaration",
                        serialize=False,
                        to="loads.load",
                    ),
                ),
                ("body", models.BinaryField()),
                ("salt", models.BinaryField()),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
            ],
        ),
        migrations.CreateModel(
            name="FiledPaper",
            fields=[
                (
                    "paper",
                    models.OneToOneField(
                        on_delete=django.db.models.deletion.PROTECT,
                        primary_key=True,
                        related_name="filed",
                        serialize=False,
                        to="loads.paper",
                    ),
                ),
                ("filed_at", models.DateTimeField()),
            ],
        ),
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
        migrations.AddField(
            model_name="filedpaper",
            name="document",
            field=models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="records.document"),
        ),
        migrations.AddField(
            model_name="filedpaper",
            name="operator",
            field=models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
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
