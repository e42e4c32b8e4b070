"""The worst point of a flight with a random sequence against many samples: none is worse, one is as bad.

The judge is `naive_sequence`, which shares no code with the engine. Beside tanks, tables and envelopes of
`test_path_against_sampling`, events are drawn: people and items that leave, move or come aboard, transfers,
gear and flaps.
"""

from dataclasses import replace
from fractions import Fraction

from hypothesis import event, given
from hypothesis import strategies as st

from fleet.positions import MovingPart, PartState
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.events import Event, Leaving, Moving, Transfer
from loads.balance.over_flight import as_seat
from tests.drawing import drawn
from tests.pure.loads.making import SOURCE, load, twin, twin_empty
from tests.pure.loads.naive_path import assert_as_sampled, drawn_down
from tests.pure.loads.naive_sequence import points_of_flight, poured, sampled_flight
from tests.pure.loads.test_path_against_sampling import envelopes, flights

F = Fraction
SAMPLES = 24
TWIN = twin()
DECLARED = read_load(load(limits=[]), TWIN)
SPOTS = (*TWIN.seats[4:], *TWIN.places)


def part(name, *changes):
    states = [PartState("UP", "up", F(0), ("ground", "flight"), SOURCE)]
    states += [
        PartState(f"S{number}", f"at {number}", F(change), ("ground", "flight"), SOURCE)
        for number, change in enumerate(changes)
    ]
    return MovingPart(name, name.lower(), "UP", tuple(states))


@st.composite
def sequences(draw, basis, plan):
    """Events in order, each possible with what is then aboard and in the tanks."""
    contents = {fuel.tank.id: fuel.usable for fuel in plan.tanks}
    people = [person.pointer for person in DECLARED.passengers]
    items = {item.pointer: item.weight for item in DECLARED.items}
    found = []
    for leg, stages, whole in (
        ("taxi", basis.taxi_order, plan.taxi / plan.density),
        ("flight", basis.burn_order, plan.trip / plan.density),
    ):
        shares = sorted(draw(st.lists(st.integers(0, 8), max_size=4 if leg == "flight" else 1)))
        burned = F(0)
        for share in shares:
            until = whole * share / 8
            contents, burned = drawn_down(contents, stages, until - burned), until
            kinds = (
                ("move", "transfer", "position")
                if leg == "taxi"
                else ("leave", "move", "transfer", "position", "come")
            )
            aboard = (contents, people, items)
            kind = draw(st.sampled_from(kinds))
            where = f"/sequence/{len(found)}/come_aboard"
            if kind == "come":
                made = {"coming": draw(_comers(where, people, items))}
            else:
                made = draw(_events(kind, basis, plan, aboard))
            if made is None:
                continue
            found.append(Event(len(found) + 1, leg, burned, "", **made))
            if "transfer" in made:
                contents = poured(contents, made["transfer"], made["transfer"].volume)
        contents = drawn_down(contents, stages, whole - burned)
    return tuple(found)


@st.composite
def _events(draw, kind, basis, plan, then):
    contents, people, items = then
    if kind == "leave":
        lines = draw(st.sets(st.sampled_from([*people, *items]), max_size=2)) if people or items else set()
        leaving = []
        for line in sorted(lines):
            if line in people:
                people.remove(line)
                leaving.append(Leaving(line))
            else:
                taken = items[line] * draw(st.integers(1, 4)) / 4
                leaving.append(Leaving(line, taken))
                items[line] -= taken
                if not items[line]:
                    del items[line]
        return {"leaving": tuple(leaving)} if leaving else None
    if kind == "move":
        known = [*people, *items]
        if not known:
            return None
        line = draw(st.sampled_from(known))
        spots = SPOTS if line in people else TWIN.places
        return {"moving": (Moving(line, draw(st.sampled_from(spots))),)}
    if kind == "transfer":
        names = list(contents)
        source, target = draw(st.sampled_from(names)), draw(st.sampled_from(names))
        held = next(fuel for fuel in plan.tanks if fuel.tank.id == target)
        room = held.tank.capacity - held.trapped - contents[target]
        volume = min(contents[source], room) * draw(st.integers(1, 4)) / 4
        return {"transfer": Transfer(source, target, volume)} if source != target and volume > 0 else None
    if not basis.positions:
        return None
    moved = draw(st.sampled_from(basis.positions))
    return {"positions": ((moved, draw(st.sampled_from(moved.states))),)}


@st.composite
def _comers(draw, where, people, items):
    """A person to a seat or a place, an item to a place, or both; they may leave and move later."""
    weights = st.integers(1, 900).map(lambda tenths: F(tenths, 2))
    found = []
    if draw(st.booleans()):
        person = replace(DECLARED.passengers[0], lap_infant=None, weight=draw(weights), pointer=f"{where}/0")
        found.append(replace(person, seat=as_seat(draw(st.sampled_from(SPOTS)))))
        people.append(f"{where}/0")
    if not found or draw(st.booleans()):
        place, weight = draw(st.sampled_from(TWIN.places)), draw(weights)
        found.append(replace(DECLARED.items[0], place=place, weight=weight, pointer=f"{where}/1"))
        items[f"{where}/1"] = weight
    return tuple(found)


@st.composite
def sequenced(draw):
    basis, plan = draw(flights())
    parts = (part("GEAR", draw(st.integers(-9000, 9000)) or 1), part("FLAPS", 1500, -2500))
    basis = replace(basis, positions=parts[: draw(st.integers(0, 2))])
    return basis, replace(DECLARED, fuel=plan, sequence=draw(sequences(basis, plan)))


@drawn(35, 400)
@given(sequenced(), st.data())
def test_no_sample_is_worse_one_is_as_bad_and_outside_is_outside(flight, data):
    basis, declared = flight
    drawn = [data.draw(envelopes("longitudinal", F(117))), data.draw(envelopes("lateral", F(0)))]
    if data.draw(st.booleans()):
        drawn.append(replace(data.draw(envelopes("longitudinal", F(117))), id="second"))
    basis = replace(basis, envelopes=tuple(drawn))

    result = assess(declared, basis, twin_empty(), advised=False)

    for axis in ("longitudinal", "lateral"):
        found = [check for check in result.checks if check.code == f"path.{axis}"]
        runs = [run for run in sampled_flight(declared, basis, twin_empty(), axis, SAMPLES) if run]
        if not found or not runs:
            assert not runs or axis == "lateral"
            continue
        assert_as_sampled(found[0], runs)
        event(f"{axis} {found[0].outcome}, {len(declared.sequence)} events, {found[0].margin_text[-25:]}")


@drawn(35, 400)
@given(sequenced())
def test_landing_and_the_lines_add_up_to_the_plain_sum_of_all_that_is_left(flight):
    basis, declared = flight
    last = [point for point in points_of_flight(declared, basis, twin_empty(), 1) if point.leg == "flight"][
        -1
    ]

    result = assess(declared, basis, twin_empty(), advised=False)

    landing = result.state("landing")
    assert (landing.weight, landing.moment) == (last.weight, last.moment)
    assert landing.lateral_moment == last.lateral_moment
    weight = moment = across = F(0)
    for line in result.lines:
        if not line.total:
            weight, moment, across = weight + line.weight, moment + line.moment, across + line.lateral_moment
        elif line.group != "operating weight":
            state = result.state(line.group)
            assert (weight, moment, across) == (state.weight, state.moment, state.lateral_moment)


@drawn(30, 300)
@given(sequenced())
def test_the_greatest_and_the_least_weight_in_flight_are_those_of_all_samples(flight):
    basis, declared = flight
    if not any(each.coming for each in declared.sequence):
        return
    points = [each for each in points_of_flight(declared, basis, twin_empty(), 4) if each.leg != "taxi"]

    result = assess(declared, basis, twin_empty(), advised=False)

    weights = [each.weight for each in points]
    limits = declared.configuration.limits
    assert result.check("weight.in-flight").room == limits.take_off.value - max(weights)
    assert result.check("weight.minimum-flying").room == min(weights) - limits.minimum_flying.value
    event(f"{result.check('weight.in-flight').title[:30]}")
