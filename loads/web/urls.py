"""Addresses of the loads pages."""

from django.urls import path

from loads.web import (
    day,
    declare,
    documents,
    inspect,
    late,
    load,
    rechecks,
    rejects,
    self_check,
    steps,
    trail,
)

urlpatterns = [
    path("", day.day, name="day"),
    path("declare", declare.declare, name="declare"),
    path("loads/<uuid:load>", load.one_load, name="load"),
    path("loads/<uuid:load>/manifest", load.manifest, name="manifest"),
    path("loads/<uuid:load>/revise", declare.revise, name="revise"),
    path("loads/<uuid:load>/sign", steps.sign, name="sign-load"),
    path("loads/<uuid:load>/assess", steps.assess, name="assess-load"),
    path("loads/<uuid:load>/depart", steps.depart, name="depart-load"),
    path("loads/<uuid:load>/change", late.change, name="change-load-late"),
    path("loads/<uuid:load>/note", late.note, name="note-load"),
    path("loads/<uuid:load>/withdraw", steps.withdraw, name="withdraw-load"),
    path("rejects", rejects.rejects, name="rejects"),
    path("rejects/<uuid:load>/remarks", rejects.remark, name="remark-reject"),
    path("documents", documents.documents, name="documents"),
    path("inspect", inspect.inspect, name="inspect"),
    path("rechecks", rechecks.rechecks, name="rechecks"),
    path("rechecks/<uuid:recheck>", rechecks.recheck, name="recheck"),
    path("self-check", self_check.self_check, name="self-check"),
    path("trail", trail.trail, name="trail"),
    path("trail/<uuid:act>", trail.one_act, name="act"),
]
