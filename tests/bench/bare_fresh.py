"""The judge as a fresh project: no middleware, no session, no login, the framework's own reader and writer of
JSON.
"""

import os
from urllib.parse import parse_qsl, urlsplit

from django.conf import settings
from django.core.wsgi import get_wsgi_application

_address = urlsplit(os.environ["DATABASE_URL"])
_options = dict(parse_qsl(_address.query))
settings.configure(
    SECRET_KEY="bench",
    ALLOWED_HOSTS=["*"],
    ROOT_URLCONF="tests.bench.bare_endpoint",
    INSTALLED_APPS=["rest_framework"],
    USE_TZ=True,
    DATABASES={
        "default": {
            "ENGINE": "django.db.backends.postgresql",
            "NAME": _address.path.strip("/"),
            "USER": _address.username or "",
            "PASSWORD": _address.password or "",
            "HOST": _options.get("host", _address.hostname or ""),
            "PORT": _address.port or "",
            "CONN_MAX_AGE": None,
        }
    },
    REST_FRAMEWORK={
        "UNAUTHENTICATED_USER": None,
        "DEFAULT_AUTHENTICATION_CLASSES": [],
        "DEFAULT_RENDERER_CLASSES": ["rest_framework.renderers.JSONRenderer"],
    },
)
application = get_wsgi_application()
