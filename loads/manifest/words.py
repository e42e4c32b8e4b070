"""The words of a rule set: what is called mass or weight, and which rule asks for which item.

Rule numbers: 14 CFR 135.63(c)(1) to (8) and 135.63(d); CAT.POL.MAB.105(a) and (c). (c)(5) to (8), (d) and the
list of 105(a) were read in the rule; the numbers of (c)(1) to (4) are remembered. No paragraph of 105(a) is
numbered here, because only the list itself was read.
"""

import re
from collections.abc import Iterable, Mapping
from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Words:
    """How a rule set speaks. `rules` maps an item of the paper to the number of the rule that asks for it."""

    weight: str
    operating: str
    paper: str
    rules: Mapping[str, str]
    rules_are: str

    def said(self, text: str, *, typed: Iterable[str] = ()) -> str:
        """This function will put a text of ours into this rule set's words.

        Of what was typed nothing is changed: name in `typed` what may stand inside the text.
        """
        if self.weight == "weight":
            return text
        kept = sorted({part for part in typed if part}, key=len, reverse=True)
        parts = re.split(f"({'|'.join(map(re.escape, kept))})", text) if kept else [text]
        return "".join(part if place % 2 else self._put(part) for place, part in enumerate(parts))

    def _put(self, text: str) -> str:
        text = re.sub(r"\boperating weight\b", self.operating, text)
        return re.sub(
            r"\b([Ww])eight(s?)\b", lambda m: f"{'M' if m[1] == 'W' else 'm'}ass{'es' if m[2] else ''}", text
        )


_US = Words(
    weight="weight",
    operating="operating weight",
    paper="Letter",
    rules={
        "registration": "135.63(c)(6)",
        "flight": "135.63(c)(6)",
        "route": "135.63(c)(7)",
        "crew": "135.63(c)(8)",
        "passengers": "135.63(c)(1)",
        "take_off": "135.63(c)(2)",
        "allowable": "135.63(c)(3)",
        "cg_limits": "135.63(c)(4)",
        "cg": "135.63(c)(5)",
        "empty_weight": "135.185",
        "carried": "135.63(d)",
    },
    rules_are="Numbers beside items: 14 CFR part 135.",
)

_MAB = "MAB.105(a)"
_EU_UK = Words(
    weight="mass",
    operating="dry operating mass",
    paper="A4",
    rules={
        **dict.fromkeys(
            (
                "registration", "flight", "crew", "preparer", "passengers", "take_off", "allowable",
                "cg_limits", "cg", "landing", "zero_fuel", "fuel", "operating", "components",
            ),
            _MAB,
        ),
        "empty_weight": "MAB.100(b)",
        "signatures": "MAB.105(c)",
    },
    rules_are="Numbers beside items: CAT.POL.MAB.100 and 105.",
)  # fmt: skip

WORDS: Mapping[str, Words] = {"US": _US, "EU-UK": _EU_UK}
SINGLE_ENGINE_US = (
    "135.63(c) binds multi-engine aircraft; its items are given here under the operator's procedure."
)
