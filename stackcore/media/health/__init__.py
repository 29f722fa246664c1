"""Health of a medium: what speaks against it, as data that window and command line show alike."""

from stackcore.media.health.check import check_medium
from stackcore.media.health.editions import edition_findings
from stackcore.media.health.findings import Finding
from stackcore.media.health.kramers_kronig import KramersKronig, kramers_kronig

__all__ = ["Finding", "KramersKronig", "check_medium", "edition_findings", "kramers_kronig"]
