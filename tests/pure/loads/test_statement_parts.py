"""The digest made of parts already written is the digest of the whole."""

from hypothesis import given
from hypothesis import strategies as st

from loads.statement import digest_from, digest_of, statement
from records.canonical import canonical, canonical_of_exact

TEXTS = st.text(st.characters(exclude_categories=["Cs"]), max_size=12)
VALUES = st.recursive(
    st.none()
    | st.booleans()
    | st.integers(-(2**53) + 1, 2**53 - 1)
    | TEXTS
    | st.decimals(-999, 999, places=3),
    lambda inner: st.lists(inner, max_size=4) | st.dictionaries(TEXTS, inner, max_size=4),
    max_leaves=12,
)
DOCUMENTS = st.dictionaries(TEXTS, VALUES, max_size=5)


@given(DOCUMENTS)
def test_the_quick_way_gives_the_same_bytes(document: dict[str, object]) -> None:
    assert canonical_of_exact(document) == canonical(document)


@given(DOCUMENTS, DOCUMENTS, st.none() | DOCUMENTS)
def test_the_digest_of_the_parts_is_that_of_the_whole(inputs, result, basis) -> None:
    versions = {"loading_basis": basis, "empty_weight": None}

    parts = digest_from(canonical(inputs), versions, "1", canonical(result))

    assert parts == digest_of(statement(inputs, versions, "1", result))
