"""Long work: done once, told how far it is, taken over when its worker is gone."""

from datetime import timedelta

import pytest
from django.utils import timezone

from network.models import Job
from network.services import jobs

pytestmark = pytest.mark.django_db


@pytest.fixture
def work(monkeypatch):
    """Kinds of work that exist for one test; what was done is listed."""
    kinds, done = {}, []
    monkeypatch.setattr(jobs, "WORK", kinds)

    @jobs.kind("count")
    def count(subject, report):
        for step in range(3):
            report(step + 1, 3)
        done.append(subject)
        return "counted"

    @jobs.kind("stumble")
    def stumble(subject, report):
        raise ValueError("a stone lay in the way")

    @jobs.kind("falter")
    def falter(subject, report):
        raise OSError("the disk was busy")

    return done


def waiting(kind, **fields):
    return Job.objects.create(kind=kind, subject="x", asked_at=timezone.now(), **fields)


def test_a_job_runs_after_its_transaction_and_keeps_its_message(
    work, django_capture_on_commit_callbacks
):
    with django_capture_on_commit_callbacks(execute=True):
        job = jobs.ask_for(kind="count", subject="x", by=None, at=timezone.now())
        assert work == []
    job.refresh_from_db()
    assert (job.state, job.message, job.steps_done, job.steps_total) == ("done", "counted", 3, 3)
    assert work == ["x"]


def test_an_error_of_the_input_fails_at_once_with_its_sentence(work):
    job = waiting("stumble")
    jobs.run(job.pk)
    job.refresh_from_db()
    assert job.state == Job.State.FAILED
    assert "a stone lay in the way" in job.message


def test_other_errors_are_tried_three_times(work):
    job = waiting("falter")
    states = []
    for _attempt in range(4):
        jobs.run(job.pk)
        job.refresh_from_db()
        states.append(job.state)
    assert states == ["waiting", "waiting", "failed", "failed"]
    assert job.attempts == 3


def test_a_running_job_is_left_to_its_holder(work):
    now = timezone.now()
    job = waiting("count", state="running", holder="someone", lease_until=now + jobs.LEASE)
    jobs.run(job.pk)
    assert work == []


def test_a_job_whose_holder_is_gone_is_taken_over(work):
    now = timezone.now()
    job = waiting("count", state="running", holder="gone", lease_until=now - timedelta(seconds=1))
    assert jobs.resume_abandoned(at=now) == 1
    job.refresh_from_db()
    assert job.state == Job.State.DONE
    assert work == ["x"]


def test_a_holder_that_lost_its_lease_stops_and_writes_nothing(work):
    @jobs.kind("slow")
    def slow(subject, report):
        Job.objects.filter(pk=job.pk).update(holder="another")
        report(1, 2)
        return "never told"

    job = waiting("slow")
    jobs.run(job.pk)
    job.refresh_from_db()
    assert (job.state, job.holder, job.message) == ("running", "another", "")


def test_an_unknown_kind_is_an_error_of_the_program(work):
    with pytest.raises(KeyError, match="There is no work called 'sing'"):
        jobs.ask_for(kind="sing", subject="", by=None, at=timezone.now())
