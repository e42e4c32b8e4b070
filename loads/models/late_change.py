"""Last-minute changes of an accepted load, and the documents their reissued manifests became."""

from django.db import models

from fleet.models import Operator, Person
from loads.models.assessment import Assessment
from loads.models.load import Load
from loads.models.step import Step


class LateChange(models.Model):
    """One last-minute change: the step that accepted it, what moved, and the load as declared from then on.

    `lines` are settled lines (`loads.balance.late_change`) and `body` is the changed document, both canonical
    JSON; both may name people. What moved is added up over all changes of the load, this one included, beside
    the bound it had to keep and the version of the settings that set it.

    In the database besides what stands here, as foreign keys: (step, load, assessment, person, operator,
    taken) is a step to "accepted" by that person; (load, previous) is the change before; (operator,
    settings_number) are settings. Triggers: the step starts from "accepted", the bound is that of the
    settings, the sums never fall.
    """

    step = models.OneToOneField(Step, primary_key=True, on_delete=models.PROTECT, related_name="late_change")
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    load = models.ForeignKey(Load, on_delete=models.PROTECT, related_name="late_changes")
    number = models.PositiveSmallIntegerField()
    previous = models.PositiveSmallIntegerField(null=True)
    assessment = models.OneToOneField(Assessment, on_delete=models.PROTECT, related_name="late_change")
    person = models.ForeignKey(Person, on_delete=models.PROTECT, related_name="+")
    lines = models.TextField()
    body = models.BinaryField()
    salt = models.BinaryField()
    settings_number = models.PositiveIntegerField()
    # Kilograms to twelve decimals: a pound has eight, and bounds and weights as typed fit as they are.
    kilograms_moved = models.DecimalField(max_digits=28, decimal_places=12)
    kilograms_bound = models.DecimalField(max_digits=28, decimal_places=12)
    persons_moved = models.PositiveSmallIntegerField()
    persons_bound = models.PositiveSmallIntegerField()
    changed_at = models.DateTimeField()
    act = models.UUIDField()  # the act of this change; its seal is what the reissued manifest prints
    taken = models.GeneratedField(
        expression=models.Value("accepted"), output_field=models.CharField(max_length=12), db_persist=True
    )

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["load", "number"], name="late_change_number_is_taken_once"),
            models.UniqueConstraint(fields=["step", "operator"], name="late_change_is_of_one_operator"),
            models.CheckConstraint(
                condition=models.Q(number=1, previous__isnull=True)
                | models.Q(number__gt=1, previous__isnull=False, previous=models.F("number") - 1),
                name="late_change_follows_the_one_before",
            ),
            models.CheckConstraint(
                condition=models.Q(kilograms_moved__gt=0)
                & models.Q(kilograms_moved__lte=models.F("kilograms_bound"))
                & models.Q(persons_moved__lte=models.F("persons_bound")),
                name="late_change_is_within_its_bound",
            ),
        ]

    def __str__(self) -> str:
        return f"last-minute change {self.number} of load {self.load_id}"

    @property
    def issue(self) -> int:
        """The issue of the manifest that shows this change; the first issue shows none."""
        return self.number + 1


class FiledIssue(models.Model):
    """The one filed document of a reissued manifest; the earlier ones stay where they are."""

    change = models.OneToOneField(
        LateChange, primary_key=True, on_delete=models.PROTECT, related_name="filed"
    )
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT)
    document = models.ForeignKey("records.Document", on_delete=models.PROTECT)
    filed_at = models.DateTimeField()

    def __str__(self) -> str:
        return f"the filed paper of change {self.change_id}"
