-- What must always hold of last-minute changes, notes after flight and notices of stale loads, named in words.

-- A last-minute change steps from "accepted" to "accepted": the one more step that brings another assessment.
INSERT INTO loads_allowedstep (before, after) VALUES ('accepted', 'accepted');
ALTER TABLE loads_step DROP CONSTRAINT step_keeps_the_assessment;
ALTER TABLE loads_step ALTER COLUMN carried SET EXPRESSION AS (
    CASE WHEN after <> 'open' AND NOT (before = 'accepted' AND after = 'accepted') THEN assessment_id END);
ALTER TABLE loads_step ADD CONSTRAINT step_keeps_the_assessment
    FOREIGN KEY (load_id, previous, carried) REFERENCES loads_step (load_id, number, assessment_id);

ALTER TABLE loads_latechange ADD CONSTRAINT late_change_is_the_steps
    FOREIGN KEY (step_id, load_id, assessment_id, person_id, operator_id, taken) REFERENCES loads_step (id, load_id, assessment_id, person_id, operator_id, after);
ALTER TABLE loads_latechange ADD CONSTRAINT late_changes_have_no_gaps
    FOREIGN KEY (load_id, previous) REFERENCES loads_latechange (load_id, number);
ALTER TABLE loads_latechange ADD CONSTRAINT late_change_keeps_a_bound_of_its_operator
    FOREIGN KEY (operator_id, settings_number) REFERENCES fleet_operatorsettings (operator_id, number);
ALTER TABLE loads_filedissue ADD CONSTRAINT filed_issue_is_of_its_changes_operator
    FOREIGN KEY (change_id, operator_id) REFERENCES loads_latechange (step_id, operator_id);
ALTER TABLE loads_note ADD CONSTRAINT note_is_of_its_loads_operator
    FOREIGN KEY (load_id, operator_id) REFERENCES loads_load (id, operator_id);
ALTER TABLE loads_note ADD CONSTRAINT note_is_by_a_person_of_its_operator
    FOREIGN KEY (person_id, operator_id) REFERENCES fleet_person (id, operator_id);
ALTER TABLE loads_stalenotice ADD CONSTRAINT stale_notice_is_of_an_assessment_of_its_load
    FOREIGN KEY (assessment_id, load_id, operator_id) REFERENCES loads_assessment (id, load_id, operator_id);

CREATE FUNCTION late_change_keeps_the_rule() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NOT EXISTS (SELECT FROM loads_step WHERE id = NEW.step_id AND before = 'accepted' AND act = NEW.act) THEN
        PERFORM load_refuse('late_change_starts_from_accepted', 'only an accepted load is changed at the last minute');
    END IF;
    IF NOT EXISTS (
        SELECT FROM fleet_operatorsettings s WHERE s.operator_id = NEW.operator_id AND s.number = NEW.settings_number
          AND s.last_minute_persons = NEW.persons_bound AND NEW.kilograms_bound = round(
              s.last_minute_weight::numeric * CASE s.last_minute_unit WHEN 'lb' THEN 0.45359237 ELSE 1 END, 12)) THEN
        PERFORM load_refuse('late_change_keeps_the_settings_bound', 'the bound is the one the settings state');
    END IF;
    IF EXISTS (
        SELECT FROM loads_latechange p WHERE p.load_id = NEW.load_id AND p.number = NEW.previous
          AND (p.kilograms_moved >= NEW.kilograms_moved OR p.persons_moved > NEW.persons_moved)) THEN
        PERFORM load_refuse('late_change_adds_to_the_sum', 'what moved is added up over all changes of a load');
    END IF;
    RETURN NULL;
END $$;

CREATE FUNCTION note_is_after_departure() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NOT EXISTS (SELECT FROM loads_step WHERE load_id = NEW.load_id AND after = 'departed') THEN
        PERFORM load_refuse(TG_NAME, 'a note is written after departure; before it, a load is revised');
    END IF;
    RETURN NULL;
END $$;

CREATE FUNCTION stale_notice_is_of_an_accepted_load() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NOT EXISTS (
        SELECT FROM loads_step WHERE load_id = NEW.load_id AND assessment_id = NEW.assessment_id AND after = 'accepted') THEN
        PERFORM load_refuse(TG_NAME, 'only of an accepted load it is told that it is stale');
    END IF;
    RETURN NULL;
END $$;

CREATE OR REPLACE FUNCTION assessment_is_brought_by_a_step() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NOT EXISTS (
        SELECT FROM loads_step WHERE assessment_id = NEW.id
          AND (after = 'open' OR (before = 'accepted' AND after = 'accepted'))) THEN
        PERFORM load_refuse(TG_NAME, 'an assessment comes into use by a step to open, or a last-minute change, in the same act');
    END IF;
    RETURN NULL;
END $$;

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
            PERFORM load_refuse('step_of_a_late_change_says_what_changed', 'an accepted load is accepted again only with a last-minute change');
        END IF;
        RETURN NULL;
    END IF;
    IF NEW.after = 'accepted' AND NOT EXISTS (SELECT FROM loads_paper WHERE load_id = NEW.load_id AND act = NEW.act) THEN
        PERFORM load_refuse('step_of_acceptance_takes_a_number', 'an accepted load takes its manifest number in the same act');
    END IF;
    IF NEW.after = 'accepted' AND EXISTS (
        SELECT FROM loads_step earlier JOIN fleet_operator o ON o.code = earlier.operator_id
        WHERE earlier.load_id = NEW.load_id AND earlier.after = 'prepared' AND earlier.assessment_id = NEW.assessment_id
          AND earlier.person_id = NEW.person_id AND NOT o.prepare_and_accept_by_one) THEN
        PERFORM load_refuse('step_of_acceptance_is_by_a_second_person', 'this operator asks for two people');
    END IF;
    RETURN NULL;
END $$;

CREATE TRIGGER late_change_keeps_the_rule AFTER INSERT ON loads_latechange
    FOR EACH ROW EXECUTE FUNCTION late_change_keeps_the_rule();
CREATE TRIGGER note_is_after_departure AFTER INSERT ON loads_note
    FOR EACH ROW EXECUTE FUNCTION note_is_after_departure();
CREATE TRIGGER stale_notice_is_of_an_accepted_load AFTER INSERT ON loads_stalenotice
    FOR EACH ROW EXECUTE FUNCTION stale_notice_is_of_an_accepted_load();
ALTER TABLE loads_latechange ENABLE ALWAYS TRIGGER late_change_keeps_the_rule;
ALTER TABLE loads_note ENABLE ALWAYS TRIGGER note_is_after_departure;
ALTER TABLE loads_stalenotice ENABLE ALWAYS TRIGGER stale_notice_is_of_an_accepted_load;
