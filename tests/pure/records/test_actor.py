"""Who acts, as a value."""

import pytest

from records.actor import Actor
from records.kind import Kind


def an_actor(operator: str | None, key: str = "person:7") -> Actor:
    return Actor(operator, "person", key, "R. Amani", "pilot in command", frozenset())


def test_an_actor_acts_on_the_chain_of_the_operator():
    assert an_actor("kt").chain == "kt"


def test_who_belongs_to_no_operator_acts_on_the_chain_of_the_house():
    assert an_actor(None).chain == "house"


@pytest.mark.parametrize("operator", ["", "house"])
def test_no_operator_is_called_nothing_or_house(operator):
    with pytest.raises(ValueError, match="the code of no operator"):
        an_actor(operator)


def test_an_actor_has_a_key():
    with pytest.raises(ValueError, match="needs a key"):
        an_actor("kt", key="")


@pytest.mark.parametrize("name", ["accept-load", "file-document", "enter-empty-weight"])
def test_an_act_is_named_by_verb_and_object(name):
    assert Kind(name, "did it").name == name


@pytest.mark.parametrize(
    "name", ["", "accept", "Accept-load", "accept_load", "-load", "accept-", "accept--load", "a b-c", "x-y\n"]
)
def test_another_name_is_refused(name):
    with pytest.raises(ValueError, match="kebab case"):
        Kind(name, "did it")


def test_an_act_needs_words():
    with pytest.raises(ValueError, match="needs words"):
        Kind("accept-load", "")
