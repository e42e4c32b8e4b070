"""Database expressions shared by the rows of the house."""

from typing import Any

from django.db import models


class Uuid7(models.Func):
    """PostgreSQL 18's own time-ordered identifier (RFC 9562, version 7)."""

    function = "uuidv7"
    output_field: Any = models.UUIDField()
