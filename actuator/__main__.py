"""``python -m actuator``: the same as the console command."""

from __future__ import annotations

import sys

from actuator.cli import main

if __name__ == "__main__":
    sys.exit(main())
