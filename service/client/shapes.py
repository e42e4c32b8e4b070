"""What the server answers, as frozen values. `body` has the whole answer; figures are decimal texts."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

from service.client.exchange import Answer
from service.client.reading import read


@dataclass(frozen=True, slots=True)
class Check:
    """One limit tested: `result` is pass, fail, unresolved or advisory; `what_next` is what would mend it."""

    code: str
    title: str
    phase: str | None
    result: str
    margin_text: str
    source: str
    what_next: str


@dataclass(frozen=True, slots=True)
class Assessment:
    """A load computed. `verdict` is within, outside or unresolved; `digest` is what would be signed."""

    verdict: str
    digest: str
    governing: Mapping[str, str] = field(compare=False)
    checks: tuple[Check, ...] = field(repr=False)
    body: Mapping[str, Any] = field(repr=False, compare=False)

    @property
    def failed(self) -> tuple[Check, ...]:
        """The checks that keep this load from being within."""
        return tuple(check for check in self.checks if check.result in {"fail", "unresolved"})


@dataclass(frozen=True, slots=True)
class ManifestNumber:
    """The number of an accepted load's manifest, and its last issue."""

    number: int
    issue: int


@dataclass(frozen=True, slots=True)
class Load(Assessment):
    """A stored load as it stood when it was answered. `etag` goes along with the next step by itself.

    `replayed`: the server had done this before, and this is its answer of then.
    """

    id: str
    state: str
    etag: str
    replaces: str | None
    manifest: ManifestNumber | None
    replayed: bool = field(compare=False)


@dataclass(frozen=True, slots=True)
class LoadLine:
    """One line of the list of loads."""

    id: str
    state: str
    etag: str
    verdict: str
    digest: str
    replaces: str | None
    aircraft: str
    reference: str
    leg: int
    departure: str


@dataclass(frozen=True, slots=True)
class Paper:
    """A manifest as filed: the bytes of the PDF and their SHA-256, which was checked."""

    pdf: bytes = field(repr=False)
    digest: str


@dataclass(frozen=True, slots=True)
class Aircraft:
    """One aircraft of the operator."""

    id: str
    registration: str
    type: str
    serial_number: str
    body: Mapping[str, Any] = field(repr=False, compare=False)


@dataclass(frozen=True, slots=True)
class Version:
    """One version of a loading basis or an empty weight."""

    id: str
    digest: str
    body: Mapping[str, Any] = field(repr=False, compare=False)


@dataclass(frozen=True, slots=True)
class EmptyWeights:
    """Which versions were in force, by base fit, and every version there is."""

    in_force: Mapping[str, str]
    versions: tuple[Version, ...]


@dataclass(frozen=True, slots=True)
class Subscription:
    """A subscription to events. `secret` is there only right after it was made."""

    id: str
    address: str
    events: tuple[str, ...]
    state: str
    secret: str = field(default="", repr=False)


@dataclass(frozen=True, slots=True)
class Delivery:
    """One event on its way to a subscriber; `message` is its webhook-id."""

    id: str
    message: str
    event: str
    about: str
    state: str


def assessment_in(answer: Answer) -> Assessment:
    """This function will read a computed load."""
    return read(lambda body: Assessment(**_computed(body)), answer.document())


def load_in(answer: Answer) -> Load:
    """This function will read a stored load."""

    def one_load(body: Mapping[str, Any]) -> Load:
        manifest = body["manifest"]
        return Load(
            **_computed(body),
            id=body["id"],
            state=body["state"],
            etag=answer.etag,
            replaces=body["replaces"],
            manifest=ManifestNumber(manifest["number"], manifest["issue"]) if manifest else None,
            replayed=answer.replayed,
        )

    return read(one_load, answer.document())


def line_in(body: Mapping[str, Any]) -> LoadLine:
    """This function will read one line of the list of loads."""

    def one_line(body: Mapping[str, Any]) -> LoadLine:
        flight = body["flight"]
        return LoadLine(
            **{name: body[name] for name in ("id", "state", "verdict", "digest", "replaces", "aircraft")},
            etag=f'"{body["step"]}"',
            reference=flight["reference"],
            leg=flight["leg"],
            departure=flight["departure"],
        )

    return read(one_line, body)


def aircraft_in(body: Mapping[str, Any]) -> Aircraft:
    """This function will read one aircraft."""
    named = ("id", "registration", "type", "serial_number")
    return read(lambda one: Aircraft(**{name: one[name] for name in named}, body=one), body)


def version_in(body: Mapping[str, Any]) -> Version:
    """This function will read one version of a loading basis or an empty weight."""
    return read(lambda one: Version(one["id"], one["digest"], one), body)


def empty_weights_in(body: Mapping[str, Any]) -> EmptyWeights:
    """This function will read the empty weights of an aircraft."""

    def the_weights(body: Mapping[str, Any]) -> EmptyWeights:
        in_force = {one["fit"]: one["id"] for one in body["in_force"]}
        return EmptyWeights(in_force, tuple(version_in(one) for one in body["empty_weights"]))

    return read(the_weights, body)


def subscription_in(body: Mapping[str, Any]) -> Subscription:
    """This function will read one subscription."""

    def one_subscription(body: Mapping[str, Any]) -> Subscription:
        named = {name: body[name] for name in ("id", "address", "state")}
        return Subscription(**named, events=tuple(body["events"]), secret=body.get("secret", ""))

    return read(one_subscription, body)


def delivery_in(body: Mapping[str, Any]) -> Delivery:
    """This function will read one delivery."""
    named = ("id", "message", "event", "about", "state")
    return read(lambda one: Delivery(**{name: one[name] for name in named}), body)


def _computed(body: Mapping[str, Any]) -> dict[str, Any]:
    named = ("code", "title", "phase", "result", "margin_text", "source", "what_next")
    checks = tuple(Check(**{name: one[name] for name in named}) for one in body["checks"])
    return {
        "verdict": body["verdict"],
        "digest": body["digest"],
        "governing": body["governing"],
        "checks": checks,
        "body": body,
    }
