"""What the API answers, for its published description. Figures are decimal strings in the units stated."""

from rest_framework import serializers

from loads.api.shapes_in import Flight, LoadDocument
from loads.api.shapes_late import LateBound, LateChangeMade, NoteAnswer
from loads.lifecycle import STATES

VERDICTS = ("within", "outside", "unresolved")


class Version(serializers.Serializer[object]):
    """One version that was used."""

    id = serializers.UUIDField()
    digest = serializers.CharField()


class BasisUsed(serializers.Serializer[object]):
    """What the computation rests on; null where nothing was in force. Tables, rules, restrictions and permits
    stand there where they were used.
    """

    loading_basis = Version(allow_null=True)
    empty_weight = Version(allow_null=True)
    standard_weights = Version(required=False)
    rules = Version(required=False)
    restrictions = Version(many=True, required=False)
    permits = Version(many=True, required=False)
    configuration = serializers.CharField()
    engine = serializers.CharField()


class Check(serializers.Serializer[object]):
    """One limit tested at one phase."""

    code = serializers.CharField()
    title = serializers.CharField()
    phase = serializers.CharField(allow_null=True)
    actual = serializers.CharField(allow_null=True)
    limit = serializers.CharField(allow_null=True)
    low = serializers.CharField(allow_null=True)
    unit = serializers.CharField(allow_null=True)
    margin = serializers.CharField(allow_null=True)
    margin_text = serializers.CharField(allow_blank=True)
    source = serializers.CharField(allow_blank=True)  # type: ignore[assignment]  # DRF takes fields out of the class
    result = serializers.ChoiceField(("pass", "fail", "unresolved", "advisory"))
    what_next = serializers.CharField(allow_blank=True)
    margin_weight = serializers.CharField(allow_null=True, required=False)
    edge = serializers.CharField(allow_null=True, required=False)
    at = serializers.DictField(allow_null=True, required=False)
    curtailed = serializers.DictField(
        required=False,
        help_text="the operator's margins at the nearest edge, their sum, and whether the certified envelope "
        "holds; only where an envelope is curtailed",
    )


class CategoryFlown(serializers.Serializer[object]):
    """The certification category of the load, where the basis has any."""

    id = serializers.CharField()
    name = serializers.CharField()


class TrimSetting(serializers.Serializer[object]):
    """The take-off trim setting for one flap setting (null: for any); a setting of null is off the table."""

    flap = serializers.CharField(allow_null=True)
    setting = serializers.CharField(allow_null=True)
    why = serializers.CharField(allow_blank=True)
    source = serializers.CharField()  # type: ignore[assignment]  # DRF takes fields out of the class


class TrimFound(serializers.Serializer[object]):
    """The take-off trim setting from the table of the basis, rounded to the manual's step."""

    unit = serializers.CharField()
    settings = TrimSetting(many=True)


class ComputedAnswer(serializers.Serializer[object]):
    """A load computed: every phase, every limit with its margin, and the sum line by line."""

    aircraft = serializers.CharField()
    configuration = serializers.CharField()
    flight = Flight()
    verdict = serializers.ChoiceField(VERDICTS)
    units = serializers.DictField(child=serializers.CharField(), allow_null=True)
    phases = serializers.ListField(child=serializers.DictField())
    path = serializers.DictField(allow_null=True, required=False)
    checks = Check(many=True)
    allowable_take_off = serializers.DictField(allow_null=True)
    governing = serializers.DictField(child=serializers.CharField())
    fuel = serializers.DictField(allow_null=True)
    sumsheet = serializers.ListField(child=serializers.DictField())
    sequence = serializers.ListField(
        child=serializers.DictField(),
        required=False,
        help_text="the events of a load that states some: number, when, and what happens in words",
    )
    operating_weight = serializers.DictField(allow_null=True)
    certification_category = CategoryFlown(required=False)
    trim = TrimFound(allow_null=True, required=False, help_text="only where the basis has a trim table")
    persons = serializers.DictField(
        allow_null=True,
        help_text="at engine start; `greatest_in_flight` where somebody comes aboard in flight",
    )
    advisories = serializers.ListField(child=serializers.CharField())
    not_assessed = serializers.ListField(child=serializers.CharField())
    standard_weights = serializers.DictField(
        required=False, help_text="The table used, its row and season, and how many people count how."
    )
    restrictions_and_permits = serializers.ListField(
        child=serializers.DictField(), required=False, help_text="Those that hold at the departure, in words."
    )
    weighing = serializers.DictField(
        required=False, help_text="When the last weighing lapses by the rule that binds this operation."
    )
    presentation = serializers.DictField(
        required=False,
        help_text="How moments are shown beside themselves: index units, divided moments. Only where the "
        "basis says so; phases and lines then hold `index` and `moment_divided`.",
    )
    basis = BasisUsed()
    digest = serializers.CharField()
    cautions = serializers.ListField(child=serializers.CharField())


class SignatureGiven(serializers.Serializer[object]):
    """One signature; the name and the words signed are shown where the load is read."""

    meaning = serializers.CharField()
    capacity = serializers.CharField()
    person = serializers.IntegerField()
    signed_at = serializers.DateTimeField()
    digest = serializers.CharField()
    name = serializers.CharField(required=False)
    statement = serializers.CharField(required=False)


class ManifestNumber(serializers.Serializer[object]):
    """The manifest of an accepted load: its number, its last issue, and where its PDF is."""

    number = serializers.IntegerField()
    issue = serializers.IntegerField()
    href = serializers.CharField()


class LoadWarning(serializers.Serializer[object]):
    """What looks doubled: one aircraft, or one person, on two standing loads less than an hour apart.

    `pointer` is the part of this load it is about; `load` is the other one, null to a token limited to
    aircraft that does not reach it. It refuses nothing.
    """

    code = serializers.ChoiceField(("same-aircraft", "same-person"))
    detail = serializers.CharField()
    pointer = serializers.CharField()
    load = serializers.UUIDField(allow_null=True)
    href = serializers.CharField(allow_null=True)


class LoadAnswer(ComputedAnswer):
    """A stored load as it stands. `step` is its entity tag."""

    id = serializers.UUIDField()
    state = serializers.ChoiceField(STATES)
    step = serializers.IntegerField()
    replaces = serializers.UUIDField(allow_null=True)
    submitted_at = serializers.DateTimeField()
    assessed_at = serializers.DateTimeField()
    signatures = SignatureGiven(many=True)
    manifest = ManifestNumber(allow_null=True)
    late_changes = LateChangeMade(many=True)
    warnings = LoadWarning(many=True)


class LatePreview(ComputedAnswer):
    """A last-minute change computed, nothing stored: sign `digest` to make it."""

    load = serializers.UUIDField()
    step = serializers.IntegerField()
    number = serializers.IntegerField()
    issue = serializers.IntegerField()
    lines = serializers.ListField(child=serializers.CharField())
    moved = serializers.CharField()
    bound = LateBound()
    to_sign = serializers.CharField(allow_blank=True)


class StaleTold(serializers.Serializer[object]):
    """That an accepted load went stale, as it was told: what changed, and to how many addresses mail went."""

    told_at = serializers.DateTimeField()
    changed = serializers.ListField(child=serializers.CharField())
    mail_addresses = serializers.IntegerField()


class StepTaken(serializers.Serializer[object]):
    """One step of a load's life."""

    number = serializers.IntegerField()
    state = serializers.ChoiceField(STATES)
    at = serializers.DateTimeField()
    reason = serializers.CharField(allow_blank=True)


class LinkedLeg(serializers.Serializer[object]):
    """Another leg: its load, its flight in words, where it stands."""

    load = serializers.UUIDField()
    flight = serializers.CharField()
    state = serializers.ChoiceField(STATES)
    href = serializers.CharField()


class Legs(serializers.Serializer[object]):
    """The leg before, those after, and in words the fuel planned to be taken on since the leg before."""

    follows = LinkedLeg(allow_null=True)
    followed_by = LinkedLeg(many=True)
    uplift = serializers.CharField(allow_blank=True)


class LoadFlagged(serializers.Serializer[object]):
    """That a later figure puts a flight outside that was within; the filed record stays as it is."""

    flagged_at = serializers.DateTimeField()
    recheck = serializers.UUIDField()
    verdict_now = serializers.ChoiceField(choices=["outside", "unresolved"])
    limit = serializers.CharField(allow_blank=True)
    excess = serializers.CharField(allow_blank=True)


class FullLoadAnswer(LoadAnswer):
    """All there is to read about a load. `stale` names what changed since it was assessed."""

    stale = serializers.ListField(child=serializers.CharField())
    replaced_by = serializers.UUIDField(allow_null=True)
    steps = StepTaken(many=True)
    to_sign = serializers.DictField(
        child=serializers.CharField(),
        help_text="what may be signed next, by meaning: exactly the words signed",
    )
    declared = LoadDocument()
    legs = Legs()
    stale_notices = StaleTold(many=True)
    flags = LoadFlagged(many=True)
    notes = NoteAnswer(many=True)


class LoadSummary(serializers.Serializer[object]):
    """One line of the list of loads."""

    id = serializers.UUIDField()
    state = serializers.ChoiceField(STATES)
    step = serializers.IntegerField()
    replaces = serializers.UUIDField(allow_null=True)
    aircraft = serializers.CharField()
    configuration = serializers.CharField()
    flight = Flight()
    verdict = serializers.ChoiceField(VERDICTS)
    governing = serializers.DictField(child=serializers.CharField(), allow_null=True)
    digest = serializers.CharField()


class LoadList(serializers.Serializer[object]):
    """Loads by departure, one page; the header Link (rel="next") and `next` lead to the next one."""

    loads = LoadSummary(many=True)
    next = serializers.CharField(allow_null=True)
