"""Options in, text out.

A command line's process is short: it loads no plug-ins of the validation library (finding out that there are none
costs a third of a check) and leaves collecting garbage to its end.
"""

import gc
import os

os.environ.setdefault("PYDANTIC_DISABLE_PLUGINS", "__all__")
gc.set_threshold(100_000)
