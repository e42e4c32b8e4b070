"""Restrictions and permits in force at a departure: what they do to a load, when they lapse, who may lift
them, and what of accepted loads goes stale.
"""

import json
from datetime import timedelta
from typing import Any

import pytest
from django.db import IntegrityError
from django.utils import timezone

from fleet.actions.approve_permit import approve_permit
from fleet.actions.end_permit import end_permit
from fleet.actions.enter_permit import enter_permit
from fleet.actions.lift_restriction import lift_restriction
from fleet.models import Aircraft
from fleet.queries.provisions import provisions_at
from loads.actions.submit_load import submit_load
from loads.actions.tell_stale import tell_after_provision
from loads.acts import ASSESS_LOAD
from loads.manifest.gathering import facts_of, paper_of
from loads.manifest.printing import html_of
from loads.models import Assessment, StaleNotice
from loads.queries.answer import answer_of
from loads.queries.current import Current
from loads.queries.overtaken import database_time
from loads.queries.signable import words_to_sign
from loads.queries.stale import stale_parts
from records.act import act
from records.refusal import Invalid, NotAllowed, StepRefused
from tests.cast import Cast, actor, browser, cast
from tests.fleet.papers import permitted, restrict
from tests.loads.making import DEPARTURE_AT, accepted, load_document, prepared
from tests.makers import q, ready_aircraft
from tests.pure.loads.papers import lb, permit_document
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
LOWER = {"effect": "limit", "limit": "take_off", "weight": lb("7000")}
MORE = {"effect": "limit", "limit": "take_off", "weight": lb("8800")}


@pytest.fixture
def people() -> Cast:
    return cast()


@pytest.fixture
def aircraft(people: Cast) -> Aircraft:
    return ready_aircraft(people)


def submitted(people: Cast, **flight: Any) -> Current:
    document = load_document(people, limits=[])
    document["flight"] |= flight
    return submit_load(document, by=actor(people.preparer))


def take_off(current: Current) -> dict[str, Any]:
    result = json.loads(current.assessment.result)
    return next(one for one in result["checks"] if one["code"] == "weight.take-off")


def test_a_restriction_binds_from_its_entry_and_stands_in_the_statement(
    people: Cast, aircraft: Aircraft
) -> None:
    before = submitted(people)
    used = restrict(people, aircraft, LOWER)

    current = submitted(people, reference="KT-300")

    assert take_off(current)["limit"] == "7000"
    answer = answer_of(current, reach=None)
    assert answer["basis"]["restrictions"] == [{"id": str(used.id), "digest": used.digest}]
    (told,) = answer["restrictions_and_permits"]
    assert told["lines"] == ["maximum take-off weight 7000 lb"]
    assert f"Restrictions: {used.id}, digest {used.digest}." in words_to_sign(
        current, load_document(people, limits=[]), "prepared"
    )
    assert stale_parts(before, database_time()) == ("restrictions",)


def test_an_accepted_load_that_a_restriction_overtakes_is_told_once(people: Cast, aircraft: Aircraft) -> None:
    soon = (timezone.now() + timedelta(hours=1)).replace(microsecond=0)
    flown = accepted(people, prepared(people, submitted(people, departure=soon.isoformat())))
    used = restrict(people, aircraft, LOWER, true_from=(soon - timedelta(days=1)).isoformat())

    assert tell_after_provision(f"{used.id}/held") == 1
    assert tell_after_provision(f"{used.id}/held") == 0

    notice = StaleNotice.objects.get(load=flown.load)
    assert (notice.changed, notice.provisions) == ("restrictions", [used.id])
    lift_restriction(actor(people.approver), aircraft, used, reason="repaired")
    assert tell_after_provision(f"{used.id}/ended") == 0  # it stands on what it was accepted on


def test_a_restriction_is_lifted_by_another_person_with_a_reason_and_from_then_on_only(
    people: Cast, aircraft: Aircraft
) -> None:
    used = restrict(people, aircraft, LOWER)
    with pytest.raises(NotAllowed):
        lift_restriction(actor(people.maintenance), aircraft, used, reason="repaired")

    ended = lift_restriction(
        actor(people.approver), aircraft, used, reason="repaired", true_from=DEPARTURE_AT
    )

    assert take_off(submitted(people))["limit"] == "8750"
    earlier = (DEPARTURE_AT - timedelta(seconds=1)).isoformat()
    assert take_off(submitted(people, departure=earlier, reference="KT-1"))["limit"] == "7000"
    known_before = ended.known_from - timedelta(microseconds=1)
    held = provisions_at(people.operator.code, aircraft, DEPARTURE_AT, known_before)
    assert [one.id for one in held.restrictions] == [used.id]
    with pytest.raises(StepRefused) as refused:
        lift_restriction(actor(people.approver), aircraft, used, reason="again")
    assert refused.value.code == "ended-already"


def test_a_permit_lapses_by_itself_at_its_very_instant(people: Cast, aircraft: Aircraft) -> None:
    """Valid from 30 November to 3 December 00:00 UTC, which is not included any more."""
    permitted(people, aircraft, MORE)

    inside = submitted(people, departure="2026-12-02T23:59:59.999999Z", reference="IN")
    on_the_line = submitted(people, departure="2026-12-03T00:00:00Z", reference="OUT")
    first = submitted(people, departure="2026-11-30T00:00:00Z", reference="FIRST")
    before = submitted(people, departure="2026-11-29T23:59:59.999999Z", reference="BEFORE")

    assert [take_off(one)["limit"] for one in (inside, on_the_line, first, before)] == [
        "8800",
        "8750",
        "8800",
        "8750",
    ]


def test_a_permit_widens_nothing_before_another_person_approved_it(people: Cast, aircraft: Aircraft) -> None:
    permit = enter_permit(actor(people.maintenance), aircraft, permit_document(MORE))
    assert take_off(submitted(people))["limit"] == "8750"
    with pytest.raises(NotAllowed):
        approve_permit(actor(people.manager, person=people.maintenance.id), aircraft, permit)

    approve_permit(actor(people.approver), aircraft, permit)

    current = submitted(people, reference="KT-2")
    assert take_off(current)["limit"] == "8800"
    assert answer_of(current, reach=None)["basis"]["permits"] == [
        {"id": str(permit.id), "digest": permit.digest}
    ]


def test_a_permit_is_for_the_operations_it_names(people: Cast, aircraft: Aircraft) -> None:
    permitted(people, aircraft, MORE, operations=["ferry"])

    charter, ferry = submitted(people), submitted(people, operation="ferry", reference="KT-3")

    assert (take_off(charter)["limit"], take_off(ferry)["limit"]) == ("8750", "8800")
    assert "restrictions_and_permits" not in json.loads(charter.assessment.result)


def test_a_permit_that_was_ended_widens_no_more(people: Cast, aircraft: Aircraft) -> None:
    permit = permitted(people, aircraft, MORE)
    used = submitted(people)
    end_permit(actor(people.maintenance), aircraft, permit, reason="not needed", true_from=DEPARTURE_AT)

    assert stale_parts(used, database_time()) == ("permits",)
    assert take_off(submitted(people, reference="KT-4"))["limit"] == "8750"
    other = permitted(people, aircraft, MORE, number="SFP-89")
    with pytest.raises(StepRefused) as refused:
        end_permit(
            actor(people.maintenance),
            aircraft,
            other,
            reason="late",
            true_from=timezone.now() + timedelta(3650),
        )
    assert refused.value.code == "lapsed-already"


def test_what_the_loading_basis_does_not_have_is_refused_at_the_entry(
    people: Cast, aircraft: Aircraft
) -> None:
    with pytest.raises(Invalid) as refused:
        restrict(people, aircraft, {"effect": "seats", "ids": ["ROW9-Z"]})

    assert [(one.pointer, one.code) for one in refused.value.faults] == [("/effects/0/ids", "unknown-id")]


def test_somebody_in_a_blocked_seat_is_refused_by_the_field(people: Cast, aircraft: Aircraft) -> None:
    restrict(people, aircraft, {"effect": "seats", "ids": ["ROW1-L"]})

    with pytest.raises(Invalid) as refused:
        submitted(people)

    assert [(one.pointer, one.code) for one in refused.value.faults] == [
        ("/passengers/0/seat", "seat-blocked")
    ]


def test_another_aircraft_and_another_operator_are_not_concerned(people: Cast, aircraft: Aircraft) -> None:
    ready_aircraft(people, "Q9-OTH")
    restrict(people, aircraft, LOWER)
    document = load_document(people, aircraft="Q9-OTH", limits=[])

    current = submit_load(document, by=actor(people.preparer))

    assert take_off(current)["limit"] == "8750"


def test_trapped_fuel_is_weighed_and_told(people: Cast, aircraft: Aircraft) -> None:
    """10 US gal at 6.7 lb: 67 lb more at every phase."""
    was = json.loads(submitted(people).assessment.result)["phases"][1]["weight"]
    restrict(people, aircraft, {"effect": "fuel", "of": "LEFT", "volume": q("10", "US gal")})

    result = json.loads(submitted(people, reference="KT-5").assessment.result)

    assert float(result["phases"][1]["weight"]) - float(was) == pytest.approx(67)
    assert "10 US gal in left tank cannot be used" in result["advisories"]


def test_the_paper_tells_what_holds_permits_in_red_and_draws_the_envelope_that_was_judged_by(
    people: Cast, aircraft: Aircraft
) -> None:
    """A permit that replaces the envelope by one to 140 in: its corner stands in the drawing."""
    corners = [["5000", "116"], ["6800", "116"], ["8800", "122"], ["8800", "140"], ["5000", "140"]]
    wider = {
        "effect": "envelope",
        "of": "normal",
        "points": [[arm, weight] for weight, arm in corners],
        "unit": "in",
        "weight_unit": "lb",
    }
    permitted(people, aircraft, wider, conditions=["day VFR"], operations=["ferry"])
    restrict(people, aircraft, {"effect": "places", "ids": ["NOSE-HOLD"]})
    flown = accepted(people, prepared(people, submitted(people, operation="ferry")))

    facts = facts_of(paper_of(people.operator.code, flown.load.id))
    page = html_of(facts)

    assert (140, 8800) in facts.basis.envelopes[0].points
    assert "Permit SFP-88, by Civil Aviation Office, Nalden." in page
    assert '<p class="permit">' in page
    assert "Every limit that was checked is kept. Under permit SFP-88." in page
    shown = Page(browser(people.pilot).get(f"/loads/{flown.load.id}")).words
    assert "Within limits under permit SFP-88" in shown
    assert "within under permit SFP-88" in Page(browser(people.pilot).get("/?day=2026-12-01")).words
    assert "day VFR" in page
    assert "nose hold closed" in page
    assert "Restriction</th>" in page
    assert "item inoperative DD-14, true from 2026-11-30 00:00:00 UTC" in page


def test_the_database_refuses_an_assessment_by_another_aircrafts_permit(
    people: Cast, aircraft: Aircraft
) -> None:
    other = ready_aircraft(people, "Q9-OTH")
    permit = permitted(people, other, MORE)
    current = submitted(people)

    with (
        pytest.raises(IntegrityError) as refused,
        act(ASSESS_LOAD, by=actor(people.preparer), about="test:x"),
    ):
        Assessment.objects.create(
            operator_id=people.operator.code,
            load=current.load,
            number=2,
            verdict="unresolved",
            result="{}",
            salt=b"0" * 16,
            digest="0" * 64,
            provisions=[permit.id],
            engine="3",
            assessed_at=timezone.now(),
        )

    assert refused.value.__cause__.diag.constraint_name == "assessment_uses_versions_of_its_aircraft"
