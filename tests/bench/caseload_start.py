"""Opens a caseload and says when its first rows were painted, when all files were read, and the memory it took.

``python -m tests.bench.caseload_start CASELOAD`` prints seconds from the start of Python to the first rows
painted and to the last file read, and the peak memory of the program and of its largest helper in megabytes. With
``first`` behind it it leaves once the first rows are painted.
"""

from __future__ import annotations

import os
import resource
import sys
import time
from pathlib import Path

_BEGAN = time.perf_counter()


def main() -> None:
    """Open it, measure, print, leave."""
    os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
    from PySide6.QtCore import QEventLoop
    from PySide6.QtWidgets import QApplication

    from desktop.faces import load_faces
    from desktop.screens.caseload_window import CaseloadWindow
    from desktop.storage.store import CaseloadStore

    path = Path(sys.argv[1])
    app = QApplication([])
    load_faces()
    window = CaseloadWindow(CaseloadStore.open(path, alone=True), path.parent)
    window.show()
    ended: list[int] = []
    window.desk.looked_through.connect(ended.append)
    window.desk.look_again()
    first = 0.0
    while not ended:
        app.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents, 5)
        if not first and window.desk.facts:
            window.grab()
            first = time.perf_counter() - _BEGAN
            if sys.argv[2:] == ["first"]:
                window.desk.stop()
                print(first, first, 0.0, flush=True)
                os._exit(0)
    whole = time.perf_counter() - _BEGAN
    window.close()
    own = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024
    helper = resource.getrusage(resource.RUSAGE_CHILDREN).ru_maxrss / 1024
    print(first, whole, own + helper, flush=True)
    os._exit(0)


if __name__ == "__main__":
    main()
