"""`python -m beatwise`, and the `beatwise` script."""

from __future__ import annotations

import sys
from typing import NoReturn


def main() -> NoReturn:
    """Run the command line and leave with its exit status."""
    try:
        from beatwise.cli import run

        sys.exit(run())
    except KeyboardInterrupt:  # while still starting
        sys.exit(130)


if __name__ == "__main__":
    main()
