"""Every page is laid out with the typeface that comes with the program."""

import pytest

from desktop.faces import load_faces


@pytest.fixture(autouse=True, scope="package")
def _faces(qapp):
    load_faces()
