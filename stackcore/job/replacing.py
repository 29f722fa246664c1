"""Replacing a file as a whole: whoever reads it sees the old content or the new, never a part."""

import contextlib
import os
import secrets
import stat
from collections.abc import Iterator
from pathlib import Path
from typing import BinaryIO


@contextlib.contextmanager
def replacing(path: str | os.PathLike[str]) -> Iterator[BinaryIO]:
    """Open a new file that takes the place of `path` when the block ends well.

    The new content is written beside the target, brought to the disk, and only then renamed over it; the folder
    is brought to the disk too. When the block raises, the old file stays as it was. A symbolic link stays a link
    and the file it points to is replaced; the mode of an old file is kept. What is not a plain file (a pipe, a
    device) is written to directly.

    Parameters
    ----------
    path
        The target; its folder must exist.

    Yields
    ------
    BinaryIO
        To write the content to.

    Raises
    ------
    OSError
        When the folder or the file cannot be written.
    """
    target = Path(os.path.realpath(path))
    old = _status(target)
    if old is not None and stat.S_ISDIR(old.st_mode):
        raise IsADirectoryError(21, os.strerror(21), str(path))
    if old is not None and not stat.S_ISREG(old.st_mode):
        with target.open("wb") as file:
            yield file
        return
    if old is not None and not os.access(target, os.W_OK):
        raise PermissionError(13, os.strerror(13), str(path))
    part = target.with_name(f".{target.name[:100]}.{secrets.token_hex(4)}.part")
    # The mode asked for is cut by the user's mask, as for any new file.
    handle = os.open(part, os.O_WRONLY | os.O_CREAT | os.O_EXCL | getattr(os, "O_BINARY", 0), 0o666)
    try:
        with os.fdopen(handle, "wb") as file:
            if old is not None:
                _keep_owner_and_mode(part, old)
            yield file
            file.flush()
            os.fsync(file.fileno())
        os.replace(part, target)
    except BaseException:
        with contextlib.suppress(OSError):
            part.unlink()
        raise
    _sync_folder(target.parent)


def _status(path: Path) -> os.stat_result | None:
    try:
        return path.stat()
    except FileNotFoundError:
        return None


def _keep_owner_and_mode(path: Path, old: os.stat_result) -> None:
    """Give `path` the mode of the old file, and its owner where that is permitted."""
    if hasattr(os, "chown") and (old.st_uid, old.st_gid) != (path.stat().st_uid, path.stat().st_gid):
        with contextlib.suppress(PermissionError):
            os.chown(path, old.st_uid, old.st_gid)
    path.chmod(stat.S_IMODE(old.st_mode))


def _sync_folder(folder: Path) -> None:
    """Bring the new name to the disk; file systems that cannot do this for a folder say so and are let be."""
    with contextlib.suppress(OSError):
        handle = os.open(folder, os.O_RDONLY)
        try:
            os.fsync(handle)
        finally:
            os.close(handle)
