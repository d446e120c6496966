"""`python -m load_profiles.demo_sites [STARTERS]`: write the raw files of the invented sites."""

import sys
from pathlib import Path

from load_profiles.demo_sites import DEMO_FOLDERS
from load_profiles.demo_sites.generator import DEMO_SITES, STARTER_SITES, write_site


def main(arguments: list[str]) -> int:
    """Write the demo's files, and the starters' where their folder is named.

    Parameters
    ----------
    arguments : list of str
        Empty, or the folder that holds the starter studies.

    Returns
    -------
    int
        Exit code: 0, or 2 when the arguments make no sense.
    """
    if len(arguments) > 1 or any(not Path(name).is_dir() for name in arguments):
        sys.stderr.write("usage: python -m load_profiles.demo_sites [FOLDER OF THE STARTERS]\n")
        return 2
    written = [
        path for folder in DEMO_FOLDERS for path in write_site(DEMO_SITES[folder.name], folder)
    ]
    for starters in arguments:
        for kind, site in STARTER_SITES.items():
            written += write_site(site, Path(starters) / kind)
    for path in written:
        sys.stdout.write(f"{path} {path.stat().st_size} bytes\n")
    return 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
