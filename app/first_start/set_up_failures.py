"""Why a set-up failed, as one sentence with the command that mends it. Pure functions of what the tools said."""

import errno
import os
import re
import shlex
import sys
from pathlib import Path

MEGABYTES_NEEDED = 1500
"""Room for `.venv`: about 900 MB when whole, and the downloads beside it while it is made (measured on Linux)."""

_DISK_FULL = re.compile(
    r"Errno 28|Errno 122|No space left|Disk quota exceeded|WinError 112|not enough space", re.I
)
_NO_CERTIFICATE = re.compile(r"CERTIFICATE_VERIFY_FAILED|SSLCertVerificationError")
_NO_NETWORK = re.compile(
    r"NewConnectionError|NameResolutionError|ConnectTimeoutError|ReadTimeoutError|ProxyError|ProtocolError"
    r"|name resolution|getaddrinfo failed|nodename nor servname|Network is unreachable|Connection (?:refused|reset)"
    r"|timed out|Could not fetch URL|HTTP error",
    re.I,
)
_NOT_WRITABLE = re.compile(r"Errno 13|Errno 30|Permission denied|Read-only file system|WinError 5\b", re.I)
# Windows refuses to replace a library that a running program has loaded, in either of these words.
_IN_USE = re.compile(r"WinError 32|being used by another process|WinError 5\b.*\.venv", re.I)
_NO_PACKAGE = re.compile(r"No matching distribution found for (\S+?)(?:[<>=].*)?$", re.M)


def explain(said: str, folder: Path, again: str) -> str:
    """The sentence for what venv, pip or the system `said` when setting up in `folder`; `again` starts anew."""
    if _DISK_FULL.search(said):
        return disk_full(folder, again)
    if "ensurepip" in said:
        return no_venv_module(again)
    if "PATH separator" in said:
        return bad_folder_name(folder)
    if _NO_CERTIFICATE.search(said):
        return no_certificate(again)
    if _NO_NETWORK.search(said):
        return no_network(again)
    if _IN_USE.search(said):
        return _sentence("a file in .venv is in use", f"close what runs from it, then run `{again}`")
    if _NOT_WRITABLE.search(said):
        return not_writable(folder)
    package = _NO_PACKAGE.search(said)
    if package:
        return no_package(package.group(1), again)
    errors = (
        [line for line in said.splitlines() if "error" in line.lower()] or said.splitlines() or ["no reason"]
    )
    return _sentence(f"the installer said '{errors[-1].strip()}'", f"run `{again}` to try once more")


def explain_error(error: OSError, folder: Path, again: str) -> str:
    """The sentence for an error of the file system while setting up in `folder`."""
    if error.errno in (errno.ENOSPC, errno.EDQUOT):
        return disk_full(folder, again)
    if error.errno in (errno.EACCES, errno.EPERM, errno.EROFS):
        return not_writable(folder)
    return explain(str(error), folder, again)


def disk_full(folder: Path, again: str) -> str:
    reason = f"the disk of '{folder}' has too little room, and {MEGABYTES_NEEDED} MB are needed"
    return _sentence(reason, f"make room there, then run `{again}`")


def no_venv_module(again: str) -> str:
    reason = f"this Python ({sys.executable}) lacks its 'venv' or 'ensurepip' module"
    if _system_is("debian", "ubuntu"):
        # The Python of the system is served by `python3-venv`, another one from a package archive by its own.
        return _sentence(reason, f"run `sudo apt install {_debian_venv()}`, then `{again}`")
    if _system_is("fedora", "rhel", "centos"):
        return _sentence(reason, f"run `sudo dnf install python3-libs`, then `{again}`")
    return _sentence(reason, f"install a Python from python.org (3.13, 64 bit), then run `{again}` with it")


def no_network(again: str) -> str:
    setting = "set HTTPS_PROXY=http://HOST:PORT" if os.name == "nt" else "export HTTPS_PROXY=http://HOST:PORT"
    return _sentence(
        "the package index cannot be reached",
        f"connect this machine to the network (behind a proxy: `{setting}`), then run `{again}`",
    )


def no_certificate(again: str) -> str:
    setting = "set PIP_CERT=FILE.pem" if os.name == "nt" else "export PIP_CERT=FILE.pem"
    return _sentence(
        "the package index shows a certificate that this machine does not trust",
        f"name your network's certificate file with `{setting}`, then run `{again}`",
    )


def not_writable(folder: Path) -> str:
    if os.name == "nt":
        commands = (
            f'xcopy /E /I "{folder}" "%USERPROFILE%\\striketrace" && cd /D "%USERPROFILE%\\striketrace"'
        )
    else:
        commands = f"cp -r {shlex.quote(str(folder))} ~/striketrace && cd ~/striketrace"
    reason = f"the folder '{folder}' cannot be written to"
    return _sentence(reason, f"make a copy of your own with `{commands}`, and start it there")


def bad_folder_name(folder: Path) -> str:
    new = folder.name.replace(os.pathsep, "-")
    move = f"mv {shlex.quote(str(folder))} {shlex.quote(str(folder.with_name(new)))}"
    if os.pathsep in str(folder.parent):
        move = f"mv {shlex.quote(str(folder))} ~/striketrace"
    return _sentence(
        f"no .venv can be made in '{folder}', whose path has a '{os.pathsep}' in it", f"run `{move}`"
    )


def no_package(name: str, again: str) -> str:
    kind = f"Python {sys.version_info.major}.{sys.version_info.minor} ({8 * _pointer_size()} bit) on {sys.platform}"
    return _sentence(
        f"the package index offers no ready-built {name} in the range needed for {kind}",
        f"use a 64-bit Python 3.13 from python.org, then run `{again}` with it",
    )


def foreign_venv(venv: Path, found: str, again: str) -> str:
    """For a `.venv` that somebody made by hand with a Python that cannot run the program: not ours to delete."""
    remove = f'rmdir /S /Q "{venv}"' if os.name == "nt" else f"rm -r {shlex.quote(str(venv))}"
    return _sentence(f"'{venv}' was made with {found}", f"run `{remove}`, then `{again}`")


def _sentence(reason: str, mend: str) -> str:
    return f"Striketrace cannot set itself up because {reason}: {mend}."


def _pointer_size() -> int:
    return 8 if sys.maxsize > 2**32 else 4


def _debian_venv() -> str:
    of_the_system = Path(sys.base_prefix) == Path("/usr") and os.path.realpath("/usr/bin/python3").endswith(
        f"python{sys.version_info.major}.{sys.version_info.minor}"
    )
    return (
        "python3-venv" if of_the_system else f"python{sys.version_info.major}.{sys.version_info.minor}-venv"
    )


def _system_is(*names: str) -> bool:
    try:
        text = Path("/etc/os-release").read_text(encoding="utf-8", errors="replace")
    except OSError:
        return False
    kinds = re.findall(r"^(?:ID|ID_LIKE)=\"?([^\"\n]*)", text, re.M)
    return bool({word for kind in kinds for word in kind.split()} & set(names))
