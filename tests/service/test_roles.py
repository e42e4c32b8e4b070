"""The two roles can do what they are for and nothing else; set-up brings them back to that."""

import psycopg
import pytest

from service import roles
from service.embedded import postgres


@pytest.fixture(scope="module")
def cluster(tmp_path_factory):
    found = postgres.start(tmp_path_factory.mktemp("roles") / "postgres", durable=False, say=lambda _: None)
    made_of = roles.Passwords(found.passwords[roles.OWNER], found.passwords[roles.SERVICE])
    roles.make(found.url("postgres", "postgres"), passwords=made_of)
    with psycopg.connect(found.url(roles.OWNER, roles.DATABASE)) as owner:
        owner.execute("CREATE TABLE trail (entry text)")
        owner.execute(f"GRANT SELECT, INSERT ON trail TO {roles.SERVICE}")
    yield found
    postgres.stop(found)


def as_service(cluster, words: str) -> None:
    with psycopg.connect(cluster.url(roles.SERVICE, roles.DATABASE), autocommit=True) as service:
        service.execute(words)


def test_the_service_does_what_it_was_granted(cluster):
    as_service(cluster, "INSERT INTO trail VALUES ('one')")


def test_no_request_starts_helpers_of_the_database(cluster):
    with psycopg.connect(cluster.url(roles.SERVICE, roles.DATABASE)) as service:
        assert service.execute("SHOW max_parallel_workers_per_gather").fetchone() == ("0",)


@pytest.mark.parametrize(
    "words",
    [
        "CREATE TABLE mine ()",
        "CREATE TEMPORARY TABLE mine ()",
        "CREATE SCHEMA mine",
        "CREATE ROLE mine",
        "CREATE DATABASE mine",
        "UPDATE trail SET entry = 'two'",
        "DELETE FROM trail",
        "TRUNCATE trail",
        "DROP TABLE trail",
        "ALTER TABLE trail DISABLE TRIGGER ALL",
        "ALTER TABLE trail OWNER TO tarebook_service",
        "SET session_replication_role = replica",
        "SET ROLE tarebook_owner",
        "ALTER ROLE tarebook_service SUPERUSER",
        "COPY trail TO PROGRAM 'cat'",
        "SELECT pg_read_file('postgresql.conf')",
    ],
)
def test_the_service_may_not(words: str, cluster):
    with pytest.raises(psycopg.errors.InsufficientPrivilege):
        as_service(cluster, words)


@pytest.mark.parametrize(
    "words", ["CREATE ROLE mine", "CREATE DATABASE mine", "SET session_replication_role = replica"]
)
def test_the_owner_owns_its_database_and_no_more(words: str, cluster):
    with (
        psycopg.connect(cluster.url(roles.OWNER, roles.DATABASE), autocommit=True) as owner,
        pytest.raises(psycopg.errors.InsufficientPrivilege),
    ):
        owner.execute(words)


def test_the_owner_may_install_what_the_exclusion_constraints_need(cluster):
    with psycopg.connect(cluster.url(roles.OWNER, roles.DATABASE)) as owner:
        owner.execute("CREATE EXTENSION btree_gist")


def test_set_up_takes_back_what_a_role_should_not_have(cluster):
    with psycopg.connect(cluster.url("postgres", roles.DATABASE), autocommit=True) as superuser:
        superuser.execute("ALTER ROLE tarebook_service SUPERUSER CREATEDB")
        superuser.execute("GRANT tarebook_owner TO tarebook_service")
        superuser.execute("GRANT CREATE ON SCHEMA public TO tarebook_service")
        superuser.execute("GRANT TEMPORARY ON DATABASE tarebook TO tarebook_service")

    roles.make(cluster.url("postgres", "postgres"))

    for words in (
        "CREATE TABLE mine ()",
        "CREATE TEMPORARY TABLE mine ()",
        "CREATE DATABASE mine",
        "SET ROLE tarebook_owner",
    ):
        with pytest.raises(psycopg.errors.InsufficientPrivilege):
            as_service(cluster, words)
