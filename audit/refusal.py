"""The one kind of error that a user meets: an input or a rule file is wrong, said in one clear message."""


class Refusal(Exception):
    """What was found, what is accepted, what to do. Ends in exit 2 without a traceback."""
