"""The one exception for "this cannot go on": a sentence for a person, with the next step in it."""


class Stopped(Exception):
    """Tell a person in one clear sentence why the program stops, and what to do next."""
