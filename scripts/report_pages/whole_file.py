# SPDX-License-Identifier: MIT
"""Files that appear whole or not at all: written beside their final name, synced, renamed."""
import contextlib
import os

from .problems import cannot


def make_folder(path):
    try:
        os.makedirs(path, exist_ok=True)
    except OSError as error:
        raise cannot("write", path, error) from None


def write_whole_file(path, data):
    """`data` is bytes. On failure neither the file nor its partial twin is left, and an older file stays as it was."""
    partial = f"{path}.partial"
    try:
        with open(partial, "wb") as file:
            file.write(data)
            file.flush()
            os.fsync(file.fileno())
        os.replace(partial, path)
    except BaseException as error:
        with contextlib.suppress(OSError):
            os.unlink(partial)
        if isinstance(error, OSError):
            raise cannot("write", path, error) from None
        raise
    _sync_folder(os.path.dirname(path) or ".")


def _sync_folder(folder):
    """Makes the rename last. A file system that cannot sync folders has done all it can."""
    with contextlib.suppress(OSError):
        descriptor = os.open(folder, os.O_RDONLY | os.O_DIRECTORY)
        try:
            os.fsync(descriptor)
        finally:
            os.close(descriptor)


def remove_stale(path):
    """A figure of an earlier report that this run does not have."""
    try:
        os.unlink(path)
    except FileNotFoundError:
        pass
    except OSError as error:
        raise cannot("write", path, error) from None
