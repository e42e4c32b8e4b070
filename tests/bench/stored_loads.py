"""What many stored loads cost: lists, searches, what is in force and a submission, with many against few.

    python -m tests.bench.stored_loads [few] [many] [what ...]

With `what`, only the questions that have one of these words in their name are asked.
Two databases, the same but for how many loads stand in them. One load of each kind goes in through the real
actions; its copies are written past the guards, as only a superuser can, here alone. Each question goes to
both by turns, and the middle of the times of each counts. Wanted: no ratio above 1.2.
"""

import statistics
import sys
import time
import uuid
from collections.abc import Callable
from typing import Any

from tests.bench.ground import database
from tests.bench.stored_loads_copies import AIRCRAFT, copy_loads

TARGET = 1.2
TURNS = 31
Ask = Callable[[], Any]


def questions(people: Any) -> dict[str, Ask]:
    """This function will return what is asked, by name, as the operator's manager over the API and pages."""
    from tests.cast import api, browser, post
    from tests.loads.making import load_document

    client, pages = api(people.manager), browser(people.manager)

    def get(path: str) -> Ask:
        return lambda: _sound(client.get(f"/api/v1{path}"))

    def page(path: str) -> Ask:
        return lambda: _sound(pages.get(path))

    def submit() -> None:
        document = load_document(people, aircraft=AIRCRAFT[3])
        document["flight"] |= {
            "reference": f"N-{uuid.uuid4().hex[:6]}",
            "departure": "2031-05-01T08:30:00-06:00",
        }
        _sound(post(client, "/loads", document))

    first = _sound(client.get("/api/v1/loads?limit=200&from=2026-09-01T00:00:00Z")).json()
    one = first["loads"][-1]["id"]
    return {
        "list: first page": get("/loads"),
        "list: a page far in": get(first["next"].removeprefix("/api/v1")),
        "list: one day": get("/loads?from=2026-10-01T00:00:00Z&to=2026-10-02T00:00:00Z"),
        "list: one aircraft": get(f"/loads?aircraft={AIRCRAFT[5]}"),
        "list: open": get("/loads?state=open"),
        "list: outside": get("/loads?verdict=outside"),
        "list: one reference": get("/loads?reference=FT-0000123"),
        "list: nothing fits": get("/loads?reference=NOBODY"),
        "one load": get(f"/loads/{one}"),
        "trail of one load": get(f"/trail?about=load:{one}"),
        "trail: newest": get("/trail"),
        "what is in force": get(f"/aircraft/{AIRCRAFT[5]}/configurations?at=2026-10-01T00:00:00Z"),
        "page: a day": page("/?day=2026-10-01"),
        "page: rejects": page("/rejects"),
        "page: documents": page("/documents"),
        "page: documents by number": page("/documents?number=1234"),
        "page: documents by reference": page("/documents?reference=ft-000012"),
        "page: documents of one aircraft": page(f"/documents?registration={AIRCRAFT[5]}"),
        "page: inspection": page(f"/inspect?aircraft={AIRCRAFT[5]}&day=2026-10-01"),
        "submit": submit,
    }


def _sound(response: Any) -> Any:
    if response.status_code not in (200, 201):
        raise AssertionError(response.content[:300])
    return response


def main(words: list[str]) -> int:
    """Print the table; 1 when a ratio is above the target."""
    few, many = int((words or ["10000"])[0]), int((words[1:] or ["200000"])[0])
    only = words[2:]
    with database():
        from django.conf import settings

        from tests import databases

        settings.PASSWORD_HASHERS = ["django.contrib.auth.hashers.MD5PasswordHasher"]
        settings.ALLOWED_HOSTS = ["testserver"]
        with databases.copied("few") as small:
            asked = {small: _filled(few, only)}
            with databases.copied("many") as large:
                begun = time.monotonic()
                asked[large] = _filled(many, only)
                print(f"{many:,} loads stand in {time.monotonic() - begun:.0f} s", flush=True)
                took = _taking_turns(asked)
    return _told(took[small], took[large], few, many)


def _filled(count: int, only: list[str]) -> dict[str, Ask]:
    from tests.cast import cast
    from tests.makers import ready_aircraft

    people = cast("bench-air")
    for registration in AIRCRAFT:
        ready_aircraft(people, registration)
    copy_loads(people, count)
    found = {
        what: ask for what, ask in questions(people).items() if not only or any(one in what for one in only)
    }
    if not found:
        raise SystemExit(f"no question is called {' or '.join(only)}")
    return found


def _taking_turns(asked: dict[str, dict[str, Ask]]) -> dict[str, dict[str, float]]:
    """This function will ask each question of both databases, one right after the other, turn by turn, and
    return the middle times in seconds. What else the machine does so falls on both alike.
    """
    from tests import databases

    times: dict[str, dict[str, list[float]]] = {name: {} for name in asked}
    for turn in range(TURNS):
        for what in asked[next(iter(asked))]:
            for name in list(asked) if turn % 2 else reversed(list(asked)):
                databases.point_at(name)
                asked[name][what]()  # opens the connection and warms
                begun = time.perf_counter()
                asked[name][what]()
                times[name].setdefault(what, []).append(time.perf_counter() - begun)
    return {name: {what: statistics.median(of) for what, of in by.items()} for name, by in times.items()}


def _told(small: dict[str, float], large: dict[str, float], few: int, many: int) -> int:
    print(
        f"{'milliseconds, by stored loads':<34}{few:>10,}{many:>12,}{'ratio':>8}   (target {TARGET} or less)"
    )
    missed = 0
    for what, seconds in small.items():
        ratio = large[what] / seconds
        missed += ratio > TARGET
        word = "   missed" if ratio > TARGET else ""
        print(f"{what:<34}{1e3 * seconds:>10.1f}{1e3 * large[what]:>12.1f}{ratio:>8.2f}{word}")
    return 1 if missed else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
