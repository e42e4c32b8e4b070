"""Work that a commit promised: the list is here, the broker only wakes a worker."""

from django.db import models


class Outbox(models.Model):
    """One promised piece of work. Written in the act's own transaction; `done_at` is set when it is done.

    Exempt from the trail: it is a to-do list, and what the work changes is witnessed by the work's own act.
    """

    id = models.BigAutoField(primary_key=True)
    task = models.CharField(max_length=80)
    key = models.CharField(max_length=120)
    operator_id = models.CharField(max_length=40)
    act = models.UUIDField()  # the act that caused it
    put_at = models.DateTimeField()
    tries = models.PositiveIntegerField(default=0)
    last_problem = models.CharField(max_length=300, blank=True)
    try_after = models.DateTimeField()
    done_at = models.DateTimeField(null=True)

    class Meta:
        constraints = [models.UniqueConstraint(fields=["task", "key"], name="outbox_task_is_promised_once")]
        # The sweeper looks only at what is not done; a partial index keeps that small for ever.
        indexes = [
            models.Index(
                fields=["try_after"], condition=models.Q(done_at__isnull=True), name="outbox_not_done"
            )
        ]

    def __str__(self) -> str:
        return f"{self.task}({self.key})"
