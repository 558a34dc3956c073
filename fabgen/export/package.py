"""A package folder is written beside its place and swapped in by one exchange.

Whatever happens, the folder that a builder opens is the old package or the new one, complete. All of it happens inside
the output folder, under a lock, so that two runs cannot mix; what a killed run left there goes with the next.
"""

import contextlib
import ctypes
import errno
import hashlib
import json
import os
import shutil
import sys
from collections.abc import Iterator, Sequence
from pathlib import Path, PurePosixPath
from typing import Any

from fabgen.design.package import PackageFile, Say
from fabgen.errors import MachineError, ProgramError

if sys.platform != "win32":
    import fcntl

_AT_FDCWD = -100
_RENAME_EXCHANGE = 2
_LOCK, _FRESH, _ASIDE = ".fabgen.lock", ".fabgen.new", ".fabgen.old"
"""In the output folder; under the lock, whatever bears the other two names is a killed run's."""

_MOVE_OUT = "move it out of the folder: a build replaces the whole of it"


def manifest(
    files: Sequence[PackageFile],
    *,
    number: str,
    revision: str,
    design_sha256: str,
    verdict: str,
    versions: dict[str, str],
) -> PackageFile:
    """The manifest of all `files`; it holds no absolute path and no clock."""
    content: dict[str, Any] = {
        "fabgen": versions["fabgen"],
        "number": number,
        "revision": revision,
        "design_sha256": design_sha256,
        "verdict": verdict,
        "versions": versions,
        "files": [
            {"path": file.path, "sha256": hashlib.sha256(file.data).hexdigest(), "purpose": file.purpose}
            for file in sorted(files, key=lambda file: file.path)
        ],
    }
    text = json.dumps(content, indent=2, ensure_ascii=False) + "\n"
    return PackageFile("manifest.json", text.encode("utf-8"), "what is in this package")


def write(files: Sequence[PackageFile], *, output: Path, name: str, say: Say = lambda _: None) -> Path:
    """Write a package folder, complete or not at all.

    Args:
        files: all files, the manifest among them.
        output: the output folder; made when missing.
        name: the package folder's name below it.
        say: takes progress.

    Returns:
        The package folder.

    Raises:
        MachineError: the disk, a permission or a file that is not ours is in the way; nothing has changed then.
        ProgramError: a name would lead outside the output folder.
    """
    if PurePosixPath(name).name != name or name in {"", ".", ".."}:
        raise ProgramError(f"package name {name!r} is not a plain folder name")
    try:
        output.mkdir(parents=True, exist_ok=True)
        with _locked(output, say):
            say(f"{name}: writing {len(files)} files")
            return _write_locked(files, output, name)
    except OSError as error:
        raise MachineError(_say(error, output), _fix(error)) from error


def _write_locked(files: Sequence[PackageFile], output: Path, name: str) -> Path:
    target, fresh = output / name, output / _FRESH
    _repair(output)
    if target.is_symlink() or (target.exists() and not target.is_dir()):
        raise MachineError(f"{target} is not a folder", "move it away; a package folder goes there")
    if target.exists():
        _refuse_other_design(target, files)
        _refuse_strangers(target)
    try:
        for file in files:
            _write_file(fresh, file)
        for folder in (fresh, *(path for path in fresh.rglob("*") if path.is_dir())):
            _sync_folder(folder)
        if not target.exists():
            fresh.rename(target)
        elif not _exchange(fresh, target):
            (output / _ASIDE).mkdir()
            target.rename(output / _ASIDE / name)
            fresh.rename(target)
        _sync_folder(output)
    finally:
        with contextlib.suppress(OSError):  # else the next run does it
            _repair(output)
    return target


def _repair(output: Path) -> None:
    """Finish what a run left: a package set aside goes back when nothing took its place, the rest goes."""
    for old in (output / _ASIDE).glob("*"):
        if not (output / old.name).exists():
            old.rename(output / old.name)
    for rest in (output / _FRESH, output / _ASIDE):
        if rest.exists():
            shutil.rmtree(rest)


def _refuse_other_design(target: Path, files: Sequence[PackageFile]) -> None:
    """Raise when the folder is another design's: number `a_b` revision `c` and number `a` revision `b_c` share one."""
    try:
        old = json.loads((target / "manifest.json").read_bytes())
        new = json.loads(next(file.data for file in files if file.path == "manifest.json"))
        owners = [(str(each["number"]), str(each["revision"])) for each in (old, new)]
    except (FileNotFoundError, ValueError, TypeError, KeyError, StopIteration):
        return
    if owners[0] != owners[1]:
        number, revision = owners[0]
        raise MachineError(f"{target} is the package of number {number} revision {revision}", "use another number")


def _refuse_strangers(target: Path) -> None:
    """Raise when a folder that would be replaced is write-protected or holds what its builder put or filled in there.

    Everything in it must be as its manifest says; hidden files do not count.
    """
    for folder in (target, *(path for path in target.rglob("*") if path.is_dir())):
        if not os.access(folder, os.W_OK | os.X_OK):
            raise PermissionError(errno.EACCES, os.strerror(errno.EACCES), str(folder))
    try:
        files = json.loads((target / "manifest.json").read_bytes())["files"]
        digests = {"manifest.json": None} | {file["path"]: file.get("sha256") for file in files}
    except (FileNotFoundError, ValueError, TypeError, KeyError):
        digests = {}
    for path in sorted(target.rglob("*")):
        name = path.relative_to(target).as_posix()
        if path.is_dir() or path.name.startswith("."):
            continue
        if name not in digests:
            raise MachineError(f"{target} holds {name}, which is of no package", _MOVE_OUT)
        if digests[name] not in (None, hashlib.sha256(path.read_bytes()).hexdigest()):
            raise MachineError(f"{target} holds {name}, which was changed since it was written", _MOVE_OUT)


def _write_file(folder: Path, file: PackageFile) -> None:
    path = PurePosixPath(file.path)
    if path.is_absolute() or ".." in path.parts:
        raise ProgramError(f"file name {file.path!r} leads outside the package")
    place = folder / path
    place.parent.mkdir(parents=True, exist_ok=True)
    with place.open("wb") as out:
        out.write(file.data)
        out.flush()
        os.fsync(out.fileno())


def _exchange(first: Path, second: Path) -> bool:
    """Exchange two folders in one step; False where the system cannot."""
    try:
        renameat2 = ctypes.CDLL(None, use_errno=True).renameat2
    except (OSError, AttributeError, TypeError):
        return False
    done = renameat2(
        ctypes.c_int(_AT_FDCWD), os.fsencode(first), ctypes.c_int(_AT_FDCWD), os.fsencode(second),
        ctypes.c_uint(_RENAME_EXCHANGE),
    )  # fmt: skip
    return bool(done == 0)


def _sync_folder(folder: Path) -> None:
    with contextlib.suppress(OSError):
        handle = os.open(folder, os.O_RDONLY)
        try:
            os.fsync(handle)
        finally:
            os.close(handle)


@contextlib.contextmanager
def _locked(output: Path, say: Say) -> Iterator[None]:
    """Hold the output folder; a second run says so and waits."""
    with (output / _LOCK).open("a") as lock:
        if sys.platform != "win32":
            try:
                fcntl.flock(lock, fcntl.LOCK_EX | fcntl.LOCK_NB)
            except BlockingIOError:
                say(f"another run is writing to {output}: waiting for it to end")
                fcntl.flock(lock, fcntl.LOCK_EX)
        yield


def _say(error: OSError, output: Path) -> str:
    place = error.filename or output
    reason = {
        errno.ENOSPC: "the disk is full",
        errno.EDQUOT: "the disk quota is used up",
        errno.EACCES: "no permission to write there",
        errno.EPERM: "no permission to write there",
        errno.EROFS: "the disk is read-only",
        errno.EEXIST: "a file stands where the folder should be",
        errno.ENOTDIR: "a file stands where the folder should be",
        errno.ENAMETOOLONG: "the name is too long for this disk",
    }.get(error.errno or 0, error.strerror or "it failed")
    return f"cannot write {place}: {reason}"


def _fix(error: OSError) -> str:
    return {
        errno.ENOSPC: "free some space; nothing was changed",
        errno.EEXIST: "move that file away or name another folder with --output",
        errno.ENOTDIR: "move that file away or name another folder with --output",
    }.get(error.errno or 0, "name another folder with --output; nothing was changed")
