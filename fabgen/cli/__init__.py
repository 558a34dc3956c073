"""Options in, text out.

A command line's process is short: garbage is left to its end.
"""

import gc

gc.set_threshold(100_000)
