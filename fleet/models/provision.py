"""What an operator lays down for a time: tables of standard weights, rules, restrictions, permits."""

from django.db import models
from django.db.models import F, Q

from fleet.models.aircraft import Aircraft
from fleet.models.operator import Operator
from fleet.models.person import Person
from fleet.models.rows import Uuid7


class Provision(models.Model):
    """One version: the document of its kind as canonical JSON text, and its SHA-256. Rows are only added.

    Standard weights and rules are the operator's; of them the approved one with the latest beginning counts,
    of equals the one approved last. Restrictions and permits are one aircraft's and hold side by side, from
    `true_from` until `true_until`, which is not included. `number` counts within its kind.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, related_name="provisions")
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT, null=True, related_name="provisions")
    kind = models.CharField(max_length=20)
    number = models.PositiveIntegerField()
    document = models.TextField()
    digest = models.CharField(max_length=64)
    true_from = models.DateTimeField()
    true_until = models.DateTimeField(null=True)
    entered_by = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    entered_at = models.DateTimeField()

    class Meta:
        constraints = [
            models.UniqueConstraint(
                fields=["operator", "kind", "number"],
                condition=Q(aircraft__isnull=True),
                name="provision_number_is_taken_once",
            ),
            models.UniqueConstraint(
                fields=["aircraft", "kind", "number"], name="provision_number_of_an_aircraft_is_taken_once"
            ),
            models.UniqueConstraint(fields=["id", "operator"], name="provision_is_of_one_operator"),
            models.UniqueConstraint(fields=["id", "entered_by"], name="provision_has_one_author"),
            models.UniqueConstraint(fields=["id", "kind"], name="provision_is_of_one_kind"),
            models.CheckConstraint(
                condition=Q(kind__in=["standard weights", "rules"], aircraft__isnull=True)
                | Q(kind__in=["restriction", "permit"], aircraft__isnull=False),
                name="provision_is_the_operators_or_one_aircrafts",
            ),
            models.CheckConstraint(
                condition=Q(true_until__isnull=True, kind__in=["standard weights", "rules", "restriction"])
                | Q(
                    true_until__isnull=False,
                    true_until__gt=F("true_from"),
                    kind__in=["restriction", "permit"],
                ),
                name="provision_permit_lapses",
            ),
            models.CheckConstraint(
                condition=Q(digest__regex=r"^[0-9a-f]{64}$"), name="provision_digest_is_sha256"
            ),
            models.CheckConstraint(condition=Q(number__gte=1), name="provision_counts_from_one"),
        ]

    def __str__(self) -> str:
        return f"{self.kind} {self.number}"


class ProvisionApproval(models.Model):
    """The second person's approval of a version; from `known_from` on it is held true.

    Author and kind are repeated so that keys and checks can hold the two people apart. A restriction needs
    none: it binds from its entry.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, related_name="+")
    provision = models.OneToOneField(Provision, on_delete=models.PROTECT, related_name="approval")
    kind = models.CharField(max_length=20)
    entered_by = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    approved_by = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    known_from = models.DateTimeField()

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=~Q(approved_by=F("entered_by")), name="provision_approval_is_by_a_second_person"
            ),
            models.CheckConstraint(
                condition=Q(kind__in=["standard weights", "rules", "permit"]),
                name="provision_approval_is_of_what_needs_one",
            ),
        ]

    def __str__(self) -> str:
        return f"approval of {self.provision_id}"


class ProvisionEnd(models.Model):
    """That a restriction was lifted or a permit ended, at `true_from`, as known from `known_from`.

    Lifting a restriction widens what is allowed, so it takes another person than entered it.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, related_name="+")
    provision = models.OneToOneField(Provision, on_delete=models.PROTECT, related_name="ending")
    kind = models.CharField(max_length=20)
    entered_by = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    ended_by = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    true_from = models.DateTimeField()
    known_from = models.DateTimeField()
    reason = models.CharField(max_length=400)

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=Q(kind="permit") | Q(kind="restriction") & ~Q(ended_by=F("entered_by")),
                name="provision_end_of_a_restriction_is_by_a_second_person",
            ),
            models.CheckConstraint(condition=~Q(reason=""), name="provision_end_says_why"),
        ]

    def __str__(self) -> str:
        return f"end of {self.provision_id}"
