"""The tables of the loads room."""

from django.conf import settings
from django.db import migrations, models
from django.db.models import PROTECT


class Migration(migrations.Migration):
    initial = True

    dependencies = [
        ("fleet", "0004_guards"),
        ("records", "0003_documents_and_outbox"),
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
                ("aircraft", models.ForeignKey(on_delete=PROTECT, related_name="loads", to="fleet.aircraft")),
                ("operator", models.ForeignKey(on_delete=PROTECT, to="fleet.operator")),
                (
                    "pilot",
                    models.ForeignKey(
                        null=True, on_delete=PROTECT, related_name="+", to=settings.AUTH_USER_MODEL
                    ),
                ),
                (
                    "replaces",
                    models.OneToOneField(
                        null=True, on_delete=PROTECT, related_name="replaced_by", to="loads.load"
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
                ]
            },
        ),
        migrations.CreateModel(
            name="Paper",
            fields=[
                (
                    "load",
                    models.OneToOneField(
                        on_delete=PROTECT,
                        primary_key=True,
                        related_name="paper",
                        serialize=False,
                        to="loads.load",
                    ),
                ),
                ("number", models.PositiveIntegerField()),
                ("previous", models.PositiveIntegerField(null=True)),
                ("act", models.UUIDField()),
                ("operator", models.ForeignKey(on_delete=PROTECT, to="fleet.operator")),
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
                ("salt", models.BinaryField()),
                ("digest", models.CharField(max_length=64)),
                ("engine", models.CharField(max_length=20)),
                ("assessed_at", models.DateTimeField()),
                ("empty_weight", models.ForeignKey(null=True, on_delete=PROTECT, to="fleet.emptyweight")),
                ("loading_basis", models.ForeignKey(null=True, on_delete=PROTECT, to="fleet.loadingbasis")),
                ("operator", models.ForeignKey(on_delete=PROTECT, to="fleet.operator")),
                ("load", models.ForeignKey(on_delete=PROTECT, related_name="assessments", to="loads.load")),
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
                ("assessment", models.ForeignKey(on_delete=PROTECT, to="loads.assessment")),
                ("load", models.ForeignKey(on_delete=PROTECT, related_name="steps", to="loads.load")),
                ("operator", models.ForeignKey(on_delete=PROTECT, to="fleet.operator")),
                ("person", models.ForeignKey(null=True, on_delete=PROTECT, to=settings.AUTH_USER_MODEL)),
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
                ("assessment", models.ForeignKey(on_delete=PROTECT, to="loads.assessment")),
                ("load", models.ForeignKey(on_delete=PROTECT, related_name="signatures", to="loads.load")),
                ("operator", models.ForeignKey(on_delete=PROTECT, to="fleet.operator")),
                ("person", models.ForeignKey(on_delete=PROTECT, to=settings.AUTH_USER_MODEL)),
                ("step", models.OneToOneField(on_delete=PROTECT, to="loads.step")),
            ],
        ),
        migrations.CreateModel(
            name="Declaration",
            fields=[
                (
                    "load",
                    models.OneToOneField(
                        on_delete=PROTECT,
                        primary_key=True,
                        related_name="declaration",
                        serialize=False,
                        to="loads.load",
                    ),
                ),
                ("body", models.BinaryField()),
                ("salt", models.BinaryField()),
                ("operator", models.ForeignKey(on_delete=PROTECT, to="fleet.operator")),
            ],
        ),
        migrations.CreateModel(
            name="FiledPaper",
            fields=[
                (
                    "paper",
                    models.OneToOneField(
                        on_delete=PROTECT,
                        primary_key=True,
                        related_name="filed",
                        serialize=False,
                        to="loads.paper",
                    ),
                ),
                ("operator", models.ForeignKey(on_delete=PROTECT, to="fleet.operator")),
                ("document", models.ForeignKey(on_delete=PROTECT, to="records.document")),
                ("filed_at", models.DateTimeField()),
            ],
        ),
    ]
