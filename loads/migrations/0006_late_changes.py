"""Last-minute changes, notes after flight and notices of stale loads: the rows."""

import django.db.models.deletion
from django.conf import settings
from django.db import migrations, models
from django.db.models import F, Func, Q, Value

_PROTECT = django.db.models.deletion.PROTECT


def _operator() -> "models.ForeignKey":
    return models.ForeignKey(on_delete=_PROTECT, to="fleet.operator")


def _link(to: str, related: str = "+", *, null: bool = False) -> "models.ForeignKey":
    return models.ForeignKey(null=null, on_delete=_PROTECT, related_name=related, to=to)


def _number() -> "models.UUIDField":
    return models.UUIDField(
        db_default=Func(function="uuidv7", output_field=models.UUIDField()),
        editable=False,
        primary_key=True,
        serialize=False,
    )


class Migration(migrations.Migration):
    dependencies = [
        ("fleet", "0005_operator_settings"),
        ("loads", "0005_remarks"),
        ("records", "0002_the_door"),
    ]

    operations = [
        migrations.CreateModel(
            name="LateChange",
            fields=[
                (
                    "step",
                    models.OneToOneField(
                        on_delete=_PROTECT,
                        primary_key=True,
                        related_name="late_change",
                        serialize=False,
                        to="loads.step",
                    ),
                ),
                ("operator", _operator()),
                ("load", _link("loads.load", "late_changes")),
                ("number", models.PositiveSmallIntegerField()),
                ("previous", models.PositiveSmallIntegerField(null=True)),
                (
                    "assessment",
                    models.OneToOneField(
                        on_delete=_PROTECT, related_name="late_change", to="loads.assessment"
                    ),
                ),
                ("person", _link(settings.AUTH_USER_MODEL)),
                ("lines", models.TextField()),
                ("body", models.BinaryField()),
                ("salt", models.BinaryField()),
                ("settings_number", models.PositiveIntegerField()),
                ("kilograms_moved", models.DecimalField(decimal_places=12, max_digits=28)),
                ("kilograms_bound", models.DecimalField(decimal_places=12, max_digits=28)),
                ("persons_moved", models.PositiveSmallIntegerField()),
                ("persons_bound", models.PositiveSmallIntegerField()),
                ("changed_at", models.DateTimeField()),
                ("act", models.UUIDField()),
                (
                    "taken",
                    models.GeneratedField(
                        db_persist=True,
                        expression=Value("accepted"),
                        output_field=models.CharField(max_length=12),
                    ),
                ),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(
                        fields=("load", "number"), name="late_change_number_is_taken_once"
                    ),
                    models.UniqueConstraint(
                        fields=("step", "operator"), name="late_change_is_of_one_operator"
                    ),
                    models.CheckConstraint(
                        condition=Q(number=1, previous__isnull=True)
                        | Q(number__gt=1, previous__isnull=False, previous=F("number") - 1),
                        name="late_change_follows_the_one_before",
                    ),
                    models.CheckConstraint(
                        condition=Q(kilograms_moved__gt=0)
                        & Q(kilograms_moved__lte=F("kilograms_bound"))
                        & Q(persons_moved__lte=F("persons_bound")),
                        name="late_change_is_within_its_bound",
                    ),
                ]
            },
        ),
        migrations.CreateModel(
            name="FiledIssue",
            fields=[
                (
                    "change",
                    models.OneToOneField(
                        on_delete=_PROTECT,
                        primary_key=True,
                        related_name="filed",
                        serialize=False,
                        to="loads.latechange",
                    ),
                ),
                ("operator", _operator()),
                ("document", models.ForeignKey(on_delete=_PROTECT, to="records.document")),
                ("filed_at", models.DateTimeField()),
            ],
        ),
        migrations.CreateModel(
            name="Note",
            fields=[
                ("id", _number()),
                ("operator", _operator()),
                ("load", _link("loads.load", "notes")),
                ("person", _link(settings.AUTH_USER_MODEL)),
                ("text", models.TextField()),
                ("salt", models.BinaryField()),
                ("written_at", models.DateTimeField()),
                ("act", models.UUIDField()),
            ],
            options={
                "constraints": [models.CheckConstraint(condition=~Q(text=""), name="note_says_something")]
            },
        ),
        migrations.CreateModel(
            name="StaleNotice",
            fields=[
                ("id", _number()),
                ("operator", _operator()),
                ("load", _link("loads.load", "stale_notices")),
                ("assessment", _link("loads.assessment")),
                ("loading_basis", _link("fleet.loadingbasis", null=True)),
                ("empty_weight", _link("fleet.emptyweight", null=True)),
                ("changed", models.CharField(max_length=60)),
                ("mail_addresses", models.PositiveSmallIntegerField()),
                ("told_at", models.DateTimeField()),
                ("act", models.UUIDField()),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(
                        fields=("load", "loading_basis", "empty_weight"),
                        name="stale_notice_is_given_once",
                        nulls_distinct=False,
                    ),
                    models.CheckConstraint(condition=~Q(changed=""), name="stale_notice_says_what_changed"),
                ]
            },
        ),
    ]
