"""A path as the reports that need a URI write it."""

from __future__ import annotations

from pathlib import PurePosixPath, PureWindowsPath
from urllib.parse import quote

from auditor.reports._inert import one_line


def uri(path: str) -> str:
    """A relative path as a relative reference, an absolute one as a file URI; Windows paths too.

    >>> uri("parts\\\\drive pin.nc"), uri("C:\\\\nc\\\\a#1.nc"), uri("/nc/a.nc")
    ('parts/drive%20pin.nc', 'file:///C:/nc/a%231.nc', 'file:///nc/a.nc')
    """
    clean = one_line(path)
    windows = PureWindowsPath(clean)
    if windows.drive or "\\" in clean:
        clean = windows.as_posix()
    if windows.drive.startswith("\\\\"):
        return f"file:{quote(clean)}"
    if windows.drive:
        return f"file:///{quote(clean, safe='/:')}"
    text = quote(PurePosixPath(clean).as_posix())
    return f"file://{text}" if text.startswith("/") else text
