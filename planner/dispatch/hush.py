"""Keep the solver's banner off the user's screen.

HiGHS prints two lines from C when the first of its objects in a process is made, whatever its
options say; they would stand above the answer. Its licence is named in DEVELOPERS.md.
"""

import os
import sys
from functools import cache

import highspy


@cache
def hush_banner() -> None:
    """Make one solver with the standard output pointed at nothing; later ones print no banner."""
    sys.stdout.flush()
    kept = os.dup(1)
    nothing = os.open(os.devnull, os.O_WRONLY)
    try:
        os.dup2(nothing, 1)
        highspy.Highs()
    finally:
        os.dup2(kept, 1)
        os.close(kept)
        os.close(nothing)
