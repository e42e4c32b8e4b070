"""The environment of the tests. Loaded before anything else, since settings are read on import.

The addresses are stand-ins: `tests/conftest.py` points them at a database of this run before the first use.
"""

import os

os.environ.update(
    SECRET_KEY="only-for-tests-only-for-tests-only-for-tests-0123456789",
    HTTPS="false",
    DATABASE_URL="postgresql://tarebook_service@/not-yet?host=/nonexistent",
    OWNER_DATABASE_URL="postgresql://tarebook_owner@/not-yet?host=/nonexistent",
)
# No broker: a test that needs one starts one and says so.
os.environ.setdefault("BROKER_URL", "redis+socket:///nonexistent/valkey.sock")
