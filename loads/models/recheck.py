"""Loads computed again against a later figure: what was asked, how far it is, what came of it, and flags."""

from django.contrib.postgres.fields import ArrayField
from django.db import models
from django.db.models import Q

from fleet.models import Aircraft, EmptyWeight, LoadingBasis, Operator, Person, Provision
from fleet.models.rows import Uuid7
from loads.models.assessment import Assessment
from loads.models.load import Load


class Recheck(models.Model):
    """What is computed again against what. Rows are only added.

    Without an aircraft: the whole operator's loads. Versions that are named take the place of those a load
    was assessed with; with none named each load is computed with what is in force now at its departure.
    """

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    aircraft = models.ForeignKey(Aircraft, on_delete=models.PROTECT, null=True, related_name="+")
    empty_weight = models.ForeignKey(EmptyWeight, on_delete=models.PROTECT, null=True, related_name="+")
    loading_basis = models.ForeignKey(LoadingBasis, on_delete=models.PROTECT, null=True, related_name="+")
    standard_weights = models.ForeignKey(Provision, on_delete=models.PROTECT, null=True, related_name="+")
    since = models.DateTimeField(null=True)  # planned departures from this one on, it included
    until = models.DateTimeField(null=True)  # and before this one
    reason = models.CharField(max_length=500, blank=True)
    engine = models.CharField(max_length=20)
    asked_by = models.ForeignKey(Person, on_delete=models.PROTECT, null=True, related_name="+")
    asked_at = models.DateTimeField()  # also the instant on the "known" clock
    act = models.UUIDField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["id", "operator"], name="recheck_is_of_one_operator"),
            models.CheckConstraint(
                condition=Q(aircraft__isnull=False)
                | Q(empty_weight__isnull=True, loading_basis__isnull=True),
                name="recheck_against_an_aircrafts_version_names_the_aircraft",
            ),
            models.CheckConstraint(
                condition=Q(since__isnull=True) | Q(until__isnull=True) | Q(until__gt=models.F("since")),
                name="recheck_ends_after_it_begins",
            ),
        ]
        indexes = [models.Index(fields=["operator", "-asked_at"], name="recheck_lately")]

    def __str__(self) -> str:
        return f"recheck {self.id}"


class RecheckPart(models.Model):
    """One part of the work: the loads of it, and once it is done, how many came out how.

    Exempt from the trail: a list of work that can be done again at any time, like the outbox.
    """

    id = models.BigAutoField(primary_key=True)
    recheck = models.ForeignKey(Recheck, on_delete=models.PROTECT, related_name="parts")
    number = models.PositiveIntegerField()
    loads = ArrayField(models.UUIDField())
    done_at = models.DateTimeField(null=True)
    same = models.PositiveIntegerField(default=0)
    changed = models.PositiveIntegerField(default=0)
    not_computed = models.PositiveIntegerField(default=0)
    other_fit = models.PositiveIntegerField(default=0)  # flown on another base fit than the empty weight's
    gone = models.PositiveIntegerField(default=0)  # replaced or withdrawn since the work was parted
    exactly = models.PositiveIntegerField(default=0)  # of them computed one by one, not in bulk

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["recheck", "number"], name="recheck_part_is_planned_once")
        ]

    def __str__(self) -> str:
        return f"part {self.number} of recheck {self.recheck_id}"


class RecheckedLoad(models.Model):
    """A load whose verdict came out otherwise, or that could not be computed (`now` is then "not computed").

    Exempt from the trail like its part. `limit` and `excess` are those of the first limit that is broken.
    """

    id = models.BigAutoField(primary_key=True)
    recheck = models.ForeignKey(Recheck, on_delete=models.PROTECT, related_name="rows")
    part = models.PositiveIntegerField()
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="+")
    assessment = models.ForeignKey(Assessment, on_delete=models.PROTECT, related_name="+")
    verdict = models.CharField(max_length=12)
    now = models.CharField(max_length=12)
    code = models.CharField(max_length=120, blank=True)
    limit = models.CharField(max_length=300, blank=True)
    excess = models.CharField(max_length=500, blank=True)

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["recheck", "load"], name="rechecked_load_is_listed_once")
        ]

    def __str__(self) -> str:
        return f"load {self.load_id}: {self.verdict}, now {self.now}"


class RecheckResult(models.Model):
    """What came of a recheck: counts, and the digest of its whole table. Rows are only added."""

    recheck = models.OneToOneField(Recheck, primary_key=True, on_delete=models.PROTECT, related_name="result")
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    loads = models.PositiveIntegerField()
    same = models.PositiveIntegerField()
    changed = models.PositiveIntegerField()
    not_computed = models.PositiveIntegerField()
    other_fit = models.PositiveIntegerField()
    gone = models.PositiveIntegerField()
    flagged = models.PositiveIntegerField()
    table_digest = models.CharField(max_length=64)
    finished_at = models.DateTimeField()
    act = models.UUIDField()

    def __str__(self) -> str:
        return f"result of recheck {self.recheck_id}"


class LoadFlag(models.Model):
    """A later figure puts a flight outside that was within. Rows are only added; the filed record stays."""

    id = models.UUIDField(primary_key=True, db_default=Uuid7(), editable=False)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="flags")
    recheck = models.ForeignKey(Recheck, on_delete=models.PROTECT, related_name="flags")
    assessment = models.ForeignKey(Assessment, on_delete=models.PROTECT, related_name="+")
    now = models.CharField(max_length=12)
    limit = models.CharField(max_length=300, blank=True)
    excess = models.CharField(max_length=500, blank=True)
    flagged_at = models.DateTimeField()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["load", "recheck"], name="load_is_flagged_once_a_recheck"),
            models.CheckConstraint(
                condition=Q(now__in=["outside", "unresolved"]), name="load_flag_says_what_is_wrong"
            ),
        ]

    def __str__(self) -> str:
        return f"load {self.load_id} is {self.now} by recheck {self.recheck_id}"
