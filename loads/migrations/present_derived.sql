SELECT s.load_id, s.operator_id, l.aircraft_id, l.departure, s.id AS step_id, s.number, s.after AS state, s.assessment_id, a.verdict,
    EXISTS (SELECT FROM loads_assessment r WHERE r.load_id = s.load_id AND r.verdict IN ('outside', 'unresolved')) AS rejected
FROM loads_step s JOIN loads_load l ON l.id = s.load_id JOIN loads_assessment a ON a.id = s.assessment_id
WHERE NOT EXISTS (SELECT FROM loads_step later WHERE later.load_id = s.load_id AND later.number > s.number)
