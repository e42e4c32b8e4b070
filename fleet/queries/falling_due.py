"""What lapses of an aircraft: its weighings by the operator's rules, its permits by their own dates."""

from dataclasses import dataclass
from datetime import date, datetime, time, timedelta
from zoneinfo import ZoneInfo

from fleet.empty_weight_reading import read_particulars
from fleet.models import Aircraft, Provision
from fleet.queries.in_force import empty_weights_in_force
from fleet.queries.provisions import provisions_at
from fleet.restriction_reading import paper_from_text
from fleet.rules import Rule, Subject
from fleet.rules_reading import rules_from_text
from records.strict_json import read

WEIGHING = "weighing-interval"


@dataclass(frozen=True, slots=True)
class Due:
    """One thing that lapses at `lapses`, the first instant at which it serves no more.

    `about` names it for good ("weighing wheels", "permit <id>"), `what` in words that name no person.
    """

    about: str
    what: str
    lapses: datetime
    source: str


def falling_due(aircraft: Aircraft, now: datetime) -> tuple[Due, ...]:
    """This function will return what lapses of an aircraft, the soonest first, also what has lapsed."""
    found = [*_weighings(aircraft, now), *_permits(aircraft, now)]
    return tuple(sorted(found, key=lambda due: (due.lapses, due.about)))


def _weighings(aircraft: Aircraft, now: datetime) -> list[Due]:
    rules = provisions_at(aircraft.operator_id, None, now, now).rules
    if rules is None:
        return []
    subject = Subject(aircraft.category, aircraft.engines, aircraft.passenger_seats)
    asked = rules_from_text(rules.document).for_aircraft(WEIGHING, subject)
    zone = ZoneInfo(aircraft.operator.time_zone)
    found: list[Due] = []
    for weight in empty_weights_in_force(aircraft, now, now):
        weighed = read_particulars(read(weight.document.encode())).weighed_on
        found += [_weighing(rule, weight.fit, weighed, zone) for rule in asked]
    return found


def _weighing(rule: Rule, fit: str, weighed: date, zone: ZoneInfo) -> Due:
    if rule.interval is None:
        raise TypeError("a rule that is not none has its interval")
    good = rule.interval.good_until(weighed)
    after = good if good == date.max else good + timedelta(days=1)
    operations = ", ".join(rule.applies.operations)
    return Due(
        about=f"weighing {fit}{f' for {operations}' if operations else ''}",
        what=f"weighing of {weighed} on {fit}{f', for {operations}' if operations else ''}",
        lapses=datetime.combine(after, time(), zone),
        source=f"every {rule.interval}, {rule.source}",
    )


def _permits(aircraft: Aircraft, now: datetime) -> list[Due]:
    rows = Provision.objects.filter(
        aircraft=aircraft, kind="permit", approval__isnull=False, ending__isnull=True, true_until__gt=now
    )
    found = []
    for row in rows:
        if row.true_until is not None:
            paper = paper_from_text(row.document, "permit")
            found.append(Due(f"permit {row.id}", paper.title, row.true_until, str(paper.source)))
    return found
