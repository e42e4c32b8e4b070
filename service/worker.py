"""The Celery application. Run as `celery -A service.worker worker` and `celery -A service.worker beat`."""

import os

from celery import Celery

os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")

app = Celery("tarebook")
app.config_from_object("django.conf:settings", namespace="CELERY")
app.autodiscover_tasks(["records", "fleet", "loads"])
