"""The rejects desk: what stays on it, who has it, remarks as added rows, what became of it, and the trend."""

from datetime import timedelta

import pytest
from django.db import IntegrityError, connection

from loads.actions.remark_reject import NewRemark, read_remark, remark_reject
from loads.actions.revise_load import revise_load
from loads.actions.submit_load import submit_load
from loads.actions.withdraw_load import withdraw_load
from loads.acts import REMARK_REJECT
from loads.models import Remark
from loads.queries.rejects import open_rejects, settled_rejects
from loads.queries.trend import reject_trend
from records.act import act
from records.models import Change
from records.refusal import Invalid, NotAllowed, NotKnown, StepRefused
from tests.cast import Cast, actor, cast, strangers
from tests.loads.making import DEPARTURE_AT, load_document, outside_document, submitted
from tests.makers import make_aircraft, ready_aircraft

pytestmark = pytest.mark.django_db
SINCE, UNTIL = DEPARTURE_AT - timedelta(days=89), DEPARTURE_AT + timedelta(days=1)


@pytest.fixture
def people() -> Cast:
    made = cast()
    ready_aircraft(made)
    return made


def rejected(people):
    return submit_load(outside_document(people), by=actor(people.preparer))


def say(people, current, words="asked the shipper", holder="", by=None):
    return remark_reject(current.load.id, NewRemark(words, holder), by=actor(by or people.manager))


def test_an_open_load_that_is_outside_is_on_the_desk_with_its_pilot(people) -> None:
    current = rejected(people)
    submitted(people)

    (reject,) = open_rejects(people.operator.code)

    assert reject.current.load.id == current.load.id
    assert reject.holder == "R. Amani"
    assert reject.remarks == ()


def test_an_unresolved_load_is_on_the_desk_too(people) -> None:
    make_aircraft(people, "Q9-NEW")
    submitted(people, aircraft="Q9-NEW")

    (reject,) = open_rejects(people.operator.code)

    assert reject.current.assessment.verdict == "unresolved"


def test_remarks_are_added_and_hand_the_reject_over(people) -> None:
    current = rejected(people)
    say(people, current)
    say(people, current, "find two lighter castings", people.preparer.login)
    say(people, current, "they come at noon", by=people.preparer)

    (reject,) = open_rejects(people.operator.code)

    assert [(one.number, one.words) for one in reject.remarks] == [
        (1, "asked the shipper"),
        (2, "find two lighter castings"),
        (3, "they come at noon"),
    ]
    assert reject.holder == "D. Lorn"


def test_a_remark_leaves_no_words_in_the_trail(people) -> None:
    say(people, rejected(people), "ask Mrs Osei for her weight")

    image = Change.objects.get(table_name="loads_remark").image

    assert "Osei" not in image
    assert '"words": "sha256:' in image


def test_only_who_may_says_anything_and_only_about_a_reject(people) -> None:
    current, within = rejected(people), submitted(people)

    with pytest.raises(NotAllowed):
        say(people, current, by=people.auditor)
    with pytest.raises(StepRefused):
        say(people, within)
    with pytest.raises(NotKnown):
        say(people, current, by=strangers().pilot)
    with pytest.raises(Invalid):
        say(people, current, holder="nobody.here")
    with pytest.raises(Invalid):
        say(people, current, holder=strangers("third-test").pilot.login)

    assert not Remark.objects.exists()


@pytest.mark.parametrize(
    ("document", "pointer"),
    [
        ({}, "/words"),
        ({"words": ""}, "/words"),
        ({"words": " x"}, "/words"),
        ({"words": "x" * 501}, "/words"),
        ({"words": 3}, "/words"),
        ({"words": "a\x00b"}, "/words"),
        ({"words": "x", "holder": 3}, "/holder"),
        ({"words": "x", "holder": "a\x00"}, "/holder"),
        ({"words": "x", "colour": "red"}, "/colour"),
    ],
)
def test_what_is_no_remark_is_named_by_its_pointer(document, pointer) -> None:
    with pytest.raises(Invalid) as refused:
        read_remark(document)

    assert pointer in [fault.pointer for fault in refused.value.faults]


def test_a_revision_takes_the_load_off_the_desk_and_is_what_became_of_it(people) -> None:
    first = rejected(people)
    say(people, first)
    second = revise_load(
        first.load.id, outside_document(people), reason="one less", seen="1", by=actor(people.preparer)
    )
    third = revise_load(
        second.load.id, load_document(people), reason="lighter", seen="1", by=actor(people.preparer)
    )

    settled = settled_rejects(people.operator.code, SINCE, UNTIL)

    assert open_rejects(people.operator.code) == ()
    assert {one.current.load.id for one in settled} == {first.load.id, second.load.id}
    assert {one.end.load.id for one in settled} == {third.load.id}
    assert {one.end.assessment.verdict for one in settled} == {"within"}
    (told,) = (one for one in settled if one.current.load.id == first.load.id)
    assert [remark.words for remark in told.remarks] == ["asked the shipper"]


def test_a_withdrawn_reject_is_told_with_its_reason(people) -> None:
    current = rejected(people)
    withdraw_load(current.load.id, reason="the shipper cancelled", seen="1", by=actor(people.preparer))

    (settled,) = settled_rejects(people.operator.code, SINCE, UNTIL)

    assert open_rejects(people.operator.code) == ()
    assert (settled.current.state, settled.current.step.reason) == ("withdrawn", "the shipper cancelled")
    assert settled.rejected.verdict == "outside"


def test_the_trend_counts_by_aircraft_by_week_and_by_limit(people) -> None:
    rejected(people)
    rejected(people)
    submitted(people)

    trend = reject_trend(people.operator.code, SINCE, UNTIL)

    (aircraft,) = trend.aircraft
    assert (aircraft.registration, aircraft.declared, aircraft.rejected) == ("Q9-KTB", 3, 2)
    assert len(aircraft.weeks) == 13
    assert aircraft.weeks[-1] == 2
    failing = {
        check["code"]
        for check in open_rejects(people.operator.code)[0].current.result()["checks"]
        if check["result"] in {"fail", "unresolved"}
    }
    assert {limit.code for limit in trend.limits} == failing
    assert {limit.loads for limit in trend.limits} == {2}


def test_the_weeks_of_the_trend_begin_and_end_where_they_say(people) -> None:
    current = rejected(people)
    at = current.load.departure

    first = reject_trend(people.operator.code, at, at + timedelta(days=14))
    second = reject_trend(people.operator.code, at - timedelta(days=7), at + timedelta(days=7))
    before = reject_trend(people.operator.code, at - timedelta(days=7), at)

    assert first.aircraft[0].weeks == (1, 0)
    assert second.aircraft[0].weeks == (0, 1)
    assert before.aircraft == ()


def test_other_operators_have_their_own_desk(people) -> None:
    rejected(people)
    others = strangers()

    assert open_rejects(others.operator.code) == ()
    assert settled_rejects(others.operator.code, SINCE, UNTIL) == ()
    assert reject_trend(others.operator.code, SINCE, UNTIL).aircraft == ()


@pytest.mark.parametrize(
    ("constraint", "changes"),
    [
        ("remark_number_is_taken_once", {"number": 1}),
        ("remark_counts_from_one", {"number": 0}),
        ("remark_says_something", {"words": ""}),
        ("remark_is_by_one_of_the_operator", {"person_id": "stranger"}),
        ("remark_hands_to_one_of_the_operator", {"holder_id": "stranger"}),
    ],
)
def test_the_database_refuses_a_remark_that_breaks(people, constraint, changes) -> None:
    current, stranger = rejected(people), strangers().pilot
    first = say(people, current)
    row = {
        "operator_id": people.operator.code,
        "load_id": current.load.id,
        "number": 2,
        "person_id": people.manager.pk,
        "holder_id": None,
        "words": "x",
        "salt": b"0" * 32,
        "at": first.at,
    } | {name: stranger.pk if value == "stranger" else value for name, value in changes.items()}

    with (
        pytest.raises(IntegrityError) as refused,
        act(REMARK_REJECT, by=actor(people.manager), about="test:constraints"),
        connection.cursor() as cursor,
    ):
        cursor.execute(
            f"INSERT INTO loads_remark ({', '.join(row)}) VALUES ({', '.join(['%s'] * len(row))})",
            list(row.values()),
        )

    assert refused.value.__cause__.diag.constraint_name == constraint
