"""Cases of the command line use the same hand-made screening as the memo."""

import sys
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent.parent / "memo"))
