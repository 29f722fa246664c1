import time
from tests.app.window.test_random_edits import *
from tests.app.window.conftest import *
import pytest
@pytest.mark.parametrize("clear",[True,False])
def test_walk(bench, clear):
    dice=random.Random(99); a=megabytes(); t=time.time(); out=open(f"/tmp/sw/exp/out{clear}","w")
    for n in range(3000):
        any_step(dice, bench)
        if n%10==0:
            QApplication.processEvents(); QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete.value)
        if clear and n%50==0:
            h=bench.session._history; h._steps.clear(); h._position=0
        if n%500==499:
            import ctypes; ctypes.CDLL("libc.so.6").malloc_trim(0)
            h=bench.session._history
            print(n, round(megabytes()-a,1), "steps", len(h._steps), len(bench.window.findChildren(QWidget)), round(time.time()-t,1), flush=True, file=out)
from PySide6.QtWidgets import QWidget
