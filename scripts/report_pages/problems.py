# SPDX-License-Identifier: MIT
"""What can be wrong with a file, in the one form that the user reads: FILE: what is wrong; what to do."""
import errno
import os

_CURES = {
    errno.ENOSPC: "free some space or choose another folder",
    errno.EDQUOT: "free some space or choose another folder",
    errno.EFBIG: "free some space or choose another folder",
    errno.EACCES: "ask for access or copy the run elsewhere",
    errno.EPERM: "ask for access or copy the run elsewhere",
    errno.EROFS: "copy the run to a folder that you may write to",
    errno.EEXIST: "move it away",
    errno.ENOTDIR: "move it away",
    errno.EISDIR: "move it away",
}


class ReportError(Exception):
    """Text: file, fault and cure."""

    def __init__(self, path, fault, cure):
        super().__init__(f"{path}: {fault}; {cure}")


def cannot(verb, path, error):
    """A ReportError from an OSError; `verb` is read or write."""
    reason = os.strerror(error.errno) if error.errno else str(error)
    return ReportError(path, f"cannot {verb}: {reason}", _CURES.get(error.errno, "check the disk"))
