"""The OpenAPI document as it is committed, and the page that shows it, with everything it needs served from
here.
"""

from functools import cache

from django.http import HttpRequest, HttpResponse
from django.shortcuts import render
from django.views.decorators.http import require_safe

from service.openapi import COMMITTED


@require_safe
def docs(request: HttpRequest) -> HttpResponse:
    """This function will show the API as its OpenAPI document describes it."""
    return render(request, "service/docs.html")


@require_safe
def openapi(_request: HttpRequest) -> HttpResponse:
    """This function will hand out the document. It is the committed file, so what was compared is what is
    served.
    """
    return HttpResponse(_committed(), content_type="application/json")


@cache
def _committed() -> bytes:
    return COMMITTED.read_bytes()
