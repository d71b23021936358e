"""Keeps Python 3.11 alive under PySide6 6.12, which takes too many references from None, True and False.

Measured with PySide6 6.12.0 on Python 3.11.7: each signal emitted by Python takes one reference from `True`, each
property that is not set one from `None`; after some hundred of them the interpreter aborts ("deallocating True or
False: bug likely caused by a refcount error in a C extension"). PySide6 6.11.3 does not do it, and from Python 3.12 on
these objects cannot die (PEP 683). Here they are given so many references that it takes years to use them up.
"""

from __future__ import annotations

import ctypes
import platform
import sys

import PySide6

MANY = 1 << 40


def keep_singletons() -> None:
    """Call once, before the first window."""
    needed = sys.version_info < (3, 12) and PySide6.__version_info__[:2] == (6, 12)
    if not needed or platform.python_implementation() != "CPython":
        return
    for singleton in (None, True, False):
        count = ctypes.c_ssize_t.from_address(
            id(singleton)
        )  # the first field of every object of CPython 3.11
        if count.value < MANY:
            count.value += MANY
