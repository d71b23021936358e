"""Compilation of the kernels: cached on disk under a key made of all their sources.

A cached kernel does not notice that a law in another file has changed, so the folder's name carries a hash of every
source file in this package. Where the folder cannot be written, kernels are compiled anew in each process, and
`cache_problem` says so once.
"""

from __future__ import annotations

import hashlib
import os
import tempfile
from pathlib import Path
from typing import Any

import numba
import platformdirs
from numba import njit
from numba.core.cpu import CPUTargetOptions
from numba.core.options import TargetOptions


def _source_key() -> str:
    digest = hashlib.sha256(numba.__version__.encode())
    for path in sorted(Path(__file__).parent.rglob("*.py")):
        digest.update(path.read_bytes())
    return digest.hexdigest()[:16]


def _cache_folder() -> tuple[Path | None, str | None]:
    """The folder for compiled kernels, or a sentence that says why there is none."""
    base = os.environ.get("STRIKETRACE_CACHE") or platformdirs.user_cache_dir("striketrace", False)
    place = Path(base) / f"kernels-{_source_key()}"
    try:
        place.mkdir(parents=True, exist_ok=True)
        with tempfile.TemporaryFile(dir=place):
            pass
    except OSError as error:
        return None, (
            f"The folder for compiled kernels ({place}) cannot be written ({error.strerror or error}): "
            "they are compiled again at each start, which takes some seconds."
        )
    return place, None


#: Where kernels are kept, or the sentence why they are not.
folder, cache_problem = _cache_folder()
#: Whether kernels were kept in the folder when this process began.
were_kept = folder is not None and any(folder.iterdir())
if folder is not None:
    numba.config.CACHE_DIR = str(folder)  # type: ignore[attr-defined]

# numba knows this flag of a function but lets no decorator set it
CPUTargetOptions.noalias = TargetOptions.Mapping("noalias")

#: Reductions may be summed in any order; not-a-number is still seen.
LOOSE_SUMS = {"reassoc", "contract", "nsz"}


def kernel(function: Any) -> Any:
    """Compile a function: releases the GIL, cached on disk where that is possible.

    Kernels allocate nothing and keep nothing, so they do without counting references, which at every slice and every
    field of a group of arrays would cost more than the arithmetic.
    """
    return njit(  # type: ignore[call-overload]
        nogil=True, cache=folder is not None, error_model="numpy", fastmath=LOOSE_SUMS, _nrt=False
    )(function)


def part_of_step(function: Any, **more: Any) -> Any:
    """Compile a function into whatever calls it: handing over groups of arrays at every step would cost too much."""
    return njit(  # type: ignore[call-overload]
        nogil=True,
        cache=folder is not None,
        error_model="numpy",
        fastmath=LOOSE_SUMS,
        _nrt=False,
        forceinline=True,
        **more,
    )(function)


def apart(function: Any) -> Any:
    """A part of a step whose arrays never share memory, as a loop over plain arrays that only it is handed: nothing
    need be checked at every step before it runs in vector instructions."""
    return part_of_step(function, noalias=True)
