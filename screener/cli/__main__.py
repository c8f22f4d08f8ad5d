"""`python -m screener.cli`: the command line."""

import sys

from screener.cli import main

sys.exit(main())
