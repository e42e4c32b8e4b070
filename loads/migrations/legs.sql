-- What must always hold of a leg: both loads of one operator and one aircraft, one after the other, from where the first ends.

ALTER TABLE loads_leg ADD CONSTRAINT leg_is_of_its_loads_operator
    FOREIGN KEY (load_id, operator_id) REFERENCES loads_load (id, operator_id);
ALTER TABLE loads_leg ADD CONSTRAINT leg_follows_one_of_its_operator
    FOREIGN KEY (follows_id, operator_id) REFERENCES loads_load (id, operator_id);

CREATE FUNCTION leg_follows_the_flight_before() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF NOT EXISTS (
        SELECT FROM loads_load AS later JOIN loads_load AS earlier ON earlier.id = NEW.follows_id
        WHERE later.id = NEW.load_id AND earlier.aircraft_id = later.aircraft_id
            AND earlier.destination = later.origin AND earlier.departure < later.departure) THEN
        PERFORM load_refuse('leg_follows_the_flight_before',
            'a leg follows an earlier flight of the same aircraft, from where that one ends');
    END IF;
    RETURN NULL;
END $$;
CREATE CONSTRAINT TRIGGER leg_follows_the_flight_before AFTER INSERT ON loads_leg
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION leg_follows_the_flight_before();
ALTER TABLE loads_leg ENABLE ALWAYS TRIGGER leg_follows_the_flight_before;
