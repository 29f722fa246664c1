"""The health of a material of a job: its medium over the sweep, and the edition it came from."""

from stackcore.job.resolve import Job
from stackcore.media.health import Finding, check_medium, edition_findings
from stackcore.media.health.findings import worst_first


def material_findings(job: Job, name: str) -> tuple[Finding, ...]:
    """Return all that speaks against a material of `job`, or that a user should know of it, the worst first.

    Parameters
    ----------
    name
        Of a material that the job defines.

    Raises
    ------
    KeyError
        When the job has no such material.
    """
    frequencies = job.sweep.frequencies()
    findings = [*check_medium(job.media[name], frequencies)]
    record = job.record.material(name)
    if record is not None and record.library:
        findings += edition_findings(record.library, frequencies)
    return worst_first(findings)
