"""Where coefficient files are looked for."""

import os
from collections.abc import Sequence
from pathlib import Path

from zeotrope import _core
from zeotrope.errors import BadInput

Folder = str | os.PathLike[str]


class Catalogue(_core.Catalogue):
    """Coefficient files, read when first asked for and kept; pass one as `catalogue=` where many refrigerants are made.

    Folders are searched in this order: `folders`, those of the environment variable ZEOTROPE_FLUIDS, the one that
    comes with the package. BadInput for a folder that does not exist.
    """

    def __init__(self, folders: Sequence[Folder] = ()) -> None:
        if isinstance(folders, (str, os.PathLike)):
            raise BadInput(f"folders: found {os.fspath(folders)!r}; a list of folders is wanted")
        packaged = Path(__file__).parent / "fluids"
        # the packaged folder comes last, so those of the environment are named before it
        own = [*_core.Catalogue.standard_folders(), packaged] if packaged.is_dir() else []
        super().__init__([*(Path(f) for f in folders), *own])


def catalogue_from(fluids: Sequence[Folder], catalogue: _core.Catalogue | None) -> _core.Catalogue:
    """The caller's catalogue, or a new one."""
    if catalogue is None:
        return Catalogue(fluids)
    if len(fluids) > 0:
        raise BadInput("fluids and catalogue are both given; at most one is wanted")
    return catalogue
