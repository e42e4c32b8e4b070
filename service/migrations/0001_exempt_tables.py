"""Tables of the framework that no act writes, each with the reason, and the rights the service role has on them."""

from django.db import migrations

_ALL = "SELECT, INSERT, UPDATE, DELETE"
_EXEMPT = (
    ("django_migrations", "what was migrated; written by the owner only", "SELECT"),
    ("django_content_type", "a list of models; written by migrations only", "SELECT"),
    ("auth_permission", "not used: what an actor may do comes from duties", "SELECT"),
    ("auth_group", "not used: what an actor may do comes from duties", "SELECT"),
    ("auth_group_permissions", "not used: what an actor may do comes from duties", "SELECT"),
    ("django_session", "who is signed in at this moment; changes no business row", _ALL),
    (
        "axes_accessattempt",
        "failures to sign in, counted to lock out; a stranger could fill the trail with them",
        _ALL,
    ),
    ("axes_accessattemptexpiration", "when a lock-out ends", _ALL),
    ("axes_accessfailurelog", "failures to sign in; a stranger could fill the trail with them", _ALL),
    ("axes_accesslog", "not used: sign-ins are not logged here", _ALL),
)


class Migration(migrations.Migration):
    dependencies = (
        ("records", "0002_the_door"),
        ("contenttypes", "0002_remove_content_type_name"),
        ("auth", "0012_alter_user_first_name_max_length"),
        ("sessions", "0001_initial"),
        ("axes", "0010_accessattemptexpiration"),
    )
    operations = tuple(
        migrations.RunSQL(f"SELECT exempt_table('{table}', '{reason}', '{rights}')", migrations.RunSQL.noop)
        for table, reason, rights in _EXEMPT
    )
