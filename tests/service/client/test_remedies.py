"""What the client asks for when a load is to be brought within, and what it makes of the answer."""

from service.client import Tarebook
from tests.service.client.told_server import Turn, telling

NUMBER = "01a23107-3d72-7a66-8157-3ea0a197a14a"
CHANGE = {"op": "replace", "path": "/passengers/0/seat", "value": "ROW1-R"}
ANSWER = {
    "load": NUMBER,
    "step": 1,
    "verdict": "outside",
    "engine": "3",
    "remedies": [
        {
            "kind": "reseat",
            "sentence": "Reseat the passenger in row 2 right to row 1 right.",
            "found": "smallest",
            "figures": [],
            "mended": [],
            "next": {},
            "change": [CHANGE],
        }
    ],
    "more": [],
    "error": [],
    "said": "",
    "cautions": [],
}


def test_the_remedies_of_a_load_are_read_with_their_change() -> None:
    with telling(Turn(200, ANSWER)) as server:
        found = Tarebook(server.address, "tb_only-for-tests").remedies(NUMBER)

    assert server.asked[0].path == f"/api/v1/loads/{NUMBER}/remedies"
    assert (found.verdict, found.said, found.more, found.error) == ("outside", "", (), ())
    (only,) = found.remedies
    assert (only.kind, only.found, only.change) == ("reseat", "smallest", (CHANGE,))
