"""A last-minute change: recomputed, within the operator's bound, accepted by the same pilot in one step."""

import pytest
from django.utils import timezone

from loads.actions.accept_load import accept_load
from loads.actions.change_late import change_late
from loads.actions.depart_load import depart_load
from loads.actions.file_manifest import FILING_ISSUE, file_manifest, manifest_bytes
from loads.actions.signing import Signing
from loads.manifest.gathering import paper_of
from loads.models import Assessment, FiledIssue, FiledPaper, LateChange, Paper, Signature
from loads.queries.declaration import declared_now
from loads.tasks import file_issue
from records.models import Change, Outbox, Seal
from records.refusal import Invalid, NotAllowed, NotKnown, PreconditionFailed, StepRefused
from tests.cast import actor, cast
from tests.loads.late import BAG, again, bounded, change_of, changed, proposed
from tests.loads.making import accepted, prepared, submitted
from tests.makers import empty_weight_document, make_empty_weight, q, ready_aircraft

pytestmark = pytest.mark.django_db
ON = {
    "change": "passenger-on",
    "name": "N. Fell",
    "seat": "ROW2-L",
    "weight": q("150", "lb"),
    "how": "declared",
}
OFF = {"change": "passenger-off", "seat": "ROW1-R"}
FUEL = {"change": "fuel-on", "tank": "LEFT", "quantity": q("5", "US gal")}


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def _weight(current):
    at = {phase["phase"]: phase["weight"] for phase in current.result()["phases"]}
    return at["take-off"]


def _refused(people, current, change, code, *, digest="0" * 64, by=None):
    with pytest.raises((StepRefused, Invalid, NotAllowed)) as refused:
        change_late(
            current.load.id,
            change,
            Signing(digest, "127.0.0.1"),
            seen=str(current.step.number),
            by=by or actor(people.pilot),
        )
    assert refused.value.code == code
    assert again(current).step.number == current.step.number
    assert not LateChange.objects.exclude(step__number__lt=current.step.number + 1).exists()
    return refused.value


def test_a_bag_at_the_door_is_computed_and_signed_in_one_step(people) -> None:
    bounded(people)
    first = accepted(people)

    done = again(changed(people, first, change_of(BAG)))

    assert (done.state, done.step.number, done.step.before) == ("accepted", 4, "accepted")
    assert float(_weight(done)) - float(_weight(first)) == 20
    assert done.assessment.number == 2
    signature = Signature.objects.get(step=done.step)
    assert (signature.meaning, signature.capacity, signature.person_id) == (
        "accepted",
        "pilot in command",
        people.pilot.pk,
    )
    assert signature.digest == done.assessment.digest
    assert signature.statement.startswith(
        "Last-minute change 1, for issue 2 of manifest 1:\n1. baggage “bag at the door” on, NOSE-HOLD,"
    )
    assert "All changes since issue 1: 20 lb and 0 persons, of 200 lb and 1 person allowed." in (
        signature.statement
    )
    assert Paper.objects.get().number == 1


def test_what_is_declared_is_the_changed_load_and_the_first_declaration_stays(people) -> None:
    bounded(people)
    first = accepted(people)

    done = again(changed(people, first, change_of(BAG)))

    assert [item["what"] for item in declared_now(done)["items"]] == ["checked bags", "bag at the door"]
    assert [item["what"] for item in declared_now(first)["items"]] == ["checked bags"]


def test_the_reissued_manifest_keeps_its_number_and_the_first_issue_stays_as_it_was(people) -> None:
    bounded(people)
    first = accepted(people)
    code, load = people.operator.code, first.load.id
    before = manifest_bytes(code, load)

    changed(people, first, change_of(BAG))
    file_issue(f"{load}/1")

    assert manifest_bytes(code, load, 1) == before
    second = manifest_bytes(code, load)
    assert second == manifest_bytes(code, load, 2) != before
    titles = [FiledPaper.objects.get().document.title, FiledIssue.objects.get().document.title]
    assert titles == [
        "Load manifest 1, Q9-KTB, KT-214 leg 1",
        "Load manifest 1 issue 2, Q9-KTB, KT-214 leg 1",
    ]
    assert Outbox.objects.get(task=FILING_ISSUE).done_at is not None
    with pytest.raises(NotKnown):
        manifest_bytes(code, load, 3)


def test_the_first_issue_filed_only_after_a_change_still_says_what_was_accepted_first(people) -> None:
    bounded(people)
    first = accepted(people)
    changed(people, first, change_of(BAG))

    filed = file_manifest(paper_of(people.operator.code, first.load.id))

    assert filed.document.title == "Load manifest 1, Q9-KTB, KT-214 leg 1"


def test_filing_an_issue_twice_files_one(people) -> None:
    bounded(people)
    first = accepted(people)
    changed(people, first, change_of(BAG))

    file_issue(f"{first.load.id}/1")
    file_issue(f"{first.load.id}/1")

    assert FiledIssue.objects.count() == 1


def test_small_steps_add_up_to_the_bound_and_no_further(people) -> None:
    bounded(people, weight="40")
    once = again(changed(people, accepted(people), change_of(BAG)))

    twice = again(changed(people, once, change_of(BAG | {"what": "another bag"})))
    refused = _refused(
        people, twice, change_of(BAG | {"what": "third", "weight": q("1", "lb")}), "beyond-the-bound"
    )

    assert refused.status == 409
    assert "41 lb and 0 persons" in refused.detail
    assert "40 lb and 1 person is the most" in refused.detail
    assert "Revise" in refused.next_step
    assert list(LateChange.objects.order_by("number").values_list("number", "previous")) == [
        (1, None),
        (2, 1),
    ]


def test_what_comes_off_counts_like_what_goes_on(people) -> None:
    bounded(people, weight="39")
    once = again(changed(people, accepted(people), change_of(BAG)))
    off = {"change": "item-off", "what": "bag at the door", "place": "NOSE-HOLD"}

    refused = _refused(people, once, change_of(off), "beyond-the-bound")

    assert "40 lb" in refused.detail


def test_a_bound_in_kilograms_is_kept_exactly(people) -> None:
    # 20 lb is 9.0718474 kg exactly; the bound allows three decimals, so it is one step below and above.
    bounded(people, weight="9.071", unit="kg")
    first = accepted(people)
    _refused(people, first, change_of(BAG), "beyond-the-bound")

    bounded(people, weight="9.072", unit="kg")
    changed(people, first, change_of(BAG))

    assert str(LateChange.objects.get().kilograms_moved) == "9.071847400000"


def test_a_load_exactly_on_the_bound_is_within_it(people) -> None:
    bounded(people, weight="20")

    changed(people, accepted(people), change_of(BAG))

    kept = LateChange.objects.get()
    assert kept.kilograms_moved == kept.kilograms_bound


def test_persons_on_and_off_count_each(people) -> None:
    bounded(people, weight="500", persons=1)
    first = accepted(people)

    refused = _refused(people, first, change_of(ON, OFF), "beyond-the-bound")

    # 150 lb on and 190 lb off, one person each way.
    assert "340 lb and 2 persons" in refused.detail


def test_a_passenger_who_stays_behind_leaves_the_declaration(people) -> None:
    bounded(people)
    first = accepted(people)

    done = again(changed(people, first, change_of(OFF, persons=2)))

    assert [one["seat"] for one in declared_now(done)["passengers"]] == ["ROW1-L"]
    assert done.result()["persons"]["total"] == 2
    # M. Dravo's 190 lb.
    assert float(_weight(first)) - float(_weight(done)) == 190


def test_fuel_counts_with_its_weight(people) -> None:
    # 5 US gal at 6.7 lb/US gal are 33.5 lb.
    bounded(people, weight="33.4")
    first = accepted(people)
    refused = _refused(people, first, change_of(FUEL), "beyond-the-bound")
    assert "33.5 lb" in refused.detail

    bounded(people, weight="33.5")
    done = again(changed(people, first, change_of(FUEL)))

    assert declared_now(done)["fuel"]["at_engine_start"]["LEFT"]["value"] == "105"


def test_without_a_bound_in_the_settings_there_is_no_last_minute_change(people) -> None:
    refused = _refused(people, accepted(people), change_of(BAG), "no-last-minute-bound")

    assert refused.status == 409
    assert "settings" in refused.detail


def test_a_change_that_breaks_a_limit_is_not_signed(people) -> None:
    bounded(people)
    first = accepted(people)
    heavy = change_of(BAG | {"weight": q("190", "lb"), "place": "AFT-HOLD"})
    shown = proposed(first, heavy)
    assert shown.computation.verdict == "outside"

    _refused(people, first, heavy, "not-within", digest=shown.computation.digest)


def test_only_the_digest_of_the_changed_load_is_signed(people) -> None:
    bounded(people)
    first = accepted(people)

    _refused(people, first, change_of(BAG), "digest-differs", digest=first.assessment.digest)


def test_only_the_same_pilot_accepts_a_change(people) -> None:
    bounded(people)
    first = accepted(people)
    digest = proposed(first, change_of(BAG)).computation.digest

    _refused(
        people, first, change_of(BAG), "not-pilot-in-command", digest=digest, by=actor(people.other_pilot)
    )
    _refused(people, first, change_of(BAG), "act-not-allowed", digest=digest, by=actor(people.preparer))


@pytest.mark.parametrize("state", ["open", "prepared", "departed"])
def test_a_load_in_another_state_has_no_last_minute_change(people, state: str) -> None:
    bounded(people)
    if state == "departed":
        current = accepted(people)
        current = depart_load(
            current.load.id, at=timezone.now(), seen=str(current.step.number), by=actor(people.pilot)
        )
    else:
        current = submitted(people) if state == "open" else prepared(people)

    _refused(people, current, change_of(BAG), "step-not-allowed")


def test_an_accepted_load_is_not_accepted_again_without_a_change(people) -> None:
    first = accepted(people)

    with pytest.raises(StepRefused) as refused:
        accept_load(
            first.load.id,
            Signing(first.assessment.digest, ""),
            seen=str(first.step.number),
            by=actor(people.pilot),
        )

    assert refused.value.code == "step-not-allowed"


def test_a_load_that_went_stale_is_revised_not_changed(people) -> None:
    bounded(people)
    first = accepted(people)
    make_empty_weight(people, first.load.aircraft, empty_weight_document(weight=q("5210", "lb")))

    _refused(people, first, change_of(BAG), "stale")


def test_a_change_of_what_was_seen_before_another_change_is_refused(people) -> None:
    bounded(people)
    first = accepted(people)
    changed(people, first, change_of(BAG))

    with pytest.raises(PreconditionFailed):
        changed(people, first, change_of(BAG | {"what": "second"}))


@pytest.mark.parametrize(
    ("line", "pointer", "code"),
    [
        (OFF | {"seat": "ROW2-R"}, "/lines/0/seat", "nobody-there"),
        (OFF | {"seat": "COCKPIT-L"}, "/lines/0/seat", "nobody-there"),
        (ON | {"seat": "ROW1-L"}, "/lines/0/seat", "seat-taken"),
        (ON | {"seat": "ROW9"}, "/lines/0/seat", "unknown-seat"),
        (ON | {"name": "L. Osei"}, "/lines/0/name", "person-twice"),
        (ON | {"how": "standard"}, "/lines/0/how", "choice"),
        (BAG | {"kind": "equipment"}, "/lines/0/kind", "choice"),
        (BAG | {"place": "ROOF"}, "/lines/0/place", "unknown-place"),
        (BAG | {"weight": q("-20", "lb")}, "/lines/0/weight/value", "negative"),
        (BAG | {"weight": q("0", "lb")}, "/lines/0/weight/value", "zero"),
        (BAG | {"removed": True}, "/lines/0/removed", "unknown-field"),
        ({"change": "item-off", "what": "piano", "place": "AFT-HOLD"}, "/lines/0/what", "no-such-item"),
        (
            {"change": "item-off", "what": "checked bags", "place": "AFT-HOLD", "weight": q("121", "lb")},
            "/lines/0/weight",
            "below-zero",
        ),
        (
            {"change": "item-off", "what": "checked bags", "place": "AFT-HOLD", "weight": q("9", "kg")},
            "/lines/0/weight/unit",
            "unit-differs",
        ),
        (FUEL | {"tank": "TAIL"}, "/lines/0/tank", "unknown-tank"),
        (FUEL | {"quantity": q("21", "US gal")}, "/lines/0/quantity", "over-capacity"),
        (FUEL | {"quantity": q("5", "l")}, "/lines/0/quantity/unit", "unit-differs"),
        (FUEL | {"change": "fuel-off", "quantity": q("101", "US gal")}, "/lines/0/quantity", "below-zero"),
        ({"change": "fuel-type", "to": "AVGAS"}, "/lines/0/change", "choice"),
        ({"change": "aircraft", "to": "Q9-KTC"}, "/lines/0/change", "choice"),
        ({"change": "configuration", "to": "freight"}, "/lines/0/change", "choice"),
        ("a bag", "/lines/0", "object-form"),
    ],
)
def test_a_line_that_does_not_fit_is_refused_by_its_pointer(people, line, pointer, code) -> None:
    bounded(people, weight="2000", persons=9)
    persons = 3 + (line.get("change") == "passenger-on" if isinstance(line, dict) else 0)

    refused = _refused(people, accepted(people), change_of(line, persons=persons), "invalid")

    assert (pointer, code) in {(fault.pointer, fault.code) for fault in refused.faults}


def test_the_count_of_persons_must_be_that_of_the_changed_load(people) -> None:
    bounded(people)

    refused = _refused(people, accepted(people), change_of(OFF, persons=3), "invalid")

    assert {(fault.pointer, fault.code) for fault in refused.faults} == {
        ("/persons_on_board", "persons-mismatch")
    }


def test_the_trail_holds_no_name_of_a_change(people) -> None:
    bounded(people)
    changed(people, accepted(people), change_of(OFF, persons=2))

    entry = Seal.objects.get(act__kind="change-load-late").entry

    assert "M. Dravo" not in entry
    assert Change.objects.filter(act__kind="change-load-late", table_name="loads_latechange").exists()
    assert Assessment.objects.count() == 2
