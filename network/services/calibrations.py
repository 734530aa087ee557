"""Acts upon calibrations: from tow runs, from a certificate, withdrawn."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime
from itertools import pairwise
from typing import Literal

from django.utils.translation import gettext as _

from network.models import (
    Calibration,
    CalibrationPiece,
    Instrument,
    MeterGroup,
    MeterPair,
    Person,
    TowRun,
)
from network.numerics.meters.meter_rating import Piece, check_pieces
from network.numerics.meters.tow_runs import TowRunFit, fit_tow_runs
from network.numerics.sentences import Refused
from network.services import acts
from network.services.acts import Refusal, open_act

Owner = MeterPair | MeterGroup | Instrument


@dataclass(frozen=True, kw_only=True)
class Run:
    """One tow run: carriage speed in m/s, revolutions counted in seconds."""

    speed_ms: float
    revolutions: float
    seconds: float


@dataclass(frozen=True, kw_only=True)
class Certificate:
    """What the paper of a laboratory says; certificate names a file already kept."""

    laboratory: str = ""
    certificate_number: str = ""
    certificate: str = ""
    lowest_velocity_ms: float | None = None
    highest_velocity_ms: float | None = None
    standard_error_ms: float | None = None
    uncertainty_percent: float | None = None
    outcome: str = Calibration.Outcome.PASSED
    remarks: str = ""


def from_tow_runs(
    *,
    owner: Owner,
    effective_from: datetime,
    runs: Sequence[Run],
    pieces: Literal[1, 2, 3],
    by: Person,
    at: datetime,
    certificate: Certificate = Certificate(),
) -> Calibration:
    """Fit a meter rating to tow runs and keep it with its runs and pieces.

    The certificate's velocity range stands; where it states none the runs' own does.
    Refuses runs that give no rating, naming the run.
    """
    try:
        fitted = fit(runs, pieces=pieces)
    except Refused as refused:
        raise _refusal(refused) from refused
    speeds = [run.speed_ms for run in runs]
    with open_act(_("calibrated by tow runs"), by=by, at=at):
        row = _row(
            owner,
            effective_from,
            certificate,
            source=Calibration.Source.TOW_RUNS,
            fitted={
                "standard_error_ms": fitted.standard_error_ms,
                "lowest_velocity_ms": _given(certificate.lowest_velocity_ms, min(speeds)),
                "highest_velocity_ms": _given(certificate.highest_velocity_ms, max(speeds)),
            },
            by=by,
            at=at,
        )
        _write_pieces(row, fitted.pieces)
        for position, run in enumerate(runs, start=1):
            TowRun.objects.create(calibration=row, position=position, **vars(run))
    return row


def from_certificate(
    *,
    owner: Owner,
    effective_from: datetime,
    by: Person,
    at: datetime,
    pieces: Sequence[Piece] = (),
    certificate: Certificate = Certificate(),
) -> Calibration:
    """Keep the rating that a certificate states; an instrument without an equation has no pieces.

    Refuses pieces that are no rating, naming piece and field.
    """
    if pieces or not isinstance(owner, Instrument):
        _check(pieces)
    with open_act(_("entered a certificate"), by=by, at=at):
        row = _row(
            owner,
            effective_from,
            certificate,
            source=Calibration.Source.CERTIFICATE,
            fitted={},
            by=by,
            at=at,
        )
        _write_pieces(row, pieces)
    return row


def withdraw(*, calibration: Calibration, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a calibration; the one before it then holds on. Signed gaugings keep what they had.

    A gauging that rests on it is reopened by its own act, so that nothing changes unseen.
    """
    with open_act(_("withdrew a calibration"), by=by, at=at, reason=reason):
        acts.withdraw(calibration, by=by, at=at, reason=reason)


def fit(runs: Sequence[Run], *, pieces: Literal[1, 2, 3]) -> TowRunFit:
    """Fit tow runs by one to three straight pieces; raises sentences.Refused."""
    return fit_tow_runs(
        [run.speed_ms for run in runs],
        [run.revolutions for run in runs],
        [run.seconds for run in runs],
        pieces=pieces,
    )


def _row(
    owner: Owner,
    effective_from: datetime,
    certificate: Certificate,
    *,
    source: str,
    fitted: dict[str, float | None],
    by: Person,
    at: datetime,
) -> Calibration:
    stated = vars(certificate) | fitted
    row = Calibration(
        **{_field_of(owner): owner},
        effective_from=effective_from,
        source=source,
        reason=stated.pop("remarks").strip(),
        recorded_by=by,
        recorded_at=at,
        **stated,
    )
    row.full_clean(exclude=["certificate"])
    row.save()
    return row


def _field_of(owner: Owner) -> str:
    return {MeterPair: "pair", MeterGroup: "group", Instrument: "instrument"}[type(owner)]


def _write_pieces(row: Calibration, pieces: Sequence[Piece]) -> None:
    for piece in pieces:
        CalibrationPiece.objects.create(
            calibration=row,
            lowest_n=piece.n_from,
            highest_n=piece.n_to,
            a_ms=piece.a_ms,
            b_m=piece.b_m,
        )


def _check(pieces: Sequence[Piece]) -> None:
    try:
        check_pieces(pieces)
    except Refused as refused:
        raise _refusal(refused) from refused
    if any(upper.n_from > lower.n_to + 1e-6 for lower, upper in pairwise(pieces)):
        raise Refusal(_("Between two pieces there is a hole in the range of n."), field="pieces")


def _refusal(refused: Refused) -> Refusal:
    said = refused.sentence
    field = f"{refused.field_name or 'pieces'}"
    where = "" if refused.row is None else f".{refused.row - 1}"
    return Refusal(_(said.text).format(**said.values), field=f"{field}{where}")


def _given(stated: float | None, otherwise: float) -> float:
    return otherwise if stated is None else stated
