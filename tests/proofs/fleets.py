"""The fleets of the proofs: written as workbooks and audited once, whatever asks for them."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from datetime import date
from pathlib import Path

from audit.findings.audit import Audit
from audit.pipeline import audit_path
from audit.rule_folder import sample_folder
from tests.proofs.cells import Disturbed, Gaps, change_workbooks
from tests.proofs.situations import write_situations
from tests.sites.fleets import FLEETS, write_fleet
from tests.sites.tarnholt.sound import sound_site

AUDITED_ON = date(2026, 11, 30)
SOUND_FLEETS = tuple(FLEETS)
SEED = 1
DEGRADED = ("disturbed", "disturbed with gaps", "situations")
ALL_FLEETS = (*SOUND_FLEETS, "sound twin", "sample", *DEGRADED)


class Audits(Mapping[str, Audit]):
    """Audits by the name of their fleet, each made when first asked for."""

    def __init__(self, folder: Path) -> None:
        self._folder = folder
        self._made: dict[str, Audit] = {}

    def __getitem__(self, name: str) -> Audit:
        """Give the audit of a fleet."""
        if name not in self._made:
            self._made[name] = audit_path(self.workbooks(name), audited_on=AUDITED_ON)
        return self._made[name]

    def __iter__(self) -> Iterator[str]:
        """Give the names of all fleets."""
        return iter(ALL_FLEETS)

    def __len__(self) -> int:
        """Count the fleets."""
        return len(ALL_FLEETS)

    def workbooks(self, name: str) -> Path:
        """Give the folder with the workbooks of a fleet."""
        match name:
            case "sample":
                return sample_folder()
            case "sound twin":
                return sample_folder() / "sound"
        folder = self._folder / name.replace(" ", "_")
        if not folder.exists():
            self._write(name, folder)
        return folder

    def _write(self, name: str, folder: Path) -> None:
        match name:
            case "disturbed":
                change_workbooks(sound_site(), self.workbooks("sound twin"), folder, Disturbed(seed=1, share=0.12))
            case "disturbed with gaps":
                change_workbooks(sound_site(), self.workbooks("disturbed"), folder, Gaps(seed=2, share=0.08))
            case "situations":
                write_situations(folder)
            case _:
                write_fleet(name, folder, SEED)
