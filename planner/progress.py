"""How long work tells whoever waits what it is doing."""

from collections.abc import Callable

#: Called with what is being done and the share of the whole that is finished, 0 to 1.
Progress = Callable[[str, float], None]


def silent(what: str, done_frac: float) -> None:
    """Tell nobody.

    Parameters
    ----------
    what : str
        What is being done.
    done_frac : float [-]
        Share of the whole that is finished.
    """
