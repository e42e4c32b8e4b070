"""All settings, in one file. DEVELOPERS.md has the table of variables.

ATOMIC_REQUESTS stays off: the door (records.act) opens the one durable transaction of a change itself.
"""

from pathlib import Path
from typing import Any

from celery.schedules import crontab

import fleet.events
import loads.events
from service import env

BASE_DIR = Path(__file__).resolve().parent.parent

SECRET_KEY = env.text("SECRET_KEY")
DEBUG = False
ALLOWED_HOSTS = env.words("ALLOWED_HOSTS", "127.0.0.1,localhost,[::1]")
CSRF_TRUSTED_ORIGINS = env.words("CSRF_TRUSTED_ORIGINS", "")
# True behind TLS. The local start serves plain HTTP on the loopback address only and sets it to false.
HTTPS = env.flag("HTTPS", True)

INSTALLED_APPS = [
    "django.contrib.contenttypes",
    "django.contrib.auth",
    "django.contrib.sessions",
    "django.contrib.staticfiles",
    "axes",
    "rest_framework",
    "drf_spectacular",
    "drf_spectacular_sidecar",
    "records",
    "fleet",
    "loads",
    "service",
]
MIDDLEWARE = [
    "django.middleware.security.SecurityMiddleware",
    "whitenoise.middleware.WhiteNoiseMiddleware",
    "service.headers.HeadersMiddleware",
    "service.accounting.AccountingMiddleware",
    "service.rate_limits.RateLimitMiddleware",
    "django.middleware.clickjacking.XFrameOptionsMiddleware",
    "django.contrib.sessions.middleware.SessionMiddleware",
    "django.middleware.common.CommonMiddleware",
    "django.middleware.csrf.CsrfViewMiddleware",
    "django.contrib.auth.middleware.AuthenticationMiddleware",
    "service.actors.ActorMiddleware",
    "axes.middleware.AxesMiddleware",
]
ROOT_URLCONF = "service.urls"
WSGI_APPLICATION = "service.wsgi.application"
DEFAULT_AUTO_FIELD = "django.db.models.BigAutoField"
APPEND_SLASH = False
TEMPLATES = [
    {
        "BACKEND": "django.template.backends.django.DjangoTemplates",
        "DIRS": [BASE_DIR / "templates"],
        "OPTIONS": {
            "context_processors": [
                "django.template.context_processors.request",
                "service.pages.page_context",
            ],
        },
    }
]

# Two roles: `default` is the service role, with no right to alter the trail; `owner` migrates and is absent
# from the environment of web and workers.
DATABASES: dict[str, Any] = {"default": env.database("DATABASE_URL")}
if owner_url := env.text("OWNER_DATABASE_URL", ""):
    DATABASES["owner"] = env.database("OWNER_DATABASE_URL", owner_url)

BROKER_URL = env.text("BROKER_URL")
CELERY_BROKER_URL = BROKER_URL
CELERY_TASK_IGNORE_RESULT = True
CELERY_TASK_ACKS_LATE = True
CELERY_TASK_REJECT_ON_WORKER_LOST = True
CELERY_WORKER_PREFETCH_MULTIPLIER = 1
# WeasyPrint grows a little with each document; a fresh child every 200 keeps memory flat.
CELERY_WORKER_MAX_TASKS_PER_CHILD = 200
CELERY_TASK_SERIALIZER = "json"
CELERY_ACCEPT_CONTENT = ["json"]
CELERY_BROKER_CONNECTION_RETRY_ON_STARTUP = True
# A request must not wait for a broker that is down: one short try, then the sweeper finds the work in the
# outbox.
CELERY_TASK_PUBLISH_RETRY = False
CELERY_BROKER_TRANSPORT_OPTIONS = {
    # Without this a publish waits some six seconds for a broker that is not there (measured).
    "max_retries": 0,
    "socket_connect_timeout": 1,
    "socket_timeout": 5,
    "visibility_timeout": 300,
}
CELERY_BEAT_SCHEDULE = {
    "sweep-the-outbox": {"task": "records.tasks.sweep_outbox", "schedule": 20.0},
    "seal-the-log-of-sign-ins": {"task": "records.tasks.seal_access_log", "schedule": 60.0},
    # A sweep nobody took up by the next one is not needed.
    "sweep-the-webhooks": {
        "task": "records.tasks.sweep_webhooks",
        "schedule": 20.0,
        "options": {"expires": 20.0},
    },
    "verify-onwards": {
        "task": "records.tasks.verify_onwards",
        "schedule": 300.0,
        "options": {"expires": 300.0},
    },
    "verify-everything": {
        "task": "records.tasks.verify_everything",
        "schedule": crontab(hour="2", minute="30"),
    },
    "falling-due": {"task": "fleet.tasks.tell_falling_due", "schedule": crontab(hour="4", minute="0")},
    "self-check": {"task": "loads.tasks.self_check", "schedule": crontab(hour="3", minute="15")},
    "forget-old-answers": {"task": "records.tasks.forget_old_answers", "schedule": 3600.0},
}

# What can be subscribed to, by name, and what it means. (Pure modules: they import no models.)
WEBHOOK_EVENTS: dict[str, str] = {**loads.events.EVENTS, **fleet.events.EVENTS}
# Receivers inside the operator's own network, as host:port: they may be private and speak plain http.
WEBHOOK_TRUSTED_RECEIVERS = env.places(
    "WEBHOOK_TRUSTED_RECEIVERS", env.words("WEBHOOK_TRUSTED_RECEIVERS", "")
)

AUTH_USER_MODEL = "fleet.Person"
AUTHENTICATION_BACKENDS = [
    "axes.backends.AxesStandaloneBackend",
    "django.contrib.auth.backends.ModelBackend",
]
AUTH_PASSWORD_VALIDATORS = [
    {"NAME": "django.contrib.auth.password_validation.MinimumLengthValidator", "OPTIONS": {"min_length": 12}},
    {"NAME": "django.contrib.auth.password_validation.CommonPasswordValidator"},
    {"NAME": "django.contrib.auth.password_validation.NumericPasswordValidator"},
]
LOGIN_URL = "sign-in"
# Joins the duties of all rooms: which scopes a token of somebody with these roles may be given.
GRANTABLE = "service.allowed.grantable"
AXES_FAILURE_LIMIT = env.whole("SIGN_IN_FAILURES", 5, low=1, high=100)
AXES_COOLOFF_TIME = 0.25  # hours
AXES_LOCKOUT_PARAMETERS = ["username"]
# The name under which `authenticate` is given the login. Unset, it would be the model's field, and nothing
# be counted.
AXES_USERNAME_FORM_FIELD = "username"
# By login alone, wherever the tries come from: counted by address, guesses from many places would go on.
SILENCED_SYSTEM_CHECKS = ["axes.W006"]
AXES_RESET_ON_SUCCESS = True
AXES_ENABLE_ADMIN = False
AXES_DISABLE_ACCESS_LOG = True
AXES_VERBOSE = False
# The page and the API answer a lock-out themselves, with the wait stated.
AXES_LOCKOUT_CALLABLE = "service.problems.keep_answer"
AXES_IPWARE_PROXY_COUNT = 0

SESSION_COOKIE_HTTPONLY = True
SESSION_COOKIE_SAMESITE = "Lax"
SESSION_COOKIE_AGE = 12 * 3600
SESSION_COOKIE_SECURE = HTTPS
CSRF_COOKIE_SECURE = HTTPS
CSRF_COOKIE_HTTPONLY = True
CSRF_FAILURE_VIEW = "service.problems.forged"
SECURE_SSL_REDIRECT = HTTPS
SECURE_HSTS_SECONDS = 31536000 if HTTPS else 0
SECURE_HSTS_INCLUDE_SUBDOMAINS = HTTPS
SECURE_HSTS_PRELOAD = HTTPS
SECURE_CONTENT_TYPE_NOSNIFF = True
SECURE_REFERRER_POLICY = "same-origin"
X_FRAME_OPTIONS = "DENY"
BEHIND_PROXY = env.flag("BEHIND_PROXY", False)
if BEHIND_PROXY:
    SECURE_PROXY_SSL_HEADER = ("HTTP_X_FORWARDED_PROTO", "https")

# Requests a minute: of a token or a person, of an address nobody is known at, and of what tries a password.
# 0: no limit.
RATE_LIMITS = {
    "known": env.whole("RATE_LIMIT_KNOWN", 1200, low=0, high=1_000_000),
    "stranger": env.whole("RATE_LIMIT_STRANGER", 120, low=0, high=1_000_000),
    "sign-in": env.whole("RATE_LIMIT_SIGN_IN", 20, low=0, high=1_000_000),
    "signing": env.whole("RATE_LIMIT_SIGNING", 30, low=0, high=1_000_000),
}
# Without a token only this machine is told the figures, and nobody behind a proxy.
METRICS_TOKEN = env.text("METRICS_TOKEN", "")

STATIC_URL = "static/"
STATICFILES_DIRS = [BASE_DIR / "static"]
STATIC_ROOT = env.text("STATIC_ROOT", "") or None
# Served straight from static/ and the packages, no collect step, no third-party host.
WHITENOISE_USE_FINDERS = True
WHITENOISE_AUTOREFRESH = False

# Mail about accepted loads that went stale; without a server none is promised, and pages and events tell.
# How long a link to choose a new password serves, in seconds.
PASSWORD_RESET_TIMEOUT = 4 * 3600
EMAIL_HOST = env.text("MAIL_HOST", "")
EMAIL_PORT = env.whole("MAIL_PORT", 587, low=1, high=65535)
EMAIL_HOST_USER = env.text("MAIL_USER", "")
EMAIL_HOST_PASSWORD = env.text("MAIL_PASSWORD", "")
EMAIL_USE_TLS = env.flag("MAIL_TLS", True)
EMAIL_TIMEOUT = 20
DEFAULT_FROM_EMAIL = env.text("MAIL_FROM", "tarebook@localhost")

LANGUAGE_CODE = "en"
USE_I18N = False
USE_TZ = True
TIME_ZONE = "UTC"

DATA_UPLOAD_MAX_MEMORY_SIZE = 1024 * 1024
# The page of a load with all its rows (400 items and what they stand on, seats, events) is one form.
DATA_UPLOAD_MAX_NUMBER_FIELDS = 12_000
REST_FRAMEWORK = {
    "DEFAULT_AUTHENTICATION_CLASSES": [
        "service.actors.TokenAuthentication",
        "service.actors.SessionAuthentication",
    ],
    "DEFAULT_PERMISSION_CLASSES": ["service.actors.Known"],
    "DEFAULT_PARSER_CLASSES": ["records.api.parser.StrictJSONParser"],
    "DEFAULT_RENDERER_CLASSES": ["records.api.render.ExactJSONRenderer"],
    "EXCEPTION_HANDLER": "service.problems.handler",
    "DEFAULT_SCHEMA_CLASS": "drf_spectacular.openapi.AutoSchema",
    "UNAUTHENTICATED_USER": None,
    "COERCE_DECIMAL_TO_STRING": True,
}
SPECTACULAR_SETTINGS = {
    "TITLE": "Tarebook",
    "VERSION": "1",
    "OAS_VERSION": "3.1.0",
    "DESCRIPTION": "Load records for small air operators. The approved flight manual, the operator's "
    "approved procedures, local rules and licensed people decide; a figure from this service does not.",
    "SERVE_INCLUDE_SCHEMA": False,
    "SCHEMA_PATH_PREFIX": "/api/v1",
    "SWAGGER_UI_DIST": "SIDECAR",
    "SWAGGER_UI_FAVICON_HREF": "SIDECAR",
    "COMPONENT_SPLIT_REQUEST": True,
    "POSTPROCESSING_HOOKS": ["service.openapi.finish"],
}

LOGGING = {
    "version": 1,
    "disable_existing_loggers": False,
    "filters": {"numbered": {"()": "service.log_lines.Numbered"}},
    "formatters": {
        "plain": {
            "()": "service.log_lines.Plain",
            "format": "%(levelname)s %(name)s [%(request_number)s] %(message)s",
        }
    },
    "handlers": {
        "console": {"class": "logging.StreamHandler", "formatter": "plain", "filters": ["numbered"]}
    },
    "root": {"handlers": ["console"], "level": env.text("LOG_LEVEL", "INFO")},
    "loggers": {
        "axes": {"level": "ERROR"},
        # What was refused stands in the line of its request already; a failure comes with its trace.
        "django.request": {"level": "ERROR"},
        "fontTools": {"level": "WARNING"},
        "weasyprint": {"level": "ERROR"},
    },
}
