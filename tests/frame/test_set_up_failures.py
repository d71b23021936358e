"""Every way in which a set-up is known to fail ends in one sentence with the command that mends it.

The texts are what venv and pip print (pip 23 to 26, seen on Linux; those of Windows and macOS from their error codes).
"""

import errno
from pathlib import Path

import pytest

from app.first_start import set_up_failures

FOLDER = Path("some where") / "striketrace"
AGAIN = "python3 -m app"

DEBIAN_VENV = """The virtual environment was not created successfully because ensurepip is not
available.  On Debian/Ubuntu systems, you need to install the python3-venv
package using the following command."""
OFFLINE = """WARNING: Retrying (Retry(total=0, connect=None)) after connection broken by 'NewConnectionError('<x>:
Failed to establish a new connection: [Errno -3] Temporary failure in name resolution')': /simple/numpy/
ERROR: Could not find a version that satisfies the requirement numpy<2.5,>=2.4 (from versions: none)
ERROR: No matching distribution found for numpy<2.5,>=2.4"""
OFFLINE_WINDOWS = "Failed to establish a new connection: [Errno 11001] getaddrinfo failed"
CERTIFICATE = """Could not fetch URL: There was a problem confirming the ssl certificate: SSLError(
'[SSL: CERTIFICATE_VERIFY_FAILED] certificate verify failed: self-signed certificate in certificate chain'))"""
NO_WHEEL = """ERROR: Could not find a version that satisfies the requirement numba<0.69,>=0.68 (from versions: 0.53)
ERROR: No matching distribution found for numba<0.69,>=0.68"""
FULL = "ERROR: Could not install packages due to an OSError: [Errno 28] No space left on device"
FULL_WINDOWS = "OSError: [WinError 112] There is not enough space on the disk"
IN_USE = (
    "Could not install packages due to an OSError: [WinError 5] Access is denied: 'c:\\x\\.venv\\Lib\\a.pyd'"
)
READ_ONLY = "Error: [Errno 30] Read-only file system: 'x/.venv/bin'"
COLON = "Error: Refusing to create a venv in a:b/.venv because it contains the PATH separator :."


@pytest.mark.parametrize(
    ("said", "reason", "mend"),
    [
        (DEBIAN_VENV, "'ensurepip' module", AGAIN),
        (OFFLINE, "package index cannot be reached", "HTTPS_PROXY"),
        (OFFLINE_WINDOWS, "package index cannot be reached", "HTTPS_PROXY"),
        (CERTIFICATE, "does not trust", "PIP_CERT"),
        (NO_WHEEL, "no ready-built numba", "64-bit"),
        (FULL, "too little room", "make room"),
        (FULL_WINDOWS, "too little room", "make room"),
        (IN_USE, "is in use", "close"),
        (READ_ONLY, "cannot be written to", "copy"),
        (COLON, "in it", "mv "),
        ("ERROR: something unheard of", "something unheard of", AGAIN),
        ("", "no reason", AGAIN),
    ],
)
def test_one_sentence_with_reason_and_command(said: str, reason: str, mend: str) -> None:
    sentence = set_up_failures.explain(said, FOLDER, AGAIN)
    assert sentence.startswith("Striketrace cannot set itself up because ")
    assert reason in sentence
    assert mend in sentence
    assert "`" in sentence
    assert sentence.endswith(".")
    assert "\n" not in sentence


@pytest.mark.parametrize(
    ("number", "reason"),
    [
        (errno.ENOSPC, "too little room"),
        (errno.EACCES, "cannot be written to"),
        (errno.EROFS, "cannot be written to"),
        (errno.EIO, "weird"),
    ],
)
def test_errors_of_the_file_system(number: int, reason: str) -> None:
    assert reason in set_up_failures.explain_error(OSError(number, "weird error"), FOLDER, AGAIN)


def test_a_folder_with_a_space_is_quoted_in_the_command(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr("os.name", "posix")
    assert f"cp -r '{FOLDER}' " in set_up_failures.not_writable(FOLDER)


@pytest.mark.parametrize(
    ("release", "command"),
    [
        ('ID=debian\nVERSION_ID="12"', "sudo apt install"),
        ("ID=linuxmint\nID_LIKE=ubuntu", "sudo apt install"),
        ('ID=rocky\nID_LIKE="rhel centos fedora"', "sudo dnf install"),
        ("ID=something", "python.org"),
    ],
)
def test_the_package_manager_is_the_one_of_the_system(
    monkeypatch: pytest.MonkeyPatch, release: str, command: str
) -> None:
    monkeypatch.setattr(Path, "read_text", lambda self, **options: release)
    assert command in set_up_failures.no_venv_module(AGAIN)
