"""Asking the web server of this container whether it is well: `python -m service.probe`, exit code 0 or 1."""

import sys
import urllib.request

from service import env

ADDRESS = "http://127.0.0.1:8000/health"


def well(address: str = ADDRESS) -> bool:
    """Return whether the server answers that it is well, asked as the proxy in front of it would ask."""
    hosts = env.words("ALLOWED_HOSTS", "127.0.0.1")
    as_the_proxy = {"Host": hosts[0].removeprefix("."), "X-Forwarded-Proto": "https"}
    request = urllib.request.Request(address, headers=as_the_proxy)  # noqa: S310 - always http
    try:
        # Anything but a 2xx is raised, and so is a redirection to https that we cannot follow here.
        with urllib.request.urlopen(request, timeout=8):  # noqa: S310 - always http
            return True
    except OSError as problem:
        print(problem, file=sys.stderr)
        return False


if __name__ == "__main__":
    sys.exit(0 if well() else 1)
