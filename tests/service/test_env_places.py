"""Places in the environment: `host:port`, and nothing else."""

import pytest

from service.env import SettingRefused, places


def test_places_are_hosts_with_their_ports():
    words = ["relay.example.org:8443", "127.0.0.1:9010", "[::1]:9010", "Relay:80"]

    assert places("RECEIVERS", words) == {
        "relay.example.org:8443",
        "127.0.0.1:9010",
        "[::1]:9010",
        "relay:80",
    }
    assert places("RECEIVERS", []) == frozenset()


@pytest.mark.parametrize(
    "word",
    ["relay", "relay:", "relay:0", "relay:65536", "relay:x", ":80", "https://relay:80", "::1:80", "*:80"],
)
def test_anything_else_stops_the_start_with_the_name_of_the_setting(word):
    with pytest.raises(SettingRefused, match="RECEIVERS must hold"):
        places("RECEIVERS", [word])
