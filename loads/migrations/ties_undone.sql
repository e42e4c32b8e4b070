-- Undoes ties.sql.

DROP FUNCTION paper_is_of_an_accepted_load() CASCADE;
DROP FUNCTION step_is_backed() CASCADE;
DROP FUNCTION assessment_is_brought_by_a_step() CASCADE;
DROP FUNCTION assessment_uses_versions_of_its_aircraft() CASCADE;
DROP FUNCTION load_is_complete() CASCADE;
DROP FUNCTION load_refuse(text, text);
ALTER TABLE loads_filedpaper DROP CONSTRAINT filed_paper_is_of_its_papers_operator;
ALTER TABLE loads_paper DROP CONSTRAINT paper_follows_the_one_before;
ALTER TABLE loads_paper DROP CONSTRAINT paper_is_of_its_loads_operator;
ALTER TABLE loads_signature DROP CONSTRAINT signature_is_the_steps;
ALTER TABLE loads_signature DROP CONSTRAINT signature_is_under_what_was_shown;
ALTER TABLE loads_step DROP CONSTRAINT step_of_acceptance_is_the_pilots;
ALTER TABLE loads_step DROP CONSTRAINT step_is_by_a_person_of_its_operator;
ALTER TABLE loads_step DROP CONSTRAINT step_has_an_assessment_of_its_load;
ALTER TABLE loads_step DROP CONSTRAINT step_keeps_the_assessment;
ALTER TABLE loads_step DROP CONSTRAINT step_starts_where_the_last_ended;
ALTER TABLE loads_step DROP CONSTRAINT step_is_allowed;
ALTER TABLE loads_assessment DROP CONSTRAINT assessment_is_of_its_loads_operator;
ALTER TABLE loads_declaration DROP CONSTRAINT declaration_is_of_its_loads_operator;
ALTER TABLE loads_load DROP CONSTRAINT load_replaces_one_of_its_operator;
ALTER TABLE loads_load DROP CONSTRAINT load_has_pilot_of_its_operator;
ALTER TABLE loads_load DROP CONSTRAINT load_has_aircraft_of_its_operator;
DELETE FROM loads_allowedstep;
