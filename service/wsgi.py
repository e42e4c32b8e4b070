"""The WSGI application, as it is: `service/proven.py` is what a server is given."""

import os

from django.core.wsgi import get_wsgi_application

os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")

application = get_wsgi_application()
