"""Several workers at one recheck, with real threads and commits: each part done once, filed once; one that
dies in the middle of a part leaves it to the next.
"""

import threading
import time

import pytest

from loads.actions import work_recheck as working
from loads.actions.work_recheck import work_recheck
from loads.models import LoadFlag, RecheckedLoad, RecheckPart, RecheckResult
from loads.queries.rechecks import progress_of
from records.models import Act
from tests.cast import Cast, cast
from tests.loads.making import submitted
from tests.loads.test_racers import at_once
from tests.loads.test_recheck import asked, heavier
from tests.makers import ready_aircraft

pytestmark = pytest.mark.usefixtures("own_database")
LOADS = 6


@pytest.fixture(scope="module")
def people(own_database: str) -> Cast:
    made = cast()
    ready_aircraft(made)
    for _ in range(LOADS - 1):
        submitted(made)
    return made


@pytest.fixture(scope="module")
def weight(people):
    return heavier(people)  # submits one more load


@pytest.fixture(autouse=True)
def small_parts(monkeypatch):
    monkeypatch.setattr(working, "LOADS_A_PART", 1)


def worker(recheck):
    def work():
        for _ in range(200):
            if work_recheck(recheck.id) == "finished":
                return True
            time.sleep(0.01)
        return False

    return work


def test_three_workers_share_the_parts_and_file_once(people, weight):
    recheck = asked(people, empty_weight=str(weight.id))

    assert at_once(*[worker(recheck)] * 3) == [True] * 3

    assert RecheckPart.objects.filter(recheck=recheck).count() == LOADS
    assert RecheckedLoad.objects.filter(recheck=recheck).count() == LOADS
    assert LoadFlag.objects.filter(recheck=recheck).count() == LOADS
    assert RecheckResult.objects.get(recheck=recheck).changed == LOADS
    assert Act.objects.filter(kind="finish-recheck", caused_by=recheck.act).count() == 1


def test_a_worker_that_dies_in_a_part_leaves_it_whole_to_another(people, weight, monkeypatch):
    recheck = asked(people, empty_weight=str(weight.id))
    work_recheck(recheck.id)
    really = working.recompute
    died = threading.Event()

    def dies(*words):
        really(*words)
        died.set()
        raise MemoryError

    with monkeypatch.context() as patched:
        patched.setattr(working, "recompute", dies)
        with pytest.raises(MemoryError):
            work_recheck(recheck.id)
    assert died.is_set()
    assert progress_of(recheck).done == 1

    assert worker(recheck)()
    assert progress_of(recheck).counts["changed"] == LOADS
    assert RecheckedLoad.objects.filter(recheck=recheck).count() == LOADS
