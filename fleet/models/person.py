"""A human login, which is Django's user model here. One person belongs to one operator."""

from typing import ClassVar

from django.contrib.auth.base_user import AbstractBaseUser, BaseUserManager
from django.db import models
from django.db.models.functions import Lower

from fleet.models.operator import Operator


class People(BaseUserManager["Person"]):
    """Finds people by their login, whatever its case."""

    def get_by_natural_key(self, username: str | None) -> "Person":
        """This function will return the person with that login, ignoring case, or raise Person.DoesNotExist."""
        return self.get(login__iexact=username)


class Person(AbstractBaseUser):
    """A person. `login` and `name` are personal: the trail holds salted digests of them only."""

    # A sign-in is not a change of a business row, so there is nothing to keep here.
    last_login = None  # type: ignore[assignment]  # Django's own way to drop the inherited column

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, related_name="people")
    login = models.CharField(max_length=60)
    name = models.CharField(max_length=120)
    salt = models.BinaryField()
    is_active = models.BooleanField(default=True)

    USERNAME_FIELD = "login"
    REQUIRED_FIELDS: ClassVar[list[str]] = []
    objects = People()

    class Meta:
        constraints = [
            models.UniqueConstraint(Lower("login"), name="person_login_is_taken_once"),
            models.UniqueConstraint(fields=["id", "operator"], name="person_is_of_one_operator"),
            models.CheckConstraint(condition=models.Q(login__regex=r"^[A-Za-z0-9][A-Za-z0-9._-]{1,59}$"), name="person_login_is_plain"),
        ]
