"""Long work: our own rows with lease and progress, run through the task framework."""

import uuid
from collections.abc import Callable
from datetime import datetime, timedelta

from django.db import transaction
from django.db.models import Q
from django.utils import timezone
from django.utils.translation import gettext as _
from django_tasks import task

from network.models import Job, Person

LEASE = timedelta(minutes=5)  # a worker that says nothing for so long is taken for gone
MOST_ATTEMPTS = 3

Report = Callable[[int, int], None]
WORK: dict[str, Callable[[str, Report], str]] = {}


class Gone(Exception):
    """The lease was taken over by another worker."""


def kind(name: str) -> Callable[[Callable[[str, Report], str]], Callable[[str, Report], str]]:
    """Name a function (subject, report) → message as a kind of long work."""

    def name_it(work: Callable[[str, Report], str]) -> Callable[[str, Report], str]:
        WORK[name] = work
        return work

    return name_it


def ask_for(*, kind: str, subject: str, by: Person | None, at: datetime) -> Job:
    """Write a job's row and hand it to the task framework once the transaction has ended."""
    if kind not in WORK:
        raise KeyError(f"There is no work called {kind!r}.")
    job = Job.objects.create(kind=kind, subject=subject, asked_by=by, asked_at=at)
    transaction.on_commit(lambda: run_task.enqueue(job.pk))
    return job


def resume_abandoned(*, at: datetime) -> int:
    """Hand out again the jobs whose worker is gone or that never began; return how many."""
    waiting = Q(state=Job.State.WAITING, asked_at__lt=at - LEASE)
    gone = Q(state=Job.State.RUNNING, lease_until__lt=at)
    keys = list(Job.objects.filter(waiting | gone).values_list("pk", flat=True))
    for key in keys:
        run_task.enqueue(key)
    return len(keys)


@task()
def run_task(job_id: int) -> None:
    """Run a job in a worker."""
    run(job_id)


def run(job_id: int) -> None:
    """Take the lease of a job and do its work; leave it done or failed with a sentence."""
    holder = uuid.uuid4().hex
    if not _take_lease(job_id, holder):
        return
    job = Job.objects.get(pk=job_id)

    def report(done: int, total: int) -> None:
        _renew(job_id, holder, steps_done=min(done, total), steps_total=total)

    try:
        message = WORK[job.kind](job.subject, report)
        _finish(job_id, holder, state=Job.State.DONE, message=message)
    except Gone:
        return
    except Exception as error:
        # A worker must outlive its work: what went wrong is told where the person looks.
        again = job.attempts < MOST_ATTEMPTS and not isinstance(error, ValueError)
        state = Job.State.WAITING if again else Job.State.FAILED
        told = _("Attempt %(n)d failed: %(error)s") % {"n": job.attempts, "error": error}
        _finish(job_id, holder, state=state, message=told)


def _take_lease(job_id: int, holder: str) -> bool:
    """Become the one holder of a job that waits or whose holder is gone."""
    now = timezone.now()
    free = Q(state=Job.State.WAITING) | Q(state=Job.State.RUNNING, lease_until__lt=now)
    with transaction.atomic():
        job = Job.objects.select_for_update().filter(free, pk=job_id).first()
        if job is None:
            return False
        job.state, job.holder, job.lease_until = Job.State.RUNNING, holder, now + LEASE
        job.attempts += 1
        job.save()
    return True


def _renew(job_id: int, holder: str, *, steps_done: int, steps_total: int) -> None:
    held = Job.objects.filter(pk=job_id, holder=holder, state=Job.State.RUNNING)
    if not held.update(
        steps_done=steps_done, steps_total=steps_total, lease_until=timezone.now() + LEASE
    ):
        raise Gone


def _finish(job_id: int, holder: str, *, state: str, message: str) -> None:
    held = Job.objects.filter(pk=job_id, holder=holder, state=Job.State.RUNNING)
    held.update(state=state, message=message, lease_until=None, holder="")
