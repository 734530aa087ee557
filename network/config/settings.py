"""Settings of an installation; what differs between machines comes from the environment."""

import sys
from pathlib import Path

import dj_database_url
from django.utils.translation import gettext_lazy as _

from network.config import env

BASE_DIR = Path(__file__).resolve().parents[2]

# --- where an installation keeps its own things -------------------------------------------------
DATA_DIR = Path(env.text("GAUGEWRIGHT_DATA", str(BASE_DIR / ".data")))
MEDIA_ROOT = DATA_DIR / "media"  # photographs, certificates, logger files, yearbooks
SECRET_KEY_FILE = DATA_DIR / "secret_key"

DEBUG = env.flag("GAUGEWRIGHT_DEBUG", False)
TESTING = "pytest" in sys.modules
# Without a key of its own an installation runs on a known one and the system check says so.
INSECURE_KEY = "set-up-has-not-run-on-this-installation-yet-0000000000000000"
SECRET_KEY = env.secret("GAUGEWRIGHT_SECRET_KEY", SECRET_KEY_FILE) or INSECURE_KEY
ALLOWED_HOSTS = env.words("GAUGEWRIGHT_HOSTS") or ["localhost", "127.0.0.1", "[::1]"]
CSRF_TRUSTED_ORIGINS = env.words("GAUGEWRIGHT_ORIGINS")
SITE_URL = env.text("GAUGEWRIGHT_URL", "http://127.0.0.1:8000").rstrip("/")

# --- parts --------------------------------------------------------------------------------------
INSTALLED_APPS = [
    "network.apps.NetworkConfig",
    "reports.apps.ReportsConfig",
    "network.apps.StaffSiteConfig",  # the Django admin with the agency's own site as default
    "django.contrib.auth",
    "django.contrib.contenttypes",
    "django.contrib.sessions",
    "django.contrib.messages",
    "django.contrib.staticfiles",
    "simple_history",
    "axes",
    "django_tasks",
]

MIDDLEWARE = [
    "django.middleware.security.SecurityMiddleware",
    "whitenoise.middleware.WhiteNoiseMiddleware",
    "network.web.content_security_policy.ContentSecurityPolicyMiddleware",
    "django.contrib.sessions.middleware.SessionMiddleware",
    "django.middleware.locale.LocaleMiddleware",
    "django.middleware.common.CommonMiddleware",
    "django.middleware.csrf.CsrfViewMiddleware",
    "django.contrib.auth.middleware.AuthenticationMiddleware",
    "django.contrib.messages.middleware.MessageMiddleware",
    "django.middleware.clickjacking.XFrameOptionsMiddleware",
    "network.web.record_clock.RecordClockMiddleware",
    "axes.middleware.AxesMiddleware",
]

ROOT_URLCONF = "network.config.urls"
WSGI_APPLICATION = "network.config.wsgi.application"

TEMPLATES = [
    {
        "BACKEND": "django.template.backends.django.DjangoTemplates",
        "APP_DIRS": True,
        "OPTIONS": {
            "context_processors": [
                "django.template.context_processors.request",
                "django.contrib.auth.context_processors.auth",
                "django.contrib.messages.context_processors.messages",
                "network.web.agency_context.agency",
            ],
        },
    },
]

# --- database -----------------------------------------------------------------------------------
DATABASES = {
    "default": dj_database_url.parse(
        env.text("DATABASE_URL", f"sqlite:///{DATA_DIR / 'gaugewright.sqlite3'}"),
        conn_max_age=env.number("GAUGEWRIGHT_CONN_MAX_AGE", 60),
        conn_health_checks=True,
    )
}
if DATABASES["default"]["ENGINE"].endswith("postgresql"):
    # Queries of many short look-ups: compiling one takes longer than running it.
    DATABASES["default"].setdefault("OPTIONS", {}).setdefault("options", "-c jit=off")
else:
    # IMMEDIATE: writers queue at the door instead of failing half-way through.
    DATABASES["default"]["OPTIONS"] = {
        "timeout": 20,
        "transaction_mode": "IMMEDIATE",
        # Five packed months fill a page of 8 kB, two would leave a third of one of 4 kB empty; it
        # is set before the file is made. The index pages of a large network fit into 32 MB.
        "init_command": "PRAGMA page_size=8192; PRAGMA journal_mode=WAL;"
        " PRAGMA synchronous=NORMAL; PRAGMA cache_size=-32000;",
    }
DEFAULT_AUTO_FIELD = "django.db.models.BigAutoField"

# --- time and language --------------------------------------------------------------------------
USE_TZ = True
TIME_ZONE = "UTC"  # instants are stored in UTC; the record clock is activated per request
USE_I18N = True
LANGUAGE_CODE = env.text("GAUGEWRIGHT_LANGUAGE", "en")
LANGUAGES = [("en", _("English")), ("de", _("German"))]
LANGUAGE_COOKIE_HTTPONLY = True

# --- people -------------------------------------------------------------------------------------
AUTH_USER_MODEL = "network.Person"
AUTHENTICATION_BACKENDS = [
    "axes.backends.AxesStandaloneBackend",
    "django.contrib.auth.backends.ModelBackend",
]
PASSWORD_HASHERS = [
    "django.contrib.auth.hashers.Argon2PasswordHasher",
    "django.contrib.auth.hashers.PBKDF2PasswordHasher",
]
AUTH_PASSWORD_VALIDATORS = [
    {"NAME": "django.contrib.auth.password_validation.UserAttributeSimilarityValidator"},
    {
        "NAME": "django.contrib.auth.password_validation.MinimumLengthValidator",
        "OPTIONS": {"min_length": 10},
    },
    {"NAME": "django.contrib.auth.password_validation.CommonPasswordValidator"},
]
LOGIN_URL = "admin:login"
AXES_FAILURE_LIMIT = 8
AXES_COOLOFF_TIME = 0.25  # hours
AXES_LOCKOUT_PARAMETERS = [["username", "ip_address"]]
AXES_RESET_ON_SUCCESS = True
AXES_VERBOSE = False
SILENCED_SYSTEM_CHECKS = ["axes.W004"] if TESTING else []

# --- hardening ----------------------------------------------------------------------------------
HTTPS = env.flag("GAUGEWRIGHT_HTTPS", False)
SECURE_SSL_REDIRECT = HTTPS
SESSION_COOKIE_SECURE = HTTPS
CSRF_COOKIE_SECURE = HTTPS
SECURE_HSTS_SECONDS = 31_536_000 if HTTPS else 0
SECURE_HSTS_INCLUDE_SUBDOMAINS = HTTPS
SECURE_HSTS_PRELOAD = HTTPS
if env.flag("GAUGEWRIGHT_BEHIND_PROXY", False):
    SECURE_PROXY_SSL_HEADER = ("HTTP_X_FORWARDED_PROTO", "https")
SECURE_REFERRER_POLICY = "same-origin"
X_FRAME_OPTIONS = "DENY"
SESSION_COOKIE_HTTPONLY = True
SESSION_COOKIE_AGE = 60 * 60 * 24 * 14
# Named like Django 6's own setting, which can take over when we move there.
SECURE_CSP = {
    "default-src": ["'none'"],
    "script-src": ["'self'"],
    "style-src": ["'self'"],
    "img-src": ["'self'", "data:"],
    "font-src": ["'self'"],
    "connect-src": ["'self'"],
    "form-action": ["'self'"],
    "frame-ancestors": ["'none'"],
    "base-uri": ["'none'"],
}

# --- uploads ------------------------------------------------------------------------------------
DATA_UPLOAD_MAX_NUMBER_FIELDS = 20_000  # a sheet of 60 verticals with five points passes 1,000
DATA_UPLOAD_MAX_MEMORY_SIZE = 10 * 2**20
UPLOAD_LIMIT_BYTES = 210 * 2**20  # a logger file of 200 MB and its form
FILE_UPLOAD_HANDLERS = [
    "network.web.upload_limit.LimitedUploadHandler",
    "django.core.files.uploadhandler.TemporaryFileUploadHandler",
]
FILE_UPLOAD_PERMISSIONS = 0o640

# --- static files, long work, mail --------------------------------------------------------------
STATIC_URL = "static/"
MEDIA_URL = "media/"
STORAGES = {
    "default": {"BACKEND": "django.core.files.storage.FileSystemStorage"},
    "staticfiles": {"BACKEND": "django.contrib.staticfiles.storage.StaticFilesStorage"},
}
WHITENOISE_USE_FINDERS = True  # no collectstatic step: the installed files are served as they are
TASKS = {
    "default": {
        "BACKEND": env.text("GAUGEWRIGHT_TASKS", "django_tasks.backends.immediate.ImmediateBackend")
    }
}
EMAIL_BACKEND = env.text(
    "GAUGEWRIGHT_EMAIL_BACKEND", "django.core.mail.backends.console.EmailBackend"
)
DEFAULT_FROM_EMAIL = env.text("GAUGEWRIGHT_FROM", "gaugewright@localhost")

# --- doors between the apps ---------------------------------------------------------------------
# The network asks about issued editions through this name, so that it never imports reports.
EDITIONS_TOUCHED_BY = "reports.editions.touched_by"

LOGGING = {
    "version": 1,
    "disable_existing_loggers": False,
    "handlers": {"console": {"class": "logging.StreamHandler"}},
    "loggers": {
        "django": {"handlers": ["console"], "level": "WARNING", "propagate": False},
        # These two describe every font table and glyph they touch.
        "weasyprint": {"handlers": ["console"], "level": "ERROR", "propagate": False},
        "fontTools": {"handlers": ["console"], "level": "ERROR", "propagate": False},
    },
}
