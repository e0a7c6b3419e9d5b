"""The README's examples, run as printed, and the chart rows that it shows."""

from __future__ import annotations

import os
import pathlib
import re
import subprocess
import sys

import pytest

ROOT = pathlib.Path(__file__).parent.parent
README = (ROOT / "README.md").read_text(encoding="utf-8")


def fences(language: str) -> list[tuple[str, str]]:
    """(code, printed output) of each block of that language that a text block follows."""
    pattern = rf"```{language}\n(.*?)```\n\nprints\n\n```text\n(.*?)```"
    return re.findall(pattern, README, flags=re.S)


def build_folder() -> pathlib.Path:
    folder = os.environ.get("ZEOTROPE_BUILD")
    if not folder:
        pytest.fail("ZEOTROPE_BUILD is not set: the build folder of the C++ library")
    return pathlib.Path(folder).resolve()


def test_cpp_example(tmp_path: pathlib.Path) -> None:
    ((code, printed),) = fences("cpp")
    assert len(code.strip().splitlines()) <= 12
    source = tmp_path / "example.cpp"
    source.write_text(code, encoding="utf-8")
    program = tmp_path / "example"
    library = build_folder() / "libzeotrope.a"
    subprocess.run(
        ["c++", "-std=c++20", f"-I{ROOT / 'include'}", "-isystem", "/usr/include/eigen3", source, library, "-lfmt", "-o", program],
        check=True,
    )
    assert subprocess.run([program], check=True, capture_output=True, text=True).stdout == printed


def test_python_example(tmp_path: pathlib.Path) -> None:
    ((code, printed),) = fences("python")
    assert len(code.strip().splitlines()) <= 12
    done = subprocess.run([sys.executable, "-c", code], check=True, capture_output=True, text=True, cwd=tmp_path)
    assert done.stdout == printed


def test_chart_rows() -> None:
    command = os.environ.get("ZEOTROPE_COMMAND")
    if not command:
        pytest.fail("ZEOTROPE_COMMAND is not set: the built command")
    out = subprocess.run([pathlib.Path(command).resolve(), "chart", "R-454B"], check=True, capture_output=True, text=True).stdout
    shown = README.split("Its middle reads\n\n", 1)[1].split("\n\nwith composition", 1)[0]
    rows = [line.strip() for line in shown.splitlines() if line.strip()]
    assert len(rows) > 20
    printed = {line.strip() for line in out.splitlines()}
    for row in rows:
        assert row in printed
