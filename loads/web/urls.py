"""Addresses of the loads pages."""

from django.urls import path

from loads.web import day, declare, load, steps

urlpatterns = [
    path("", day.day, name="day"),
    path("declare", declare.declare, name="declare"),
    path("loads/<uuid:load>", load.one_load, name="load"),
    path("loads/<uuid:load>/manifest", load.manifest, name="manifest"),
    path("loads/<uuid:load>/revise", declare.revise, name="revise"),
    path("loads/<uuid:load>/sign", steps.sign, name="sign-load"),
    path("loads/<uuid:load>/assess", steps.assess, name="assess-load"),
    path("loads/<uuid:load>/depart", steps.depart, name="depart-load"),
    path("loads/<uuid:load>/withdraw", steps.withdraw, name="withdraw-load"),
]
