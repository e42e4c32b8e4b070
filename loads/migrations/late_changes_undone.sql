-- Undoes late_changes.sql but for the two functions it replaced, which the migration takes from ties.sql again.

DROP FUNCTION stale_notice_is_of_an_accepted_load() CASCADE;
DROP FUNCTION note_is_after_departure() CASCADE;
DROP FUNCTION late_change_keeps_the_rule() CASCADE;
ALTER TABLE loads_stalenotice DROP CONSTRAINT stale_notice_is_of_an_assessment_of_its_load;
ALTER TABLE loads_note DROP CONSTRAINT note_is_by_a_person_of_its_operator;
ALTER TABLE loads_note DROP CONSTRAINT note_is_of_its_loads_operator;
ALTER TABLE loads_filedissue DROP CONSTRAINT filed_issue_is_of_its_changes_operator;
ALTER TABLE loads_latechange DROP CONSTRAINT late_change_keeps_a_bound_of_its_operator;
ALTER TABLE loads_latechange DROP CONSTRAINT late_changes_have_no_gaps;
ALTER TABLE loads_latechange DROP CONSTRAINT late_change_is_the_steps;
ALTER TABLE loads_step DROP CONSTRAINT step_keeps_the_assessment;
ALTER TABLE loads_step ALTER COLUMN carried SET EXPRESSION AS (CASE WHEN NOT (after = 'open') THEN assessment_id END);
ALTER TABLE loads_step ADD CONSTRAINT step_keeps_the_assessment
    FOREIGN KEY (load_id, previous, carried) REFERENCES loads_step (load_id, number, assessment_id);
DELETE FROM loads_allowedstep WHERE before = 'accepted' AND after = 'accepted';
