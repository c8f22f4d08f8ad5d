"""`python -m screener`: the command line."""

import sys

from screener.cli import main

sys.exit(main())
