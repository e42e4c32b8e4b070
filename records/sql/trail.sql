-- The trail's own tables: two deferred triggers that seal, refusals of every change, and the right to read. The closing table is a
-- place of passage without a log of its own; nobody but the sealing functions touches it.
-- The witnesses look for the open act of their transaction with every statement. Not unique: a restored cluster starts low again.
ALTER TABLE records_act ADD COLUMN txid xid8 NOT NULL;
CREATE INDEX act_by_transaction ON records_act (txid);
ALTER TABLE records_change ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY;
ALTER TABLE records_closing SET UNLOGGED;

CREATE CONSTRAINT TRIGGER records_act_closes AFTER INSERT ON records_act
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION act_closes();
ALTER TABLE records_act ENABLE ALWAYS TRIGGER records_act_closes;
CREATE CONSTRAINT TRIGGER records_closing_seals AFTER INSERT ON records_closing
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION closing_seals();
ALTER TABLE records_closing ENABLE ALWAYS TRIGGER records_closing_seals;

SELECT put_refusals('records_act', '{UPDATE,DELETE,TRUNCATE}'), put_refusals('records_change', '{UPDATE,DELETE,TRUNCATE}'),
       put_refusals('records_seal', '{UPDATE,DELETE,TRUNCATE}'), put_refusals('records_name', '{UPDATE,DELETE,TRUNCATE}');
SELECT grant_rights('records_act', 'SELECT'), grant_rights('records_change', 'SELECT'),
       grant_rights('records_seal', 'SELECT'), grant_rights('records_name', 'SELECT');
REVOKE ALL ON records_closing FROM PUBLIC, tarebook_service;

SELECT guard_table('records_guarded_table', key => '{name}', mode => 'edit', operator => 'chain');
SELECT grant_rights('records_guarded_table', 'SELECT');
SELECT keep_definition(name, 'trail', '{}', '{}', '{}', '{}', '{}', '', 'the trail itself')
FROM unnest('{records_act,records_change,records_seal,records_name,records_closing}'::text[]) AS u (name);
