"""A human login, which is Django's user model here. One person belongs to one operator."""

from typing import ClassVar

from django.contrib.auth.base_user import AbstractBaseUser, BaseUserManager
from django.contrib.auth.hashers import check_password
from django.db import models
from django.utils.crypto import salted_hmac

from fleet.models.operator import Operator


class People(BaseUserManager["Person"]):
    """Finds people by their login, which is kept in lower case."""

    def get_by_natural_key(self, username: str | None) -> "Person":
        """This function will return the person with that login in any case, or raise Person.DoesNotExist."""
        return self.get(login=(username or "").lower())


class Person(AbstractBaseUser):
    """A person. `login` (lower case), `name` and `mail` are personal: the trail holds only their digests."""

    # A sign-in is not a change of a business row, so there is nothing to keep here.
    last_login = None  # Django's own way to drop the inherited column

    id = models.BigAutoField(primary_key=True)
    operator = models.ForeignKey(Operator, on_delete=models.PROTECT, related_name="people")
    login = models.CharField(max_length=60)
    name = models.CharField(max_length=120)
    mail = models.CharField(max_length=254, blank=True, default="")
    salt = models.BinaryField()
    is_active = models.BooleanField(default=True)
    # Raised to end every session at once: each session carries a digest of password hash and series.
    session_series = models.PositiveIntegerField(default=0)

    USERNAME_FIELD = "login"
    EMAIL_FIELD = "mail"
    REQUIRED_FIELDS: ClassVar[list[str]] = []
    objects = People()

    class Meta:
        constraints = [
            models.UniqueConstraint(fields=["login"], name="person_login_is_taken_once"),
            models.UniqueConstraint(fields=["id", "operator"], name="person_is_of_one_operator"),
            models.CheckConstraint(
                condition=models.Q(login__regex=r"^[a-z0-9][a-z0-9._-]{1,59}$"),
                name="person_login_is_plain",
            ),
        ]

    def __str__(self) -> str:
        return f"person:{self.pk}"  # never the name: this lands in logs

    def check_password(self, raw_password: str | None) -> bool:
        """This function will say whether this is the person's password, and change nothing.

        Django's own would save a stronger hash in passing, which the database refuses outside an act;
        `fleet.actions.change_password.renew_hash` does that openly.
        """
        return check_password(raw_password, self.password)

    def _get_session_auth_hash(self, secret: str | None = None) -> str:
        """This function will return what a session must carry to be of today; Django's own knows no
        series.
        """
        of_today = f"{self.password}\n{self.session_series}"
        return salted_hmac("fleet.person.session", of_today, secret=secret, algorithm="sha256").hexdigest()
