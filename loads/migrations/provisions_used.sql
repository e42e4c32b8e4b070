-- What an assessment used is of the aircraft of its load, and of its operator.
CREATE OR REPLACE FUNCTION assessment_uses_versions_of_its_aircraft() RETURNS trigger LANGUAGE plpgsql
SET search_path = public, pg_temp AS $$
BEGIN
    IF (NEW.loading_basis_id IS NOT NULL AND NOT EXISTS (
            SELECT FROM loads_load l JOIN fleet_loadingbasis b ON b.aircraft_id = l.aircraft_id
            WHERE l.id = NEW.load_id AND b.id = NEW.loading_basis_id))
       OR (NEW.empty_weight_id IS NOT NULL AND NOT EXISTS (
            SELECT FROM loads_load l JOIN fleet_emptyweight e ON e.aircraft_id = l.aircraft_id
            WHERE l.id = NEW.load_id AND e.id = NEW.empty_weight_id))
       OR (cardinality(NEW.provisions) > 0 AND EXISTS (
            SELECT FROM unnest(NEW.provisions) AS used (id)
            WHERE NOT EXISTS (
                SELECT FROM fleet_provision p JOIN loads_load l ON l.id = NEW.load_id
                WHERE p.id = used.id AND p.operator_id = NEW.operator_id
                  AND (p.aircraft_id IS NULL OR p.aircraft_id = l.aircraft_id)))) THEN
        PERFORM load_refuse(TG_NAME, 'an assessment uses versions of the aircraft of its load');
    END IF;
    RETURN NULL;
END $$;
