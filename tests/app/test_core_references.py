"""A tripwire for the versions of PySide6 and Python that are allowed together.

PySide6 6.12.0 on Python 3.11 takes a reference from `True` at each signal that Python emits, and one from `None` at
each property that is not set (measured): after some hundred of them the interpreter aborts. PySide6 6.11 does not, and
from Python 3.12 on these objects cannot die (PEP 683).
"""

import sys

import pytest
from PySide6.QtCore import QObject, Signal

ROUNDS = 100


class Emitter(QObject):
    happened = Signal()


@pytest.mark.skipif(sys.version_info >= (3, 12), reason="None, True and False cannot die")
@pytest.mark.usefixtures("qapp")
def test_qt_takes_no_references_from_none_and_true():
    emitter = Emitter()
    emitter.happened.connect(lambda: None)
    before = sys.getrefcount(None), sys.getrefcount(True)
    for _ in range(ROUNDS):
        emitter.happened.emit()
        emitter.property("not set")
    after = sys.getrefcount(None), sys.getrefcount(True)
    assert after[0] - before[0] > -ROUNDS / 2
    assert after[1] - before[1] > -ROUNDS / 2
