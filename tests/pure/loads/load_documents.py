"""Any load document that the page which declares a load can carry, for the tests of both directions."""

from typing import Any

from hypothesis import strategies as st

from tests.pure.loads.making import twin

SEATS = tuple(seat.id for seat in twin().seats)
TANKS = tuple(tank.id for tank in twin().tanks)
DEPARTURE = "2026-12-01T08:30:00-06:00"
WEIGHT_UNITS = st.sampled_from(("lb", "kg"))
FUEL_UNITS = st.sampled_from(("US gal", "imp gal", "l", "lb", "kg"))
DENSITY_UNITS = st.sampled_from(("lb/US gal", "kg/l", "kg/US gal", "lb/imp gal"))
HOWS = st.sampled_from(("weighed", "declared", "estimated"))

# What the reader of documents takes for a text: something to see, no controls, no blanks at the ends.
texts = (
    st.text(st.characters(blacklist_categories=("C", "Z"), whitelist_characters=" "), min_size=1, max_size=20)
    .map(str.strip)
    .filter(bool)
)
figures = st.decimals(0, 99999, places=2).map(str) | st.integers(0, 99999).map(str)


def _quantities(units: st.SearchStrategy[str]) -> st.SearchStrategy[dict[str, str]]:
    return st.fixed_dictionaries({"value": figures, "unit": units})


@st.composite
def _people(draw: st.DrawFn) -> tuple[list[dict[str, Any]], list[dict[str, Any]]]:
    crew: list[dict[str, Any]] = []
    passengers: list[dict[str, Any]] = []
    for seat in SEATS:
        kind = draw(st.sampled_from(("empty", "crew", "passenger", "standard")))
        if kind == "empty":
            continue
        unit = draw(WEIGHT_UNITS)
        person: dict[str, Any] = {"name": draw(texts), "seat": seat}
        if kind == "standard":
            person |= {"how": "standard"}
        else:
            person |= {"how": draw(HOWS), "weight": draw(_quantities(st.just(unit)))}
        person |= draw(st.fixed_dictionaries({}, optional={"category": texts}))
        if kind == "crew":
            person |= {"position": draw(st.sampled_from(("pilot in command", "second pilot")) | texts)}
            crew.append(person | draw(st.fixed_dictionaries({}, optional={"person": texts})))
            continue
        own = _quantities(st.just(unit))
        infant = st.fixed_dictionaries({"name": texts}, optional={"weight": own, "how": HOWS})
        passengers.append(person | draw(st.fixed_dictionaries({}, optional={"lap_infant": infant})))
    return crew, passengers


@st.composite
def _fuel(draw: st.DrawFn) -> dict[str, Any]:
    units = {tank: draw(FUEL_UNITS) for tank in TANKS}
    held = {tank: _quantities(st.just(unit)) for tank, unit in units.items()}
    return {
        "density": draw(_quantities(DENSITY_UNITS)) | {"source": draw(texts)},
        "at_engine_start": draw(st.fixed_dictionaries({}, optional=held)),
        "not_usable": draw(st.fixed_dictionaries({}, optional=held)),
        **{name: draw(_quantities(FUEL_UNITS)) for name in ("taxi", "trip", "minimum_at_landing")},
    }


@st.composite
def documents(draw: st.DrawFn) -> dict[str, Any]:
    """This strategy will draw documents whose people stand in the order of the seats, as the page writes
    them; whether a load makes sense is not asked.
    """
    crew, passengers = draw(_people())
    weights = _quantities(WEIGHT_UNITS)
    item = {"kind": texts, "what": texts, "place": texts, "how": HOWS}
    limit = {"at": st.sampled_from(("take-off", "landing")), "weight": weights, "source": texts}
    words = ("reference", "origin", "destination", "operation")
    return {
        "schema": "tarebook.load/1",
        "aircraft": draw(texts),
        "configuration": draw(texts),
        "flight": {word: draw(texts) for word in words}
        | {"leg": draw(st.integers(1, 99)), "departure": DEPARTURE},
        "persons_on_board": draw(st.integers(1, 99)),
        "crew": crew,
        "passengers": passengers,
        "items": draw(st.lists(st.fixed_dictionaries(item, optional={"weight": weights}), max_size=5)),
        "fuel": draw(_fuel()),
        "limits": draw(st.lists(st.fixed_dictionaries(limit), max_size=3)),
    }
