import django.contrib.postgres.fields
import django.db.models.deletion
from django.conf import settings
from django.db import migrations, models


class Migration(migrations.Migration):
    initial = True

    dependencies = []

    operations = [
        migrations.CreateModel(
            name="Operator",
            fields=[
                ("code", models.CharField(max_length=40, primary_key=True, serialize=False)),
                ("name", models.CharField(max_length=120)),
                ("certificate", models.CharField(blank=True, max_length=60)),
                ("base", models.CharField(blank=True, max_length=80)),
                ("time_zone", models.CharField(max_length=60)),
                ("rule_set", models.CharField(max_length=20)),
                ("procedure", models.CharField(max_length=200)),
                ("weight_method", models.CharField(max_length=200)),
                ("estimates_may_be_signed", models.BooleanField(default=False)),
                ("prepare_and_accept_by_one", models.BooleanField(default=True)),
                ("invented", models.BooleanField(default=False)),
            ],
            options={
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(("code__regex", "^[a-z0-9][a-z0-9-]{1,39}$")),
                        name="operator_code_is_plain",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("code", "house"), _negated=True),
                        name="operator_code_is_not_the_house_chain",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("rule_set__in", ["US", "EU-UK"])),
                        name="operator_rule_set_is_known",
                    ),
                ],
            },
        ),
        migrations.CreateModel(
            name="Person",
            fields=[
                ("password", models.CharField(max_length=128, verbose_name="password")),
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                (
                    "operator",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="people",
                        to="fleet.operator",
                    ),
                ),
                ("login", models.CharField(max_length=60)),
                ("name", models.CharField(max_length=120)),
                ("salt", models.BinaryField()),
                ("is_active", models.BooleanField(default=True)),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(fields=("login",), name="person_login_is_taken_once"),
                    models.UniqueConstraint(fields=("id", "operator"), name="person_is_of_one_operator"),
                    models.CheckConstraint(
                        condition=models.Q(("login__regex", "^[a-z0-9][a-z0-9._-]{1,59}$")),
                        name="person_login_is_plain",
                    ),
                ],
            },
        ),
        migrations.CreateModel(
            name="Duty",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "person",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="duties",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                ("role", models.CharField(max_length=40)),
                ("granted", models.BooleanField()),
                ("since", models.DateTimeField()),
            ],
            options={
                "indexes": [models.Index(fields=["person", "role", "-since"], name="duty_newest_per_role")],
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(
                            (
                                "role__in",
                                (
                                    "pilot",
                                    "load preparer",
                                    "loading supervisor",
                                    "maintenance",
                                    "records approver",
                                    "operations manager",
                                    "auditor",
                                    "integration",
                                ),
                            )
                        ),
                        name="duty_role_is_known",
                    )
                ],
            },
        ),
        migrations.CreateModel(
            name="Token",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                (
                    "operator",
                    models.ForeignKey(on_delete=django.db.models.deletion.PROTECT, to="fleet.operator"),
                ),
                (
                    "person",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="tokens",
                        to=settings.AUTH_USER_MODEL,
                    ),
                ),
                ("label", models.CharField(max_length=80)),
                ("digest", models.CharField(max_length=64, unique=True)),
                (
                    "scopes",
                    django.contrib.postgres.fields.ArrayField(
                        base_field=models.CharField(max_length=40), size=None
                    ),
                ),
                ("integration", models.BooleanField(default=False)),
                ("issued_at", models.DateTimeField()),
                ("expires_at", models.DateTimeField()),
                ("revoked_at", models.DateTimeField(null=True)),
            ],
            options={
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(("expires_at__gt", models.F("issued_at"))),
                        name="token_expires_after_it_is_issued",
                    )
                ],
            },
        ),
        migrations.CreateModel(
            name="Aircraft",
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
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="aircraft",
                        to="fleet.operator",
                    ),
                ),
                ("registration", models.CharField(max_length=12)),
                ("serial_number", models.CharField(max_length=40)),
                ("type", models.CharField(max_length=80)),
                ("category", models.CharField(max_length=20)),
                ("engines", models.PositiveSmallIntegerField()),
                ("passenger_seats", models.PositiveSmallIntegerField()),
            ],
            options={
                "constraints": [
                    models.UniqueConstraint(
                        fields=("operator", "registration"), name="aircraft_registration_is_taken_once"
                    ),
                    models.UniqueConstraint(
                        fields=("operator", "type", "serial_number"), name="aircraft_serial_is_taken_once"
                    ),
                    models.UniqueConstraint(fields=("id", "operator"), name="aircraft_is_of_one_operator"),
                    models.CheckConstraint(
                        condition=models.Q(("registration__regex", "^[A-Z0-9][A-Z0-9-]{1,11}$")),
                        name="aircraft_registration_is_plain",
                    ),
                    models.CheckConstraint(
                        condition=models.Q(("category__in", ["aeroplane", "helicopter"])),
                        name="aircraft_category_is_known",
                    ),
                ],
            },
        ),
    ]
