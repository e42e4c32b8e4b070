"""Whether every guard stands: start-up and readiness refuse otherwise, and reconciliation names what is
missing.
"""

from collections.abc import Iterator
from typing import Any

from django.db import connections

from records.guard.definitions import functions

_ROLE = "tarebook_service"
_REFUSALS = frozenset({"refuse_delete", "refuse_truncate"})
_TRIGGERS_OF_MODE = {
    "append": frozenset({"witness_insert", "refuse_update"}) | _REFUSALS,
    "close-once": frozenset({"witness_insert", "witness_update"}) | _REFUSALS,
    "edit": frozenset({"witness_insert", "witness_update"}) | _REFUSALS,
}
# What the service role may do on a whole table, by mode. (To close a row it has a right on single columns.)
_RIGHTS_OF_MODE = {
    "append": {"SELECT", "INSERT"},
    "close-once": {"SELECT", "INSERT"},
    "edit": {"SELECT", "INSERT", "UPDATE"},
    "trail": {"SELECT"},
    "derived": {"SELECT"},
}
# The register is written by guard_table() as the owner only; nobody but the sealing functions has the
# closing table.
_RIGHTS_OF_TABLE: dict[str, set[str]] = {"records_guarded_table": {"SELECT"}, "records_closing": set()}

_TABLES = """
SELECT c.relname, g.mode, g.triggers, c.relhasrules, pg_get_userbyid(c.relowner) = %(role)s,
    ARRAY(SELECT t.tgenabled::text || ' ' || pg_get_triggerdef(t.oid) FROM pg_trigger t
          WHERE t.tgrelid = c.oid AND NOT t.tgisinternal
            AND (t.tgname LIKE 'witness\\_%%' OR t.tgname LIKE 'refuse\\_%%' OR t.tgname LIKE 'records\\_%%')
          ORDER BY t.tgname),
    ARRAY(SELECT r FROM unnest(ARRAY['SELECT', 'INSERT', 'UPDATE', 'DELETE', 'TRUNCATE', 'TRIGGER']) AS u (r)
          WHERE has_table_privilege(%(role)s, c.oid, r))
FROM pg_class c LEFT JOIN records_guarded_table g ON g.name = c.relname
WHERE c.relnamespace = 'public'::regnamespace AND c.relkind IN ('r', 'p', 'f') ORDER BY c.relname
"""
_FUNCTIONS = """
SELECT p.proname, p.prosrc, p.prosecdef, coalesce(p.proconfig, '{}'),
    p.proowner = (SELECT relowner FROM pg_class WHERE oid = 'public.records_act'::regclass)
FROM pg_proc p WHERE p.pronamespace = 'public'::regnamespace AND p.proname = ANY (%s)
"""
_ROLE_IS = """
SELECT r.rolsuper OR r.rolbypassrls OR r.rolreplication OR r.rolcreaterole,
    EXISTS (SELECT FROM pg_auth_members m WHERE m.member = r.oid),
    has_database_privilege(r.rolname, current_database(), 'TEMPORARY, CREATE'),
    has_schema_privilege(r.rolname, 'public', 'CREATE'),
    has_parameter_privilege(r.rolname, 'session_replication_role', 'SET')
FROM pg_roles r WHERE r.rolname = %s
"""
_TOO_MUCH = (
    "has powers over the cluster",
    "is a member of another role",
    "may make temporary tables or schemas in this database",
    "may make objects in the schema public",
    "may set session_replication_role",
)


def missing_guards(using: str = "default") -> tuple[str, ...]:
    """This function will return a sentence for each guard that is missing, bent or switched off; none when
    sound.
    """
    with connections[using].cursor() as cursor:
        cursor.execute("SELECT to_regclass('public.records_guarded_table')")
        if cursor.fetchone() == (None,):
            return ("The trail's own tables are missing: the database is not migrated.",)
        return (*_tables(cursor), *_functions(cursor), *_role(cursor))


def _tables(cursor: Any) -> Iterator[str]:
    cursor.execute(_TABLES, {"role": _ROLE})
    for name, mode, registered, rules, owned, found, rights in cursor.fetchall():
        if owned:
            yield f"The table {name} belongs to {_ROLE}."
        if mode is None:
            yield f"The table {name} is in no list: neither guarded nor exempt."
        elif mode != "exempt":
            yield from _guards_of(name, mode, registered, found)
            if rules:
                yield f"The table {name} has a rewrite rule, which could lead a write past its guards."
            allowed = _RIGHTS_OF_TABLE.get(name, _RIGHTS_OF_MODE[mode])
            for right in sorted(set(rights) - allowed):
                yield f"The role {_ROLE} may {right} on {name}."


def _guards_of(table: str, mode: str, registered: list[str], found: list[str]) -> Iterator[str]:
    for definition in registered:
        if definition not in found:
            switched = any(definition[2:] == other[2:] for other in found)
            word = "is not enabled always" if switched else "is missing or was changed"
            yield f"The guard {_name_in(definition)} of {table} {word}."
    for definition in found:
        if definition not in registered and not any(definition[2:] == other[2:] for other in registered):
            yield f"The trigger {_name_in(definition)} of {table} is not as the register says."
    for wanted in sorted(_TRIGGERS_OF_MODE.get(mode, frozenset()) - {_name_in(one) for one in registered}):
        yield f"The register knows no guard {wanted} of {table}, which its mode {mode} asks for."
    for definition in registered:
        if not definition.startswith("A "):
            yield f"The guard {_name_in(definition)} of {table} was registered without ENABLE ALWAYS."


def _name_in(definition: str) -> str:
    words = definition.split()
    return words[words.index("TRIGGER") + 1]


def _functions(cursor: Any) -> Iterator[str]:
    wanted = {one.name: one for one in functions()}
    cursor.execute(_FUNCTIONS, [list(wanted)])
    seen = set()
    for name, body, with_owners_rights, pinned, owned in cursor.fetchall():
        definition = wanted[name]
        if name in seen:
            yield f"The function {name}() stands twice, with other arguments."
        seen.add(name)
        if body != definition.body:
            yield f"The body of the function {name}() is not that of the file it comes from."
        if (with_owners_rights, frozenset(pinned)) != (definition.with_owners_rights, definition.pinned):
            yield f"The function {name}() runs with other rights or settings than its file says."
        if not owned:
            yield f"The function {name}() belongs to another role than the trail."
    for name in sorted(set(wanted) - seen):
        yield f"The function {name}() is missing."


def _role(cursor: Any) -> Iterator[str]:
    cursor.execute(_ROLE_IS, [_ROLE])
    row = cursor.fetchone()
    if row is None:
        yield f"The role {_ROLE} is missing."
        return
    for too_much, words in zip(row, _TOO_MUCH, strict=True):
        if too_much:
            yield f"The role {_ROLE} {words}."
