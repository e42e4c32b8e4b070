"""The WSGI application: `granian --interface wsgi service.wsgi:application`."""

import os
from importlib import import_module

from django.core.wsgi import get_wsgi_application

os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")

application = get_wsgi_application()
# Every start proves the computer; imported here, once the rooms are loaded. No connection is kept for threads
# that are yet to come.
import_module("service.proving").prove_at_start()
import_module("django.db").connections.close_all()
