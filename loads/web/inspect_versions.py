"""The versions a load used, as the inspector's screen tells them: figures, report, author and approver."""

import json
from collections.abc import Sequence
from datetime import datetime
from typing import Any
from uuid import UUID
from zoneinfo import ZoneInfo

from fleet.models import Approval, EmptyWeight, LoadingBasis, Provision
from fleet.queries.aircraft import empty_weight_of, loading_basis_of
from fleet.web.as_typed import as_typed, sided

Shown = dict[str, Any]


def weight_shown(used: EmptyWeight | None, now: EmptyWeight | None, zone: ZoneInfo) -> Shown | None:
    """This function will tell the empty weight a load used, and which other is held true for that time now.

    None when none was in force.
    """
    if used is None:
        return None
    version = empty_weight_of(used.aircraft, used.id)
    document = json.loads(version.document)
    return _authors(version, getattr(version, "approval", None), zone) | {
        "figure": as_typed(document["weight"]),
        "lines": [
            f"{title} {sided(name, document[name])}"
            for name, title in (
                ("moment", "moment"),
                ("arm", "arm"),
                ("lateral_moment", "lateral moment"),
                ("lateral_arm", "lateral arm"),
            )
            if name in document
        ],
        "how": document["how"],
        "report": document["report"],
        "date": document["date"],
        "signed_by": document.get("signed_by", ""),
        "includes": _includes(document.get("includes", {})),
        "fit": version.fit,
        "true_from": _local(version.true_from, zone),
        "digest": version.digest,
        "other_now": _other(json.loads(now.document)) if now and now.id != version.id else "",
    }


def basis_shown(used: LoadingBasis | None, now: LoadingBasis | None, zone: ZoneInfo) -> Shown | None:
    """This function will tell the loading basis a load used, and which other is held true for that time now.

    None when none was in force.
    """
    if used is None:
        return None
    version = loading_basis_of(used.aircraft, used.id)
    document = json.loads(version.document)["document"]
    return _authors(version, getattr(version, "approval", None), zone) | {
        "revision": version.revision,
        "document": f"{document['title']} {document['number']} rev {document['revision']}",
        "digest": version.digest,
        "other_now": f"revision {now.revision}" if now and now.id != version.id else "",
    }


def provisions_shown(used: Sequence[UUID], zone: ZoneInfo) -> list[Shown]:
    """This function will tell the tables, rules, restrictions and permits a load used, with who entered and
    approved them.
    """
    rows = Provision.objects.filter(id__in=list(used)).select_related("entered_by", "approval__approved_by")
    found = {row.id: row for row in rows}
    return [_provision(found[one], zone) for one in used if one in found]


def _provision(row: Provision, zone: ZoneInfo) -> Shown:
    approval = getattr(row, "approval", None)
    document = json.loads(row.document)
    return {
        "kind": row.kind,
        "title": f"{document.get('number', row.number)}: {document.get('title') or document.get('what')}",
        "entered": f"{row.entered_by.name}, {_local(row.entered_at, zone)}",
        "approved": f"{approval.approved_by.name}, {_local(approval.known_from, zone)}" if approval else "",
        "digest": row.digest,
    }


def equipment_shown(used: LoadingBasis | None, configuration: str) -> list[dict[str, str]]:
    """This function will list the equipment and operating items of the configuration flown, as the basis has
    them.
    """
    if used is None:
        return []
    document = json.loads(loading_basis_of(used.aircraft, used.id).document)
    found = next((one for one in document["configurations"] if one["id"] == configuration), None)
    if found is None:
        return []
    return [
        {
            "kind": kind,
            "what": item["what"],
            "weight": as_typed(item["weight"]),
            "arm": as_typed(item["arm"]),
        }
        for part, kind in (("equipment", "equipment"), ("operating_items", "operating item"))
        for item in found.get(part, ())
    ]


def _authors(version: EmptyWeight | LoadingBasis, approval: Approval | None, zone: ZoneInfo) -> Shown:
    return {
        "entered": f"{version.entered_by.name}, {_local(version.entered_at, zone)}",
        "approved": f"{approval.approved_by.name}, {_local(approval.known_from, zone)}" if approval else "",
    }


def _other(document: dict[str, Any]) -> str:
    return f"{as_typed(document['weight'])}, report {document['report']}, approved later"


def _includes(parts: dict[str, Any]) -> str:
    oil = {"full": "full oil", "none": "no oil"}.get(str(parts.get("oil")), "")
    unusable = {True: "unusable fuel", False: "no unusable fuel"}.get(bool(parts.get("unusable_fuel")), "")
    return " and ".join(part for part in (oil, unusable) if part)


def _local(instant: datetime, zone: ZoneInfo) -> str:
    return instant.astimezone(zone).strftime("%Y-%m-%d %H:%M")
