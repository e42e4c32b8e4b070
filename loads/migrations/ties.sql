-- What must always hold between the rows of a load, as foreign keys and triggers named in words.
--
-- The foreign keys over several columns are immediate: they refuse the row, not the commit. What can be asked only when the
-- act is whole (a signed step has its signature, an accepted load its number) is asked by deferred triggers that only read.

-- The pairs of `loads.lifecycle.STEPS`, and the beginning; a test compares the two.
INSERT INTO loads_allowedstep (before, after) VALUES
    ('', 'open'),
    ('open', 'open'),
    ('open', 'prepared'),
    ('open', 'superseded'),
    ('open', 'withdrawn'),
    ('prepared', 'open'),
    ('prepared', 'loaded'),
    ('prepared', 'accepted'),
    ('prepared', 'superseded'),
    ('prepared', 'withdrawn'),
    ('loaded', 'open'),
    ('loaded', 'accepted'),
    ('loaded', 'superseded'),
    ('loaded', 'withdrawn'),
    ('accepted', 'departed'),
    ('accepted', 'superseded'),
    ('accepted', 'withdrawn');

ALTER TABLE loads_load ADD CONSTRAINT load_has_aircraft_of_its_operator
    FOREIGN KEY (aircraft_id, operator_id) REFERENCES fleet_aircraft (id, operator_id);
ALTER TABLE loads_load ADD CONSTRAINT load_has_pilot_of_its_operator
    FOREIGN KEY (pilot_id, operator_id) REFERENCES fleet_person (id, operator_id);
ALTER TABLE loads_load ADD CONSTRAINT load_replaces_one_of_its_operator
    FOREIGN KEY (replaces_id, operator_id) REFERENCES loads_load (id, operator_id);
ALTER TABLE loads_declaration ADD CONSTRAINT declaration_is_of_its_loads_operator
    FOREIGN KEY (load_id, operator_id) REFERENCES loads_load (id, operator_id);
ALTER TABLE loads_assessment ADD CONSTRAINT assessment_is_of_its_loads_operator
    FOREIGN KEY (load_id, operator_id) REFERENCES loads_load (id, operator_id);
ALTER TABLE loads_step ADD CONSTRAINT step_is_allowed
    FOREIGN KEY (before, after) REFERENCES loads_allowedstep (before, after);
ALTER TABLE loads_step ADD CONSTRAINT step_starts_where_the_last_ended
    FOREIGN KEY (load_id, previous, before) REFERENCES loads_step (load_id, number, after);
ALTER TABLE loads_step ADD CONSTRAINT step_keeps_the_assessment
    FOREIGN KEY (load_id, previous, carried) REFERENCES loads_step (load_id, number, assessment_id);
ALTER TABLE loads_step ADD CONSTRAINT step_has_an_assessment_of_its_load
    FOREIGN KEY (assessment_id, load_id, operator_id) REFERENCES loads_assessment (id, load_id, operator_id);
ALTER TABLE loads_step ADD CONSTRAINT step_is_by_a_person_of_its_operator
    FOREIGN KEY (person_id, operator_id) REFERENCES fleet_person (id, operator_id);
ALTER TABLE loads_step ADD CONSTRAINT step_of_acceptance_is_the_pilots
    FOREIGN KEY (load_id, acceptor) REFERENCES loads_load (id, pilot_id);
ALTER TABLE loads_signature ADD CONSTRAINT signature_is_under_what_was_shown
    FOREIGN KEY (assessment_id, load_id, digest, signable) REFERENCES loads_assessment (id, load_id, digest, verdict);
ALTER TABLE loads_signature ADD CONSTRAINT signature_is_the_steps
    FOREIGN KEY (step_id, load_id, assessment_id, person_id, operator_id, meaning) REFERENCES loads_step (id, load_id, assessment_id, person_id, operator_id, after);
ALTER TABLE loads_paper ADD CONSTRAINT paper_is_of_its_loads_operator
    FOREIGN KEY (load_id, operator_id) REFERENCES loads_load (id, operator_id);
ALTER TABLE loads_paper ADD CONSTRAINT paper_follows_the_one_before
    FOREIGN KEY (operator_id, previous) REFERENCES loads_paper (operator_id, number);
ALTER TABLE loads_filedpaper ADD CONSTRAINT filed_paper_is_of_its_papers_operator
    FOREIGN KEY (paper_id, operator_id) REFERENCES loads_paper (load_id, operator_id);

CREATE FUNCTION load_refuse(tie text, sentence text) RETURNS void LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    RAISE EXCEPTION '%', sentence USING ERRCODE = 'check_violation', CONSTRAINT = tie;
END $$;

CREATE FUNCTION load_is_complete() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NOT EXISTS (SELECT FROM loads_declaration WHERE load_id = NEW.id)
       OR NOT EXISTS (SELECT FROM loads_step WHERE load_id = NEW.id AND number = 1) THEN
        PERFORM load_refuse('load_is_complete', 'a load needs its declaration and its first step in the same act');
    END IF;
    IF NEW.replaces_id IS NOT NULL AND NOT EXISTS (
        SELECT FROM loads_step WHERE load_id = NEW.replaces_id AND after = 'superseded') THEN
        PERFORM load_refuse('load_supersedes_what_it_replaces', 'a revision supersedes the load it replaces in the same act');
    END IF;
    RETURN NULL;
END $$;

CREATE FUNCTION assessment_uses_versions_of_its_aircraft() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF (NEW.loading_basis_id IS NOT NULL AND NOT EXISTS (
            SELECT FROM loads_load l JOIN fleet_loadingbasis b ON b.aircraft_id = l.aircraft_id
            WHERE l.id = NEW.load_id AND b.id = NEW.loading_basis_id))
       OR (NEW.empty_weight_id IS NOT NULL AND NOT EXISTS (
            SELECT FROM loads_load l JOIN fleet_emptyweight e ON e.aircraft_id = l.aircraft_id
            WHERE l.id = NEW.load_id AND e.id = NEW.empty_weight_id)) THEN
        PERFORM load_refuse(TG_NAME, 'an assessment uses versions of the aircraft of its load');
    END IF;
    RETURN NULL;
END $$;

CREATE FUNCTION assessment_is_brought_by_a_step() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NOT EXISTS (SELECT FROM loads_step WHERE assessment_id = NEW.id AND after = 'open') THEN
        PERFORM load_refuse(TG_NAME, 'an assessment comes into use by a step to open in the same act');
    END IF;
    RETURN NULL;
END $$;

CREATE FUNCTION step_is_backed() RETURNS trigger LANGUAGE plpgsql
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

CREATE FUNCTION paper_is_of_an_accepted_load() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NOT EXISTS (SELECT FROM loads_step WHERE load_id = NEW.load_id AND after = 'accepted' AND act = NEW.act) THEN
        PERFORM load_refuse(TG_NAME, 'a manifest number is taken only in the act of acceptance');
    END IF;
    RETURN NULL;
END $$;

CREATE CONSTRAINT TRIGGER load_is_complete AFTER INSERT ON loads_load
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION load_is_complete();
CREATE TRIGGER assessment_uses_versions_of_its_aircraft AFTER INSERT ON loads_assessment
    FOR EACH ROW EXECUTE FUNCTION assessment_uses_versions_of_its_aircraft();
CREATE CONSTRAINT TRIGGER assessment_is_brought_by_a_step AFTER INSERT ON loads_assessment
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION assessment_is_brought_by_a_step();
CREATE CONSTRAINT TRIGGER step_is_backed AFTER INSERT ON loads_step
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW
    WHEN (NEW.after IN ('prepared', 'loaded', 'accepted', 'superseded')) EXECUTE FUNCTION step_is_backed();
CREATE CONSTRAINT TRIGGER paper_is_of_an_accepted_load AFTER INSERT ON loads_paper
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION paper_is_of_an_accepted_load();

ALTER TABLE loads_load ENABLE ALWAYS TRIGGER load_is_complete;
ALTER TABLE loads_assessment ENABLE ALWAYS TRIGGER assessment_uses_versions_of_its_aircraft;
ALTER TABLE loads_assessment ENABLE ALWAYS TRIGGER assessment_is_brought_by_a_step;
ALTER TABLE loads_step ENABLE ALWAYS TRIGGER step_is_backed;
ALTER TABLE loads_paper ENABLE ALWAYS TRIGGER paper_is_of_an_accepted_load;
