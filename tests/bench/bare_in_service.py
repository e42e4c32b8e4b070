"""The judge with the service's own settings and middleware: the same sign-in by token, the same strict reader
of JSON, the same headers; only the endpoint is another one.
"""

import os

from django.conf import settings
from django.core.wsgi import get_wsgi_application

os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")
settings.ROOT_URLCONF = "tests.bench.bare_endpoint"
application = get_wsgi_application()
