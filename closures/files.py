"""Writing: to standard output, or to a file that appears whole or not at all."""

from __future__ import annotations

import os
import sys

from walllaw.errors import InputError


def write_file(path: str, content: bytes) -> None:
    """Write a file through a temporary file in the same folder and a rename.

    Raises
    ------
    InputError
        If the folder cannot be written; the old file, if any, is left as it was.
    """
    import tempfile  # only when a file is written: it costs 3 ms

    folder = os.path.dirname(os.path.abspath(path))
    temporary = ""
    try:
        handle, temporary = tempfile.mkstemp(prefix=".closures-", dir=folder)
        with os.fdopen(handle, "wb") as file:
            file.write(content)
            file.flush()
            os.fsync(file.fileno())
        os.chmod(temporary, 0o666 & ~_umask())
        os.replace(temporary, path)
    except OSError as error:
        if temporary and os.path.exists(temporary):
            os.unlink(temporary)
        raise InputError(
            "--output", path, "a file that can be written", error.strerror or str(error)
        ) from None


def _umask() -> int:
    mask = os.umask(0)
    os.umask(mask)
    return mask


def emit(content: str, output: str = "-") -> None:
    """Write to standard output (``-``) or to a file."""
    if not content.endswith("\n"):
        content += "\n"
    if output != "-":
        write_file(output, content.encode("utf-8"))
        return
    sys.stdout.write(content)
    sys.stdout.flush()


def emit_bytes(content: bytes, output: str = "-") -> None:
    """Write a picture to standard output (``-``, unless that is a terminal) or to a file."""
    if output != "-":
        write_file(output, content)
        return
    if sys.stdout.isatty():
        raise InputError("--output", "a terminal", "a file for the picture")
    sys.stdout.flush()
    sys.stdout.buffer.write(content)
    sys.stdout.buffer.flush()
