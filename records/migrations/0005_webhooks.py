"""Subscriptions to events, under guard; the list of what to send and the log of what was sent, exempt."""

import django.contrib.postgres.fields
import django.db.models.deletion
import django.db.models.expressions
from django.db import migrations, models

# Rows that belong together belong to one operator, and a step starts where the last one ended.
_TIES = """
ALTER TABLE records_webhook ADD CONSTRAINT webhook_is_of_its_operator UNIQUE (id, operator_id);
ALTER TABLE records_webhookevent ADD CONSTRAINT webhook_event_is_of_its_operator UNIQUE (id, operator_id);
ALTER TABLE records_webhookdelivery ADD CONSTRAINT webhook_delivery_is_of_its_operator UNIQUE (id, operator_id);
ALTER TABLE records_webhookstep ADD CONSTRAINT webhook_step_is_of_its_webhooks_operator
    FOREIGN KEY (webhook_id, operator_id) REFERENCES records_webhook (id, operator_id);
ALTER TABLE records_webhookstep ADD CONSTRAINT webhook_step_starts_where_the_last_ended
    FOREIGN KEY (webhook_id, previous, before) REFERENCES records_webhookstep (webhook_id, number, after);
ALTER TABLE records_webhooksecret ADD CONSTRAINT webhook_secret_is_of_its_webhooks_operator
    FOREIGN KEY (webhook_id, operator_id) REFERENCES records_webhook (id, operator_id);
ALTER TABLE records_webhookdelivery ADD CONSTRAINT webhook_delivery_is_of_its_webhooks_operator
    FOREIGN KEY (webhook_id, operator_id) REFERENCES records_webhook (id, operator_id);
ALTER TABLE records_webhookdelivery ADD CONSTRAINT webhook_delivery_is_of_its_events_operator
    FOREIGN KEY (event_id, operator_id) REFERENCES records_webhookevent (id, operator_id);
ALTER TABLE records_webhookattempt ADD CONSTRAINT webhook_attempt_is_of_its_deliverys_operator
    FOREIGN KEY (delivery_id, operator_id) REFERENCES records_webhookdelivery (id, operator_id);
"""
_TIES_UNDONE = """
ALTER TABLE records_webhookattempt DROP CONSTRAINT webhook_attempt_is_of_its_deliverys_operator;
ALTER TABLE records_webhookdelivery DROP CONSTRAINT webhook_delivery_is_of_its_events_operator;
ALTER TABLE records_webhookdelivery DROP CONSTRAINT webhook_delivery_is_of_its_webhooks_operator;
ALTER TABLE records_webhooksecret DROP CONSTRAINT webhook_secret_is_of_its_webhooks_operator;
ALTER TABLE records_webhookstep DROP CONSTRAINT webhook_step_starts_where_the_last_ended;
ALTER TABLE records_webhookstep DROP CONSTRAINT webhook_step_is_of_its_webhooks_operator;
ALTER TABLE records_webhookdelivery DROP CONSTRAINT webhook_delivery_is_of_its_operator;
ALTER TABLE records_webhookevent DROP CONSTRAINT webhook_event_is_of_its_operator;
ALTER TABLE records_webhook DROP CONSTRAINT webhook_is_of_its_operator;
"""
_GUARDS = (
    "SELECT guard_table('records_webhook', key => '{id}', mode => 'append', operator => 'operator_id')",
    "SELECT guard_table('records_webhookstep', key => '{id}', mode => 'append', operator => 'operator_id')",
    # Not even encrypted does a secret stand in the trail.
    (
        "SELECT guard_table('records_webhooksecret', key => '{id}', mode => 'close-once', "
        "operator => 'operator_id', hidden => '{sealed}', closes => '{ends_at}')"
    ),
    (
        "SELECT exempt_table('records_webhookevent', 'what subscribers are told, as bytes to send; what it tells "
        "of is witnessed by the act it names', 'SELECT, INSERT')"
    ),
    (
        "SELECT exempt_table('records_webhookdelivery', 'a list of what is to be sent to whom; subscribing, "
        "parking, replaying and ending are acts', 'SELECT, INSERT, UPDATE')"
    ),
    (
        "SELECT exempt_table('records_webhookattempt', 'a log of tries to reach a receiver, which would fill the "
        "chain for as long as a receiver is down; it is only added to', 'SELECT, INSERT')"
    ),
)


class Migration(migrations.Migration):
    dependencies = [
        ("records", "0004_receipts"),
    ]

    operations = [
        migrations.CreateModel(
            name="WebhookEvent",
            fields=[
                (
                    "id",
                    models.UUIDField(
                        db_default=models.Func(function="uuidv7", output_field=models.UUIDField()),
                        primary_key=True,
                        serialize=False,
                    ),
                ),
                ("operator_id", models.CharField(max_length=40)),
                ("name", models.CharField(max_length=60)),
                ("about", models.CharField(max_length=120)),
                ("body", models.TextField()),
                ("at", models.DateTimeField()),
                ("act", models.UUIDField()),
            ],
        ),
        migrations.CreateModel(
            name="Webhook",
            fields=[
                ("id", models.UUIDField(primary_key=True, serialize=False)),
                ("operator_id", models.CharField(max_length=40)),
                ("address", models.CharField(max_length=500)),
                (
                    "events",
                    django.contrib.postgres.fields.ArrayField(
                        base_field=models.CharField(max_length=60), size=None
                    ),
                ),
                ("label", models.CharField(max_length=80)),
                ("subscribed_at", models.DateTimeField()),
                ("act", models.UUIDField()),
            ],
            options={
                "indexes": [models.Index(fields=["operator_id"], name="webhook_by_operator")],
                "constraints": [
                    models.CheckConstraint(
                        condition=models.Q(("events__len__gt", 0)), name="webhook_is_told_of_something"
                    )
                ],
            },
        ),
        migrations.CreateModel(
            name="WebhookDelivery",
            fields=[
                (
                    "id",
                    models.UUIDField(
                        db_default=models.Func(function="uuidv7", output_field=models.UUIDField()),
                        primary_key=True,
                        serialize=False,
                    ),
                ),
                ("operator_id", models.CharField(max_length=40)),
                ("state", models.CharField(default="waiting", max_length=10)),
                ("failed", models.PositiveSmallIntegerField(default=0)),
                ("try_at", models.DateTimeField(null=True)),
                ("held_until", models.DateTimeField(null=True)),
                (
                    "webhook",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="deliveries",
                        to="records.webhook",
                    ),
                ),
                (
                    "event",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="deliveries",
                        to="records.webhookevent",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="WebhookAttempt",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("operator_id", models.CharField(max_length=40)),
                ("at", models.DateTimeField()),
                ("milliseconds", models.PositiveIntegerField()),
                ("outcome", models.CharField(max_length=30)),
                ("status", models.PositiveSmallIntegerField(null=True)),
                ("detail", models.CharField(blank=True, max_length=200)),
                (
                    "delivery",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="attempts",
                        to="records.webhookdelivery",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="WebhookSecret",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("operator_id", models.CharField(max_length=40)),
                ("sealed", models.BinaryField()),
                ("made_at", models.DateTimeField()),
                ("ends_at", models.DateTimeField(null=True)),
                (
                    "webhook",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="secrets",
                        to="records.webhook",
                    ),
                ),
            ],
        ),
        migrations.CreateModel(
            name="WebhookStep",
            fields=[
                ("id", models.BigAutoField(primary_key=True, serialize=False)),
                ("operator_id", models.CharField(max_length=40)),
                ("number", models.PositiveIntegerField()),
                ("previous", models.PositiveIntegerField(null=True)),
                ("before", models.CharField(blank=True, max_length=10)),
                ("after", models.CharField(max_length=10)),
                ("because", models.CharField(max_length=200)),
                ("at", models.DateTimeField()),
                ("act", models.UUIDField()),
                (
                    "webhook",
                    models.ForeignKey(
                        on_delete=django.db.models.deletion.PROTECT,
                        related_name="steps",
                        to="records.webhook",
                    ),
                ),
            ],
        ),
        migrations.AddIndex(
            model_name="webhookdelivery",
            index=models.Index(
                condition=models.Q(("state", "waiting")), fields=["try_at"], name="webhook_delivery_waiting"
            ),
        ),
        migrations.AddIndex(
            model_name="webhookdelivery",
            index=models.Index(
                models.F("webhook"),
                models.OrderBy(models.F("id"), descending=True),
                name="webhook_delivery_newest",
            ),
        ),
        migrations.AddConstraint(
            model_name="webhookdelivery",
            constraint=models.UniqueConstraint(
                fields=("webhook", "event"), name="webhook_event_is_delivered_once"
            ),
        ),
        migrations.AddConstraint(
            model_name="webhookdelivery",
            constraint=models.CheckConstraint(
                condition=models.Q(("state__in", ("waiting", "delivered", "parked", "ended"))),
                name="webhook_delivery_state",
            ),
        ),
        migrations.AddConstraint(
            model_name="webhookdelivery",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("state", "waiting"), ("try_at__isnull", False)),
                    models.Q(models.Q(("state", "waiting"), _negated=True), ("try_at", None)),
                    _connector="OR",
                ),
                name="webhook_delivery_waits_for_a_moment",
            ),
        ),
        migrations.AddConstraint(
            model_name="webhooksecret",
            constraint=models.CheckConstraint(
                condition=models.Q(("ends_at", None), ("ends_at__gte", models.F("made_at")), _connector="OR"),
                name="webhook_secret_ends_after_it_is_made",
            ),
        ),
        migrations.AddConstraint(
            model_name="webhooksecret",
            constraint=models.UniqueConstraint(
                condition=models.Q(("ends_at", None)),
                fields=("webhook",),
                name="webhook_has_one_secret_without_end",
            ),
        ),
        migrations.AddConstraint(
            model_name="webhookstep",
            constraint=models.UniqueConstraint(
                fields=("webhook", "number"), name="webhook_step_is_taken_once"
            ),
        ),
        migrations.AddConstraint(
            model_name="webhookstep",
            constraint=models.UniqueConstraint(
                fields=("webhook", "number", "after"), name="webhook_step_leads_on"
            ),
        ),
        migrations.AddConstraint(
            model_name="webhookstep",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("after", "live"), ("before", "")),
                    models.Q(("after", "parked"), ("before", "live")),
                    models.Q(("after", "live"), ("before", "parked")),
                    models.Q(("after", "ended"), ("before__in", ("live", "parked"))),
                    _connector="OR",
                ),
                name="webhook_step_is_allowed",
            ),
        ),
        migrations.AddConstraint(
            model_name="webhookstep",
            constraint=models.CheckConstraint(
                condition=models.Q(
                    models.Q(("before", ""), ("number", 1), ("previous", None)),
                    models.Q(
                        (
                            "number",
                            django.db.models.expressions.CombinedExpression(
                                models.F("previous"), "+", models.Value(1)
                            ),
                        ),
                        models.Q(("before", ""), _negated=True),
                    ),
                    _connector="OR",
                ),
                name="webhook_steps_follow_each_other",
            ),
        ),
        migrations.RunSQL(_TIES, _TIES_UNDONE),
        *(migrations.RunSQL(guard, migrations.RunSQL.noop) for guard in _GUARDS),
    ]
