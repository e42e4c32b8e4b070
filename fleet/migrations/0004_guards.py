"""Brings every table of the room under guard: no row is written outside an act (`guard_table` is records' own SQL)."""

from django.db import migrations

GUARDS = [
    "'fleet_operator', key => '{code}', mode => 'append', operator => 'code'",
    # Login and name are personal; of the password the trail says only whether it changed.
    "'fleet_person', key => '{id}', mode => 'edit', operator => 'operator_id', personal => '{login,name}', hidden => '{password}'",
    "'fleet_duty', key => '{id}', mode => 'append', operator => 'operator_id'",
    "'fleet_token', key => '{id}', mode => 'close-once', operator => 'operator_id', closes => '{revoked_at}'",
    "'fleet_aircraft', key => '{id}', mode => 'append', operator => 'operator_id'",
    "'fleet_loadingbasis', key => '{id}', mode => 'append', operator => 'operator_id'",
    # The document names who signed the weighing report.
    "'fleet_emptyweight', key => '{id}', mode => 'append', operator => 'operator_id', personal => '{document}'",
    "'fleet_approval', key => '{id}', mode => 'append', operator => 'operator_id'",
    "'fleet_standing', key => '{id}', mode => 'close-once', operator => 'operator_id', closes => '{known}'",
]


class Migration(migrations.Migration):
    dependencies = [("fleet", "0003_ties"), ("records", "0002_the_door")]

    operations = [
        migrations.RunSQL(f"SELECT guard_table({guard})", migrations.RunSQL.noop) for guard in GUARDS
    ]
