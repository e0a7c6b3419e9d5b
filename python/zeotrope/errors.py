"""Errors. Each message names the quantity, its value with unit, what is allowed, and the fluid where there is one."""


class Error(Exception):
    """Root of every error of this package."""


class BadInput(Error, ValueError):
    """The input cannot be read or makes no sense: unit, designation, composition, number."""


class OutOfRange(Error, ValueError):
    """The input is sound but lies outside the published range of an equation."""


class NoSolution(Error, ValueError):
    """What is asked for does not exist, e.g. a bubble point above the critical temperature."""


class NotConverged(Error, RuntimeError):
    """A solution should exist, but none that passes its checks was found."""


class BadFile(Error, ValueError):
    """A coefficient file cannot be used; the message reads "FILE:LINE: KEY: what, and what would be right"."""

    file: str
    line: int  #: 1-based; 0 where the fault belongs to no line
    key: str

    def __init__(self, message: str, file: str = "", line: int = 0, key: str = "") -> None:
        super().__init__(message)
        self.file = file
        self.line = line
        self.key = key
