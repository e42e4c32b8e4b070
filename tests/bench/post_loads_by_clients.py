"""POST /api/v1/loads at 1, 4 and 16 clients, each beside the bare endpoint in the same house.

    python -m tests.bench.post_loads_by_clients

Requests a second, in turns, the middle of five. There is no target: it tells how far two server processes of
four threads each go, and that more clients never bring it down.
"""

import statistics
import sys

from tests.bench.served import rate, served

CLIENTS, ROUNDS, SECONDS = (1, 4, 16), 5, 3.0


def main() -> int:
    """This function will print a line for each number of clients."""
    with served("loads", "bare") as of:
        for name in ("loads", "bare"):
            rate(of, name, seconds=2.0)  # warm
        seen: dict[tuple[int, str], list[float]] = {}
        for _ in range(ROUNDS):
            for clients in CLIENTS:
                for name in ("loads", "bare"):
                    seen.setdefault((clients, name), []).append(
                        rate(of, name, seconds=SECONDS, clients=clients)
                    )
    print(f"{'clients':>8}{'POST /loads':>14}{'bare':>10}{'ratio':>8}")
    for clients in CLIENTS:
        loads, bare = (statistics.median(seen[clients, name]) for name in ("loads", "bare"))
        print(f"{clients:>8}{loads:>12.0f}/s{bare:>8.0f}/s{loads / bare:>8.2f}")
    return 0


if __name__ == "__main__":
    sys.exit(main())
