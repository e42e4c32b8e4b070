"""Brings every table of the room under guard: no row is written outside an act (`guard_table` is records' own SQL)."""

from django.db import migrations

GUARDS = [
    "'loads_load', key => '{id}', mode => 'append', operator => 'operator_id'",
    # What was declared names people: the trail keeps a salted digest, so the paper can be destroyed when its time comes.
    "'loads_declaration', key => '{load_id}', mode => 'append', operator => 'operator_id', personal => '{body}'",
    # A result is long; a salted digest of it in the trail finds any change of it just as well.
    "'loads_assessment', key => '{id}', mode => 'append', operator => 'operator_id', personal => '{result}'",
    "'loads_step', key => '{id}', mode => 'append', operator => 'operator_id'",
    "'loads_signature', key => '{id}', mode => 'append', operator => 'operator_id', personal => '{name,signed_from}'",
    "'loads_paper', key => '{load_id}', mode => 'append', operator => 'operator_id'",
    "'loads_filedpaper', key => '{paper_id}', mode => 'append', operator => 'operator_id'",
]
_EXEMPT = "'loads_allowedstep', 'a fixed list of pairs of states, written by migrations only', 'SELECT'"


class Migration(migrations.Migration):
    dependencies = [("loads", "0003_ties"), ("records", "0002_the_door")]

    operations = [
        *(migrations.RunSQL(f"SELECT guard_table({guard})", migrations.RunSQL.noop) for guard in GUARDS),
        migrations.RunSQL(f"SELECT exempt_table({_EXEMPT})", migrations.RunSQL.noop),
    ]
