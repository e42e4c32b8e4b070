"""A person's own mail address: personal, like login and name."""

from django.db import migrations, models

# Given again as a whole: login, name and mail are personal; of the password the trail says only whether it changed.
GUARD = (
    "SELECT guard_table('fleet_person', key => '{id}', mode => 'edit', operator => 'operator_id', "
    "personal => '{login,name,mail}', hidden => '{password}')"
)


class Migration(migrations.Migration):
    dependencies = [("fleet", "0006_secrets_and_sessions"), ("records", "0002_the_door")]

    operations = [
        migrations.AddField(
            model_name="person",
            name="mail",
            field=models.CharField(blank=True, default="", max_length=254),
        ),
        migrations.RunSQL(GUARD, migrations.RunSQL.noop),
    ]
