"""All addresses: the API of the rooms under /api/v1/, the pages, health."""

from django.urls import URLPattern, URLResolver, include, path

from service import new_password, pages
from service.docs import docs, openapi
from service.figures import metrics
from service.health import Health, alive

api: list[URLPattern | URLResolver] = [
    # Tried in this order: what is asked most stands first.
    path("", include("loads.api.urls")),
    path("", include("fleet.api.urls")),
    path("", include("records.api.urls")),
    path("health", Health.as_view(), name="api-health"),
    path("openapi.json", openapi, name="openapi"),
]
urlpatterns = [
    path("api/v1/", include(api)),
    path("health", Health.as_view(schema=None), name="health"),
    path("health/alive", alive, name="alive"),
    path("metrics", metrics, name="metrics"),
    path("docs", docs, name="docs"),
    path("sign-in", pages.sign_in, name="sign-in"),
    path("new-password/<int:person>/<str:code>", new_password.new_password, name="new-password"),
    path("sign-out", pages.sign_out, name="sign-out"),
    path("", include("fleet.web.urls")),
    path("", include("loads.web.urls")),
]

handler400 = "service.problems.unreadable"
handler403 = "service.problems.not_allowed"
handler404 = "service.problems.not_found"
handler500 = "service.problems.failed"
