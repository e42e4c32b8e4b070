"""Database expressions shared by the rows of the house."""

from functools import partial

from django.db import models

# PostgreSQL 18's own time-ordered identifier (RFC 9562, version 7). A plain Func, so that migrations name
# Django's class and nothing of ours.
Uuid7 = partial(models.Func, function="uuidv7", output_field=models.UUIDField())
