"""From an answer of the live lane to what curves are drawn from."""

from app.series.compared import Scene
from app.workers.live import Answer
from stackcore.job.records import JobRecord


def scene_of(record: JobRecord, answer: Answer) -> Scene:
    """Return the scene over the sweep."""
    return Scene(_told(record, answer), answer.question.place, answer.response, answer.others)


def scene_at_markers(record: JobRecord, answer: Answer) -> Scene | None:
    """Return the scene at exactly the frequencies of the markers; None without markers."""
    if answer.at_markers is None:
        return None
    return Scene(_told(record, answer), answer.question.place, answer.at_markers, answer.others_at_markers)


def _told(record: JobRecord, answer: Answer) -> JobRecord:
    """Return the record the answer was asked for; a stack may be gone or renamed by now."""
    return answer.question.job.record if answer.question.job is not None else record
