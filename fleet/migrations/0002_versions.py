import django.contrib.postgres.constraints
import django.contrib.postgres.fields.ranges
import django.contrib.postgres.operations
import django.db.models.deletion
from django.conf import settings
from django.db import migrations, models


class Migration(migrations.Migration):
    dependencies = [
        ("fleet", "0001_people_and_aircraft"),
    ]

    operations = [
        django.contrib.postgres.operations.BtreeGistExtension(),
        migrations.CreateModel(
            name="LoadingBasis",
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
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "aircraft",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="loading_bases",
                        to="fleet.aircraft",
                    ),
                ),
                ("revision", models.PositiveIntegerField()),
                ("document", models.TextField()),
                ("digest", models.CharField(max_length=64)),
                (
                    "entered_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, to=settings.AUTH_USER_MODEL
                    ),
                ),
                ("entered_at", models.DateTimeField()),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(
                        fields=("aircraft", "revision"), name="loading_basis_revision_is_taken_once"
                    ),
                    models.UniqueConstraint(fields=("id", "entered_by"), name="loading_basis_has_one_author"),
                    models.UniqueConstraint(
                        fields=("id", "aircraft"), name="loading_basis_is_of_one_aircraft"
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("digest__regex", "^[0-9a-f]{64}$")),
                        name="loading_basis_digest_is_sha256",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("revision__gte", 1)), name="loading_basis_counts_from_one"
                    ),
                ],
            },
        ),
        migrations.CreateModel(
            name="EmptyWeight",
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
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "aircraft",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="empty_weights",
                        to="fleet.aircraft",
                    ),
                ),
                ("fit", models.CharField(max_length=120)),
                ("document", models.TextField()),
                ("salt", models.BinaryField()),
                ("digest", models.CharField(max_length=64)),
                ("true_from", models.DateTimeField()),
                (
                    "entered_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT, to=settings.AUTH_USER_MODEL
                    ),
                ),
                ("entered_at", models.DateTimeField()),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(fields=("id", "entered_by"), name="empty_weight_has_one_author"),
                    models.UniqueConstraint(
                        fields=("id", "true_from"), name="empty_weight_has_one_beginning"
                    ),
                    models.UniqueConstraint(
                        fields=("id", "aircraft", "fit"), name="empty_weight_is_of_one_fit"
                    ),
                    models.UniqueConstraint(
                        fields=("id", "aircraft"), name="empty_weight_is_of_one_aircraft"
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("digest__regex", "^[0-9a-f]{64}$")),
                        name="empty_weight_digest_is_sha256",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("fit", ""), _negated=True), name="empty_weight_names_its_fit"
                    ),
                ],
            },
        ),
        migrations.CreateModel(
            name="Approval",
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
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "aircraft",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.aircraft"),
                ),
                (
                    "loading_basis",
                    models.OneToOneField(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="approval",
                        to="fleet.loadingbasis",
                    ),
                ),
                (
                    "empty_weight",
                    models.OneToOneField(
                        null=True,
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="approval",
                        to="fleet.emptyweight",
                    ),
                ),
                (
                    "entered_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                (
                    "approved_by",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="+",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                ("true_from", models.DateTimeField()),
                ("known_from", models.DateTimeField()),
            ],
            options={
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(("approved_by", models.F("entered_by")), _negated=True),
                        name="approval_is_by_a_second_person",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(
                            models.Q(("empty_weight__isnull", True), ("loading_basis__isnull", False)),
                            models.Q(("empty_weight__isnull", False), ("loading_basis__isnull", True)),
                            _connector="OR",
                        ),
                        name="approval_is_of_one_version",
                    ),
                ],
            },
        ),
        migrations.CreateModel(
            name="Standing",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "aircraft",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.aircraft"),
                ),
                ("kind", models.CharField(max_length=20)),
                ("fit", models.CharField(blank=True, max_length=120)),
                ("version", models.UUIDField()),
                ("valid", django.contrib.postgres.fields.ranges.DateTimeRangeField()),
                ("known", django.contrib.postgres.fields.ranges.DateTimeRangeField()),
            ],
            options={
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(("kind__in", ["loading basis", "empty weight"])),
                        name="standing_kind_is_known",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(
                            models.Q(("fit", ""), ("kind", "loading basis")),
                            models.Q(("kind", "empty weight"), models.Q(("fit", ""), _negated=True)),
                            _connector="OR",
                        ),
                        name="standing_names_a_fit_for_empty_weights_only",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("valid__isempty", False), ("valid__lower_inf", False)),
                        name="standing_is_valid_for_some_time",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("known__isempty", False), ("known__lower_inf", False)),
                        name="standing_is_known_for_some_time",
                    ),
                    django.contrib.postgres.constraints.ExclusionConstraint(
                        expressions=[
                            ("aircraft", "="),
                            ("kind", "="),
                            ("fit", "="),
                            ("valid", "&&"),
                            ("known", "&&"),
                        ],
                        name="standing_has_one_version_at_any_moment",
                    ),
                ],
            },
        ),
    ]
