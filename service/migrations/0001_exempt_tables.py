"""The tables of the libraries, none of which holds a business row: exempt from guard, each with its reason.

What the service role has no use for it may only read.
"""

from django.db import migrations

EXEMPT = [
    ("django_migrations", "which migrations have run; only the owner writes it", "SELECT"),
    ("django_content_type", "the names of the models; only migrations write it", "SELECT"),
    (
        "auth_permission",
        "Django's own permissions, which nothing here asks; only migrations write it",
        "SELECT",
    ),
    ("auth_group", "Django's own groups, which nothing here uses", "SELECT"),
    ("auth_group_permissions", "Django's own groups, which nothing here uses", "SELECT"),
    (
        "django_session",
        "who is signed in at a browser right now; no record",
        "SELECT, INSERT, UPDATE, DELETE",
    ),
    (
        "axes_accessattempt",
        "failed sign-ins, counted and forgotten: a stranger must not be able to fill an undeletable chain",
        "SELECT, INSERT, UPDATE, DELETE",
    ),
    ("axes_accessattemptexpiration", "deleted with the failed sign-ins; not in use", "SELECT, DELETE"),
    ("axes_accessfailurelog", "a second list of failed sign-ins; switched off", "SELECT"),
    ("axes_accesslog", "a list of sign-ins; switched off", "SELECT"),
]


def _call(name: str, reason: str, rights: str) -> str:
    quoted = ", ".join("'" + text.replace("'", "''") + "'" for text in (name, reason, rights))
    return f"SELECT exempt_table({quoted})"


class Migration(migrations.Migration):
    dependencies = [
        ("records", "0002_the_door"),
        ("auth", "0012_alter_user_first_name_max_length"),
        ("contenttypes", "0002_remove_content_type_name"),
        ("sessions", "0001_initial"),
        ("axes", "0010_accessattemptexpiration"),
    ]

    operations = [migrations.RunSQL(_call(*exempt), migrations.RunSQL.noop) for exempt in EXEMPT]
