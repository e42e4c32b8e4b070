"""Who asks for a second person is asked of the operator's settings in force at the acceptance, no longer of its row.

Before any version of the settings the operator's own row speaks, as `fleet.queries.settings` has it.
"""

from django.db import migrations

SETTING = """
CREATE OR REPLACE FUNCTION one_may_prepare_and_accept(of_operator text, at_instant timestamptz)
RETURNS boolean LANGUAGE sql STABLE SET search_path = public, pg_temp AS $$
    SELECT coalesce(
        (SELECT s.prepare_and_accept_by_one FROM fleet_operatorsettings s
         WHERE s.operator_id = of_operator AND s.true_from <= at_instant AND s.known_from <= at_instant
         ORDER BY s.true_from DESC, s.number DESC LIMIT 1),
        (SELECT o.prepare_and_accept_by_one FROM fleet_operator o WHERE o.code = of_operator))
$$
"""
BACKED = """
CREATE OR REPLACE FUNCTION step_is_backed() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NEW.after = 'superseded' THEN
        IF NOT EXISTS (SELECT FROM loads_load WHERE replaces_id = NEW.load_id) THEN
            PERFORM load_refuse('step_to_superseded_has_a_revision', 'only a revision supersedes a load');
        END IF;
        RETURN NULL;
    END IF;
    IF NOT EXISTS (SELECT FROM loads_signature WHERE step_id = NEW.id) THEN
        PERFORM load_refuse('step_is_signed', 'this step needs its signature in the same act');
    END IF;
    IF NEW.before = 'accepted' THEN
        IF NOT EXISTS (SELECT FROM loads_latechange WHERE step_id = NEW.id) THEN
            PERFORM load_refuse('step_of_a_late_change_says_what_changed',
                                'an accepted load is accepted again only with a last-minute change');
        END IF;
        RETURN NULL;
    END IF;
    IF NEW.after = 'accepted' AND NOT EXISTS (SELECT FROM loads_paper WHERE load_id = NEW.load_id AND act = NEW.act) THEN
        PERFORM load_refuse('step_of_acceptance_takes_a_number',
                            'an accepted load takes its manifest number in the same act');
    END IF;
    IF NEW.after = 'accepted' AND EXISTS (
        SELECT FROM loads_step earlier
        WHERE earlier.load_id = NEW.load_id AND earlier.after = 'prepared' AND earlier.assessment_id = NEW.assessment_id
          AND earlier.person_id = NEW.person_id AND NOT one_may_prepare_and_accept(NEW.operator_id, NEW.at)) THEN
        PERFORM load_refuse('step_of_acceptance_is_by_a_second_person', 'this operator asks for two people');
    END IF;
    RETURN NULL;
END $$
"""


class Migration(migrations.Migration):
    dependencies = [("fleet", "0005_operator_settings"), ("loads", "0007_late_ties")]

    # On the way back the function stays as it is here: it only asks one more table, which still stands then.
    operations = [
        migrations.RunSQL(SETTING, migrations.RunSQL.noop),
        migrations.RunSQL(BACKED, migrations.RunSQL.noop),
    ]
