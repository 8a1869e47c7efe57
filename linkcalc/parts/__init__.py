"""What a mechanism is made of. Every file beneath is imported, so a kind is found because its file is there."""

import importlib
import pkgutil

for _module in pkgutil.walk_packages(__path__, prefix=f"{__name__}."):
    importlib.import_module(_module.name)
