"""The job: what a person writes down, stored in a file, resolved into stacks that can be solved."""

from stackcore.job.codec import job_from_json, job_to_json
from stackcore.job.materials import with_resolved_library
from stackcore.job.ranges import RangeFinding, range_findings
from stackcore.job.resolve import Job
from stackcore.job.store import read_job, write_job

__all__ = [
    "Job",
    "RangeFinding",
    "job_from_json",
    "job_to_json",
    "range_findings",
    "read_job",
    "with_resolved_library",
    "write_job",
]
