-- What stands now of every load, kept by each step that is written, whoever writes it: no way of writing can forget it. A step's foreign
-- keys have its assessment, and that one its load, written before, so both are there. The rows of loads_present are nobody's to write:
-- the function runs with its owner's rights, the service role may read them only.

CREATE FUNCTION step_moves_present() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER
SET search_path = public, pg_temp AS $$
BEGIN
    IF NEW.number = 1 THEN
        INSERT INTO loads_present (load_id, operator_id, aircraft_id, departure, step_id, number, state, assessment_id, verdict, rejected)
        SELECT NEW.load_id, NEW.operator_id, l.aircraft_id, l.departure, NEW.id, 1, NEW.after, a.id, a.verdict,
               a.verdict IN ('outside', 'unresolved')
        FROM loads_load l, loads_assessment a WHERE l.id = NEW.load_id AND a.id = NEW.assessment_id;
    ELSE
        UPDATE loads_present p SET step_id = NEW.id, number = NEW.number, state = NEW.after, assessment_id = a.id, verdict = a.verdict,
               rejected = p.rejected OR a.verdict IN ('outside', 'unresolved')
        FROM loads_assessment a WHERE p.load_id = NEW.load_id AND p.number = NEW.previous AND a.id = NEW.assessment_id;
        IF NOT FOUND THEN
            PERFORM load_refuse('steps_are_written_in_their_order', 'a step is written after the one it follows');
        END IF;
    END IF;
    RETURN NULL;
END $$;
REVOKE ALL ON FUNCTION step_moves_present() FROM PUBLIC;

CREATE TRIGGER step_moves_present AFTER INSERT ON loads_step FOR EACH ROW EXECUTE FUNCTION step_moves_present();
ALTER TABLE loads_step ENABLE ALWAYS TRIGGER step_moves_present;
