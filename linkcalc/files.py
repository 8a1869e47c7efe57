"""Writing files whole: either the new file stands there, or the old one still does."""

from __future__ import annotations

import os
import shutil
from pathlib import Path

from linkcalc.faults import Fault, Faults


def write_whole(path: str | Path, data: str | bytes) -> None:
    """Write a file in one step, over an old one if there is one; text is written as UTF-8.

    Raises Faults: it cannot be written there. Nothing is left half-written.
    """
    name = str(path)
    try:
        content = data.encode("utf-8") if isinstance(data, str) else data
        target = Path(os.path.realpath(path))
        if target.is_dir():
            raise Faults(Fault((), "cannot be written: it is a folder", "the name of a file is wanted", name))
        if target.exists() and not target.is_file():
            target.write_bytes(content)  # a pipe or a terminal: there is nothing to keep whole
            return
        if not target.parent.is_dir():
            raise Faults(Fault((), f"cannot be written: there is no folder {Path(path).parent}", "", name))
        _replace(target, content)
    except OSError as error:
        reason = (error.strerror or str(error)).lower()
        raise Faults(Fault((), f"cannot be written: {reason}", "", name)) from None
    except UnicodeEncodeError:
        raise Faults(Fault((), "cannot be written: it holds half a character", "", name)) from None
    except ValueError as error:
        if isinstance(error, Faults):
            raise
        raise Faults(Fault((), "cannot be written: not a name for a file", "", name)) from None


def _replace(target: Path, content: bytes) -> None:
    """Write beside the target, in the same folder so that the last step is one move."""
    beside = target.with_name(f".{target.name[:80]}.{os.getpid()}.part")
    try:
        with beside.open("xb") as part:
            part.write(content)
            part.flush()
            os.fsync(part.fileno())
        if target.exists():
            if not os.access(target, os.W_OK):
                raise PermissionError(13, "Permission denied")
            shutil.copymode(target, beside)
        beside.replace(target)
    finally:
        beside.unlink(missing_ok=True)
